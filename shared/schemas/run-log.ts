import { z } from 'zod'
import { PHASE_IDS } from '#shared/planning/types'
import { clientKeySchema, idSchema, instantSchema, lineSchema, quantitySchema, textSchema } from '#shared/schemas/common'

/** What every line of the run sheet has: when it was read, and the browser's key, under which it is recorded once. */
const entryFields = { at: instantSchema, clientKey: clientKeySchema, note: textSchema(1000).optional() }

export const levelPercentSchema = quantitySchema('a level', '%', { least: 0, most: 100 })

/** Begins a phase. */
export const phaseEntrySchema = z.object({ kind: z.literal('phase'), phase: z.enum(PHASE_IDS, { message: 'Choose a phase.' }), ...entryFields }).strict()

/** A reading of the helium level. */
export const levelEntrySchema = z.object({ kind: z.literal('level'), levelPercent: levelPercentSchema, ...entryFields }).strict()

/** A transfer: what left the dewar, and the level before and after. */
export const transferEntrySchema = z.object({
  kind: z.literal('transfer'),
  fromAccountId: idSchema,
  startedAt: instantSchema,
  drawnLitres: quantitySchema('the litres drawn', 'L', { above: 0, most: 1000 }),
  levelBeforePercent: levelPercentSchema,
  levelAfterPercent: levelPercentSchema,
  ...entryFields,
}).strict()

/** A temperature of the sample stage. */
export const temperatureEntrySchema = z.object({ kind: z.literal('temperature'), temperatureK: quantitySchema('a temperature', 'K', { above: 0, most: 400 }), ...entryFields }).strict()

/** A reading of the recovery gas meter. */
export const gasMeterEntrySchema = z.object({ kind: z.literal('gas-meter'), gasMeterM3: quantitySchema('a gas meter reading', 'm³', { least: 0, most: 1e7 }), ...entryFields }).strict()

/** A remark. */
export const noteEntrySchema = z.object({ kind: z.literal('note'), ...entryFields, note: lineSchema('a note', 1000) }).strict()

/** One line of the run sheet, of any kind. */
export const runEntrySchema = z.discriminatedUnion('kind', [phaseEntrySchema, levelEntrySchema, transferEntrySchema, temperatureEntrySchema, gasMeterEntrySchema, noteEntrySchema])

export type RunEntryInput = z.output<typeof runEntrySchema>
