import { DomainError } from '#shared/errors'

/**
 * Copper reference equation: C = Σ Aₙ Tⁿ with Aₙ in mJ/(mol K^(n+1)), odd n.
 * Source: D. W. Osborne, H. E. Flotow and F. Schreiner, Rev. Sci. Instrum. 38, 159 (1967), for the 1965 Calorimetry
 * Conference copper standard. Coefficients from memory; plausible, since A₃ gives Θ_D = 344.5 K and C(20 K) = 0.462 J/(mol K).
 */
export const COPPER_REFERENCE_COEFFICIENTS: readonly (readonly [power: number, coefficient: number])[] = [
  [1, 0.69434], [3, 4.7548e-2], [5, 1.6314e-6], [7, 9.4786e-8], [9, -1.3639e-10], [11, 5.3898e-14],
]

/** Temperatures over which the equation holds, K. */
export const COPPER_REFERENCE_RANGE_K: readonly [number, number] = [1, 25]

/** How the equation is named where it is used. */
export const COPPER_REFERENCE_SOURCE = 'Copper reference equation, D. W. Osborne, H. E. Flotow and F. Schreiner, Rev. Sci. Instrum. 38, 159 (1967); coefficients from memory'

/**
 * Heat capacity of copper by the published reference equation.
 *
 * @param temperatureK temperature, K, within `COPPER_REFERENCE_RANGE_K`
 * @returns mJ/(mol K)
 * @throws DomainError outside the equation's range
 */
export function copperReferenceHeatCapacity(temperatureK: number): number {
  const [low, high] = COPPER_REFERENCE_RANGE_K
  if (!(temperatureK >= low && temperatureK <= high)) {
    throw new DomainError('invalid', `The copper reference equation holds from ${low} K to ${high} K. Leave the point at ${temperatureK} K out of the comparison.`, ['temperatureK'])
  }
  return COPPER_REFERENCE_COEFFICIENTS.reduce((sum, [power, coefficient]) => sum + coefficient * temperatureK ** power, 0)
}
