import { describe, expect, it } from 'vitest'
import { boardScale, dayIndexAt, daysTouched, positionOf, visibleSpan } from '#shared/board/scale'

const HOUR = 3_600_000
const hours = (range: { from: string, to: string, timeZone: string }) => boardScale(range).days.map(day => (day.endMs - day.startMs) / HOUR)

describe('boardScale', () => {
  it('gives each day its true length over both changes of the clock', () => {
    // Oslo: forward on Sunday 28 March 2027 at 02:00, back on Sunday 31 October 2027 at 03:00.
    expect(hours({ from: '2027-03-27', to: '2027-03-30', timeZone: 'Europe/Oslo' })).toEqual([24, 23, 24])
    expect(hours({ from: '2027-10-30', to: '2027-11-02', timeZone: 'Europe/Oslo' })).toEqual([24, 25, 24])
    // Lord Howe changes by half an hour.
    expect(hours({ from: '2027-04-03', to: '2027-04-06', timeZone: 'Australia/Lord_Howe' })).toEqual([24, 24.5, 24])
  })

  it('draws a day of 23 h narrower, and days end to end', () => {
    const { days } = boardScale({ from: '2027-03-27', to: '2027-03-30', timeZone: 'Europe/Oslo' })
    expect(days[1]?.width).toBeCloseTo(23 / 71, 12)
    days.forEach((day, index) => expect(day.left).toBeCloseTo(days.slice(0, index).reduce((sum, { width }) => sum + width, 0), 12))
    expect(days.reduce((sum, { width }) => sum + width, 0)).toBeCloseTo(1, 12)
  })

  it('starts at the facility\'s midnight and knows weekends', () => {
    const scale = boardScale({ from: '2027-05-07', to: '2027-05-10', timeZone: 'Europe/Oslo' })
    expect(new Date(scale.startMs).toISOString()).toBe('2027-05-06T22:00:00.000Z')
    expect(scale.days.map(day => day.isWeekend)).toEqual([false, true, true])
  })

  it('refuses an empty range and one that is too long', () => {
    expect(() => boardScale({ from: '2027-05-07', to: '2027-05-07', timeZone: 'Europe/Oslo' })).toThrow('1 to 92 days')
    expect(() => boardScale({ from: '2027-01-01', to: '2027-12-31', timeZone: 'Europe/Oslo' })).toThrow('1 to 92 days')
  })
})

describe('places on the board', () => {
  const scale = boardScale({ from: '2027-05-03', to: '2027-05-17', timeZone: 'Europe/Oslo' })
  const at = (text: string) => Date.parse(text)

  it('puts noon of the first day half a day in', () => {
    expect(positionOf(scale, at('2027-05-03T12:00+02:00'))).toBeCloseTo(0.5 / 14, 12)
  })

  it('cuts a span to what is shown', () => {
    expect(visibleSpan(scale, at('2027-05-01T00:00+02:00'), at('2027-05-10T00:00+02:00'))).toEqual({ left: 0, width: 0.5 })
    expect(visibleSpan(scale, at('2027-05-20T00:00+02:00'), at('2027-05-21T00:00+02:00')).width).toBe(0)
  })

  it('finds the day under the pointer, at the edges too', () => {
    expect([-1, 0, 0.5, 0.999, 2].map(share => dayIndexAt(scale, share))).toEqual([0, 0, 7, 13, 13])
  })

  it('names the days a span touches; one that ends at midnight does not touch the next', () => {
    expect(daysTouched(scale, at('2027-05-04T09:00+02:00'), at('2027-05-06T00:00+02:00'))).toEqual({ first: 1, last: 2 })
    expect(daysTouched(scale, at('2027-04-04T09:00+02:00'), at('2027-05-03T00:00+02:00'))).toBeUndefined()
    expect(daysTouched(scale, at('2027-05-16T09:00+02:00'), at('2027-06-03T00:00+02:00'))).toEqual({ first: 13, last: 13 })
  })
})
