import { z } from 'zod'
import { idSchema } from '#shared/schemas/common'

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

/** A signature, or a refusal to sign; the service asks for the reason where it must not be empty. */
export const signOffSchema = z.object({
  accepted: z.boolean({ required_error: 'Say whether you accept this result.' }),
  reason: z.string().trim().max(2000, 'Keep the reason under 2000 characters.').default(''),
}).strict()

/** A remark on an analysis. */
export const commentSchema = z.object({
  text: z.string({ required_error: 'Write a remark first.' }).trim().min(1, 'Write a remark first.').max(4000, 'Keep a remark under 4000 characters.'),
}).strict()
