import { DomainError } from '#shared/errors'
import { debyeHeatCapacityJPerMolK } from '#shared/materials/debye-heat-capacity'

/** Materials of which the cold mass of a cryostat is listed. */
export const COLD_MASS_MATERIALS = ['copper', 'aluminium', 'stainless-steel', 'lead', 'niobium', 'silver', 'titanium'] as const

/** One material of a cold mass. */
export type ColdMassMaterial = typeof COLD_MASS_MATERIALS[number]

/** Lowest and highest temperature of the heat-capacity fits, K. */
export const ENTHALPY_RANGE_K: readonly [number, number] = [4, 300]

/**
 * log₁₀ c_p/(J/(kg K)) = Σ aᵢ (log₁₀ T/K)ⁱ, 4 K to 300 K, stated within about 5 %.
 * Source: NIST, cryogenic material properties, https://trc.nist.gov/cryogenics/materials/ (OFHC copper, 6061-T6 aluminium,
 * 304 stainless steel). Handbook "steel" from 77 K is iron-like and needs only two thirds of what 304 needs.
 */
const NIST_FIT: Readonly<Partial<Record<ColdMassMaterial, readonly number[]>>> = {
  'copper': [-1.91844, -0.15973, 8.61013, -18.996, 21.9661, -12.7328, 3.54322, -0.3797],
  'aluminium': [46.6467, -314.292, 866.662, -1298.3, 1162.27, -637.795, 210.351, -38.3094, 2.96344],
  'stainless-steel': [22.0061, -127.5528, 303.647, -381.0098, 274.0328, -112.9212, 24.7593, -2.239153],
}

/**
 * Metals without a fit here: a Debye lattice with γT, whose Θ_D is the one that gives the measured enthalpy H(298.15 K) − H(0)
 * of the SGTE unary data (not the low-temperature Θ_D, which misses it by 5 to 14 %). γ in J/(mol K²): common handbook values,
 * from memory; at 300 K γT is under 10 % of c_p.
 */
const DEBYE_MODEL: Readonly<Partial<Record<ColdMassMaterial, { thetaK: number, gamma: number, molarMassKg: number }>>> = {
  lead: { thetaK: 76.5, gamma: 2.98e-3, molarMassKg: 0.2072 },
  niobium: { thetaK: 318.9, gamma: 7.79e-3, molarMassKg: 0.09290637 },
  silver: { thetaK: 202.2, gamma: 0.646e-3, molarMassKg: 0.1078682 },
  titanium: { thetaK: 350.9, gamma: 3.35e-3, molarMassKg: 0.047867 },
}

/**
 * Specific heat of a cold-mass material.
 *
 * @param material Which material.
 * @param temperatureK Temperature, K, 4 to 300.
 * @returns c_p, J/(kg K).
 * @throws DomainError outside 4 K to 300 K.
 */
export function specificHeatJPerKgK(material: ColdMassMaterial, temperatureK: number): number {
  if (!(temperatureK >= ENTHALPY_RANGE_K[0] && temperatureK <= ENTHALPY_RANGE_K[1])) {
    throw new DomainError('invalid', 'Heat capacities of the cold mass are known from 4 K to 300 K. Enter a temperature in that range.', ['temperatureK'])
  }
  const fit = NIST_FIT[material]
  if (fit) {
    const x = Math.log10(temperatureK)
    return 10 ** fit.reduceRight((sum, coefficient) => sum * x + coefficient, 0)
  }
  const model = DEBYE_MODEL[material] as { thetaK: number, gamma: number, molarMassKg: number }
  return (debyeHeatCapacityJPerMolK(temperatureK, model.thetaK) + model.gamma * temperatureK) / model.molarMassKg
}

/** A slice of the heat to be taken from a kilogram of material: how much, and at what temperature. */
export interface HeatSlice {
  readonly temperatureK: number
  readonly heatJPerKg: number
}

/**
 * Heat to be taken from a kilogram of material in slices of temperature, by Simpson's rule in ln T, where the fits are
 * smooth. The slices add up to the enthalpy; weighting each first answers what depends on the temperature it comes off at.
 *
 * @param material Which material.
 * @param fromK Start temperature, K, up to 300.
 * @param toK End temperature, K, 4 or more.
 * @returns Slices from cold to warm; none when nothing is to be cooled.
 * @throws DomainError outside 4 K to 300 K.
 */
export function heatSlices(material: ColdMassMaterial, fromK: number, toK: number): HeatSlice[] {
  if (fromK <= toK) return []
  const steps = 160
  const h = Math.log(fromK / toK) / steps
  return Array.from({ length: steps + 1 }, (_, i) => {
    const temperatureK = i === 0 ? toK : i === steps ? fromK : toK * Math.exp(i * h)
    const simpson = i === 0 || i === steps ? 1 : i % 2 === 1 ? 4 : 2
    return { temperatureK, heatJPerKg: specificHeatJPerKgK(material, temperatureK) * temperatureK * simpson * h / 3 }
  })
}

/**
 * Heat to be taken from a kilogram of material to cool it.
 *
 * @param material Which material.
 * @param fromK Start temperature, K, up to 300.
 * @param toK End temperature, K, 4 or more; 4.2 K when left out.
 * @returns Enthalpy difference, J/kg; zero when nothing is to be cooled.
 * @throws DomainError outside 4 K to 300 K.
 */
export function enthalpyDifferenceJPerKg(material: ColdMassMaterial, fromK: number, toK = 4.2): number {
  return heatSlices(material, fromK, toK).reduce((sum, slice) => sum + slice.heatJPerKg, 0)
}
