import type { Learned } from '#shared/planning/learning'
import type { MeasurementTime } from '#shared/planning/measurement'
import type { CryostatPlanningFacts, PlannedSample } from '#shared/planning/types'

/** What the words of an estimate are made of. */
export interface BasisFacts {
  readonly cryostat: CryostatPlanningFacts
  readonly sample: PlannedSample
  readonly points: number
  readonly planned: MeasurementTime
  readonly gasUseShare: Learned
  readonly staticBoilOff: Learned
  readonly measureFactor: Learned
  readonly withNitrogen: boolean
  readonly finishedRunCount: number
  readonly refills: number
}

const runs = (count: number): string => count === 1 ? '1 finished run' : `${count} finished runs`

function significant(value: number): string {
  return value >= 100 ? value.toFixed(0) : Number(value.toPrecision(2)).toString()
}

function coldMassWords({ coldMass }: CryostatPlanningFacts): string {
  const kilograms = new Map<string, number>()
  for (const { material, massKg } of coldMass) kilograms.set(material, (kilograms.get(material) ?? 0) + massKg)
  return [...kilograms].map(([material, massKg]) => `${significant(massKg)}\u2009kg of ${material.replace('-', ' ')}`).join(', ')
}

/**
 * Says in plain words what an estimate rests on.
 *
 * @param facts Cryostat, learned values with their counts, and the planned points.
 * @returns Sentences, the most important first.
 */
export function estimateBasis(facts: BasisFacts): string[] {
  const { cryostat, sample, planned, gasUseShare, staticBoilOff, measureFactor } = facts
  const sentences = [
    facts.finishedRunCount > 0
      ? `Rests on ${runs(facts.finishedRunCount)} of ${cryostat.name} and on the stated starting values, which count for two runs.`
      : `${cryostat.name} has no finished run yet: this rests on the stated starting values alone.`,
  ]
  if (cryostat.kind === 'closed-cycle') {
    sentences.push(`${cryostat.name} is a closed-cycle cryostat and uses no liquid helium.`)
  }
  else {
    const start = facts.withNitrogen ? '77\u2009K, after nitrogen' : '300\u2009K, without nitrogen'
    sentences.push(`Cooldown: ${coldMassWords(cryostat)} from ${start}, using ${Math.round(gasUseShare.mean * 100)}\u2009±\u2009${Math.round(gasUseShare.sd * 100)}\u2009% of the enthalpy of the gas (${gasUseShare.count > 0 ? `learned from ${runs(gasUseShare.count)}` : 'a starting value'}).`)
    sentences.push(`Static boil-off: ${staticBoilOff.mean.toFixed(2)}\u2009±\u2009${staticBoilOff.sd.toFixed(2)}\u2009L/h (${staticBoilOff.count > 0 ? `learned from ${runs(staticBoilOff.count)}` : 'a starting value'}).`)
    if (facts.refills > 0) {
      sentences.push(`The bath of ${significant(cryostat.fillLitres)}\u2009L is refilled ${facts.refills === 1 ? 'once' : `${facts.refills} times`} while measuring.`)
    }
  }
  const { slowest } = planned
  sentences.push(`Measurement: ${facts.points} ${facts.points === 1 ? 'point' : 'points'}, each settling for ${significant(cryostat.calorimeter.settleS)}\u2009s and followed over ${cryostat.calorimeter.relaxationTimesPerPoint} relaxation times; with ${sample.label} the slowest is ${significant(slowest.relaxationTimeS)}\u2009s, at ${significant(slowest.temperatureK)}\u2009K.`)
  if (measureFactor.count > 0) {
    sentences.push(`Measurements here took ${measureFactor.mean.toFixed(2)} times the planned hours (${runs(measureFactor.count)}).`)
  }
  sentences.push('Intervals hold 80\u2009%: one run in ten is expected to need less, and one in ten more.')
  return sentences
}
