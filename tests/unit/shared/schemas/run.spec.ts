import { describe, expect, it } from 'vitest'
import type { z } from 'zod'
import { closureSchema } from '#shared/schemas/closure'
import { daySchema, instantSchema, timeSchema } from '#shared/schemas/common'
import { runEntrySchema } from '#shared/schemas/run-log'
import { planEstimateSchema, runAskSchema, runDeclineSchema, runFinishSchema } from '#shared/schemas/run'
import { sampleSchema } from '#shared/schemas/sample'
import { signInSchema } from '#shared/schemas/sign-in'

const ID = '0197a3c2-7c1e-7000-8000-000000000001'
const ask = {
  cryostatId: ID, groupId: ID, sampleIds: [ID], temperatureLowK: 0.35, temperatureHighK: 20, points: 120, nitrogenPrecool: true,
  title: 'Oxide, low end', startsAt: '2027-05-04T09:00:00+02:00', clientKey: ID,
}
const entry = (fields: object) => ({ at: '2027-05-04T09:00:00Z', clientKey: ID, ...fields })

/** What is said at each field, by its dotted name. */
function said(schema: z.ZodTypeAny, input: unknown): Record<string, string> {
  return Object.fromEntries(schema.safeParse(input).error?.issues.map(({ path, message }) => [path.join('.'), message]) ?? [])
}

describe('asking for a run', () => {
  it('takes a whole request and reads its start as an instant', () => {
    expect(runAskSchema.parse(ask)).toMatchObject({ startsAt: new Date('2027-05-04T07:00:00Z'), sweeps: 0 })
  })
  it.each([
    [{ temperatureLowK: 20 }, 'temperatureHighK', 'The highest temperature must be above the lowest. Correct one of the two.'],
    [{ temperatureLowK: 0 }, 'temperatureLowK', 'Enter a lowest temperature above 0 and up to 400 K.'],
    [{ temperatureLowK: '0.35' }, 'temperatureLowK', 'Enter a lowest temperature above 0 and up to 400 K, as a number.'],
    [{ temperatureHighK: Number.POSITIVE_INFINITY }, 'temperatureHighK', 'Enter a highest temperature above 0 and up to 400 K.'],
    [{ points: 2 }, 'points', 'Enter at least 3 points.'],
    [{ points: 12.5 }, 'points', 'Enter the number of points as a whole number.'],
    [{ sampleIds: [] }, 'sampleIds', 'Choose at least one sample.'],
    [{ title: '   ' }, 'title', 'Enter a title of the run.'],
    [{ title: 'x'.repeat(81) }, 'title', 'Enter at most 80 characters.'],
    [{ startsAt: 'next Monday' }, 'startsAt', 'Enter a date and time.'],
    // Without an offset a time names no instant.
    [{ startsAt: '2027-05-04T09:00:00' }, 'startsAt', 'Enter a date and time.'],
    [{ nitrogenPrecool: 'yes' }, 'nitrogenPrecool', 'Choose yes or no.'],
    [{ priceMinor: 1 }, '', 'There is no field “priceMinor” here. Leave it out.'],
  ])('refuses %j at its field', (change, field, sentence) => {
    expect(said(runAskSchema, { ...ask, ...change })).toEqual({ [field]: sentence })
  })
  it('estimates without days, title or key', () => {
    const { title: _title, startsAt: _startsAt, clientKey: _clientKey, ...plan } = ask
    expect(said(planEstimateSchema, plan)).toEqual({})
  })
})

describe('deciding and finishing', () => {
  it('declines only with a reason', () => {
    expect(said(runDeclineSchema, { reason: ' ' })).toEqual({ reason: 'Enter a reason, so that the group knows what to change.' })
  })
  it('asks why a run was cut short, and only then', () => {
    expect(said(runFinishSchema, { cutShort: true, operatorHours: 5 })).toEqual({ reason: 'Say why the run was cut short.' })
    expect(said(runFinishSchema, { cutShort: true, reason: 'Leak at the insert', operatorHours: 5 })).toEqual({})
    expect(said(runFinishSchema, { operatorHours: 5 })).toEqual({})
  })
  it('closes a cryostat only for a time that ends after it starts', () => {
    const closure = { cryostatId: ID, reason: 'Cold head service', startsAt: '2027-05-04T09:00:00Z' }
    expect(said(closureSchema, { ...closure, endsAt: closure.startsAt })).toEqual({ endsAt: 'The closure ends before it starts. Choose a later end.' })
    expect(said(closureSchema, { ...closure, endsAt: '2027-05-04T11:00:01+02:00' })).toEqual({})
  })
})

