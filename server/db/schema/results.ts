import { sql } from 'drizzle-orm'
import { boolean, check, doublePrecision, index, integer, jsonb, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id, instant } from '../columns'
import { people } from './people'
import { runs } from './runs'
import { samples } from './samples'
import type { HeatCapacitySample, Verdict } from '#shared/heat-capacity/types'
import type { DatasetMapping, RejectedRow, StoredAnalysis } from '#shared/types/results'

/** One uploaded table: the raw file as it came, how its columns were read, and the curve that came of it. */
export const datasets = pgTable('datasets', {
  id: id(),
  runId: uuid('run_id').notNull().references(() => runs.id),
  sampleId: uuid('sample_id').references(() => samples.id),
  role: text('role').$type<'measurement' | 'addenda' | 'copper-standard'>().notNull().default('measurement'),
  originalName: text('original_name').notNull(),
  fileKey: text('file_key').notNull(),
  bytes: integer('bytes').notNull(),
  sha256: text('sha256').notNull(),
  uploadedBy: uuid('uploaded_by').notNull().references(() => people.id),
  /** Null until the columns are confirmed. */
  mapping: jsonb('mapping').$type<DatasetMapping>(),
  rowCount: integer('row_count'),
  rejectedRows: jsonb('rejected_rows').$type<RejectedRow[]>().notNull().default([]),
  temperatureK: doublePrecision('temperature_k').array(),
  heatCapacity: doublePrecision('heat_capacity').array(),
  sigma: doublePrecision('sigma').array(),
  createdAt: createdAt(),
}, table => [
  index('datasets_run').on(table.runId),
  index('datasets_newest').on(table.createdAt.desc(), table.id.desc()),
  // The same file twice on a run is one dataset: pressing twice does a thing once.
  uniqueIndex('datasets_once').on(table.runId, table.sha256, table.role),
  check('datasets_role', sql`${table.role} in ('measurement', 'addenda', 'copper-standard')`),
])

/** One saved analysis; immutable (trigger). Everything that made the numbers is inside. */
export const analyses = pgTable('analyses', {
  id: id(),
  datasetId: uuid('dataset_id').notNull().references(() => datasets.id),
  addendaDatasetId: uuid('addenda_dataset_id').references(() => datasets.id),
  createdBy: uuid('created_by').notNull().references(() => people.id),
  sample: jsonb('sample').$type<HeatCapacitySample>().notNull(),
  result: jsonb('result').$type<StoredAnalysis>().notNull(),
  verdict: text('verdict').$type<Verdict>().notNull(),
  engineVersion: text('engine_version').notNull(),
  /** The conversion a person accepted, visible in the record for ever. */
  correction: jsonb('correction').$type<{ id: string, factor: number, message: string } | null>(),
  createdAt: createdAt(),
}, table => [
  index('analyses_dataset').on(table.datasetId),
  check('analyses_verdict', sql`${table.verdict} in ('ok', 'caution', 'fail')`),
])

/** A person with the right signs the analysis they saw, or says why not (append-only). */
export const signOffs = pgTable('sign_offs', {
  id: id(),
  analysisId: uuid('analysis_id').notNull().references(() => analyses.id),
  personId: uuid('person_id').notNull().references(() => people.id),
  accepted: boolean('accepted').notNull(),
  reason: text('reason').notNull(),
  at: instant('at').notNull().defaultNow(),
}, table => [index('sign_offs_analysis').on(table.analysisId)])

/** Remarks on an analysis. */
export const analysisComments = pgTable('analysis_comments', {
  id: id(),
  analysisId: uuid('analysis_id').notNull().references(() => analyses.id),
  personId: uuid('person_id').notNull().references(() => people.id),
  text: text('text').notNull(),
  at: instant('at').notNull().defaultNow(),
}, table => [index('analysis_comments_analysis').on(table.analysisId)])
