import { describe, expect, it } from 'vitest'
import type { ForecastInput } from '#shared/helium/forecast'
import { forecastStock } from '#shared/helium/forecast'
import { forecastSentence } from '#shared/helium/forecast-sentence'
import { MS_PER_HOUR as H } from '#shared/units/helium-units'

const NOW = Date.UTC(2026, 4, 11, 6) // Monday 11 May 2026, 08:00 in Oslo
const DAY = 24 * H
const run = (runId: string, held: boolean, startMs: number, days: number, litres: number, sdLitres: number) =>
  ({ runId, held, draws: [{ startMs, endMs: startMs + days * DAY, litres, sdLitres }] })
const INPUT: ForecastInput = {
  nowMs: NOW, untilMs: NOW + 14 * DAY, stockLitres: 200, stockSdLitres: 0, reserveLitres: 80, dewarBoilOffLitresPerHour: 0,
  runs: [run('a', true, NOW + DAY, 2, 100, 10), run('b', false, NOW + 5 * DAY, 2, 60, 8)], deliveries: [], mode: 'held',
}

describe('helium forecast', () => {
  it('holds with the runs that hold their days', () => {
    const forecast = forecastStock(INPUT)
    expect(forecast.points.at(-1)?.likelyLitres).toBeCloseTo(100, 9)
    // Band: 1.28155 × 10 L.
    expect(forecast.points.at(-1)?.lowLitres).toBeCloseTo(87.184, 3)
    expect(forecast.likelyShortMs).toBeUndefined()
    expect(forecast.lowShortMs).toBeUndefined()
    expect(forecastSentence(forecast, 80, 'Europe/Oslo')).toMatch(/^With the runs that hold their days, helium stays above the reserve of 80\.0.L until Monday 25 May 2026; the least is 100.L on Thursday 14 May 2026\.$/)
  })

  it('names the day when all asked runs go', () => {
    const forecast = forecastStock({ ...INPUT, mode: 'all-asked' })
    // 100 L before run b; 20 of its 60 L are gone after 2/3 day of 2: 80 L at day 5 + 16 h.
    expect(Math.abs((forecast.likelyShortMs as number) - (NOW + 5 * DAY + 16 * H))).toBeLessThan(2000)
    expect(forecast.lowShortMs).toBeLessThan(forecast.likelyShortMs as number)
    // 17 May 00:00 in Oslo is 22:00 UTC on the 16th: the instant 16 May 22:00 UTC is already the 17th there.
    expect(forecastSentence(forecast, 80, 'Europe/Oslo')).toMatch(/If every run asked for also went, helium is likely to fall under the reserve of 80\.0.L on Sunday 17 May 2026\. If the runs drink more than planned, it may be as early as Saturday 16 May 2026\.$/)
    // End band: runs are independent, √(10² + 8²) = 12.806.
    expect(forecast.points.at(-1)?.highLitres).toBeCloseTo(40 + 1.2815516 * 12.8062, 3)
  })

  it('steps up at a delivery, with a point before and after', () => {
    const atMs = NOW + 6 * DAY
    const forecast = forecastStock({ ...INPUT, mode: 'all-asked', deliveries: [{ atMs, litres: 250 }] })
    const [before, after] = forecast.points.filter(point => point.atMs === atMs)
    expect((after?.likelyLitres ?? 0) - (before?.likelyLitres ?? 0)).toBe(250)
    expect(forecast.points.at(-1)?.likelyLitres).toBeCloseTo(290, 9)
    expect(forecast.lowest.atMs).toBe(atMs)
  })

  it('counts only the rest of a phase already begun, and the boil-off of the dewars', () => {
    const forecast = forecastStock({ ...INPUT, runs: [run('c', true, NOW - DAY, 4, 80, 0)], dewarBoilOffLitresPerHour: 0.1 })
    // 3/4 of 80 L to come, and 14 d × 24 h × 0.1 L/h = 33.6 L.
    expect(forecast.points.at(-1)?.likelyLitres).toBeCloseTo(200 - 60 - 33.6, 9)
  })

  it('warns when only the low end falls under the reserve', () => {
    const forecast = forecastStock({ ...INPUT, reserveLitres: 90 })
    expect(forecast.likelyShortMs).toBeUndefined()
    expect(forecastSentence(forecast, 90, 'Europe/Oslo')).toMatch(/likely to stay above .* but it may fall under it on Thursday 14 May 2026/)
  })

  it('is short from the start when the stock already is', () => {
    expect(forecastStock({ ...INPUT, stockLitres: 70 }).likelyShortMs).toBe(NOW)
  })

  it('carries the uncertainty of one run through its phases together', () => {
    const one = { runId: 'd', held: true, draws: [
      { startMs: NOW, endMs: NOW + DAY, litres: 10, sdLitres: 3 }, { startMs: NOW + DAY, endMs: NOW + 2 * DAY, litres: 10, sdLitres: 4 },
    ] }
    // Within a run spreads add: 3 + 4 = 7.
    expect(forecastStock({ ...INPUT, runs: [one] }).points.at(-1)?.lowLitres).toBeCloseTo(180 - 1.2815516 * 7, 4)
  })

  it('refuses times and amounts that cannot be', () => {
    expect(() => forecastStock({ ...INPUT, untilMs: NOW })).toThrow(/Choose a later day/)
    expect(() => forecastStock({ ...INPUT, stockLitres: -1 })).toThrow(/zero or more/)
    expect(() => forecastStock({ ...INPUT, runs: [run('x', true, NOW, -1, 5, 0)] })).toThrow(/Plan that run again/)
    expect(() => forecastStock({ ...INPUT, deliveries: [{ atMs: Number.NaN, litres: 5 }] })).toThrow(/Correct that delivery/)
  })
})
