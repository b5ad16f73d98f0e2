import { describe, expect, it } from 'vitest'
import { formatDate, formatDay, formatDayRange, formatInstant, formatSlot } from '#shared/utils/format-date'

// 4 May 2027 is a Tuesday, 1 January 2027 a Friday (ISO 8601 calendar).
describe('days and times in facility time', () => {
  it('shows a day with its weekday, and with its year on papers', () => {
    expect(formatDay('2027-05-04')).toBe('Tue 4 May')
    expect(formatDay('2027-01-01')).toBe('Fri 1 Jan')
    expect(formatDate('2027-12-31')).toBe('31 Dec 2027')
  })

  it.each([
    ['2027-05-04T08:05:00Z', 'Europe/Oslo', 'Tue 4 May 10:05'],
    ['2027-05-04T22:05:00Z', 'Europe/Oslo', 'Wed 5 May 00:05'],
    ['2027-05-04T02:05:00Z', 'America/New_York', 'Mon 3 May 22:05'],
    // The clock is put forward over 02:00 to 03:00 on 28 March 2027.
    ['2027-03-28T00:59:00Z', 'Europe/Oslo', 'Sun 28 Mar 01:59'],
    ['2027-03-28T01:00:00Z', 'Europe/Oslo', 'Sun 28 Mar 03:00'],
  ])('%s in %s is %s', (instant, zone, text) => {
    expect(formatInstant(instant, zone)).toBe(text)
    expect(formatInstant(new Date(instant), zone)).toBe(text)
  })

  it.each([
    ['2027-05-04', '2027-05-17', '4 – 17 May'],
    ['2027-04-28', '2027-05-11', '28 Apr – 11 May'],
    ['2027-12-28', '2028-01-10', '28 Dec 2027 – 10 Jan 2028'],
  ])('from %s to %s is %s', (from, to, text) => {
    expect(formatDayRange(from, to)).toBe(text)
  })

  it('shows a slot by its two ends', () => {
    expect(formatSlot('2027-05-04T08:00:00Z', '2027-05-06T16:00:00Z', 'Europe/Oslo')).toBe('Tue 4 May 10:00 – Thu 6 May 18:00')
  })

  it('is the same whatever zone the machine stands in', () => {
    const before = process.env.TZ
    try {
      const shown = ['Pacific/Kiritimati', 'America/Adak', 'UTC'].map((zone) => {
        process.env.TZ = zone
        return [formatInstant('2027-05-04T22:05:00Z', 'Europe/Oslo'), formatDay('2027-05-04'), formatDayRange('2027-05-04', '2027-05-17')].join()
      })
      expect(new Set(shown)).toEqual(new Set(['Wed 5 May 00:05,Tue 4 May,4 – 17 May']))
    }
    finally {
      process.env.TZ = before
    }
  })
})
