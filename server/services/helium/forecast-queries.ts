import { can, type Actor } from '#shared/access/rules'
import { thinPoints } from '#shared/board/stock-strip'
import { forecastSentence } from '#shared/helium/forecast-sentence'
import { forecastStock, type ForecastInput, type ForecastPoint, type HeliumForecast } from '#shared/helium/forecast'
import { forecastRun } from '#shared/planning/forecast-run'
import type { HeliumForecastReply, StockBandPoint, StockForecast, StockPoint } from '#shared/types/helium-forecast'
import { heliumLitresFromMg } from '#shared/units/helium-units'
import type { Database } from '#server/db/client'
import { dayRangeKey, type DayRange } from '#server/db/day-range'
import { authorise } from '#server/services/access/authorise'
import { sharedRead } from '#server/utils/shared-read'
import { readStockRows, type StockRows, type StockRowsInRange } from './forecast-rows'

/** A storage dewar loses about one per cent of what it holds in a day (common practice, no source). */
const DEWAR_LOSS_PER_HOUR = 0.01 / 24

/** The gauges of the storage dewars are good to about two per cent of what they hold (common practice, no source). */
const STOCK_SHARE_SD = 0.02

/** Finer than a drawing of the stock can show. */
const DRAWN_LITRES = 0.2

/** What is asked of the forecast: days of the facility as for the board, and who asks. */
export interface HeliumForecastQuery { actor: Actor, from?: string, to?: string, now: Date }

/**
 * What the stock forecast is made from, for those who ask further questions of it.
 *
 * @param rows stock, plans and deliveries
 * @param span the instant of the stock and the end of the forecast
 * @returns input of `forecastStock` without its mode
 */
export function toForecastInput(rows: StockRows, span: { now: Date, until: Date }): Omit<ForecastInput, 'mode'> {
  // Books can stand below zero after a late entry; a dewar cannot hold less than nothing.
  const stockLitres = Math.max(0, heliumLitresFromMg(rows.stockMg))
  return {
    nowMs: span.now.getTime(),
    untilMs: span.until.getTime(),
    stockLitres,
    stockSdLitres: stockLitres * STOCK_SHARE_SD,
    reserveLitres: rows.reserveLitres,
    dewarBoilOffLitresPerHour: stockLitres * DEWAR_LOSS_PER_HOUR,
    runs: rows.runs.map(({ runId, held, startsAt, phases }) => forecastRun({ runId, held, startMs: Date.parse(startsAt), estimate: { phases } })),
    deliveries: rows.deliveries.map(({ dueAt, litres }) => ({ atMs: Date.parse(dueAt), litres })),
  }
}

/**
 * The helium strip: stock as it was by the books, and as it is going to be with the runs that hold their days, and with
 * every asked run besides. People without a facility role get the line alone.
 *
 * @param db database
 * @param query range of days and who asks
 * @returns history, forecasts and the sentence that names the day of a shortage
 * @throws DomainError when the actor may not read the board
 */
export async function readHeliumForecast(db: Database, { actor, from, to, now }: HeliumForecastQuery): Promise<HeliumForecastReply> {
  authorise(actor, 'board:read')
  const strip = await readStrip(db, { from: from ?? null, to: to ?? null, now })
  return can(actor, 'helium:read') ? { ...strip, line: [] } : { ...strip, detail: null }
}

/** The whole strip; forecasts are the same for everybody, so people who ask at the same moment share them. */
const readStrip = sharedRead<DayRange, HeliumForecastReply>(dayRangeKey, async (db, range) => {
  const rows = await readStockRows(db, range)
  const [fromMs, until] = [Date.parse(rows.fromAt), new Date(rows.toAt)]
  const input = until > range.now ? toForecastInput(rows, { now: range.now, until }) : undefined
  const held = input && forecastStock({ ...input, mode: 'held' })
  return {
    timeZone: rows.timeZone,
    reserveLitres: rows.reserveLitres,
    history: historyOf(rows, range.now),
    line: held ? fromDay(held.points, fromMs).map(toStockPoint) : [],
    detail: input && held
      ? {
          onHandLitres: round(input.stockLitres),
          held: toStockForecast(held, rows, fromMs, toBandPoint),
          allAsked: toStockForecast(forecastStock({ ...input, mode: 'all-asked' }), rows, fromMs, toStockPoint),
          askedCount: input.runs.filter(run => !run.held).length,
          deliveries: rows.deliveries.map(delivery => ({ ...delivery, isOverdue: Date.parse(delivery.dueAt) < range.now.getTime() })),
        }
      : null,
  }
})

/** Stock by the books from the start of the range until now (or its end): each change is a step with two points. */
function historyOf({ stockMg, changes, fromAt, toAt }: StockRowsInRange, now: Date): StockPoint[] {
  const end = Math.min(Date.parse(toAt), now.getTime())
  if (end <= Date.parse(fromAt)) return []
  let balanceMg = stockMg - changes.reduce((sum, change) => sum + change.amountMg, 0)
  const points = [{ at: fromAt, litres: round(heliumLitresFromMg(balanceMg)) }]
  for (const { at, amountMg } of changes) {
    if (Date.parse(at) > end) break
    points.push({ at, litres: round(heliumLitresFromMg(balanceMg)) })
    balanceMg += amountMg
    points.push({ at, litres: round(heliumLitresFromMg(balanceMg)) })
  }
  return [...points, { at: new Date(end).toISOString(), litres: round(heliumLitresFromMg(balanceMg)) }]
}

/** Points the range shows and a drawing needs, with the one before it, so that the line reaches its edge. */
function fromDay(points: readonly ForecastPoint[], fromMs: number): readonly ForecastPoint[] {
  const first = points.findIndex(point => point.atMs >= fromMs)
  const shown = first <= 0 ? points : points.slice(first - 1)
  return thinPoints(shown.map(({ atMs, lowLitres, likelyLitres, highLitres }) => ({ atMs, lowLitres, likelyLitres, highLitres })), DRAWN_LITRES)
}

function toStockForecast<Point extends StockPoint>(forecast: HeliumForecast, { reserveLitres, timeZone }: StockRows, fromMs: number, toPoint: (point: ForecastPoint) => Point): StockForecast<Point> {
  return {
    points: fromDay(forecast.points, fromMs).map(toPoint),
    likelyShortAt: toInstant(forecast.likelyShortMs),
    lowShortAt: toInstant(forecast.lowShortMs),
    sentence: forecastSentence(forecast, reserveLitres, timeZone),
  }
}

const round = (litres: number) => Math.round(litres * 10) / 10
const toInstant = (atMs: number | undefined) => atMs === undefined ? null : new Date(atMs).toISOString()
const toStockPoint = ({ atMs, likelyLitres }: ForecastPoint): StockPoint => ({ at: new Date(atMs).toISOString(), litres: round(likelyLitres) })
const toBandPoint = (point: ForecastPoint): StockBandPoint => ({ ...toStockPoint(point), low: round(point.lowLitres), high: round(point.highLitres) })
