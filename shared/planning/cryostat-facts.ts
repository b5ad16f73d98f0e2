import type { CalorimeterFacts, ColdMassPart, CryostatKind, CryostatPlanningFacts, TimedPhaseId, Uncertain } from '#shared/planning/types'

/** A prior as it is stored. */
interface StoredPrior {
  readonly mean: number
  readonly standardDeviation: number
}

/** What is stored of a cryostat that planning needs. */
export interface CryostatRecord {
  readonly id: string
  readonly name: string
  readonly kind: CryostatKind
  readonly baseTemperatureK: number
  readonly vesselCalibration: readonly { readonly percent: number, readonly litres: number }[]
  readonly coldMass: readonly ColdMassPart[]
  readonly staticBoilOffLitresPerHour: number
  readonly transferLossFraction: number
  readonly gasUsePrior: StoredPrior
  readonly phaseHoursPrior: Readonly<Partial<Record<TimedPhaseId, StoredPrior>>>
  /** Conductance of the calorimeter link at 4 K, W/K. */
  readonly linkConductanceWPerK: number
}

/** Phase hours where a cryostat states none (common practice, no source). */
const USUAL_PHASE_HOURS: Readonly<Record<TimedPhaseId, Uncertain>> = {
  'prepare': { mean: 4, sd: 1.5 },
  'cool-to-77': { mean: 12, sd: 3 },
  'cool-to-base': { mean: 8, sd: 3 },
  'warm-up': { mean: 18, sd: 5 },
  'turn-round': { mean: 3, sd: 1 },
}

/** Highest temperature each kind measures at, K (common practice, no source). */
const HIGHEST_TEMPERATURE_K: Readonly<Record<CryostatKind, number>> = {
  'bath-he4': 300, 'he3-insert': 60, 'dilution': 30, 'closed-cycle': 300,
}

/** Temperature at which the link's conductance is stored, K. */
const LINK_TEMPERATURE_K = 4

/**
 * Calorimeter with a metallic link, whose conductance goes with T. Ten relaxation times cover heating and decay, five each;
 * addenda of a sapphire platform with grease go about as T³ (common practice, no source).
 */
function calorimeter(linkConductanceWPerK: number): CalorimeterFacts {
  return {
    conductanceAt1KWPerK: linkConductanceWPerK / LINK_TEMPERATURE_K,
    conductanceExponent: 1,
    addendaAt1KJPerK: 2e-8,
    addendaExponent: 3,
    relaxationTimesPerPoint: 10,
    settleS: 180,
  }
}

/**
 * Facts that planning uses, from what is stored of a cryostat. What is not stored takes the usual spread: a quarter of the
 * static boil-off, a third of the transfer loss; a magnet sweep boils off 0.5 L (common practice, no source).
 *
 * @param record Stored facts of the cryostat.
 * @returns Facts for `estimateRun`.
 */
export function cryostatPlanningFacts(record: CryostatRecord): CryostatPlanningFacts {
  const hours = Object.fromEntries(Object.entries(USUAL_PHASE_HOURS).map(([phase, usual]) => {
    const stored = record.phaseHoursPrior[phase as TimedPhaseId]
    return [phase, stored ? { mean: stored.mean, sd: stored.standardDeviation } : usual]
  })) as Record<TimedPhaseId, Uncertain>
  const liquid = record.kind !== 'closed-cycle'
  return {
    cryostatId: record.id,
    name: record.name,
    kind: record.kind,
    baseTemperatureK: record.baseTemperatureK,
    highestTemperatureK: HIGHEST_TEMPERATURE_K[record.kind],
    coldMass: record.coldMass,
    fillLitres: liquid ? record.vesselCalibration.at(-1)?.litres ?? 0 : 0,
    lowestLevelShare: 0.2,
    transferLossShare: { mean: record.transferLossFraction, sd: record.transferLossFraction / 3 },
    gasUseShare: { mean: record.gasUsePrior.mean, sd: record.gasUsePrior.standardDeviation },
    // A prior needs some spread even where the boil-off is zero.
    staticBoilOffLitresPerHour: { mean: record.staticBoilOffLitresPerHour, sd: Math.max(1e-6, record.staticBoilOffLitresPerHour / 4) },
    sweepLitres: liquid ? { mean: 0.5, sd: 0.2 } : { mean: 0, sd: 0 },
    measurementLitresPerHour: liquid ? { mean: record.staticBoilOffLitresPerHour * 0.2, sd: record.staticBoilOffLitresPerHour * 0.1 } : { mean: 0, sd: 0 },
    phaseHours: hours,
    calorimeter: calorimeter(record.linkConductanceWPerK),
  }
}
