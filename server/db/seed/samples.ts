import type { MaterialKind } from '#shared/heat-capacity/types'
import type { Database } from '#server/db/client'
import { samples } from '#server/db/schema'
import type { SeededPeople } from './people'

/** A substance of the demo: what its sample sheet says, and how it behaves when it is measured. */
export interface Substance {
  key: string
  group: string
  name: string
  formula: string
  kind: MaterialKind
  molarMassGPerMol: number
  atomsPerFormulaUnit: number
  massMg: number
  conductionElectrons?: number
  criticalTemperatureK?: number
  densityGPerCm3?: number
  hazards?: string
  /** Behaviour, per mole of formula units: γ in mJ/(mol K²), Θ_D in K, tail A in mJ K/mol. */
  gamma: number
  debyeTemperatureK: number
  tail?: number
  title: string
}

/** Invented samples. Copper and silver behave as the handbook says; the rest is invented. */
export const SUBSTANCES: Substance[] = [
  { key: 'cu', group: 'Hazel', name: 'Cu 99.999 %, rod 3', formula: 'Cu', kind: 'metal', molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, massMg: 412.6, conductionElectrons: 1, densityGPerCm3: 8.96, gamma: 0.6944, debyeTemperatureK: 344.5, title: 'Cu standard' },
  { key: 'ag', group: 'Birch', name: 'Ag bead B2', formula: 'Ag', kind: 'metal', molarMassGPerMol: 107.868, atomsPerFormulaUnit: 1, massMg: 288.1, conductionElectrons: 1, densityGPerCm3: 10.5, gamma: 0.646, debyeTemperatureK: 225, title: 'Silver, C(T)' },
  { key: 'heavy', group: 'Alder', name: 'CeAl3 ingot 7', formula: 'CeAl3', kind: 'metal', molarMassGPerMol: 221.06, atomsPerFormulaUnit: 4, massMg: 4.6, gamma: 1250, debyeTemperatureK: 290, title: 'Heavy-electron C/T' },
  { key: 'sapphire', group: 'Cedar', name: 'Sapphire disc 12', formula: 'Al2O3', kind: 'insulator', molarMassGPerMol: 101.961, atomsPerFormulaUnit: 5, massMg: 92.3, densityGPerCm3: 3.98, gamma: 0, debyeTemperatureK: 1035, title: 'Sapphire addenda' },
  { key: 'oxide', group: 'Alder', name: 'Gd oxide pellet', formula: 'Gd2O3', kind: 'insulator', molarMassGPerMol: 362.5, atomsPerFormulaUnit: 5, massMg: 21.7, gamma: 0, debyeTemperatureK: 370, tail: 480, title: 'Oxide, low-T tail', hazards: 'Fine powder: do not breathe dust.' },
  { key: 'alloy', group: 'Rowan Materials', name: 'Alloy RM-18', formula: 'Cu0.9Ni0.1', kind: 'metal', molarMassGPerMol: 63.06, atomsPerFormulaUnit: 1, massMg: 310.2, conductionElectrons: 0.9, gamma: 1.31, debyeTemperatureK: 340, title: 'Alloy RM-18, C(T)' },
  { key: 'si', group: 'Rowan Materials', name: 'Si wafer piece', formula: 'Si', kind: 'insulator', molarMassGPerMol: 28.085, atomsPerFormulaUnit: 1, massMg: 240.5, gamma: 0, debyeTemperatureK: 645, title: 'Silicon wafer' },
  { key: 'au', group: 'Cedar', name: 'Au wire 25 µm', formula: 'Au', kind: 'metal', molarMassGPerMol: 196.967, atomsPerFormulaUnit: 1, massMg: 155, conductionElectrons: 1, gamma: 0.729, debyeTemperatureK: 164, title: 'Gold wire, C(T)' },
  { key: 'pd', group: 'Birch', name: 'Pd foil', formula: 'Pd', kind: 'metal', molarMassGPerMol: 106.42, atomsPerFormulaUnit: 1, massMg: 201.4, gamma: 9.4, debyeTemperatureK: 274, title: 'Palladium foil' },
]

/** A substance with the id of its sample sheet. */
export type SeededSample = Substance & { id: string, groupId: string }

/** A balance of the facility reads to 0.02 mg; heavy pieces to 0.1 mg. */
export function weighingMg(massMg: number): number {
  return massMg < 50 ? 0.02 : 0.1
}

/** Sample sheets of the groups. */
export async function seedSamples(db: Database, people: SeededPeople): Promise<SeededSample[]> {
  const rows = SUBSTANCES.map((substance) => {
    const group = people.groups.find(candidate => candidate.name === substance.group)!
    return { substance, group }
  })
  const inserted = await db.insert(samples).values(rows.map(({ substance, group }) => ({
    groupId: group.id, createdBy: group.memberId, name: substance.name, formula: substance.formula, kind: substance.kind, molarMassGPerMol: substance.molarMassGPerMol, atomsPerFormulaUnit: substance.atomsPerFormulaUnit,
    massMg: substance.massMg, massUncertaintyMg: weighingMg(substance.massMg), densityGPerCm3: substance.densityGPerCm3 ?? null, conductionElectrons: substance.conductionElectrons ?? null, criticalTemperatureK: substance.criticalTemperatureK ?? null, hazards: substance.hazards ?? '',
  }))).returning({ id: samples.id })
  return rows.map(({ substance, group }, index) => ({ ...substance, id: inserted[index]!.id, groupId: group.id }))
}
