import { describe, expect, it } from 'vitest'
import { layPhases, phaseAt, trueHours } from '#shared/planning/phases'
import { basinDepth, profileTemperatureK, temperatureProfile } from '#shared/planning/profile'
import { MS_PER_HOUR as H } from '#shared/units/helium-units'

const PHASES = [
  { phase: 'prepare', hours: 4 }, { phase: 'cool-to-77', hours: 12 }, { phase: 'cool-to-base', hours: 8 },
  { phase: 'measure', hours: 40 }, { phase: 'warm-up', hours: 18 }, { phase: 'turn-round', hours: 3 },
] as const

describe('phases over real time', () => {
  it('lie end to end with their true lengths', () => {
    const laid = layPhases(0, PHASES)
    expect(laid.map(({ startMs, endMs }) => trueHours(startMs, endMs))).toEqual([4, 12, 8, 40, 18, 3])
    laid.slice(1).forEach((phase, i) => expect(phase.startMs).toBe(laid[i]?.endMs))
  })

  it.each([
    // Clocks in Oslo go forward on 28 March 2027 and back on 31 October 2027 (tz database): 24 true hours from
    // local midnight end at 01:00 the next day in spring and at 23:00 of the same day in autumn.
    ['2027-03-27T23:00:00Z', '29/03/2027, 01:00'],
    ['2027-10-30T22:00:00Z', '31/10/2027, 23:00'],
  ])('keep 24 true hours across the clock change after %s', (start, localEnd) => {
    const [day] = layPhases(Date.parse(start), [{ phase: 'measure', hours: 24 }])
    expect(trueHours(day?.startMs as number, day?.endMs as number)).toBe(24)
    const local = new Intl.DateTimeFormat('en-GB', { timeZone: 'Europe/Oslo', dateStyle: 'short', timeStyle: 'short' }).format(day?.endMs)
    expect(local).toBe(localEnd)
  })

  it('do not gather rounding over many phases', () => {
    const laid = layPhases(0, Array.from({ length: 1000 }, () => ({ phase: 'measure' as const, hours: 1 / 7.0001 })))
    expect(laid.at(-1)?.endMs).toBe(Math.round(1000 / 7.0001 * H))
  })

  it('say which phase is on', () => {
    const laid = layPhases(0, PHASES)
    expect(phaseAt(laid, 0)?.phase).toBe('prepare')
    expect(phaseAt(laid, 4 * H)?.phase).toBe('cool-to-77')
    expect(phaseAt(laid, 85 * H)).toBeUndefined()
    expect(phaseAt(laid, -1)).toBeUndefined()
  })

  it('refuse a start that is no time and hours below zero', () => {
    expect(() => layPhases(Number.NaN, PHASES)).toThrow(/Choose a day/)
    expect(() => layPhases(0, [{ phase: 'measure', hours: -1 }])).toThrow(/measure/)
  })
})

describe('planned temperature', () => {
  it('is a basin: rim, nitrogen, floor, rim', () => {
    expect(temperatureProfile(PHASES, 1.5)).toEqual([
      { hour: 0, temperatureK: 300 }, { hour: 4, temperatureK: 300 }, { hour: 16, temperatureK: 77 }, { hour: 24, temperatureK: 1.5 },
      { hour: 64, temperatureK: 1.5 }, { hour: 82, temperatureK: 300 }, { hour: 85, temperatureK: 300 },
    ])
  })

  it('reads between corners on the logarithmic scale', () => {
    const profile = temperatureProfile(PHASES, 3)
    // Half-way from 77 K to 3 K: √(77 × 3) = 15.199 K.
    expect(profileTemperatureK(profile, 20)).toBeCloseTo(Math.sqrt(77 * 3), 9)
    expect(profileTemperatureK(profile, -5)).toBe(300)
    expect(profileTemperatureK(profile, 500)).toBe(300)
  })

  it('has depth 0 at the rim, 1 at the floor, half at the geometric mean', () => {
    expect(basinDepth(300)).toBe(0)
    expect(basinDepth(0.01)).toBe(1)
    expect(basinDepth(Math.sqrt(3))).toBeCloseTo(0.5, 12)
    expect(basinDepth(0.001)).toBe(1)
    expect(basinDepth(310)).toBe(0)
  })
})
