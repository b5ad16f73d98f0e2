import type { ColdMassMaterial } from '#shared/materials/enthalpy'

/** A number with its standard deviation, both in the same unit. */
export interface Uncertain {
  readonly mean: number
  readonly sd: number
}

/** A low, a likely and a high value: the two ends are the 10 % and 90 % points, so the interval holds 80 %. */
export interface Interval {
  readonly low: number
  readonly likely: number
  readonly high: number
}

/** What kind of cryostat it is; a closed cycle uses no liquid. */
export type CryostatKind = 'bath-he4' | 'he3-insert' | 'dilution' | 'closed-cycle'

/** The phases of a run, in order. */
export const PHASE_IDS = ['prepare', 'cool-to-77', 'cool-to-base', 'measure', 'warm-up', 'turn-round'] as const

/** One phase of a run. */
export type PhaseId = typeof PHASE_IDS[number]

/** A phase whose hours come from the cryostat's past; `measure` comes from the points instead. */
export type TimedPhaseId = Exclude<PhaseId, 'measure'>

/** One part of a cryostat's cold mass. */
export interface ColdMassPart {
  readonly material: ColdMassMaterial
  readonly massKg: number
}

/** The calorimeter: how its bath link and addenda go with temperature, both as power laws of T/(1 K). */
export interface CalorimeterFacts {
  /** Conductance of the link to the bath at 1 K, W/K. */
  readonly conductanceAt1KWPerK: number
  /** Exponent of the link: K = K₁ (T/1 K)^exponent. */
  readonly conductanceExponent: number
  /** Addenda heat capacity at 1 K, J/K. */
  readonly addendaAt1KJPerK: number
  /** Exponent of the addenda. */
  readonly addendaExponent: number
  /** Relaxation times followed for one point (common practice is five to ten, no source). */
  readonly relaxationTimesPerPoint: number
  /** Time to settle at a new temperature before a point, s. */
  readonly settleS: number
}

/** What planning knows of a cryostat before it looks at the past. */
export interface CryostatPlanningFacts {
  readonly cryostatId: string
  readonly name: string
  readonly kind: CryostatKind
  readonly baseTemperatureK: number
  readonly highestTemperatureK: number
  readonly coldMass: readonly ColdMassPart[]
  /** Liquid in the bath when full, litres; 0 for a closed cycle. */
  readonly fillLitres: number
  /** Share of a full bath that is never boiled away before a refill, 0 to 1. */
  readonly lowestLevelShare: number
  /** Share of what leaves a dewar that is lost in the line, 0 to under 1. */
  readonly transferLossShare: Uncertain
  /** Prior for the share of the gas enthalpy used in a cooldown, 0 to 1. */
  readonly gasUseShare: Uncertain
  /** Prior for the static boil-off, litres of liquid per hour. */
  readonly staticBoilOffLitresPerHour: Uncertain
  /** Litres that one magnet sweep boils off. */
  readonly sweepLitres: Uncertain
  /** Extra boil-off while measuring (pumped pot, heaters), litres per hour. */
  readonly measurementLitresPerHour: Uncertain
  /** Priors for the hours of the phases. */
  readonly phaseHours: Readonly<Record<TimedPhaseId, Uncertain>>
  readonly calorimeter: CalorimeterFacts
}

/** What one finished run of a cryostat teaches. Runs cut short teach only what they completed: leave the rest out. */
export interface FinishedRunFacts {
  readonly runId: string
  readonly cryostatId: string
  readonly nitrogenPrecool: boolean
  /** Temperature at which liquid helium began to flow, K. */
  readonly startTemperatureK: number
  /** Litres that the cooldown evaporated, where logged. */
  readonly cooldownLitres?: number
  /** Static boil-off seen, litres per hour. */
  readonly staticBoilOffLitresPerHour?: number
  /** True hours of each phase that ran to its end. */
  readonly phaseHours: Readonly<Partial<Record<PhaseId, number>>>
  /** Hours the plan gave the measurement, where there was a plan. */
  readonly plannedMeasureHours?: number
}

/** The sample as planning needs it. */
export interface PlannedSample {
  /** Name or formula, for the words. */
  readonly label: string
  /** Moles of formula units. */
  readonly amountMol: number
  /** Expected heat capacity per mole of formula units, J/(mol K), at a temperature in K. */
  readonly heatCapacityJPerMolK: (temperatureK: number) => number
}

/** What a user asks of a run. */
export interface RunPlanRequest {
  readonly cryostat: CryostatPlanningFacts
  readonly sample: PlannedSample
  /** Lowest and highest temperature wanted, K. */
  readonly temperatureRangeK: readonly [number, number]
  readonly points: number
  readonly nitrogenPrecool: boolean
  readonly sweeps: number
}

/** One phase of an estimate. */
export interface PlannedPhase {
  readonly phase: PhaseId
  readonly hours: Interval
  readonly hoursSd: number
  /** Liquid taken from storage during this phase, litres, likely value. */
  readonly drawnLitres: number
  /** Standard deviation of what is drawn, litres. */
  readonly drawnSdLitres: number
}

/** The parts of a run's helium, litres of liquid taken from storage. */
export type HeliumPart = 'cooldown' | 'fill' | 'transferLoss' | 'staticBoilOff' | 'measurement'

/** What a run is expected to take, with an 80 % interval on everything, and what that rests on. */
export interface RunEstimate {
  readonly phases: readonly PlannedPhase[]
  readonly totalHours: Interval
  /** Each part of the helium; the likely values add up to the likely total. */
  readonly heliumLitres: Readonly<Record<HeliumPart, Interval>>
  readonly totalHeliumLitres: Interval
  /** Standard deviation of the total, litres. */
  readonly totalHeliumSdLitres: number
  /** Share of the gas enthalpy expected to be used. */
  readonly gasUseShare: Uncertain
  /** Number of finished runs of this cryostat that the estimate rests on. */
  readonly finishedRunCount: number
  /** Plain sentences: what the estimate rests on. */
  readonly basis: readonly string[]
}
