/**
 * Properties of helium and nitrogen at their normal boiling points (101.325 kPa), and the conversions that rest on them.
 *
 * Source of the figures unless said otherwise: Helmholtz-energy equations of state, helium after Ortiz-Vega et al.,
 * nitrogen after Span et al., J. Phys. Chem. Ref. Data 29, 1361 (2000), with the coefficients published in CoolProp (MIT).
 * A second public source (McCarty and Arp; Jacobsen) agrees within 0.4 % in density and 1 % in latent heat.
 */
import { DomainError } from '#shared/errors'

/** Standard atmosphere, Pa (exact). */
export const STANDARD_ATMOSPHERE_PA = 101_325

/** Temperature of liquid helium boiling at 101.325 kPa on the ITS-90, K. */
export const HELIUM_BOILING_POINT_K = 4.2221

/** Density of saturated liquid helium at 101.325 kPa, kg/m³ (equally g/L). */
export const HELIUM_LIQUID_DENSITY_KG_PER_M3 = 124.669

/** Density of saturated helium vapour at 101.325 kPa, kg/m³. */
export const HELIUM_SATURATED_VAPOUR_DENSITY_KG_PER_M3 = 16.9026

/** Latent heat of helium at 101.325 kPa, J/kg. Public sources differ by about 1.5 %. */
export const HELIUM_LATENT_HEAT_J_PER_KG = 20_564.4

/** Density of saturated liquid nitrogen at 101.325 kPa, kg/m³. */
export const NITROGEN_LIQUID_DENSITY_KG_PER_M3 = 806.085

/** Boiling point of nitrogen at 101.325 kPa, K. */
export const NITROGEN_BOILING_POINT_K = 77.355

/** Molar gas constant, J/(mol K), exact since the 2019 SI (CODATA 2018). */
const GAS_CONSTANT_J_PER_MOL_K = 8.314462618

/** Molar masses, kg/mol: IUPAC standard atomic weights. */
const MOLAR_MASS_KG_PER_MOL = { helium: 4.002602e-3, nitrogen: 28.0134e-3 } as const

/** Deviation of real from ideal gas density at 101.325 kPa near room temperature, from the equations of state above. */
const COMPRESSIBILITY = { helium: 1.0005, nitrogen: 0.9997 } as const

/** A cryogenic liquid whose gas can displace the air of a room. */
export type CryogenicFluid = 'helium' | 'nitrogen'

/** Density of each saturated liquid at 101.325 kPa, kg/m³ (equally g/L). */
export const LIQUID_DENSITY_KG_PER_M3: Readonly<Record<CryogenicFluid, number>> = {
  helium: HELIUM_LIQUID_DENSITY_KG_PER_M3,
  nitrogen: NITROGEN_LIQUID_DENSITY_KG_PER_M3,
}

/**
 * Litres of liquid helium that a heat load evaporates in an hour: 1.404 L/h for one watt.
 *
 * @param powerW Heat load, W, zero or more.
 * @returns Litres of liquid at 4.2 K and 101.325 kPa, evaporated per hour.
 */
export function boilOffLitresPerHour(powerW: number): number {
  return powerW / HELIUM_LATENT_HEAT_J_PER_KG / HELIUM_LIQUID_DENSITY_KG_PER_M3 * 1000 * 3600
}

/**
 * Heat load that evaporates a given boil-off: the inverse of `boilOffLitresPerHour`.
 *
 * @param litresPerHour Litres of liquid helium evaporated per hour.
 * @returns Heat load, W.
 */
export function heatLoadW(litresPerHour: number): number {
  return litresPerHour / boilOffLitresPerHour(1)
}

/**
 * Share of the evaporated helium that leaves a vented vessel; the rest stays behind as saturated vapour in the space the
 * liquid gave up: (ρ_liquid − ρ_vapour)/ρ_liquid = 0.864.
 */
export const OUTGOING_GAS_SHARE = 1 - HELIUM_SATURATED_VAPOUR_DENSITY_KG_PER_M3 / HELIUM_LIQUID_DENSITY_KG_PER_M3

/**
 * Fall of the level behind a flow of gas that leaves a vented vessel: gas worth 1.404 L/h of liquid leaves while the level
 * falls by 1.624 L/h, because cold vapour stays to fill the space. At constant pressure the energy balance is
 * Q = L·(evaporated mass), so a heat load sets the fall of the level itself (`boilOffLitresPerHour`) and the gas meter
 * sees less than that. Vapour warmer than the liquid fills the space with less mass, so a real vessel lies in between.
 *
 * @param outgoingLitresPerHour Gas leaving, as litres of liquid per hour.
 * @returns Fall of the liquid volume, L/h.
 */
export function levelFallLitresPerHour(outgoingLitresPerHour: number): number {
  return outgoingLitresPerHour / OUTGOING_GAS_SHARE
}

/**
 * Density of helium or nitrogen gas at 101.325 kPa near room temperature, within 0.1 % from 250 K to 320 K.
 *
 * @param temperatureK Gas temperature, K, 250 to 320.
 * @param fluid Which gas.
 * @returns Density, kg/m³.
 * @throws DomainError when the temperature is outside 250 K to 320 K.
 */
export function gasDensityKgPerM3(temperatureK: number, fluid: CryogenicFluid = 'helium'): number {
  if (!(temperatureK >= 250 && temperatureK <= 320)) {
    throw new DomainError('invalid', 'A volume of gas needs the gas temperature. Enter a temperature from 250 K to 320 K.', ['gasTemperatureK'])
  }
  return STANDARD_ATMOSPHERE_PA * MOLAR_MASS_KG_PER_MOL[fluid] / (GAS_CONSTANT_J_PER_MOL_K * temperatureK * COMPRESSIBILITY[fluid])
}

/**
 * Litres of gas at 101.325 kPa that one litre of liquid becomes (helium: 698 at 0 °C, 750 at 20 °C).
 *
 * @param gasTemperatureK Gas temperature, K, 250 to 320.
 * @param fluid Which liquid.
 * @returns Litres of gas per litre of liquid.
 * @throws DomainError when the temperature is outside 250 K to 320 K.
 */
export function gasLitresPerLiquidLitre(gasTemperatureK: number, fluid: CryogenicFluid = 'helium'): number {
  return LIQUID_DENSITY_KG_PER_M3[fluid] / gasDensityKgPerM3(gasTemperatureK, fluid)
}
