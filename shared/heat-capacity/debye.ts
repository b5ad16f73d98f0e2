import { DomainError } from '#shared/errors'
import type { Estimate } from '#shared/heat-capacity/types'
import { DEBYE_T3_CONSTANT_J_PER_MOL_K } from '#shared/materials/constants'

/** ζ(s) for s ≥ 2: the direct sum with the first Euler–Maclaurin corrections for its tail, good to double precision. */
function zeta(s: number): number {
  const last = 30
  let sum = 0
  for (let k = last - 1; k >= 1; k -= 1) sum += k ** -s
  return sum + last ** (1 - s) / (s - 1) + last ** -s / 2 + s * last ** (-s - 1) / 12 - s * (s + 1) * (s + 2) * last ** (-s - 3) / 720
    + s * (s + 1) * (s + 2) * (s + 3) * (s + 4) * last ** (-s - 5) / 30240
}

/** B₂ₖ/(2k)! = (−1)^(k+1) 2ζ(2k)/(2π)^(2k), for k = 1 … 20. */
const BERNOULLI_OVER_FACTORIAL = Array.from({ length: 20 }, (_, index) => (index % 2 === 0 ? 2 : -2) * zeta(2 * index + 2) / (2 * Math.PI) ** (2 * index + 2))

/** n! ζ(n + 1): the whole integral from 0 to ∞, for n = 1 … 4. */
const WHOLE_INTEGRAL = [1, 2, 6, 24].map((factorial, index) => factorial * zeta(index + 2))

/** Order of a Debye function. */
export type DebyeOrder = 1 | 2 | 3 | 4

/**
 * Debye function Dₙ(x) = (n/xⁿ) ∫₀ˣ tⁿ/(eᵗ − 1) dt. Below x = 2 by its power series in Bernoulli numbers, above it as the whole
 * integral less the exponential series of the tail, so that neither cancels. Relative error under 1e-14.
 * Source: M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions, 27.1.1 to 27.1.3.
 *
 * @param order n, 1 to 4
 * @param x zero or more, dimensionless; infinity gives 0
 * @returns Dₙ(x), from 1 at x = 0 to 0
 * @throws DomainError when x is negative or no number
 */
export function debyeFunction(order: DebyeOrder, x: number): number {
  if (!(x >= 0)) throw new DomainError('invalid', 'A Debye function needs an argument of zero or more. Check the temperature and Θ_D.', ['x'])
  if (x < 2) {
    const square = x * x
    let power = 1
    let sum = 1 - order * x / (2 * (order + 1))
    for (let k = 1; k <= BERNOULLI_OVER_FACTORIAL.length; k += 1) {
      power *= square
      sum += order * BERNOULLI_OVER_FACTORIAL[k - 1]! * power / (2 * k + order)
    }
    return sum
  }
  if (x === Infinity) return 0
  return order * (WHOLE_INTEGRAL[order - 1]! - tailIntegral(order, x)) / x ** order
}

/** ∫ₓ^∞ tⁿ/(eᵗ − 1) dt = Σₖ e^(−kx) (xⁿ/k + n xⁿ⁻¹/k² + … + n!/kⁿ⁺¹). */
function tailIntegral(order: number, x: number): number {
  let sum = 0
  for (let k = 1; k <= 24; k += 1) {
    const weight = Math.exp(-k * x)
    if (weight === 0) break
    let term = x ** order / k
    let polynomial = term
    for (let step = order; step >= 1; step -= 1) {
      term *= step / (x * k)
      polynomial += term
    }
    const part = weight * polynomial
    sum += part
    if (part < sum * 1e-17) break
  }
  return sum
}

/**
 * Debye heat capacity as a share of its classical value: C/(3rR) = 4D₃(Θ/T) − 3(Θ/T)/(e^(Θ/T) − 1).
 * Source: P. Debye, Ann. Phys. 344, 789 (1912). Cold it is (4π⁴/5)(T/Θ)³, warm 1 − (Θ/T)²/20.
 *
 * @param reducedTemperature T/Θ_D, zero or more, dimensionless
 * @returns 0 to 1
 * @throws DomainError when the temperature is negative or no number
 * @example debyeHeatCapacity(0.1) // 0.0758
 */
export function debyeHeatCapacity(reducedTemperature: number): number {
  const x = 1 / reducedTemperature
  const value = debyeFunction(3, x)
  return x > 700 ? 4 * value : 4 * value - 3 * xOverExpm1(x)
}

/**
 * Heat taken up from absolute zero by a Debye lattice: U/(3rRΘ_D) = (T/Θ) D₃(Θ/T), zero-point energy left out.
 *
 * @param reducedTemperature T/Θ_D, zero or more
 */
export function debyeEnergy(reducedTemperature: number): number {
  return reducedTemperature === 0 ? 0 : reducedTemperature * debyeFunction(3, 1 / reducedTemperature)
}

