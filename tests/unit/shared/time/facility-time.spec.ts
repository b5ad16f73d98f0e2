import { describe, expect, it } from 'vitest'
import { DomainError } from '#shared/errors'
import { addDays, daysBetween, instantOfWallTime, instantsOfWallTime, mondayOf, startOfDay, wallTimeOf } from '#shared/time/facility-time'

// Changes of the clock. Oslo: Directive 2000/84/EC, last Sundays of March and October at 01:00 UTC. Lord Howe, Havana and
// Cairo: IANA time zone database, files australasia, northamerica and africa.
const OSLO = 'Europe/Oslo'
const LORD_HOWE = 'Australia/Lord_Howe'
const iso = (instant: Date) => instant.toISOString()
const at = (date: string, time: string, zone = OSLO, fold?: 'first' | 'second') => iso(instantOfWallTime({ date, time }, zone, fold))

describe('the wall time of an instant', () => {
  it.each([
    ['2027-01-15T09:30:00Z', OSLO, '2027-01-15', '10:30'], // winter, UTC+1
    ['2027-07-15T22:30:00Z', OSLO, '2027-07-16', '00:30'], // summer, UTC+2, already the next day
    ['2027-03-28T00:59:00Z', OSLO, '2027-03-28', '01:59'], // last minute before the clock is put forward
    ['2027-03-28T01:00:00Z', OSLO, '2027-03-28', '03:00'],
    ['2026-10-25T00:30:00Z', OSLO, '2026-10-25', '02:30'], // both read 02:30
    ['2026-10-25T01:30:00Z', OSLO, '2026-10-25', '02:30'],
    ['2027-01-15T12:00:00Z', 'Asia/Kathmandu', '2027-01-15', '17:45'], // UTC+5:45
  ])('%s in %s', (instant, zone, date, time) => {
    expect(wallTimeOf(new Date(instant), zone)).toEqual({ date, time })
  })
})

describe('the instant of a wall time', () => {
  it('follows winter and summer time', () => {
    expect(at('2027-01-15', '10:30')).toBe('2027-01-15T09:30:00.000Z')
    expect(at('2027-07-15', '10:30')).toBe('2027-07-15T08:30:00.000Z')
    expect(at('2027-01-15', '17:45', 'Asia/Kathmandu')).toBe('2027-01-15T12:00:00.000Z')
  })

  it('is right on either side of a change', () => {
    expect(at('2027-03-28', '01:59')).toBe('2027-03-28T00:59:00.000Z')
    expect(at('2027-03-28', '03:00')).toBe('2027-03-28T01:00:00.000Z')
    expect(at('2026-10-25', '01:59')).toBe('2026-10-24T23:59:00.000Z')
    expect(at('2026-10-25', '03:00')).toBe('2026-10-25T02:00:00.000Z')
  })

  it('refuses a time the clock is put forward over, and names the next', () => {
    const refused = () => at('2027-03-28', '02:30')
    expect(refused).toThrow(DomainError)
    expect(refused).toThrow('On 2027-03-28 the clock is put forward over 02:30, so this time does not exist. The next one that does is 03:00.')
    expect(() => at('2027-03-28', '02:00')).toThrow('The next one that does is 03:00.')
    expect(() => at('2027-03-28', '02:59')).toThrow('The next one that does is 03:00.')
    // Cairo: from midnight to 01:00. Apia left out the whole of 30 December 2011 (IANA, australasia).
    expect(() => at('2027-04-30', '00:20', 'Africa/Cairo')).toThrow('The next one that does is 01:00.')
    expect(() => at('2011-12-30', '12:00', 'Pacific/Apia')).toThrow('The next one that does is 2011-12-31, 00:00.')
    expect(() => at('2027-03-28', '02:30', OSLO, 'second')).toThrow('does not exist')
  })

  it('tells the two apart where the clock is put back', () => {
    expect(at('2026-10-25', '02:30')).toBe('2026-10-25T00:30:00.000Z')
    expect(at('2026-10-25', '02:30', OSLO, 'first')).toBe('2026-10-25T00:30:00.000Z')
    expect(at('2026-10-25', '02:30', OSLO, 'second')).toBe('2026-10-25T01:30:00.000Z')
    // A time that comes once is the same as first and as second.
    expect(at('2026-10-25', '03:30', OSLO, 'second')).toBe(at('2026-10-25', '03:30'))
  })

  it('gives all instants of a wall time, for a form to ask which is meant', () => {
    const all = (date: string, time: string) => instantsOfWallTime({ date, time }, OSLO).map(iso)
    expect(all('2026-10-25', '02:30')).toEqual(['2026-10-25T00:30:00.000Z', '2026-10-25T01:30:00.000Z'])
    expect(all('2026-10-25', '03:00')).toEqual(['2026-10-25T02:00:00.000Z'])
    expect(all('2027-03-28', '02:30')).toEqual([])
  })

  it('knows changes of half an hour', () => {
    // Lord Howe: 2027-04-04 02:00 (UTC+11) back to 01:30 (UTC+10:30); 2027-10-03 02:00 forward to 02:30.
    expect(at('2027-04-04', '01:45', LORD_HOWE, 'first')).toBe('2027-04-03T14:45:00.000Z')
    expect(at('2027-04-04', '01:45', LORD_HOWE, 'second')).toBe('2027-04-03T15:15:00.000Z')
    expect(() => at('2027-10-03', '02:15', LORD_HOWE)).toThrow('The next one that does is 02:30.')
    expect(at('2027-10-03', '02:30', LORD_HOWE)).toBe('2027-10-02T15:30:00.000Z')
  })

  it.each([['2027-02-30', '09:00'], ['2027-13-01', '09:00'], ['tomorrow', '09:00'], ['2027-05-04', '24:00'], ['2027-05-04', '25:00'], ['2027-05-04', '09:61'], ['2027-05-04', '']])('refuses %s %s', (date, time) => {
    expect(() => at(date, time)).toThrow('This is not a date and time. Enter a date such as 2027-05-04 and a time such as 09:30.')
  })
})

