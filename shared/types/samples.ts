import type { MaterialKind } from '#shared/heat-capacity/types'

/** A sample sheet as pages show it. */
export interface SampleSheet {
  id: string
  groupId: string
  group: string
  name: string
  formula: string
  kind: MaterialKind
  molarMassGPerMol: number
  atomsPerFormulaUnit: number
  massMg: number | null
  massUncertaintyMg: number | null
  densityGPerCm3: number | null
  conductionElectrons: number | null
  criticalTemperatureK: number | null
  hazards: string
}
