import { z } from 'zod'
import { idSchema } from '#shared/schemas/common'
import { analysisSampleSchema, columnMappingSchema, fitModelSchema } from '#shared/schemas/heat-capacity'

export const datasetParams = z.object({ datasetId: idSchema }).strict()
export const analysisParams = z.object({ analysisId: idSchema }).strict()
export const runDatasetParams = z.object({ runId: idSchema }).strict()

/** What an uploaded table holds. */
export const datasetRoleSchema = z.enum(['measurement', 'addenda', 'copper-standard'], { message: 'Say what the file holds: a measurement, addenda or the copper standard.' })

/** Filters of the list of results; absent ones let everything pass. */
export const resultListQuery = z.object({
  verdict: z.enum(['ok', 'caution', 'fail', 'none']).optional(),
  signed: z.enum(['yes', 'no']).optional(),
  runId: idSchema.optional(),
  search: z.string().trim().max(80, 'Search for at most 80 characters.').optional(),
  cursor: z.string().max(80).optional(),
}).strict()
export type ResultListQuery = z.infer<typeof resultListQuery>

/** Optional numbers of a form are null while empty. */
const withoutNulls = (value: unknown) => value && typeof value === 'object' ? Object.fromEntries(Object.entries(value).filter(([, each]) => each !== null)) : value

/** How the columns of an uploaded table are read, the facts of its sample, and the rows that are put back. */
export const mapDatasetSchema = z.object({
  columns: columnMappingSchema,
  sampleId: idSchema.nullish(),
  /** Left out for addenda, which have no sample. */
  sample: z.preprocess(withoutNulls, analysisSampleSchema.optional()),
  restoredRows: z.array(z.number().int().positive()).max(10_000, 'At most 10 000 rows can be put back; mend the file instead.').default([]),
}).strict()
export type MapDatasetInput = z.infer<typeof mapDatasetSchema>

/** What an analysis is made with; the server computes the numbers itself. */
export const saveAnalysisSchema = z.object({
  model: fitModelSchema,
  addendaDatasetId: idSchema.nullish(),
  /** The conversion a person accepted, by the id under which it was suggested. */
  correctionId: z.string().max(60).nullish(),
}).strict()
export type SaveAnalysisInput = z.infer<typeof saveAnalysisSchema>

/** A signature, or a refusal to sign; the service asks for the reason where it must not be empty. */
export const signOffSchema = z.object({
  accepted: z.boolean({ required_error: 'Say whether you accept this result.' }),
  reason: z.string().trim().max(2000, 'Keep the reason under 2000 characters.').default(''),
}).strict()

/** A remark on an analysis. */
export const commentSchema = z.object({
  text: z.string({ required_error: 'Write a remark first.' }).trim().min(1, 'Write a remark first.').max(4000, 'Keep a remark under 4000 characters.'),
}).strict()
