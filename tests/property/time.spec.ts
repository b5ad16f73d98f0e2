import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { hoursBetween } from '#shared/time/duration'
import { addDays, daysBetween, instantOfWallTime, mondayOf, startOfDay, wallTimeOf } from '#shared/time/facility-time'

const zone = fc.constantFrom('Europe/Oslo', 'America/New_York', 'Australia/Lord_Howe', 'Asia/Kathmandu', 'America/Havana', 'Africa/Cairo', 'Pacific/Chatham', 'UTC')
const MINUTE = 60_000
// Minutes from 2024 to 2030; the rules of these zones are settled from 2024 on.
const instant = fc.integer({ min: Date.UTC(2024, 0, 1) / MINUTE, max: Date.UTC(2030, 0, 1) / MINUTE }).map(minutes => new Date(minutes * MINUTE))
const day = instant.map(at => at.toISOString().slice(0, 10))

/** The wall time as the engine's own formatter reads it, an independent reading of the zone database. */
function wallTimeByIntl(at: Date, timeZone: string) {
  const part = Object.fromEntries(new Intl.DateTimeFormat('en-GB', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit', hour: '2-digit', minute: '2-digit', hourCycle: 'h23' })
    .formatToParts(at).map(({ type, value }) => [type, value]))
  return { date: `${part.year}-${part.month}-${part.day}`, time: `${part.hour}:${part.minute}` }
}

describe('facility time', () => {
  it('reads every instant as the engine\'s formatter does', () => {
    fc.assert(fc.property(instant, zone, (at, timeZone) => {
      expect(wallTimeOf(at, timeZone)).toEqual(wallTimeByIntl(at, timeZone))
    }), { numRuns: 500 })
  })

  it('leads back to an instant, as the first or the second of its wall time', () => {
    fc.assert(fc.property(instant, zone, (at, timeZone) => {
      const wall = wallTimeOf(at, timeZone)
      const both = (['first', 'second'] as const).map(fold => instantOfWallTime(wall, timeZone, fold).getTime())
      expect(both).toContain(at.getTime())
      expect(both[0]).toBeLessThanOrEqual(both[1]!)
    }), { numRuns: 500 })
  })

  it('does so near the changes of the clock too', () => {
    const change = fc.constantFrom(Date.UTC(2026, 9, 25, 1), Date.UTC(2027, 2, 28, 1))
    fc.assert(fc.property(change, fc.integer({ min: -180, max: 180 }), (near, minutes) => {
      const at = new Date(near + minutes * MINUTE)
      const wall = wallTimeOf(at, 'Europe/Oslo')
      // Put back at 01:00 UTC: the hour before it is the first, the hour after it the second.
      const fold = near === Date.UTC(2026, 9, 25, 1) && minutes >= 0 ? 'second' : 'first'
      expect(instantOfWallTime(wall, 'Europe/Oslo', fold).getTime()).toBe(at.getTime())
    }), { numRuns: 500 })
  })

  it('lets a day begin at its first instant and last between 23 and 25 hours', () => {
    fc.assert(fc.property(day, zone, (date, timeZone) => {
      const start = startOfDay(date, timeZone)
      expect(wallTimeOf(start, timeZone).date).toBe(date)
      expect(wallTimeOf(new Date(start.getTime() - 1), timeZone).date).toBe(addDays(date, -1))
      const hours = hoursBetween(start, startOfDay(addDays(date, 1), timeZone))
      expect([23, 23.5, 24, 24.5, 25]).toContain(hours)
    }), { numRuns: 500 })
  })
})

describe('calendar arithmetic', () => {
  it('adds and counts days as inverses of each other', () => {
    fc.assert(fc.property(day, fc.integer({ min: -2000, max: 2000 }), (date, days) => {
      expect(daysBetween(date, addDays(date, days))).toBe(days)
      expect(addDays(addDays(date, days), -days)).toBe(date)
    }))
  })

  it('has a Monday at most six days before every day', () => {
    fc.assert(fc.property(day, (date) => {
      const monday = mondayOf(date)
      expect(daysBetween(monday, date)).toBeGreaterThanOrEqual(0)
      expect(daysBetween(monday, date)).toBeLessThanOrEqual(6)
      // 5 January 1970 was a Monday.
      expect(daysBetween('1970-01-05', monday) % 7 + 0).toBe(0)
    }))
  })
})