/**
 * Entropy of a Debye lattice: S/(3rR) = (4/3) D₃(Θ/T) − ln(1 − e^(−Θ/T)).
 *
 * @param reducedTemperature T/Θ_D, zero or more
 */
export function debyeEntropy(reducedTemperature: number): number {
  const x = 1 / reducedTemperature
  return 4 / 3 * debyeFunction(3, x) - Math.log(-Math.expm1(-x))
}

/** x/(eˣ − 1), 1 at zero. */
function xOverExpm1(x: number): number {
  return x === 0 ? 1 : x / Math.expm1(x)
}

/**
 * Einstein heat capacity C/(3R) per oscillating atom, x²eˣ/(eˣ − 1)² with x = Θ_E/T.
 * Source: A. Einstein, Ann. Phys. 327, 180 (1907).
 *
 * @param reducedTemperature T/Θ_E, zero or more
 * @returns 0 to 1
 */
export function einsteinHeatCapacity(reducedTemperature: number): number {
  if (!(reducedTemperature >= 0)) throw new DomainError('invalid', 'An Einstein heat capacity needs a temperature of zero or more. Check the temperature and Θ_E.', ['temperatureK'])
  const x = 1 / reducedTemperature
  if (x > 740) return 0
  const ratio = xOverExpm1(x)
  // x²eˣ/(eˣ − 1)² = x/(eˣ − 1) · x/(1 − e⁻ˣ), which neither overflows nor cancels.
  return ratio * (x === 0 ? 1 : x / -Math.expm1(-x))
}

/**
 * Schottky heat capacity of two levels per mole of systems, C/R = x² g e⁻ˣ/(1 + g e⁻ˣ)² with x = Δ/T.
 * Source: W. Schottky, Phys. Z. 23, 448 (1922); E. S. R. Gopal, Specific Heats at Low Temperatures, eq. 5.3.
 *
 * @param reducedTemperature T/Δ with the gap Δ as a temperature; zero or more
 * @param degeneracyRatio g = g₁/g₀, degeneracy of the upper level over that of the lower; 1 when left out
 * @returns C/R; warm it is g/(1+g)² (Δ/T)², the T⁻² tail
 * @example schottkyHeatCapacity(0.41678) // 0.4392, the peak for g = 1
 */
export function schottkyHeatCapacity(reducedTemperature: number, degeneracyRatio = 1): number {
  if (!(reducedTemperature >= 0) || !(degeneracyRatio > 0)) {
    throw new DomainError('invalid', 'A Schottky anomaly needs a temperature of zero or more and a degeneracy ratio above zero. Check both.', ['degeneracyRatio'])
  }
  const x = 1 / reducedTemperature
  if (x > 740) return 0
  const occupied = degeneracyRatio * Math.exp(-x)
  return x * x * occupied / (1 + occupied) ** 2
}

/**
 * Debye temperature of a lattice term: Θ_D = (12π⁴ r R/5β₃)^(1/3); its relative standard error is a third of that of β₃.
 *
 * @param beta3 coefficient of T³ per mole of formula units, mJ/(mol K⁴)
 * @param atomsPerFormulaUnit r; with the wrong r the same data give another Θ_D
 * @param beta3StandardError standard error of β₃, mJ/(mol K⁴); 0 when left out
 * @returns Θ_D in K, or undefined when β₃ is not above zero: then there is no Debye temperature
 * @throws DomainError when r is not above zero
 * @example debyeTemperatureFromBeta3(0.047548, 1)?.value // 344.485, copper
 */
export function debyeTemperatureFromBeta3(beta3: number, atomsPerFormulaUnit: number, beta3StandardError = 0): Estimate | undefined {
  if (!(atomsPerFormulaUnit > 0)) throw new DomainError('invalid', 'Atoms per formula unit must be above zero. Check the formula of the sample.', ['atomsPerFormulaUnit'])
  if (!(beta3 > 0)) return undefined
  const value = Math.cbrt(DEBYE_T3_CONSTANT_J_PER_MOL_K * 1000 * atomsPerFormulaUnit / beta3)
  return { value, standardError: value * beta3StandardError / (3 * beta3), unit: 'K' }
}

/**
 * Lattice coefficient of a Debye temperature, the inverse of `debyeTemperatureFromBeta3`.
 *
 * @param debyeTemperatureK Θ_D, K, above zero
 * @param atomsPerFormulaUnit r
 * @returns β₃, mJ/(mol K⁴)
 */
export function beta3FromDebyeTemperature(debyeTemperatureK: number, atomsPerFormulaUnit: number): number {
  return DEBYE_T3_CONSTANT_J_PER_MOL_K * 1000 * atomsPerFormulaUnit / debyeTemperatureK ** 3
}
