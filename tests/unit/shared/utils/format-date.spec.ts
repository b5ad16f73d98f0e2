import { describe, expect, it } from 'vitest'
import { formatDate, formatDay, formatDayRange, formatInstant, formatSlot } from '#shared/utils/format-date'

describe('a day for people', () => {
  it('has its weekday, or its year on papers', () => {
    // 4 May 2027 is a Tuesday, 29 February 2028 a Tuesday, 1 January 2027 a Friday.
    expect(formatDay('2027-05-04')).toBe('Tue 4 May')
    expect(formatDay('2028-02-29')).toBe('Tue 29 Feb')
    expect(formatDay('2027-01-01')).toBe('Fri 1 Jan')
    expect(formatDate('2027-05-07')).toBe('7 May 2027')
    expect(formatDate('2027-12-31')).toBe('31 Dec 2027')
  })

  it.each([
    ['2027-05-04', '2027-05-17', '4 \u2013 17 May'],
    ['2027-04-28', '2027-05-11', '28 Apr \u2013 11 May'],
    ['2026-12-28', '2027-01-10', '28 Dec 2026 \u2013 10 Jan 2027'],
    ['2026-05-04', '2027-05-04', '4 May 2026 \u2013 4 May 2027'],
    ['2027-05-04', '2027-05-04', '4 May'],
  ])('from %s to %s is %j', (from, to, text) => {
    expect(formatDayRange(from, to)).toBe(text)
  })
})

describe('an instant for people', () => {
  it('is shown in the zone', () => {
    expect(formatInstant('2027-05-04T08:05:00Z', 'Europe/Oslo')).toBe('Tue 4 May 10:05') // UTC+2
    expect(formatInstant(new Date('2027-01-15T23:30:00Z'), 'Europe/Oslo')).toBe('Sat 16 Jan 00:30') // UTC+1, the next day
    expect(formatSlot('2027-05-04T08:00:00Z', '2027-05-06T16:00:00Z', 'Europe/Oslo')).toBe('Tue 4 May 10:00 \u2013 Thu 6 May 18:00')
  })
})
