import { DomainError } from '#shared/errors'

/** Lanczos coefficients for ln Γ, g = 7, n = 9. Source: P. Godfrey (2001), as used in many numerical libraries; good to 1e-15. */
const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
]

function logGamma(z: number): number {
  const x = z - 1
  const t = x + 7.5
  const sum = LANCZOS.reduce((total, coefficient, i) => i === 0 ? coefficient : total + coefficient / (x + i), 0)
  return 0.5 * Math.log(2 * Math.PI) + (x + 0.5) * Math.log(t) - t + Math.log(sum)
}

/** Continued fraction of the incomplete beta function by Lentz's method. Source: Abramowitz and Stegun, 26.5.8. */
function betaFraction(x: number, a: number, b: number): number {
  const tiny = 1e-300
  let c = 1
  let d = 1 / Math.max(1 - (a + b) * x / (a + 1), tiny)
  let fraction = d
  for (let m = 1; m <= 500; m += 1) {
    for (const step of [m * (b - m) * x / ((a + 2 * m - 1) * (a + 2 * m)), -(a + m) * (a + b + m) * x / ((a + 2 * m) * (a + 2 * m + 1))]) {
      d = 1 / (1 + step * d || tiny)
      c = 1 + step / c || tiny
      fraction *= c * d
    }
    if (Math.abs(c * d - 1) < 1e-16) break
  }
  return fraction
}

function incompleteBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0
  if (x >= 1) return 1
  const front = Math.exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log1p(-x))
  return x < (a + 1) / (a + b + 2) ? front * betaFraction(x, a, b) / a : 1 - front * betaFraction(1 - x, b, a) / b
}

/**
 * Chance that |t| of Student's distribution stays within a bound. Source: Abramowitz and Stegun, 26.7.1.
 *
 * @param bound 0 or more
 * @param degreesOfFreedom ν, above 0
 */
export function studentCoverage(bound: number, degreesOfFreedom: number): number {
  return incompleteBeta(bound * bound / (degreesOfFreedom + bound * bound), 0.5, degreesOfFreedom / 2)
}

/** Above this ν Student's distribution is the normal one to 1e-6 of the bound. */
const NEARLY_NORMAL = 1e6

/**
 * How many standard errors on either side cover a share of cases: 1.96 for 95 % with known errors, more with few degrees of freedom.
 *
 * @param coverage share, 0 to 1 exclusive, e.g. 0.95
 * @param degreesOfFreedom ν; infinity for known errors
 * @throws DomainError for a share or a ν out of range
 * @example coverageFactor(0.95, 10) // 2.228
 */
export function coverageFactor(coverage: number, degreesOfFreedom: number): number {
  if (!(coverage > 0 && coverage < 1)) throw new DomainError('invalid', 'The coverage must lie between 0 and 100 %. Enter for example 95 %.', ['coverage'])
  if (!(degreesOfFreedom > 0)) throw new DomainError('invalid', 'Without degrees of freedom there is no interval. Widen the window.', ['windowK'])
  const freedom = Math.min(degreesOfFreedom, NEARLY_NORMAL)
  let low = 0
  let high = 2
  while (studentCoverage(high, freedom) < coverage) high *= 2
  for (let step = 0; step < 80 && high - low > 1e-14 * high; step += 1) {
    const middle = (low + high) / 2
    if (studentCoverage(middle, freedom) < coverage) low = middle
    else high = middle
  }
  return (low + high) / 2
}
