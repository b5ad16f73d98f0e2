/**
 * A smooth curve through points that never overshoots between them: piecewise cubic Hermite with Fritsch–Carlson slopes.
 *
 * @param x Abscissae, strictly rising, two or more.
 * @param y Ordinates, as many as abscissae.
 * @returns A function of x, held constant outside the points.
 * @throws RangeError when the points are fewer than two, differ in number or do not rise: a fault of the table, not of a user.
 * Source: F. N. Fritsch and R. E. Carlson, SIAM J. Numer. Anal. 17, 238 (1980); slopes by the weighted harmonic mean of
 * F. N. Fritsch and J. Butland (1984).
 */
export function monotoneCurve(x: readonly number[], y: readonly number[]): (at: number) => number {
  const n = x.length
  if (n < 2 || y.length !== n) throw new RangeError('monotoneCurve needs two or more points, with one ordinate each')
  const at = (values: readonly number[], index: number): number => values[index] as number
  const width: number[] = []
  const secant: number[] = []
  for (let i = 0; i < n - 1; i++) {
    const h = at(x, i + 1) - at(x, i)
    if (!(h > 0)) throw new RangeError('monotoneCurve needs strictly rising abscissae')
    width.push(h)
    secant.push((at(y, i + 1) - at(y, i)) / h)
  }
  const slope = Array.from({ length: n }, (_, i) => {
    if (i === 0) return at(secant, 0)
    if (i === n - 1) return at(secant, n - 2)
    const [before, after] = [at(secant, i - 1), at(secant, i)]
    if (before * after <= 0) return 0
    const [hBefore, hAfter] = [at(width, i - 1), at(width, i)]
    const [w1, w2] = [2 * hAfter + hBefore, hAfter + 2 * hBefore]
    return (w1 + w2) / (w1 / before + w2 / after)
  })

  return (value) => {
    if (value <= at(x, 0)) return at(y, 0)
    if (value >= at(x, n - 1)) return at(y, n - 1)
    let [low, high] = [0, n - 1]
    while (high - low > 1) {
      const middle = (low + high) >> 1
      if (at(x, middle) <= value) low = middle
      else high = middle
    }
    const h = at(width, low)
    const t = (value - at(x, low)) / h
    return at(y, low) * (1 + 2 * t) * (1 - t) ** 2
      + h * at(slope, low) * t * (1 - t) ** 2
      + at(y, low + 1) * t ** 2 * (3 - 2 * t)
      + h * at(slope, low + 1) * t ** 2 * (t - 1)
  }
}
