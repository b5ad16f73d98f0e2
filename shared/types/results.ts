import type { CorrectionSuggestion, HeatCapacityAnalysis, HeatCapacitySample, Verdict } from '#shared/heat-capacity/types'

/** What an uploaded table holds. */
export type DatasetRole = 'measurement' | 'addenda' | 'copper-standard'

/** A row of the file that is not in the curve; `restored` rows were put back by a person. */
export interface RejectedRow {
  /** Line of the file, from 1. */
  row: number
  column?: string
  reason: string
  restored?: boolean
  /** Whether the row holds numbers that could stand in the curve. */
  restorable?: boolean
}

/** Who signed an analysis, or said why not. */
export interface SignOffView { id: string, accepted: boolean, reason: string, personName: string, at: string }

/** One line of the list of results. */
export interface ResultListItem {
  datasetId: string
  role: DatasetRole
  originalName: string
  runId: string
  runNumber: number
  cryostatName: string
  groupName: string
  sampleName: string | null
  formula: string | null
  uploadedAt: string
  /** False until its columns are confirmed. */
  mapped: boolean
  pointCount: number | null
  /** The newest saved analysis. */
  latest: {
    analysisId: string
    verdict: Verdict
    checkCounts: { ok: number, caution: number, fail: number }
    gamma: { value: number, standardError: number } | null
    debyeTemperatureK: { value: number, standardError: number } | null
    createdAt: string
    signed: 'accepted' | 'refused' | null
  } | null
}

/** A page of the list; instants are shown in the facility's zone. */
export interface ResultList { timeZone: string, items: ResultListItem[], nextCursor: string | null }

/** A saved analysis in the history of its dataset. */
export interface AnalysisSummary {
  id: string
  createdAt: string
  createdByName: string
  verdict: Verdict
  windowK: readonly [number, number]
  terms: readonly string[]
  gamma: { value: number, standardError: number } | null
  debyeTemperatureK: { value: number, standardError: number } | null
  signed: 'accepted' | 'refused' | null
}

/** Where the numbers of an analysis come from, step by step. */
export interface AnalysisLineage {
  datasetId: string
  originalName: string
  fileSha256: string
  /** The columns, units and sample facts as they stood. */
  mapping: Record<string, unknown>
  /** SHA-256 of the curve that was fitted, so that a later mapping can be told apart. */
  curveSha256: string
  addenda: { datasetId: string, fileSha256: string } | null
  correction: CorrectionSuggestion | null
  windowK: readonly [number, number]
  engineVersion: string
}

/** What is stored as the result of an analysis: the engine's words and what they rest on. */
export interface StoredAnalysis extends HeatCapacityAnalysis {
  lineage: AnalysisLineage
}

/** A saved analysis with what people said of it. */
export interface AnalysisView {
  id: string
  datasetId: string
  createdAt: string
  createdByName: string
  sample: HeatCapacitySample
  result: HeatCapacityAnalysis
  lineage: AnalysisLineage
  /** False once the dataset was mapped anew after this analysis. */
  restsOnCurrentCurve: boolean
  signOffs: SignOffView[]
  comments: { id: string, text: string, personName: string, at: string }[]
  maySign: boolean
}

/** One reading of the copper standard on a cryostat. */
export interface CopperReading {
  datasetId: string
  at: string
  runNumber: number
  /** Mean and greatest departure from the published equation over `temperatureRangeK`, per cent. */
  meanDeviationPercent: number
  largestDeviationPercent: number
  temperatureRangeK: readonly [number, number]
  pointCount: number
}
