import { DomainError } from '#shared/errors'
import type { FitOptions } from '#shared/heat-capacity/fit'
import { fitLowTemperature } from '#shared/heat-capacity/fit'
import type { FitTerm, HeatCapacityCurve, LowTemperatureFit } from '#shared/heat-capacity/types'

/** One window of the scan: what the fit up to T_max says. */
export interface WindowCandidate {
  readonly highK: number
  readonly pointCount: number
  /** γ and its standard error, mJ/(mol K²). */
  readonly gamma: number
  readonly gammaStandardError: number
  /** Θ_D, K; absent when β₃ ≤ 0. */
  readonly debyeTemperatureK?: number
  readonly aicc?: number
  readonly reducedChiSquared: number
  /** Whether T_max ≤ Θ_D/50, with the Θ_D of this very fit. */
  readonly withinT3Range: boolean
}

/** The window and the terms to take, and why. */
export interface WindowAdvice {
  /** γ against T_max with the first terms, rising. */
  readonly series: readonly WindowCandidate[]
  /** T_max of the first and the last window whose γ agree, K. */
  readonly plateauK: readonly [number, number]
  readonly windowK: readonly [number, number]
  readonly terms: readonly FitTerm[]
  /** Which part of the rule could be kept: `kept`, or the part that had to give way. */
  readonly rule: 'kept' | 'no-window-in-T3-range'
  /** Why, in two or three plain sentences. */
  readonly reason: string
}

/** Choices of a scan. */
export interface AdviceOptions extends FitOptions {
  /** Terms of every fit; γT and β₃T³ when left out. */
  readonly terms?: readonly FitTerm[]
  /** Cold end of all windows, K; the coldest point when left out. */
  readonly lowK?: number
  /** Windows to try; 40 when left out. */
  readonly candidateCount?: number
  /** False where the terms are settled, so that β₅T⁵ is not tried. */
  readonly offerBeta5?: boolean
}

/** T³ law: the lattice keeps to it within about 1 % below Θ_D/50 for real phonon spectra. Common practice, no source. */
export const T3_RANGE_DIVISOR = 50
/** γ of two windows agree while they lie within this many standard errors of a common value. */
const AGREEMENT = 2
/** Points beyond the number of coefficients that a window should have at least. */
const SPARE_POINTS = 4
/** Gain of the corrected Akaike criterion that a further term has to bring. Burnham and Anderson (2002), 2.6. */
const AICC_GAIN = 2

/**
 * Advises a window and whether to add β₅T⁵. The rule, in this order:
 *
 * 1. Windows start at the coldest point and end at T_max, which is scanned over the data.
 * 2. T_max ≤ Θ_D/50, with the Θ_D of the window's own fit. If no window keeps to that, the narrowest is taken and it is said.
 * 3. Stable γ: from the narrowest window on, wider ones are taken as long as all their γ agree with a common value within 2 standard errors.
 * 4. Of those the widest: it knows γ best.
 * 5. β₅T⁵ joins when it lowers AICc by more than 2 in that window.
 *
 * @param curve temperatures in K, heat capacities and σ in mJ/(mol K)
 * @param options terms, atoms per formula unit, weights
 * @returns the series γ(T_max), its plateau, the window (K), the terms and the reason
 * @throws DomainError when there are too few points for any window, or γT is not among the terms
 */
export function adviseWindow(curve: HeatCapacityCurve, options: AdviceOptions): WindowAdvice {
  const terms = options.terms ?? ['gamma', 'beta3']
  if (!terms.includes('gamma') || !terms.includes('beta3')) throw new DomainError('invalid', 'The scan follows γ and Θ_D, so γT and β₃T³ must be in the model. Add them.', ['terms'])
  const lowK = options.lowK ?? curve.temperatureK.find(temperature => temperature > 0) ?? 0
  const series = candidateEnds(curve, lowK, terms.length, options.candidateCount ?? 40).map(highK => candidate(fitLowTemperature(curve, { terms, windowK: [lowK, highK] }, options), highK))
  const inRange = series.filter(each => each.withinT3Range)
  const eligible = inRange.length > 0 ? inRange : series.slice(0, 1)
  const plateau = agreeing(eligible)
  const chosen = plateau[plateau.length - 1]!
  const windowK = [lowK, chosen.highK] as const
  const longer = options.offerBeta5 === false ? undefined : withBeta5(curve, terms, windowK, options, chosen)
  return {
    series,
    plateauK: [plateau[0]!.highK, chosen.highK],
    windowK,
    terms: longer ?? terms,
    rule: inRange.length > 0 ? 'kept' : 'no-window-in-T3-range',
    reason: reasonFor({ series, inRange, plateau, chosen, addsBeta5: longer !== undefined, alreadyBeta5: terms.includes('beta5') || options.offerBeta5 === false }),
  }
}

