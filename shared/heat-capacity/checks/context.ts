import type { AddendaShare } from '#shared/heat-capacity/addenda'
import type { StandardReading } from '#shared/heat-capacity/copper-standard'
import type { CheckId, CheckResult, FitTerm, HeatCapacityCurve, HeatCapacitySample, LowTemperatureFit } from '#shared/heat-capacity/types'
import type { Thresholds } from '#shared/heat-capacity/checks/thresholds'
import type { HandbookEntry } from '#shared/materials/elements'
import { DomainError } from '#shared/errors'
import { correlationInflation } from '#shared/heat-capacity/statistics'
import { termValue } from '#shared/heat-capacity/terms'

/** Everything a check may look at. */
export interface CheckContext {
  /** The curve that was fitted, addenda taken off. */
  readonly curve: HeatCapacityCurve
  readonly sample: HeatCapacitySample
  /** The fit with the errors of the points alone. */
  readonly fit: LowTemperatureFit
  /** The fit with the uncertainty of the mass in it. */
  readonly reported: LowTemperatureFit
  readonly thresholds: Thresholds
  readonly handbook?: HandbookEntry
  readonly addenda?: AddendaShare
  readonly standard?: StandardReading
  /** Fits other terms over the same window; throws a DomainError when the points do not allow it. */
  readonly refit: (terms: readonly FitTerm[]) => LowTemperatureFit
}

/** A check: looks at a result and says one thing about it. */
export type Check = (context: CheckContext) => CheckResult

/** What stays the same whatever a check finds. */
export interface CheckFrame { readonly id: CheckId, readonly title: string, readonly source: string, readonly why: string }

/** Makes the results of one check. */
export function frameOf(frame: CheckFrame) {
  return {
    /** A verdict with its number and band. */
    say: (status: 'ok' | 'caution' | 'fail', message: string, number: Pick<CheckResult, 'value' | 'unit' | 'band'> & { source?: string } = {}): CheckResult => ({ ...frame, status, message, ...number }),
    /** The check does not apply. */
    skip: (message: string): CheckResult => ({ ...frame, status: 'not-applicable', message }),
  }
}

/** A short number for a sentence: so many figures, a true minus. */
export function figures(value: number, count = 3): string {
  return String(Number(value.toPrecision(count))).replace('-', '−')
}

/** A share as a percentage for a sentence. */
export function percent(share: number): string {
  return `${figures(share * 100, 2)} %`
}

/**
 * A refit, or undefined where the points do not allow it.
 *
 * @param context the check's view
 * @param terms of the other model
 */
export function refitIfPossible(context: CheckContext, terms: readonly FitTerm[]): LowTemperatureFit | undefined {
  try {
    return context.refit(terms)
  }
  catch (error) {
    if (error instanceof DomainError) return undefined
    throw error
  }
}

/**
 * Standard error of a coefficient for tests against zero. It is widened when stated errors prove too small (χ²/ν > 1), and when
 * neighbouring residuals resemble each other, since then there are fewer independent points than points.
 *
 * @param fit whose coefficient
 * @param term which
 */
export function carefulError(fit: LowTemperatureFit, term: FitTerm): number {
  const error = fit.coefficients[term]?.standardError ?? Number.NaN
  const widened = fit.errorConvention === 'absolute' ? error * Math.sqrt(Math.max(1, fit.reducedChiSquared)) : error
  return widened * correlationInflation(fit.residuals)
}

/** Warmest and coldest temperature used in the fit, K. */
export function usedRangeK({ curve, fit }: Pick<CheckContext, 'curve' | 'fit'>): [number, number] {
  const used = fit.usedIndices
  return [curve.temperatureK[used[0]!]!, curve.temperatureK[used[used.length - 1]!]!]
}

/**
 * Share of C at the coldest point used that one term takes. With thousands of points a term is significant long before it matters.
 *
 * @param context the check's view
 * @param fit whose term
 * @param term which
 */
export function coldShare({ curve }: Pick<CheckContext, 'curve'>, fit: LowTemperatureFit, term: FitTerm): number {
  const index = fit.usedIndices[0]!
  return Math.abs((fit.coefficients[term]?.value ?? 0) * termValue(term, curve.temperatureK[index]!) / curve.heatCapacity[index]!)
}

/** Conduction electrons and density, from the sample sheet or else the handbook; undefined when one is not known. */
export function carriersOf({ sample, handbook }: Pick<CheckContext, 'sample' | 'handbook'>): { electronsPerFormulaUnit: number, densityGPerCm3: number, molarMassGPerMol: number } | undefined {
  const electronsPerFormulaUnit = sample.conductionElectrons ?? handbook?.conductionElectrons
  const densityGPerCm3 = sample.densityGPerCm3 ?? handbook?.densityGPerCm3
  return electronsPerFormulaUnit && densityGPerCm3 ? { electronsPerFormulaUnit, densityGPerCm3, molarMassGPerMol: sample.molarMassGPerMol } : undefined
}
