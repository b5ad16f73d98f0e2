import { DomainError } from '#shared/errors'
import type { HeatCapacityCurve, HeatCapacitySample } from '#shared/heat-capacity/types'
import { type ConversionFacts, type HeatCapacityUnit, heatCapacityConversion, isTotalUnit } from '#shared/units/heat-capacity-units'

/** Addenda are kept for the whole holder, in mJ/K: as if they were one mole of 1 g/mol weighing 1 g. */
export const WHOLE_HOLDER: ConversionFacts = { molarMassGPerMol: 1, atomsPerFormulaUnit: 1, massMg: 1000 }

/**
 * Refuses a table of addenda that is not of the whole holder.
 *
 * @param unit unit of its heat capacities
 * @throws DomainError `invalid` for a unit per amount of a sample
 */
export function requireTotalUnit(unit: HeatCapacityUnit): void {
  if (!isTotalUnit(unit)) throw new DomainError('invalid', `Addenda are the heat capacity of the whole empty holder, so a unit such as µJ/K is needed, not ${unit}. Choose the unit of the table.`, ['mapping', 'heatCapacity'])
}

/**
 * Addenda of the whole holder per mole of the sample they are to be taken off.
 *
 * @param holder heat capacities and sigmas in mJ/K
 * @param sample with its mass, mg, and molar mass, g/mol
 * @returns the same points in mJ per mole of the sample and kelvin
 * @throws DomainError `invalid` when the mass of the sample is not known
 */
export function addendaPerMole(holder: HeatCapacityCurve, sample: Pick<HeatCapacitySample, 'molarMassGPerMol' | 'atomsPerFormulaUnit' | 'massMg'>): HeatCapacityCurve {
  if (!sample.massMg) throw new DomainError('invalid', 'Addenda are measured for the whole holder, so the mass of the sample is needed to take them off. Enter it with the columns.', ['sample', 'massMg'])
  const { factor } = heatCapacityConversion('mJ/K', sample)
  return { ...holder, heatCapacity: holder.heatCapacity.map(value => value * factor), sigma: holder.sigma?.map(value => value * factor) }
}
