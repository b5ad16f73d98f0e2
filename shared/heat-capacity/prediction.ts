import { coverageFactor } from '#shared/heat-capacity/student'
import { TERM_SYMBOL, termValue } from '#shared/heat-capacity/terms'
import type { Estimate, FitTerm, LowTemperatureFit } from '#shared/heat-capacity/types'

/** The fitted curve with its band; all arrays have the length of `temperatureK`. */
export interface PredictionBand {
  readonly temperatureK: readonly number[]
  /** Fitted heat capacity, mJ/(mol K). */
  readonly heatCapacity: readonly number[]
  /** Standard error of the fitted curve itself, mJ/(mol K). */
  readonly standardError: readonly number[]
  /** Half width that covers the true curve, mJ/(mol K). */
  readonly curveHalfWidth: readonly number[]
  /** Half width that covers one more measured point, mJ/(mol K); absent where no σ of such a point is known. */
  readonly pointHalfWidth?: readonly number[]
  readonly coverage: number
}

/** Choices of a band. */
export interface BandOptions {
  /** Share of cases covered; 0.95 when left out. */
  readonly coverage?: number
  /** σ of a new point at a temperature, mJ/(mol K); from the weights when left out, which stated σ do not tell. */
  readonly sigmaAt?: (temperatureK: number) => number
}

/** One linear combination of the coefficients and its standard error: Σ gⱼbⱼ and √(gᵀ cov g). */
function combine(fit: LowTemperatureFit, gradient: readonly number[]): { value: number, standardError: number } {
  let value = 0
  let variance = 0
  fit.model.terms.forEach((term, i) => {
    value += gradient[i]! * fit.coefficients[term]!.value
    fit.covariance[i]!.forEach((entry, j) => {
      variance += gradient[i]! * entry * gradient[j]!
    })
  })
  return { value, standardError: Math.sqrt(Math.max(0, variance)) }
}

/**
 * The fitted heat capacity and its band, by the full covariance of the coefficients.
 *
 * @param fit a fit
 * @param temperatureK where to draw it, K, each above 0
 * @param options coverage, and σ of a new point
 * @returns curve, standard error and half widths in mJ/(mol K); Student's factor with scaled errors, the normal one with absolute ones
 */
export function predictionBand(fit: LowTemperatureFit, temperatureK: readonly number[], options: BandOptions = {}): PredictionBand {
  const coverage = options.coverage ?? 0.95
  const scaled = fit.errorConvention === 'scaled'
  const factor = coverageFactor(coverage, scaled ? fit.degreesOfFreedom : Infinity)
  const inflation = scaled ? Math.sqrt(fit.reducedChiSquared) : 1
  const band = temperatureK.map(temperature => combine(fit, fit.model.terms.map(term => termValue(term, temperature))))
  const sigmaAt = options.sigmaAt ?? sigmaOfWeights(fit)
  return {
    temperatureK,
    heatCapacity: band.map(each => each.value),
    standardError: band.map(each => each.standardError),
    curveHalfWidth: band.map(each => factor * each.standardError),
    pointHalfWidth: sigmaAt && band.map((each, index) => factor * Math.hypot(each.standardError, inflation * sigmaAt(temperatureK[index]!, each.value))),
    coverage,
  }
}

function sigmaOfWeights(fit: LowTemperatureFit): ((temperatureK: number, heatCapacity: number) => number) | undefined {
  if (fit.weights === 'uniform') return () => 1
  const share = fit.relativeSigma
  return fit.weights === 'relative' && share !== undefined ? (_, heatCapacity) => share * Math.abs(heatCapacity) : undefined
}

/** Entropy gained from 0 K, and the terms that have none. */
export interface FittedEntropy extends Estimate {
  /** Terms left out, whose entropy from 0 K is not finite: the tail and the constant hold only above their own temperatures. */
  readonly leftOut: readonly FitTerm[]
  /** One sentence on what it counts. */
  readonly note: string
}

/** ∫C/T dT of Tⁿ from 0 is Tⁿ/n. */
const POWER: Readonly<Partial<Record<FitTerm, number>>> = { gamma: 1, beta3: 3, beta5: 5 }

/**
 * Entropy of the fitted electrons and lattice from 0 K to a temperature, S = γT + β₃T³/3 + β₅T⁵/5.
 *
 * @param fit a fit
 * @param temperatureK K; the end of the window when left out
 * @returns mJ/(mol K) with its standard error, and which terms are not counted
 */
export function fittedEntropy(fit: LowTemperatureFit, temperatureK: number = fit.model.windowK[1]): FittedEntropy {
  const gradient = fit.model.terms.map(term => POWER[term] ? termValue(term, temperatureK) / POWER[term] : 0)
  const leftOut = fit.model.terms.filter(term => !POWER[term])
  const note = leftOut.length === 0
    ? 'Counts all terms of the fit from 0 K.'
    : `Counts electrons and lattice only: ${leftOut.map(term => TERM_SYMBOL[term]).join(' and ')} cannot be carried down to 0 K.`
  return { ...combine(fit, gradient), unit: 'mJ/(mol K)', leftOut, note }
}
