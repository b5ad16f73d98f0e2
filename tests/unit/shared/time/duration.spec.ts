import { describe, expect, it } from 'vitest'
import { hoursBetween } from '#shared/time/duration'
import { addDays, instantOfWallTime, startOfDay } from '#shared/time/facility-time'

describe('hours of a span', () => {
  it.each([
    ['2027-03-28', 'Europe/Oslo', 23], // clock put forward by an hour
    ['2026-10-25', 'Europe/Oslo', 25], // put back by an hour
    ['2027-05-04', 'Europe/Oslo', 24],
    ['2027-10-03', 'Australia/Lord_Howe', 23.5], // half an hour forward
    ['2027-04-04', 'Australia/Lord_Howe', 24.5],
    ['2027-04-30', 'Africa/Cairo', 23], // put forward at midnight
  ])('the day %s in %s has %d h', (date, zone, hours) => {
    expect(hoursBetween(startOfDay(date, zone), startOfDay(addDays(date, 1), zone))).toBe(hours)
  })

  it('a slot across a change of the clock has its true length', () => {
    const at = (date: string, time: string) => instantOfWallTime({ date, time }, 'Europe/Oslo')
    // Friday 09:00 to Monday 17:00 is 3 × 24 + 8 = 80 h by the calendar.
    expect(hoursBetween(at('2027-03-19', '09:00'), at('2027-03-22', '17:00'))).toBe(80)
    expect(hoursBetween(at('2027-03-26', '09:00'), at('2027-03-29', '17:00'))).toBe(79)
    expect(hoursBetween(at('2026-10-23', '09:00'), at('2026-10-26', '17:00'))).toBe(81)
  })

  it('is negative where the end comes first', () => {
    expect(hoursBetween(new Date(7_200_000), new Date(0))).toBe(-2)
  })
})
