import { describe, expect, it } from 'vitest'
import type { z } from 'zod'
import { daySchema, idSchema, instantSchema, lineSchema, quantitySchema, textSchema, timeSchema } from '#shared/schemas/common'
import { deliveryReceiveSchema } from '#shared/schemas/helium'
import { levelPercentSchema } from '#shared/schemas/run-log'
import { sampleSchema } from '#shared/schemas/sample'
import { signInSchema } from '#shared/schemas/sign-in'

/** The first sentence said to an input, undefined where it is taken. */
const said = (schema: z.ZodTypeAny, input: unknown) => schema.safeParse(input).error?.issues[0]?.message

describe('a quantity with its limits', () => {
  it.each([
    [{ least: 0, most: 100 }, [0, 100, 0.5], [-0.001, 100.001, 140], 'Enter a level from 0 to 100 %.'],
    [{ above: 0, most: 100 }, [1e-9, 100], [0, 100.001], 'Enter a level above 0 and up to 100 %.'],
    [{ above: 0 }, [1e-9, 1e9], [0, -1], 'Enter a level above 0 %.'],
    [{ least: 3 }, [3, 1e9], [2.999], 'Enter a level of 3 % or more.'],
    [{ most: 3 }, [3, -1e9], [3.001], 'Enter a level up to 3 %.'],
  ])('within %j takes %j and refuses %j', (limits, taken, refused, sentence) => {
    const schema = quantitySchema('a level', '%', limits)
    for (const value of taken) expect(said(schema, value)).toBeUndefined()
    for (const value of [...refused, undefined]) expect(said(schema, value)).toBe(sentence)
    for (const value of ['50', null, Number.NaN]) expect(said(schema, value)).toBe(sentence.replace('.', ', as a number.'))
  })

  it('says its limits at the fields that use it', () => {
    expect(said(levelPercentSchema, 140)).toBe('Enter a level from 0 to 100 %.')
    expect(said(deliveryReceiveSchema, { litres: 0 })).toBe('Enter the litres that arrived above 0 and up to 5000 L.')
    expect(said(deliveryReceiveSchema, { litres: 5000 })).toBeUndefined()
    expect(said(sampleSchema.shape.conductionElectrons, 101)).toBe('Enter conduction electrons per formula unit above 0 and up to 100.')
  })
})

describe('text', () => {
  it('of one line is trimmed, not empty and not too long', () => {
    const schema = lineSchema('a name', 5)
    expect(schema.parse('  abcde ')).toBe('abcde')
    expect(said(schema, ' \t')).toBe('Enter a name.')
    expect(said(schema, undefined)).toBe('Enter a name.')
    expect(said(schema, 'abcdef')).toBe('Enter at most 5 characters.')
  })

  it('that is free may be empty', () => {
    expect(textSchema(5).parse('  ')).toBe('')
    expect(said(textSchema(5), 'abcdef')).toBe('Enter at most 5 characters.')
  })
})

describe('instants, days, times and ids', () => {
  it.each([
    ['2027-05-04T09:00:00Z', '2027-05-04T09:00:00.000Z'],
    ['2027-05-04T09:00:00+02:00', '2027-05-04T07:00:00.000Z'],
    ['2027-05-04T09:00:00.250-03:30', '2027-05-04T12:30:00.250Z'], // 09:00 + 3:30
  ])('reads the instant %s', (text, instant) => {
    expect(instantSchema.parse(text).toISOString()).toBe(instant)
    // What came out goes in again: forms run their first values through the schema.
    expect(instantSchema.parse(instantSchema.parse(text)).toISOString()).toBe(instant)
  })

  it.each([
    [instantSchema, '2027-05-04', 'Enter a date and time.'],
    [instantSchema, '2027-05-04T25:00:00Z', 'Enter a date and time.'],
    [instantSchema, undefined, 'Enter a date and time.'],
    [daySchema, '2027-5-4', 'Enter a date such as 2027-05-04.'],
    [daySchema, '2027-02-29', 'There is no such day. Check the month and the day.'],
    [daySchema, undefined, 'Enter a date such as 2027-05-04.'],
    [timeSchema, '24:00', 'Enter a time such as 09:30.'],
    [timeSchema, undefined, 'Enter a time such as 09:30.'],
    [idSchema, '17', 'This link does not name anything here. Go back and choose it from the list.'],
  ])('refuses what is none (%#)', (schema, input, sentence) => {
    expect(said(schema, input)).toBe(sentence)
  })
})

describe('signing in', () => {
  it.each([
    [{ email: '  ', password: 'x' }, 'Enter your e-mail address.'],
    [{ email: `${'a'.repeat(250)}@b.no`, password: 'x' }, 'Enter an e-mail address of at most 254 characters.'],
    [{ email: 'ada@example.org', password: '' }, 'Enter your password.'],
    [{ email: 'ada@example.org', password: 'x'.repeat(513) }, 'Enter a password of at most 512 characters.'],
  ])('refuses input %#', (input, sentence) => {
    expect(said(signInSchema, input)).toBe(sentence)
  })
})
