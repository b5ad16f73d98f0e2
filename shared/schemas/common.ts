import { z } from 'zod'
import { plainWords } from '#shared/schemas/plain-words'

// Called here and not there: a bundler may drop a module of which nothing is used, and every schema uses this one.
z.setErrorMap(plainWords)

/** An id as the server gives it. */
export const idSchema = z.string({ required_error: 'Choose one from the list.' }).uuid('This link does not name anything here. Go back and choose it from the list.')

/** The browser's own key of a request, under which it is done once however often it is sent. */
export const clientKeySchema = z.string({ required_error: 'This page has no key for its request. Reload it and send it again.' }).uuid('The key of this request is not valid. Reload the page and send it again.')

/**
 * An instant with its offset, ISO 8601. A Date passes too: forms run their first values through the schema, and what
 * comes out must go in again.
 */
export const instantSchema: z.ZodType<Date, z.ZodTypeDef, string> = z.preprocess(
  value => value instanceof Date && !Number.isNaN(value.getTime()) ? value.toISOString() : value,
  z.string({ required_error: 'Enter a date and time.', invalid_type_error: 'Enter a date and time.' }).datetime({ offset: true, message: 'Enter a date and time.' }).transform(text => new Date(text)),
) as z.ZodType<Date, z.ZodTypeDef, string>

/** A calendar day. */
export const daySchema = z.string({ required_error: 'Enter a date such as 2027-05-04.' }).regex(/^\d{4}-\d{2}-\d{2}$/, 'Enter a date such as 2027-05-04.')
  .refine(text => !Number.isNaN(Date.parse(`${text}T12:00:00Z`)) && new Date(`${text}T12:00:00Z`).toISOString().startsWith(text), 'There is no such day. Check the month and the day.')

/** A wall-clock time. */
export const timeSchema = z.string({ required_error: 'Enter a time such as 09:30.' }).regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Enter a time such as 09:30.')

/** One line of text that must not be empty. */
export const lineSchema = (label: string, longest = 120) => z.string({ required_error: `Enter ${label}.` }).trim().min(1, `Enter ${label}.`).max(longest, `Enter at most ${longest} characters.`)

/** Free text that may be empty. */
export const textSchema = (longest = 2000) => z.string().trim().max(longest, `Enter at most ${longest} characters.`)

/** A finite number within limits, with its unit in the sentence. */
export const quantitySchema = (label: string, unit: string, limits: { above?: number, least?: number, most?: number }) => {
  const sentence = `Enter ${label} ${describe(limits, unit ? ` ${unit}` : '')}`.trim()
  return z.number({ required_error: `${sentence}.`, invalid_type_error: `${sentence}, as a number.` }).finite(`${sentence}.`)
    .refine(value => (limits.above === undefined || value > limits.above) && (limits.least === undefined || value >= limits.least) && (limits.most === undefined || value <= limits.most), `${sentence}.`)
}

function describe({ above, least, most }: { above?: number, least?: number, most?: number }, unit: string): string {
  if (least !== undefined && most !== undefined) return `from ${least} to ${most}${unit}`
  if (above !== undefined && most !== undefined) return `above ${above} and up to ${most}${unit}`
  if (above !== undefined) return `above ${above}${unit}`
  if (least !== undefined) return `of ${least}${unit} or more`
  return most === undefined ? unit.trim() : `up to ${most}${unit}`
}
