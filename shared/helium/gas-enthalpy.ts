import { DomainError } from '#shared/errors'
import { monotoneCurve } from '#shared/helium/monotone-curve'

/** Temperatures of the enthalpy table, K. */
const TEMPERATURE_K = [
  4.2224, 5, 6, 8, 10, 15, 20, 30, 40, 50, 60, 77, 80, 100, 150, 200, 250, 273.15, 300,
] as const

/** Enthalpy of the gas above saturated vapour at 101.325 kPa, kJ/kg: equation of state of Ortiz-Vega et al. (CoolProp coefficients). */
const ABOVE_VAPOUR_KJ_PER_KG = [
  0, 5.9911, 12.3171, 23.8081, 34.7710, 61.4523, 87.7643, 140.0405, 192.1445, 244.1792, 296.1787, 384.5359,
  400.1248, 504.0354, 763.7500, 1023.4302, 1283.0977, 1403.3215, 1542.7593,
] as const

const curve = monotoneCurve(TEMPERATURE_K, ABOVE_VAPOUR_KJ_PER_KG)

/**
 * Heat that helium gas takes up between saturated vapour and a temperature, at 101.325 kPa. From 4.2 K to 300 K it is
 * 75 times the latent heat, which is why the share of it that a cryostat uses decides what a cooldown costs.
 *
 * @param temperatureK Gas temperature, K, from the boiling point to 300 K; below it the answer is zero.
 * @returns Enthalpy above saturated vapour, J/kg.
 * @throws DomainError above 300 K or when the temperature is no number.
 */
export function gasEnthalpyJPerKg(temperatureK: number): number {
  if (!(temperatureK <= 300)) {
    throw new DomainError('invalid', 'The gas enthalpy is known up to 300 K. Enter a temperature of 300 K or less.', ['temperatureK'])
  }
  return curve(temperatureK) * 1000
}
