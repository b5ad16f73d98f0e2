import type { z } from 'zod'

const KINDS: Readonly<Partial<Record<z.ZodParsedType, string>>> = {
  string: 'Enter text.',
  number: 'Enter a number.',
  integer: 'Enter a whole number.',
  boolean: 'Choose yes or no.',
  array: 'Choose from the list.',
  object: 'The fields are missing. Fill them in and send them again.',
}

const listed = (options: readonly unknown[]) => options.map(option => `“${String(option)}”`).join(', ')

/**
 * Words what a schema does not word itself, so that the validator's own phrases never reach a person.
 *
 * @param issue what is wrong
 */
export const plainWords: z.ZodErrorMap = issue => ({ message: sentenceOf(issue) })

function sentenceOf(issue: z.ZodIssueOptionalMessage): string {
  switch (issue.code) {
    case 'invalid_type': return KINDS[issue.expected] ?? 'This field is missing. Fill it in.'
    case 'unrecognized_keys': return `There is no field ${listed(issue.keys)} here. Leave it out.`
    case 'invalid_enum_value':
    case 'invalid_union_discriminator': return `Choose one of ${listed(issue.options)}.`
    case 'invalid_literal': return `Enter ${listed([issue.expected])}, or leave this out.`
    case 'too_small': return `${limitOf(issue.type, 'at least', Number(issue.minimum))}.`
    case 'too_big': return `${limitOf(issue.type, 'at most', Number(issue.maximum))}.`
    case 'not_finite': return 'Enter a number.'
    default: return 'This is not valid here. Check it and enter it again.'
  }
}

function limitOf(type: string, bound: 'at least' | 'at most', count: number): string {
  if (type === 'string') return `Enter ${bound} ${count} ${count === 1 ? 'character' : 'characters'}`
  return `${type === 'array' ? 'Choose' : 'Enter'} ${bound} ${count}`
}
