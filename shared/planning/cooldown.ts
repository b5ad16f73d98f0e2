import { DomainError } from '#shared/errors'
import { gasEnthalpyJPerKg } from '#shared/helium/gas-enthalpy'
import { HELIUM_LATENT_HEAT_J_PER_KG, HELIUM_LIQUID_DENSITY_KG_PER_M3 } from '#shared/helium/properties'
import { heatSlices } from '#shared/materials/enthalpy'
import type { ColdMassPart } from '#shared/planning/types'

/** Temperature down to which liquid helium at 101.325 kPa cools, K; what a run does below it costs no enthalpy worth counting. */
const LIQUID_HELIUM_K = 4.2

/** Relative uncertainty of the specific-heat fits, as their source states. */
export const SPECIFIC_HEAT_UNCERTAINTY = 0.05

/** Heat of the whole cold mass in slices, each with the enthalpy of the gas at its temperature. */
interface CoolingSlice {
  readonly heatJ: number
  readonly gasJPerKg: number
}

function coolingSlices(coldMass: readonly ColdMassPart[], startK: number): CoolingSlice[] {
  return coldMass.flatMap(({ material, massKg }, row) => {
    if (!(massKg >= 0 && Number.isFinite(massKg))) {
      throw new DomainError('invalid', `The mass of part ${row + 1} of the cold mass is not a number of kilograms. Enter zero or more.`, ['coldMass', row, 'massKg'])
    }
    return heatSlices(material, startK, LIQUID_HELIUM_K).map(({ temperatureK, heatJPerKg }) =>
      ({ heatJ: massKg * heatJPerKg, gasJPerKg: gasEnthalpyJPerKg(temperatureK) }))
  })
}

function litresFor(slices: readonly CoolingSlice[], gasUseShare: number): number {
  const heliumKg = slices.reduce((sum, { heatJ, gasJPerKg }) => sum + heatJ / (HELIUM_LATENT_HEAT_J_PER_KG + gasUseShare * gasJPerKg), 0)
  return heliumKg / HELIUM_LIQUID_DENSITY_KG_PER_M3 * 1000
}

/**
 * Liquid helium that a cold mass evaporates while it is cooled: ∫ c_p dT / (L + s·h(T)), where h(T) is the enthalpy of the
 * gas above saturated vapour and s the share of it that the cryostat really uses (0: only latent heat; 1: the gas leaves
 * as warm as the metal).
 *
 * @param coldMass Parts of the cold mass, kilograms by material.
 * @param startK Start temperature, K: 300 from room temperature, 77 after nitrogen; up to 300.
 * @param gasUseShare Share of the gas enthalpy used, 0 to 1.
 * @returns Litres of liquid at 4.2 K and 101.325 kPa.
 * @throws DomainError for a share outside 0 to 1, a negative mass, or a temperature outside 4 K to 300 K.
 * Source: energy balance; the two ends agree with handbook tables of litres per kilogram within 10 % for copper and aluminium.
 */
export function cooldownLitres(coldMass: readonly ColdMassPart[], startK: number, gasUseShare: number): number {
  if (!(gasUseShare >= 0 && gasUseShare <= 1)) {
    throw new DomainError('invalid', 'The share of the gas enthalpy used is a number from 0 to 1.', ['gasUseShare'])
  }
  return litresFor(coolingSlices(coldMass, startK), gasUseShare)
}

/**
 * Share of the gas enthalpy that a finished cooldown used, from the litres it took: the inverse of `cooldownLitres`.
 *
 * @param coldMass Parts of the cold mass.
 * @param startK Start temperature, K.
 * @param usedLitres Litres of liquid evaporated by the cooldown, above zero.
 * @returns Share from 0 to 1; 1 when even the whole gas enthalpy would not explain so little, 0 when more was used than latent heat asks.
 * @throws DomainError when the litres are not above zero or there is no cold mass.
 */
export function gasUseShareFromCooldown(coldMass: readonly ColdMassPart[], startK: number, usedLitres: number): number {
  const slices = coolingSlices(coldMass, startK)
  if (!(usedLitres > 0) || litresFor(slices, 1) === 0) {
    throw new DomainError('invalid', 'A share can be learned only from a cooldown that used helium on a known cold mass.', ['usedLitres'])
  }
  if (usedLitres >= litresFor(slices, 0)) return 0
  if (usedLitres <= litresFor(slices, 1)) return 1
  let [low, high] = [0, 1]
  for (let step = 0; step < 40; step++) {
    const middle = (low + high) / 2
    if (litresFor(slices, middle) > usedLitres) low = middle
    else high = middle
  }
  return (low + high) / 2
}
