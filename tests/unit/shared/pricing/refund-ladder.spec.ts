import { describe, expect, it } from 'vitest'
import { DEFAULT_REFUND_LADDER, refundOf } from '#shared/pricing/refund-ladder'

const OSLO = 'Europe/Oslo'
const percent = (withdrawn: string, starts: string, zone = OSLO) => refundOf(100_00, new Date(withdrawn), new Date(starts), zone).percent

describe('what of a deposit comes back', () => {
  // Defaults of product.md: 14 days or more before 100 %, 3 to 14 days 50 %, less 0 %.
  // Start Monday 2027-06-21 09:00 in Oslo, summer time: 07:00 UTC. 14 days before is the 7th, 3 days before the 18th.
  const START = '2027-06-21T07:00:00.000Z'
  it.each([
    ['2027-05-01T00:00:00.000Z', 100],
    ['2027-06-07T06:59:59.999Z', 100],
    ['2027-06-07T07:00:00.000Z', 100], // exactly 14 days before
    ['2027-06-07T07:00:00.001Z', 50], // a millisecond later
    ['2027-06-18T06:59:59.999Z', 50],
    ['2027-06-18T07:00:00.000Z', 50], // exactly 3 days before
    ['2027-06-18T07:00:00.001Z', 0],
    ['2027-06-21T07:00:00.000Z', 0],
    ['2027-06-22T00:00:00.000Z', 0], // after the start
  ])('withdrawn at %s: %i %%', (withdrawn, expected) => {
    expect(percent(withdrawn, START)).toBe(expected)
  })

  it('counts days on the calendar where the clock is put forward in between', () => {
    // Start Monday 2027-04-05 09:00 Oslo, summer time: 07:00 UTC. 14 days before, on 22 March, 09:00 is 08:00 UTC (winter).
    // 14 × 24 h before would be 22 March 07:00 UTC, an hour too early.
    expect(percent('2027-03-22T08:00:00.000Z', '2027-04-05T07:00:00.000Z')).toBe(100)
    expect(percent('2027-03-22T08:00:00.001Z', '2027-04-05T07:00:00.000Z')).toBe(50)
  })

  it('counts days on the calendar where the clock is put back in between', () => {
    // Start Tuesday 2026-10-27 09:00 Oslo, winter: 08:00 UTC. 3 days before, Saturday the 24th, 09:00 is 07:00 UTC (summer).
    expect(percent('2026-10-24T07:00:00.000Z', '2026-10-27T08:00:00.000Z')).toBe(50)
    expect(percent('2026-10-24T07:00:00.001Z', '2026-10-27T08:00:00.000Z')).toBe(0)
  })

  it('has a boundary also on a day whose clock skips that time', () => {
    // Start 2027-03-31 02:30 Oslo, 00:30 UTC. 3 days before, on the 28th, 02:30 does not exist: 24 h after the 27th 02:30 (01:30 UTC).
    expect(percent('2027-03-28T01:30:00.000Z', '2027-03-31T00:30:00.000Z')).toBe(50)
    expect(percent('2027-03-28T01:30:00.001Z', '2027-03-31T00:30:00.000Z')).toBe(0)
    // Cairo skips midnight to 01:00 on 2027-04-30. Start 2027-05-03 00:30 there (UTC+3): the 2nd, 21:30 UTC;
    // 24 h after the 29th 00:30 (UTC+2, the 28th 22:30 UTC).
    expect(percent('2027-04-29T22:30:00.000Z', '2027-05-02T21:30:00.000Z', 'Africa/Cairo')).toBe(50)
    expect(percent('2027-04-29T22:30:00.001Z', '2027-05-02T21:30:00.000Z', 'Africa/Cairo')).toBe(0)
  })

  it('rounds half a unit away from zero', () => {
    // 50 % of 333.33 is 166.665 → 166.67.
    expect(refundOf(333_33, new Date('2027-06-10T00:00:00Z'), new Date(START), OSLO)).toEqual({ amountMinor: 166_67, percent: 50 })
    expect(refundOf(333_33, new Date('2027-06-01T00:00:00Z'), new Date(START), OSLO)).toEqual({ amountMinor: 333_33, percent: 100 })
    expect(refundOf(0, new Date('2027-06-01T00:00:00Z'), new Date(START), OSLO)).toEqual({ amountMinor: 0, percent: 100 })
  })

  it('takes the facility\'s own ladder, in any order of steps', () => {
    const ladder = [{ fromDaysBefore: 7, refundPercent: 80 }, { fromDaysBefore: 30, refundPercent: 90 }]
    // 20 days before: the step from 7 days. 5 days before: no step, nothing.
    expect(refundOf(200_00, new Date('2027-06-01T07:00:00Z'), new Date(START), OSLO, ladder)).toEqual({ amountMinor: 160_00, percent: 80 })
    expect(refundOf(200_00, new Date('2027-06-16T07:00:00Z'), new Date(START), OSLO, ladder)).toEqual({ amountMinor: 0, percent: 0 })
    expect(refundOf(200_00, new Date('2027-06-01T07:00:00Z'), new Date(START), OSLO, [])).toEqual({ amountMinor: 0, percent: 0 })
  })

  it('has the defaults of the facility', () => {
    expect(DEFAULT_REFUND_LADDER.map(step => [step.fromDaysBefore, step.refundPercent])).toEqual([[14, 100], [3, 50], [0, 0]])
  })
})
