import { describe, expect, it } from 'vitest'
import { payByInstant } from '#shared/runs/pay-by'
import { checkAskable, FARTHEST_DAYS_AHEAD, overlaps, type Slot } from '#shared/runs/slot'
import { instantOfWallTime } from '#shared/time/facility-time'

const slot = (startsAt: string, endsAt: string): Slot => ({ startsAt: new Date(startsAt), endsAt: new Date(endsAt) })
const MAY = slot('2027-05-04T09:00:00Z', '2027-05-07T18:00:00Z')

describe('overlapping slots', () => {
  it.each([
    ['the same', '2027-05-04T09:00:00Z', '2027-05-07T18:00:00Z', true],
    ['one within', '2027-05-05T09:00:00Z', '2027-05-06T18:00:00Z', true],
    ['one around', '2027-05-01T09:00:00Z', '2027-05-16T18:00:00Z', true],
    ['one second at its end', '2027-05-07T17:59:59Z', '2027-05-08T18:00:00Z', true],
    ['one that starts as it ends', '2027-05-07T18:00:00Z', '2027-05-08T18:00:00Z', false],
    ['one that ends as it starts', '2027-05-01T09:00:00Z', '2027-05-04T09:00:00Z', false],
    ['one a week later', '2027-05-14T09:00:00Z', '2027-05-17T09:00:00Z', false],
  ])('%s: both ways alike', (_, startsAt, endsAt, expected) => {
    expect(overlaps(MAY, slot(startsAt, endsAt))).toBe(expected)
    expect(overlaps(slot(startsAt, endsAt), MAY)).toBe(expected)
  })

  it('in the hour that the clock repeats, 02:30 first and 02:30 second are an hour apart', () => {
    const at = (fold: 'first' | 'second') => instantOfWallTime({ date: '2026-10-25', time: '02:30' }, 'Europe/Oslo', fold)
    const before = slot('2026-10-24T07:00:00Z', at('first').toISOString())
    expect(overlaps(before, { startsAt: at('first'), endsAt: at('second') })).toBe(false)
    expect(overlaps({ ...before, endsAt: at('second') }, { startsAt: at('first'), endsAt: at('second') })).toBe(true)
  })
})

describe('days that can be asked for', () => {
  const now = new Date('2027-05-01T12:00:00Z')
  const from = (startsAt: Date, hours = 48) => ({ startsAt, endsAt: new Date(startsAt.getTime() + hours * 3_600_000) })
  const later = (ms: number) => new Date(now.getTime() + ms)
  const limit = FARTHEST_DAYS_AHEAD * 86_400_000

  it.each([[1], [limit]])('start %i ms from now', (ms) => {
    expect(() => checkAskable(from(later(ms)), now)).not.toThrow()
  })
  it.each([
    [from(later(0)), 'startsAt', 'This start is in the past. Choose a later day.'],
    [from(later(-86_400_000)), 'startsAt', 'This start is in the past. Choose a later day.'],
    [from(later(86_400_000), 0), 'endsAt', 'The run ends before it starts. Choose a later end.'],
    [from(later(limit + 1)), 'startsAt', 'Days can be asked for up to 370 days ahead. Choose an earlier day.'],
  ])('are not %o', (asked, field, sentence) => {
    expect(() => checkAskable(asked, now)).toThrow(expect.objectContaining({ code: 'invalid', path: [field], message: sentence }))
  })
})

describe('a deposit for a run approved at the last moment', () => {
  it.each([[90, 60], [60, 60], [30, 30], [1, 1]])('approved %i min before the start, is due %i min later: never after the start', (minutesToStart, minutes) => {
    const approvedAt = new Date('2027-05-01T12:00:00Z')
    const startsAt = new Date(approvedAt.getTime() + minutesToStart * 60_000)
    expect((payByInstant(approvedAt, startsAt, 72).getTime() - approvedAt.getTime()) / 60_000).toBe(minutes)
  })
})
