import { DomainError } from '#shared/errors'
import { estimateBasis } from '#shared/planning/basis'
import { estimateHelium } from '#shared/planning/helium-estimate'
import { eightyPercent, learnGasUseShare, learnMeasureFactor, learnPhaseHours, learnStaticBoilOff } from '#shared/planning/learning'
import { measurementTime, spreadTemperaturesK } from '#shared/planning/measurement'
import type { FinishedRunFacts, PhaseId, PlannedPhase, RunEstimate, RunPlanRequest, Uncertain } from '#shared/planning/types'
import { PHASE_IDS } from '#shared/planning/types'

function checkRequest({ cryostat, temperatureRangeK: [lowestK, highestK], sweeps }: RunPlanRequest): void {
  if (lowestK < cryostat.baseTemperatureK) {
    throw new DomainError('invalid', `${cryostat.name} reaches ${cryostat.baseTemperatureK} K. Enter a lowest temperature of ${cryostat.baseTemperatureK} K or more, or choose a colder cryostat.`, ['temperatureRangeK', 0])
  }
  if (highestK > cryostat.highestTemperatureK) {
    throw new DomainError('invalid', `${cryostat.name} measures up to ${cryostat.highestTemperatureK} K. Enter a highest temperature of ${cryostat.highestTemperatureK} K or less.`, ['temperatureRangeK', 1])
  }
  if (!(Number.isInteger(sweeps) && sweeps >= 0 && sweeps <= 1000)) {
    throw new DomainError('invalid', 'The number of magnet sweeps is a whole number from 0 to 1000.', ['sweeps'])
  }
}

/**
 * Estimates a run from physics and from the cryostat's own past: hours of each phase, litres of helium by part, each with
 * an 80 % interval, and the plain words of what it rests on. Spreads of different parts are taken as independent.
 *
 * @param request Cryostat, sample, temperature range in K, points, nitrogen pre-cooling and magnet sweeps.
 * @param history Finished runs; only those of this cryostat teach anything.
 * @returns The estimate.
 * @throws DomainError naming the field when the range, points, sweeps or sample cannot be.
 */
export function estimateRun(request: RunPlanRequest, history: readonly FinishedRunFacts[]): RunEstimate {
  checkRequest(request)
  const { cryostat, nitrogenPrecool, points, sample, sweeps, temperatureRangeK } = request
  const withNitrogen = nitrogenPrecool && cryostat.kind !== 'closed-cycle'
  const planned = measurementTime(cryostat.calorimeter, sample, spreadTemperaturesK(...temperatureRangeK, points))
  const measureFactor = learnMeasureFactor(cryostat, history)
  const measureHours: Uncertain = {
    mean: planned.totalHours * measureFactor.mean,
    sd: planned.totalHours * measureFactor.sd,
  }
  const gasUseShare = learnGasUseShare(cryostat, history)
  const staticBoilOff = learnStaticBoilOff(cryostat, history)
  const helium = estimateHelium({
    cryostat, gasUseShare, staticBoilOffLitresPerHour: staticBoilOff, measureHours, sweeps,
    startTemperatureK: withNitrogen ? 77 : 300,
  })

  const drawn: Partial<Record<PhaseId, Uncertain>> = {
    'cool-to-base': helium.drawnInCooldown,
    'measure': helium.drawnInMeasurement,
  }
  const phases = PHASE_IDS.filter(phase => phase !== 'cool-to-77' || withNitrogen).map((phase): PlannedPhase => {
    const hours = phase === 'measure' ? measureHours : learnPhaseHours(cryostat, history, phase, withNitrogen)
    const { mean, sd } = drawn[phase] ?? { mean: 0, sd: 0 }
    return { phase, hours: eightyPercent(hours), hoursSd: hours.sd, drawnLitres: mean, drawnSdLitres: sd }
  })
  const totalHours: Uncertain = {
    mean: phases.reduce((sum, { hours }) => sum + hours.likely, 0),
    sd: Math.hypot(...phases.map(phase => phase.hoursSd)),
  }
  const runsOfCryostat = history.filter(run => run.cryostatId === cryostat.cryostatId)
  return {
    phases,
    totalHours: eightyPercent(totalHours),
    heliumLitres: helium.parts,
    totalHeliumLitres: eightyPercent(helium.total),
    totalHeliumSdLitres: helium.total.sd,
    gasUseShare: { mean: gasUseShare.mean, sd: gasUseShare.sd },
    finishedRunCount: runsOfCryostat.length,
    basis: estimateBasis({
      cryostat, sample, points, planned, gasUseShare, staticBoilOff, measureFactor, withNitrogen,
      finishedRunCount: runsOfCryostat.length, refills: helium.refills,
    }),
  }
}
