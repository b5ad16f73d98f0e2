import type { HeliumForecast } from '#shared/helium/forecast'
import { litresText } from '#shared/units/helium-units'

/** Day in the facility's zone, as in `Thursday 14 May 2026`. */
function dayText(atMs: number, timeZone: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', { timeZone, weekday: 'long', day: 'numeric', month: 'long', year: 'numeric' }).formatToParts(atMs)
  const part = (type: Intl.DateTimeFormatPartTypes): string => parts.find(candidate => candidate.type === type)?.value ?? ''
  return `${part('weekday')} ${part('day')} ${part('month')} ${part('year')}`
}

/**
 * Says when the stock of helium falls under the reserve, naming the day in the facility's zone.
 *
 * @param forecast Forecast of the stock.
 * @param reserveLitres Reserve, litres.
 * @param timeZone IANA name of the facility's zone, e.g. `Europe/Oslo`.
 * @returns One or two plain sentences.
 */
export function forecastSentence(forecast: HeliumForecast, reserveLitres: number, timeZone: string): string {
  const basis = forecast.mode === 'held' ? 'With the runs that hold their days' : 'If every run asked for also went'
  const reserve = `the reserve of ${litresText(reserveLitres)}`
  const day = (atMs: number): string => dayText(atMs, timeZone)
  const { likelyShortMs, lowShortMs, lowest, points } = forecast
  const end = points.at(-1)?.atMs ?? lowest.atMs
  if (likelyShortMs !== undefined) {
    const early = lowShortMs !== undefined && day(lowShortMs) !== day(likelyShortMs)
      ? ` If the runs drink more than planned, it may be as early as ${day(lowShortMs)}.`
      : ''
    return `${basis}, helium is likely to fall under ${reserve} on ${day(likelyShortMs)}.${early}`
  }
  if (lowShortMs !== undefined) {
    return `${basis}, helium is likely to stay above ${reserve} until ${day(end)}, but it may fall under it on ${day(lowShortMs)} if the runs drink more than planned.`
  }
  return `${basis}, helium stays above ${reserve} until ${day(end)}; the least is ${litresText(lowest.likelyLitres)} on ${day(lowest.atMs)}.`
}