/** Ends of windows on data points: every distinct temperature from the narrowest sound window on, thinned evenly. */
function candidateEnds(curve: HeatCapacityCurve, lowK: number, termCount: number, count: number): number[] {
  const inside = curve.temperatureK.filter(temperature => temperature >= lowK)
  const distinct = [...new Set(inside)].sort((a, b) => a - b)
  const fewest = termCount + SPARE_POINTS
  if (distinct.length < fewest) {
    throw new DomainError('invalid', `Only ${distinct.length} temperatures lie above ${lowK} K; an advice needs at least ${fewest}. Measure more points or choose the window by hand.`, ['curve'])
  }
  const ends = distinct.slice(fewest - 1)
  const wanted = Math.max(2, count)
  if (ends.length <= wanted) return ends
  return [...new Set(Array.from({ length: wanted }, (_, step) => ends[Math.round(step * (ends.length - 1) / (wanted - 1))]!))]
}

function candidate(fit: LowTemperatureFit, highK: number): WindowCandidate {
  const gamma = fit.coefficients.gamma!
  const theta = fit.debyeTemperature?.value
  return {
    highK,
    pointCount: fit.pointCount,
    gamma: gamma.value,
    gammaStandardError: gamma.standardError,
    debyeTemperatureK: theta,
    aicc: fit.aicc,
    reducedChiSquared: fit.reducedChiSquared,
    withinT3Range: theta !== undefined && highK <= theta / T3_RANGE_DIVISOR,
  }
}

/** The longest run from the narrowest window on whose intervals γ ± 2 standard errors have a value in common. */
function agreeing(candidates: readonly WindowCandidate[]): WindowCandidate[] {
  let [low, high] = [-Infinity, Infinity]
  const run: WindowCandidate[] = []
  for (const each of candidates) {
    low = Math.max(low, each.gamma - AGREEMENT * each.gammaStandardError)
    high = Math.min(high, each.gamma + AGREEMENT * each.gammaStandardError)
    if (low > high) break
    run.push(each)
  }
  return run
}

function withBeta5(curve: HeatCapacityCurve, terms: readonly FitTerm[], windowK: readonly [number, number], options: AdviceOptions, chosen: WindowCandidate): FitTerm[] | undefined {
  if (terms.includes('beta5') || chosen.pointCount < terms.length + 1 + SPARE_POINTS) return undefined
  const longer: FitTerm[] = [...terms, 'beta5']
  const { aicc } = fitLowTemperature(curve, { terms: longer, windowK }, options)
  return aicc !== undefined && chosen.aicc !== undefined && aicc < chosen.aicc - AICC_GAIN ? longer : undefined
}

interface Grounds {
  series: readonly WindowCandidate[]
  inRange: readonly WindowCandidate[]
  plateau: readonly WindowCandidate[]
  chosen: WindowCandidate
  addsBeta5: boolean
  alreadyBeta5: boolean
}

function reasonFor({ series, inRange, plateau, chosen, addsBeta5, alreadyBeta5 }: Grounds): string {
  const end = `${Number(chosen.highK.toPrecision(4))} K`
  const theta = chosen.debyeTemperatureK
  const first = inRange.length === 0
    ? theta === undefined
      ? `No window gives a lattice term above zero, so the T³ range cannot be told; the narrowest one, up to ${end}, is shown.`
      : `No window keeps to the T³ range (Θ_D/${T3_RANGE_DIVISOR} is ${(theta / T3_RANGE_DIVISOR).toPrecision(3)} K); the narrowest one, up to ${end}, is the least wrong. Colder points are needed.`
    : plateau.length < inRange.length
      ? `γ stays the same within ${AGREEMENT} standard errors up to ${end} and drifts in wider windows.`
      : inRange.length < series.length
        ? `Up to ${end} is as far as the T³ law holds (Θ_D/${T3_RANGE_DIVISOR}), and γ stays the same within ${AGREEMENT} standard errors all the way.`
        : `All points up to ${end} lie in the T³ range (Θ_D/${T3_RANGE_DIVISOR} is ${(theta! / T3_RANGE_DIVISOR).toPrecision(3)} K), and γ stays the same within ${AGREEMENT} standard errors.`
  const second = alreadyBeta5 ? '' : addsBeta5 ? ' A β₅T⁵ term describes these points clearly better (AICc), so it is added.' : ' A β₅T⁵ term brings nothing here (AICc), so it is left out.'
  return first + second
}