describe('the start of a day', () => {
  it.each([
    ['2027-05-04', OSLO, '2027-05-03T22:00:00.000Z'],
    ['2027-03-28', OSLO, '2027-03-27T23:00:00.000Z'],
    // Cairo puts the clock forward at midnight of the last Friday of April: the day starts at 01:00 summer time, UTC+3.
    ['2027-04-30', 'Africa/Cairo', '2027-04-29T22:00:00.000Z'],
    // Havana puts it back from 01:00 to 00:00 on the first Sunday of November: the first midnight, UTC−4, starts the day.
    ['2027-11-07', 'America/Havana', '2027-11-07T04:00:00.000Z'],
  ])('%s in %s is %s', (date, zone, instant) => {
    expect(iso(startOfDay(date, zone))).toBe(instant)
  })

  it('refuses what is no day', () => {
    expect(() => startOfDay('2027-02-30', OSLO)).toThrow('This is not a date')
  })
})

describe('calendar arithmetic', () => {
  it('counts days over months, leap days and changes of the clock', () => {
    expect(addDays('2027-02-28', 1)).toBe('2027-03-01')
    expect(addDays('2028-02-28', 1)).toBe('2028-02-29')
    expect(addDays('2027-03-27', 2)).toBe('2027-03-29')
    expect(addDays('2027-01-01', -1)).toBe('2026-12-31')
    expect(daysBetween('2027-03-27', '2027-03-29')).toBe(2)
    expect(daysBetween('2027-05-04', '2027-04-04')).toBe(-30)
    expect(daysBetween('2028-01-01', '2029-01-01')).toBe(366)
  })

  it('finds the Monday of a week', () => {
    // 3 May 2027 is a Monday, 9 May 2027 the Sunday after it.
    expect(mondayOf('2027-05-03')).toBe('2027-05-03')
    expect(mondayOf('2027-05-06')).toBe('2027-05-03')
    expect(mondayOf('2027-05-09')).toBe('2027-05-03')
    expect(mondayOf('2027-01-01')).toBe('2026-12-28')
  })
})
