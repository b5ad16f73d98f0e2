import { z } from 'zod'
import { idSchema, instantSchema, lineSchema } from '#shared/schemas/common'

/** Closes a cryostat for a time. */
export const closureSchema = z.object({
  cryostatId: idSchema,
  startsAt: instantSchema,
  endsAt: instantSchema,
  reason: lineSchema('a reason', 120),
}).strict().refine(closure => closure.endsAt > closure.startsAt, { message: 'The closure ends before it starts. Choose a later end.', path: ['endsAt'] })

export const closureParams = z.object({ id: idSchema }).strict()

export type ClosureInput = z.output<typeof closureSchema>
