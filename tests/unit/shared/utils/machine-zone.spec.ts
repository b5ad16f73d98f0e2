import { afterEach, describe, expect, it } from 'vitest'
import { addDays, mondayOf } from '#shared/time/facility-time'
import { formatDay, formatDayRange, formatInstant } from '#shared/utils/format-date'

const before = process.env.TZ
afterEach(() => {
  if (before === undefined) delete process.env.TZ
  else process.env.TZ = before
})

describe('days and times of the facility', () => {
  it.each([['Pacific/Kiritimati', -840], ['America/Adak', 540], ['UTC', 0]])('are the same on a machine in %s', (zone, offsetMinutes) => {
    process.env.TZ = zone
    // The machine really stands in that zone, else this proves nothing. In May Adak keeps summer time, UTC−9.
    expect(new Date('2027-05-04T22:05:00Z').getTimezoneOffset()).toBe(offsetMinutes)
    expect(formatInstant('2027-05-04T22:05:00Z', 'Europe/Oslo')).toBe('Wed 5 May 00:05')
    expect(formatDay('2027-05-04')).toBe('Tue 4 May')
    expect(formatDayRange('2027-05-04', '2027-05-17')).toBe('4 – 17 May')
    expect(addDays('2027-03-27', 2)).toBe('2027-03-29')
    expect(mondayOf('2027-05-09')).toBe('2027-05-03')
  })
})
