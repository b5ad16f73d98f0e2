import type { CheckStatus, CorrectionSuggestion, Estimate, FitTerm, FitWeights, HeatCapacityAnalysis, Verdict } from '#shared/heat-capacity/types'
import type { RejectedRow } from '#shared/types/results'

/** The answer of the command line and of `POST /api/heat-capacity/check`. Numbers that do not exist are null, never NaN. */
export interface HeatCapacityReport {
  readonly engineVersion: string
  readonly fit: {
    readonly gamma: Estimate | null
    readonly beta3: Estimate | null
    readonly debyeTemperature: Estimate | null
    readonly beta5: Estimate | null
    readonly tail: Estimate | null
    readonly terms: readonly FitTerm[]
    readonly weights: FitWeights
    readonly errorConvention: 'absolute' | 'scaled'
    readonly pointCount: number
    readonly degreesOfFreedom: number
    readonly chiSquared: number
    readonly reducedChiSquared: number
    readonly conditionNumber: number
    readonly aicc: number | null
  }
  readonly window: { readonly low: number, readonly high: number, readonly unit: 'K', readonly chosenBy: 'given' | 'advice' | 'whole-range', readonly reason: string | null }
  readonly sample: { readonly formula: string, readonly molarMass: { readonly value: number, readonly unit: 'g/mol' }, readonly atomsPerFormulaUnit: number, readonly kind: string, readonly conversionUses: readonly string[] }
  readonly rejectedRows: readonly { readonly row: number, readonly column: string | null, readonly reason: string, readonly restorable: boolean, readonly restored: boolean }[]
  readonly checks: readonly {
    readonly id: string
    readonly status: CheckStatus
    readonly title: string
    readonly message: string
    readonly value: number | null
    readonly unit: string | null
    readonly band: readonly [number | null, number | null] | null
    readonly source: string
    readonly why: string
  }[]
  readonly verdict: Verdict
  readonly suggestions: readonly CorrectionSuggestion[]
}

/** What a report is made of. */
export interface ReportInput {
  readonly analysis: HeatCapacityAnalysis
  readonly window: Omit<HeatCapacityReport['window'], 'low' | 'high' | 'unit'>
  readonly sample: { readonly formula: string, readonly molarMassGPerMol: number, readonly atomsPerFormulaUnit: number, readonly kind: string }
  readonly conversionUses: readonly string[]
  readonly rejectedRows: readonly RejectedRow[]
}

/**
 * The analysis as plain JSON.
 *
 * @param input analysis, how the window was chosen, sample, and rows left out
 */
export function heatCapacityReport({ analysis, window, sample, conversionUses, rejectedRows }: ReportInput): HeatCapacityReport {
  const { fit } = analysis
  const { gamma, beta3, beta5, tail } = fit.coefficients
  const [low, high] = fit.model.windowK
  return {
    engineVersion: analysis.engineVersion,
    fit: {
      gamma: gamma ?? null,
      beta3: beta3 ?? null,
      debyeTemperature: fit.debyeTemperature ?? null,
      beta5: beta5 ?? null,
      tail: tail ?? null,
      terms: fit.model.terms,
      weights: fit.weights,
      errorConvention: fit.errorConvention,
      pointCount: fit.pointCount,
      degreesOfFreedom: fit.degreesOfFreedom,
      chiSquared: fit.chiSquared,
      reducedChiSquared: fit.reducedChiSquared,
      conditionNumber: fit.conditionNumber,
      aicc: fit.aicc ?? null,
    },
    window: { low, high, unit: 'K', ...window },
    sample: { formula: sample.formula, molarMass: { value: sample.molarMassGPerMol, unit: 'g/mol' }, atomsPerFormulaUnit: sample.atomsPerFormulaUnit, kind: sample.kind, conversionUses },
    rejectedRows: rejectedRows.map(row => ({ row: row.row, column: row.column ?? null, reason: row.reason, restorable: row.restorable ?? false, restored: row.restored ?? false })),
    checks: analysis.checks.map(check => ({ ...check, value: finite(check.value), unit: check.unit ?? null, band: check.band ?? null })),
    verdict: analysis.verdict,
    suggestions: analysis.suggestions,
  }
}

function finite(value: number | undefined): number | null {
  return value !== undefined && Number.isFinite(value) ? value : null
}