describe('a line of the run sheet', () => {
  const transfer = { kind: 'transfer', fromAccountId: ID, startedAt: '2027-05-04T08:40:00Z', drawnLitres: 42.5, levelBeforePercent: 18, levelAfterPercent: 92 }
  it.each([
    [{ kind: 'phase', phase: 'cool-to-77' }], [{ kind: 'level', levelPercent: 0 }], [{ kind: 'level', levelPercent: 100 }], [transfer],
    [{ kind: 'temperature', temperatureK: 0.02 }], [{ kind: 'gas-meter', gasMeterM3: 0 }], [{ kind: 'note', note: 'Needle valve opened by half a turn.' }],
  ])('takes %j', (fields) => {
    expect(said(runEntrySchema, entry(fields))).toEqual({})
  })
  it.each([
    [{ kind: 'level', levelPercent: 140 }, 'levelPercent', 'Enter a level from 0 to 100 %.'],
    [{ kind: 'level', levelPercent: -1 }, 'levelPercent', 'Enter a level from 0 to 100 %.'],
    [{ kind: 'level', levelPercent: 'full' }, 'levelPercent', 'Enter a level from 0 to 100 %, as a number.'],
    [{ kind: 'level' }, 'levelPercent', 'Enter a level from 0 to 100 %.'],
    [{ kind: 'temperature', temperatureK: 0 }, 'temperatureK', 'Enter a temperature above 0 and up to 400 K.'],
    [{ ...transfer, drawnLitres: 0 }, 'drawnLitres', 'Enter the litres drawn above 0 and up to 1000 L.'],
    [{ kind: 'phase', phase: 'defrost' }, 'phase', 'Choose a phase.'],
    [{ kind: 'note', note: '' }, 'note', 'Enter a note.'],
    [{ kind: 'level', levelPercent: 50, litres: 9 }, '', 'There is no field “litres” here. Leave it out.'],
    [{ kind: 'photo' }, 'kind', 'Choose one of “phase”, “level”, “transfer”, “temperature”, “gas-meter”, “note”.'],
    [{ kind: 'level', levelPercent: 50, clientKey: 'again' }, 'clientKey', 'The key of this request is not valid. Reload the page and send it again.'],
  ])('refuses %j at its field', (fields, field, sentence) => {
    expect(said(runEntrySchema, entry(fields))).toEqual({ [field]: sentence })
  })
})

describe('days, times and people', () => {
  it.each([['2028-02-29', true], ['2027-02-29', false], ['2027-02-31', false], ['2027-13-01', false], ['4.5.2027', false]])('the day %s exists: %s', (day, exists) => {
    expect(daySchema.safeParse(day).success).toBe(exists)
  })
  it.each([['00:00', true], ['23:59', true], ['24:00', false], ['9:30', false], ['09:60', false]])('the time %s exists: %s', (time, exists) => {
    expect(timeSchema.safeParse(time).success).toBe(exists)
  })
  it('does not roll a day that is not there over into the next month', () => {
    expect(instantSchema.safeParse('2027-02-31T09:00:00Z').success).toBe(false)
  })
  it('asks for what is missing to sign in', () => {
    expect(said(signInSchema, {})).toEqual({ email: 'Enter your e-mail address.', password: 'Enter your password.' })
    expect(said(signInSchema, { email: 'name at example', password: 'x' })).toEqual({ email: 'Enter an e-mail address such as name@example.org.' })
  })
  it('keeps a password as typed, and trims an address', () => {
    expect(signInSchema.parse({ email: ' name@example.org ', password: ' two words ' })).toEqual({ email: 'name@example.org', password: ' two words ' })
  })
  it('takes a sample of which only the formula is known', () => {
    const sample = { groupId: ID, name: 'Oxide, crystal 3', formula: 'Al2O3', kind: 'insulator' }
    expect(said(sampleSchema, sample)).toEqual({})
    expect(said(sampleSchema, { ...sample, massMg: 0 })).toEqual({ massMg: 'Enter a mass above 0 and up to 1000000 mg.' })
    expect(said(sampleSchema, { ...sample, kind: 'glass' })).toEqual({ kind: 'Choose what kind of material it is.' })
  })
})
