import { z } from 'zod'
import { clientKeySchema, idSchema, instantSchema, lineSchema, quantitySchema, textSchema } from '#shared/schemas/common'

/** What of a run planning needs; shared by the estimate and the request. */
const planFields = {
  cryostatId: idSchema,
  groupId: idSchema,
  sampleIds: z.array(idSchema).min(1, 'Choose at least one sample.').max(6, 'Choose at most 6 samples for one run.'),
  temperatureLowK: quantitySchema('a lowest temperature', 'K', { above: 0, most: 400 }),
  temperatureHighK: quantitySchema('a highest temperature', 'K', { above: 0, most: 400 }),
  points: z.number({ required_error: 'Enter the number of points.', invalid_type_error: 'Enter the number of points as a whole number.' }).int('Enter the number of points as a whole number.').min(3, 'Enter at least 3 points.').max(2000, 'Enter at most 2000 points.'),
  nitrogenPrecool: z.boolean(),
  sweeps: z.number().int('Enter the number of magnet sweeps as a whole number.').min(0, 'Enter 0 or more sweeps.').max(1000, 'Enter at most 1000 sweeps.').default(0),
}

const rangeIsOrdered = (plan: { temperatureLowK: number, temperatureHighK: number }) => plan.temperatureHighK > plan.temperatureLowK
const rangeSentence = { message: 'The highest temperature must be above the lowest. Correct one of the two.', path: ['temperatureHighK'] }

/** Asks for hours, litres and price of a run; with a start, also for what it collides with. */
export const planEstimateSchema = z.object({ ...planFields, startsAt: instantSchema.optional() }).strict().refine(rangeIsOrdered, rangeSentence)

/** Asks for days. */
export const runAskSchema = z.object({
  ...planFields,
  title: lineSchema('a title of the run', 80),
  startsAt: instantSchema,
  costCode: textSchema(40).optional(),
  purchaseOrder: textSchema(40).optional(),
  clientKey: clientKeySchema,
}).strict().refine(rangeIsOrdered, rangeSentence)

/** The id in the path of a run's routes. */
export const runParams = z.object({ runId: idSchema }).strict()

/** Approves a request. */
export const runApproveSchema = z.object({ reason: textSchema(500).default('') }).strict()

/** Declines a request; the group is told why. */
export const runDeclineSchema = z.object({ reason: lineSchema('a reason, so that the group knows what to change', 500) }).strict()

/** Withdraws a run. */
export const runWithdrawSchema = z.object({ reason: textSchema(500).default('') }).strict()

/** Starts a run. */
export const runStartSchema = z.object({}).strict()

/** Finishes a run; one that was cut short says why. */
export const runFinishSchema = z.object({
  cutShort: z.boolean().default(false),
  reason: textSchema(500).default(''),
  operatorHours: quantitySchema('operator hours', 'h', { least: 0, most: 500 }),
}).strict().refine(finish => !finish.cutShort || finish.reason !== '', { message: 'Say why the run was cut short.', path: ['reason'] })

/** What the run list is narrowed to. */
export const runListQuery = z.object({ state: z.string().max(100).optional(), cursor: z.string().max(100).optional() }).strict()

export type PlanEstimateInput = z.output<typeof planEstimateSchema>
export type RunAsk = z.output<typeof runAskSchema>
export type RunFinish = z.output<typeof runFinishSchema>
