import { describe, expect, it } from 'vitest'
import { payByInstant } from '#shared/runs/pay-by'

const at = (text: string) => new Date(`2027-05-${text}:00.000Z`)

describe('the instant by which a deposit must be paid', () => {
  it.each([
    // Approved on the 1st at 09:00, term 72 h, start far off: the 4th at 09:00.
    ['the facility\'s term', '01T09:00', '20T09:00', 72, '04T09:00'],
    // Start on the 4th at 09:00, so a day before it, the 3rd at 09:00, comes first.
    ['a day before the start', '01T09:00', '04T09:00', 72, '03T09:00'],
    // Exactly 96 h ahead both are the 4th at 09:00.
    ['both at once', '01T09:00', '05T09:00', 72, '04T09:00'],
    // Start 10 h after approval: a day before it is past, so an hour after approval.
    ['an hour after approval at short notice', '01T09:00', '01T19:00', 72, '01T10:00'],
    // A day before the start is 30 min after approval: the hour is the least.
    ['an hour even where a day before the start is sooner', '01T09:00', '02T09:30', 72, '01T10:00'],
    // Start 20 min after approval: an hour would be 40 min into the slot.
    ['the start, where not even an hour is left', '01T09:00', '01T09:20', 72, '01T09:20'],
  ])('is %s', (_, approved, starts, term, payBy) => {
    expect(payByInstant(at(approved), at(starts), term)).toEqual(at(payBy))
  })
})
