import { DomainError } from '#shared/errors'
import { EIGHTY_PERCENT_Z } from '#shared/helium/eighty-percent'
import { gasUseShareFromCooldown } from '#shared/planning/cooldown'
import type { CryostatPlanningFacts, FinishedRunFacts, Interval, PhaseId, TimedPhaseId, Uncertain } from '#shared/planning/types'

/** A quantity learned from the past: what the next run is expected to show. */
export interface Learned extends Uncertain {
  /** Number of finished runs it rests on, beside the prior. */
  readonly count: number
}

/** How many runs the prior's mean counts for. */
const PRIOR_RUNS = 2

/** Shape of the prior of the variance: the smallest that keeps the variance of the next run finite without a past. */
const PRIOR_SHAPE = 2

/**
 * Learns a quantity from a stated prior and what finished runs showed. The mean and the scatter from run to run are both
 * unknown, so the prior is normal–inverse-gamma: the mean moves from the prior to the runs as they grow in number
 * (the prior counts for two runs), and the scatter is learned from the runs themselves.
 *
 * @param prior Mean and standard deviation expected of a run before any was seen.
 * @param observed What each finished run showed, same unit.
 * @returns Mean and standard deviation expected of the next run, and the count of runs.
 * @throws DomainError when a value is not finite or the prior has no spread.
 * Source: conjugate analysis of the normal distribution, e.g. A. Gelman et al., Bayesian Data Analysis, section 3.3 (from memory).
 */
export function learn(prior: Uncertain, observed: readonly number[]): Learned {
  if (!Number.isFinite(prior.mean) || !(prior.sd > 0) || !observed.every(Number.isFinite)) {
    throw new DomainError('invalid', 'Learning needs a prior with a spread above zero and finite values of past runs.')
  }
  const count = observed.length
  if (count === 0) return { ...prior, count }
  const sampleMean = observed.reduce((sum, value) => sum + value, 0) / count
  const scatter = observed.reduce((sum, value) => sum + (value - sampleMean) ** 2, 0)
  const weight = PRIOR_RUNS + count
  const shape = PRIOR_SHAPE + count / 2
  const priorScale = prior.sd ** 2 * (PRIOR_SHAPE - 1) * PRIOR_RUNS / (PRIOR_RUNS + 1)
  const scale = priorScale + scatter / 2 + PRIOR_RUNS * count * (sampleMean - prior.mean) ** 2 / (2 * weight)
  return {
    mean: (PRIOR_RUNS * prior.mean + count * sampleMean) / weight,
    sd: Math.sqrt(scale * (weight + 1) / (weight * (shape - 1))),
    count,
  }
}

/**
 * 80 % interval about a mean, not below a bound.
 *
 * @param value Mean and standard deviation.
 * @param lowest Lowest value that can be, 0 when left out.
 * @returns Low, likely and high in the unit of the value.
 */
export function eightyPercent(value: Uncertain, lowest = 0): Interval {
  return {
    low: Math.max(lowest, value.mean - EIGHTY_PERCENT_Z * value.sd),
    likely: value.mean,
    high: value.mean + EIGHTY_PERCENT_Z * value.sd,
  }
}

const ofCryostat = (cryostat: CryostatPlanningFacts, history: readonly FinishedRunFacts[]): FinishedRunFacts[] =>
  history.filter(run => run.cryostatId === cryostat.cryostatId)

/**
 * Share of the gas enthalpy that a cryostat uses in a cooldown, learned from its finished runs.
 *
 * @param cryostat The cryostat and its stated prior.
 * @param history Finished runs; those of other cryostats and those without a logged cooldown are passed over.
 * @returns Share from 0 to 1 with its spread, and the count of runs.
 */
export function learnGasUseShare(cryostat: CryostatPlanningFacts, history: readonly FinishedRunFacts[]): Learned {
  const shares = ofCryostat(cryostat, history).flatMap(({ cooldownLitres, startTemperatureK }) =>
    cooldownLitres !== undefined && cooldownLitres > 0 && startTemperatureK > 4.2 && cryostat.coldMass.length > 0
      ? [gasUseShareFromCooldown(cryostat.coldMass, Math.min(300, startTemperatureK), cooldownLitres)]
      : [])
  const learned = learn(cryostat.gasUseShare, shares)
  return { ...learned, mean: Math.min(1, Math.max(0, learned.mean)) }
}

/**
 * Hours of a phase, learned from a cryostat's finished runs. Cooling to base is learned apart with and without nitrogen,
 * because the two have little in common.
 *
 * @param cryostat The cryostat and its stated priors.
 * @param history Finished runs; those of other cryostats are passed over.
 * @param phase Which phase.
 * @param nitrogenPrecool Whether nitrogen cools to 77 K first.
 * @returns Hours with their spread, and the count of runs.
 */
export function learnPhaseHours(
  cryostat: CryostatPlanningFacts, history: readonly FinishedRunFacts[], phase: TimedPhaseId, nitrogenPrecool: boolean,
): Learned {
  const alike = ofCryostat(cryostat, history)
    .filter(run => phase !== 'cool-to-base' || run.nitrogenPrecool === nitrogenPrecool)
  return learn(cryostat.phaseHours[phase], observedHours(alike, phase))
}

function observedHours(runs: readonly FinishedRunFacts[], phase: PhaseId): number[] {
  return runs.flatMap(run => run.phaseHours[phase] ?? [])
}

/**
 * Static boil-off of a cryostat, learned from its finished runs.
 *
 * @param cryostat The cryostat and its stated prior.
 * @param history Finished runs; those of other cryostats are passed over.
 * @returns Litres of liquid per hour with their spread, and the count of runs.
 */
export function learnStaticBoilOff(cryostat: CryostatPlanningFacts, history: readonly FinishedRunFacts[]): Learned {
  return learn(cryostat.staticBoilOffLitresPerHour,
    ofCryostat(cryostat, history).flatMap(run => run.staticBoilOffLitresPerHour ?? []))
}

/** Prior for how much longer a measurement takes than its points ask: as planned, within 30 % (common practice, no source). */
export const MEASURE_FACTOR_PRIOR: Uncertain = { mean: 1, sd: 0.3 }

/**
 * How many times the planned hours a measurement on this cryostat really takes, learned from runs that had a plan.
 *
 * @param cryostat The cryostat.
 * @param history Finished runs; those of other cryostats and those without a plan are passed over.
 * @returns Factor with its spread, and the count of runs.
 */
export function learnMeasureFactor(cryostat: CryostatPlanningFacts, history: readonly FinishedRunFacts[]): Learned {
  return learn(MEASURE_FACTOR_PRIOR, ofCryostat(cryostat, history).flatMap(({ phaseHours, plannedMeasureHours }) =>
    phaseHours.measure !== undefined && plannedMeasureHours !== undefined && plannedMeasureHours > 0
      ? [phaseHours.measure / plannedMeasureHours]
      : []))
}
