import { describe, expect, it } from 'vitest'
import { correlationInflation, erfc, median, runsTest } from '#shared/heat-capacity/statistics'
import { normals } from '../../../support/heat-capacity-files'

/** Lower-tail probability of the runs by listing every order of the signs. */
function listed(runs: number, positive: number, negative: number): number {
  let few = 0
  let all = 0
  const total = positive + negative
  for (let mask = 0; mask < 1 << total; mask += 1) {
    const signs = Array.from({ length: total }, (_, bit) => (mask >> bit) & 1)
    if (signs.reduce<number>((sum, sign) => sum + sign, 0) !== positive) continue
    all += 1
    if (signs.reduce<number>((count, sign, index) => count + (index === 0 || sign !== signs[index - 1] ? 1 : 0), 0) <= runs) few += 1
  }
  return few / all
}

describe('runs test', () => {
  it.each([[[1, 1, 1, 1, -1, -1, -1, -1]], [[1, -1, 1, -1, 1, -1, 1]], [[1, 1, -1, -1, -1, 1, 1, -1, 1, 1, 1]], [[-1, 1, 1, 1, 1, 1, 1, 1, 1, -1]]])('agrees with listing every order of %j', (signs) => {
    const positive = signs.filter(sign => sign > 0).length
    const { pValue, runs } = runsTest(signs)
    expect(pValue).toBeCloseTo(listed(runs, positive, signs.length - positive), 12)
  })

  it('goes over into the normal approximation without a step', () => {
    /** As many of either sign, in so many runs: all runs but the last two have one. */
    const inRuns = (half: number, runs: number) => {
      const left = half - Math.floor(runs / 2) + 1
      const single = Array.from({ length: 2 * Math.floor(runs / 2) - 2 }, (_, index) => index % 2 === 0 ? 1 : -1)
      return [...single, ...Array.from({ length: left }, () => 1), ...Array.from({ length: left }, () => -1)]
    }
    const exact = runsTest(inRuns(40, 32))
    const normal = runsTest(inRuns(41, 34))
    expect([exact.runs, normal.runs]).toEqual([32, 34])
    // Exact to 40 of a sign, normal above: (32.5 − 41)/4.444 is z = −1.91, (34.5 − 42)/4.500 is −1.67.
    expect(exact.pValue).toBeCloseTo(erfc(1.9127 / Math.SQRT2) / 2, 2)
    expect(normal.pValue).toBeCloseTo(erfc(1.6667 / Math.SQRT2) / 2, 4)
  })

  it('calls random residuals random about as often as it says', () => {
    const normal = normals(3)
    const share = Array.from({ length: 2000 }, () => runsTest(Array.from({ length: 60 }, normal)).pValue).filter(p => p < 0.05).length / 2000
    // The exact test is discrete, so it stays at or under its level.
    expect(share).toBeGreaterThan(0.02)
    expect(share).toBeLessThan(0.06)
  })

  it('takes residuals of one sign for what they are', () => {
    expect(runsTest([1, 2, 3, 4]).pValue).toBe(0.125)
    expect(runsTest([1]).pValue).toBe(1)
    expect(runsTest([]).pValue).toBe(1)
  })
})

describe('other statistics', () => {
  it.each([[0, 1], [1, 0.15729920705028513], [2, 0.004677734981047266], [-1, 1.8427007929497148]])('erfc(%d)', (x, expected) => {
    // A&S table 7.1 and mpmath.
    expect(Math.abs(erfc(x) / expected - 1)).toBeLessThan(1.2e-7)
  })

  it('finds the median', () => {
    expect(median([3, 1, 2])).toBe(2)
    expect(median([4, 1, 2, 3])).toBe(2.5)
  })

  it('widens errors for residuals that hang together, not for noise', () => {
    const normal = normals(5)
    expect(correlationInflation(Array.from({ length: 400 }, normal))).toBe(1)
    let last = 0
    // ρ = 0.6: √((1 + 0.6)/(1 − 0.6)) = 2.
    expect(correlationInflation(Array.from({ length: 20_000 }, () => last = 0.6 * last + 0.8 * normal()))).toBeCloseTo(2, 1)
    expect(correlationInflation([0, 0, 0, 0, 0])).toBe(1)
  })
})
