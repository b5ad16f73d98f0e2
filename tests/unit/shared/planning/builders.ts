import { cryostatPlanningFacts } from '#shared/planning/cryostat-facts'
import { expectedHeatCapacity } from '#shared/planning/measurement'
import type { CryostatPlanningFacts, FinishedRunFacts, PlannedSample, RunPlanRequest } from '#shared/planning/types'

/** An invented bath cryostat. */
export const PETREL: CryostatPlanningFacts = cryostatPlanningFacts({
  id: 'petrel', name: 'Petrel', kind: 'bath-he4', baseTemperatureK: 1.5,
  vesselCalibration: [{ percent: 0, litres: 0 }, { percent: 100, litres: 30 }],
  coldMass: [{ material: 'copper', massKg: 12 }, { material: 'stainless-steel', massKg: 6 }],
  staticBoilOffLitresPerHour: 0.3, transferLossFraction: 0.12,
  gasUsePrior: { mean: 0.4, standardDeviation: 0.15 },
  phaseHoursPrior: { 'cool-to-base': { mean: 6, standardDeviation: 2 } },
  linkConductanceWPerK: 1e-6,
})

/** An invented closed-cycle cryostat. */
export const PUFFIN: CryostatPlanningFacts = cryostatPlanningFacts({
  id: 'puffin', name: 'Puffin', kind: 'closed-cycle', baseTemperatureK: 2.5, vesselCalibration: [], coldMass: [],
  staticBoilOffLitresPerHour: 0, transferLossFraction: 0, gasUsePrior: { mean: 0.5, standardDeviation: 0.2 },
  phaseHoursPrior: {}, linkConductanceWPerK: 1e-6,
})

/** 20 mg of copper: γ 0.695 mJ/(mol K²), Θ_D 343 K (handbook values, from memory). */
export const COPPER: PlannedSample = {
  label: 'Cu', amountMol: 0.02 / 63.546,
  heatCapacityJPerMolK: expectedHeatCapacity({ gammaJPerMolK2: 0.695e-3, debyeTemperatureK: 343, atomsPerFormulaUnit: 1 }),
}

/** A request, with what a test changes. */
export function request(more: Partial<RunPlanRequest> = {}): RunPlanRequest {
  return { cryostat: PETREL, sample: COPPER, temperatureRangeK: [1.6, 20], points: 60, nitrogenPrecool: true, sweeps: 0, ...more }
}

/** A finished run of Petrel, with what a test changes. */
export function finished(runId: string, more: Partial<FinishedRunFacts> = {}): FinishedRunFacts {
  return { runId, cryostatId: 'petrel', nitrogenPrecool: true, startTemperatureK: 77, phaseHours: {}, ...more }
}
