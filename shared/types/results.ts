import type { StandardReading } from '#shared/heat-capacity/copper-standard'
import type { SuggestedMapping } from '#shared/heat-capacity/table/head'
import type { CorrectionSuggestion, HeatCapacityAnalysis, HeatCapacitySample, MaterialKind, Verdict } from '#shared/heat-capacity/types'
import type { ColumnMapping } from '#shared/schemas/heat-capacity'

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

/** Lines of a file by point: the first of consecutive ones, or each. */
export type PackedRows = { first: number } | number[]

/** How a table was read: its columns and units, and the sample facts that the conversion rests on. */
export interface DatasetMapping {
  columns: ColumnMapping
  /** Null for addenda, which are kept for the whole holder in mJ/K. */
  sample: HeatCapacitySample | null
  /** Heads in the order of the file; files with the same heads are offered the same columns. */
  heads: string[]
  /** E.g. `molar mass 63.546 g/mol`. */
  conversionUses: string[]
  /** Line of the file of each point of the curve. */
  rowNumbers?: PackedRows
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
  mapping: Omit<DatasetMapping, 'rowNumbers'>
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
  /** Mean and largest departure from the published equation over `temperatureRangeK`, per cent. */
  meanDeviationPercent: number
  largestDeviationPercent: number
  temperatureRangeK: readonly [number, number]
  pointCount: number
}

/** The beginning of a table, for choosing its columns. */
export interface TablePreview {
  heads: string[]
  /** What the heads say, and what was chosen for the last table with the same heads. */
  suggested: SuggestedMapping
  remembered: { columns: ColumnMapping, from: string } | null
  delimiter: string
  decimal: string
  rows: { row: number, cells: string[] }[]
}

/** Sample facts that a run brings along, for filling the form. */
export interface SampleChoice {
  id: string
  name: string
  formula: string
  kind: MaterialKind
  massMg: number | null
  massUncertaintyMg: number | null
  densityGPerCm3: number | null
  conductionElectrons: number | null
  criticalTemperatureK: number | null
}

/** A curve as the browser gets it. */
export interface CurvePoints {
  temperatureK: number[]
  heatCapacity: number[]
  sigma: number[] | null
  rowNumbers: number[] | null
}

/** Everything a result page needs of a dataset, but the points of long tables. */
export interface DatasetView {
  id: string
  role: DatasetRole
  originalName: string
  bytes: number
  sha256: string
  uploadedAt: string
  uploadedByName: string
  timeZone: string
  run: { id: string, number: number, title: string, cryostatName: string, startsAt: string, endsAt: string, groupName: string }
  sampleId: string | null
  sampleName: string | null
  sampleChoices: SampleChoice[]
  mapping: Omit<DatasetMapping, 'rowNumbers'> | null
  rejectedRows: RejectedRow[]
  pointCount: number | null
  analyses: AnalysisSummary[]
  /** Mapped addenda tables of the same cryostat, newest first. */
  addendaChoices: { id: string, originalName: string, runNumber: number, uploadedAt: string }[]
  /** The newest reading of the copper standard on this cryostat before this dataset, as the check takes it. */
  copperStandard: StandardReading | null
  /** Every reading of the cryostat, oldest first: its control chart; only for a reading of the standard itself. */
  copperHistory: CopperReading[]
  /** Thresholds that the manager tuned. */
  checkThresholds: Record<string, number>
  may: { map: boolean, analyse: boolean, sign: boolean }
}

/** What came of confirming the columns. */
export interface MappingReply { pointCount: number, rejectedRows: RejectedRow[], conversionUses: string[] }
