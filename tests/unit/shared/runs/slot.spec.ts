import { describe, expect, it } from 'vitest'
import { checkAskable, overlaps } from '#shared/runs/slot'
import { instantOfWallTime } from '#shared/time/facility-time'

const slot = (from: string, to: string) => ({ startsAt: new Date(`2027-05-${from}:00Z`), endsAt: new Date(`2027-05-${to}:00Z`) })

describe('two slots', () => {
  const held = slot('04T10:00', '06T18:00')
  it.each([
    ['ends when the other starts', slot('03T10:00', '04T10:00'), false],
    ['starts when the other ends', slot('06T18:00', '07T18:00'), false],
    ['ends a minute into the other', slot('03T10:00', '04T10:01'), true],
    ['starts a minute before the other ends', slot('06T17:59', '07T18:00'), true],
    ['lies inside', slot('05T10:00', '05T12:00'), true],
    ['lies around', slot('01T10:00', '09T12:00'), true],
    ['is the same', held, true],
    ['is elsewhere', slot('09T10:00', '10T12:00'), false],
  ] as const)('one that %s', (_, other, shared) => {
    expect(overlaps(held, other)).toBe(shared)
    expect(overlaps(other, held)).toBe(shared)
  })

  it('may follow each other within the hour that the clock repeats', () => {
    // Oslo, 25 October 2026: 02:30 comes twice, an hour apart.
    const at = (fold: 'first' | 'second') => instantOfWallTime({ date: '2026-10-25', time: '02:30' }, 'Europe/Oslo', fold)
    const repeated = { startsAt: at('first'), endsAt: at('second') }
    const before = { startsAt: new Date('2026-10-24T07:00:00Z'), endsAt: at('first') }
    expect(overlaps(before, repeated)).toBe(false)
    expect(overlaps({ ...before, endsAt: at('second') }, repeated)).toBe(true)
  })
})

describe('a slot that is asked for', () => {
  const now = new Date('2027-05-04T09:00:00Z')
  const after = (ms: number, lengthMs = 3_600_000) => ({ startsAt: new Date(now.getTime() + ms), endsAt: new Date(now.getTime() + ms + lengthMs) })
  // The last instant that can be asked for is 370 days of 24 h ahead.
  const farthest = 370 * 86_400_000

  it('may start from the next instant up to 370 days ahead', () => {
    expect(() => checkAskable(after(1), now)).not.toThrow()
    expect(() => checkAskable(after(farthest), now)).not.toThrow()
  })

  it.each([
    ['now', after(0), 'This start is in the past. Choose a later day.', 'startsAt'],
    ['in the past', after(-1), 'This start is in the past. Choose a later day.', 'startsAt'],
    ['empty', after(1000, 0), 'The run ends before it starts. Choose a later end.', 'endsAt'],
    ['backwards', after(1000, -500), 'The run ends before it starts. Choose a later end.', 'endsAt'],
    ['too far ahead', after(farthest + 1), 'Days can be asked for up to 370 days ahead. Choose an earlier day.', 'startsAt'],
  ])('is refused when it is %s', (_, asked, sentence, field) => {
    expect(() => checkAskable(asked, now)).toThrow(expect.objectContaining({ code: 'invalid', message: sentence, path: [field] }))
  })
})
