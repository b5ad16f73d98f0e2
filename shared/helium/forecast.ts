import { DomainError } from '#shared/errors'
import { EIGHTY_PERCENT_Z } from '#shared/helium/eighty-percent'
import { MS_PER_HOUR } from '#shared/units/helium-units'

/** Helium that a run draws from storage over one of its phases, spread evenly. */
export interface ForecastDraw {
  readonly startMs: number
  readonly endMs: number
  /** Drawn over the whole phase, litres of liquid: likely value and standard deviation. */
  readonly litres: number
  readonly sdLitres: number
}

/** A run as the forecast sees it. */
export interface ForecastRun {
  readonly runId: string
  /** Held runs keep their days (approved, confirmed, running); asked ones may not go. */
  readonly held: boolean
  readonly draws: readonly ForecastDraw[]
}

/** A delivery that is known. */
export interface ForecastDelivery {
  readonly atMs: number
  readonly litres: number
}

/** What a forecast is made from. Stock is what the storage dewars hold together. */
export interface ForecastInput {
  readonly nowMs: number
  readonly untilMs: number
  readonly stockLitres: number
  /** Standard deviation of the stock reading, litres. */
  readonly stockSdLitres: number
  readonly reserveLitres: number
  /** Boil-off of the dewars themselves, litres per hour. */
  readonly dewarBoilOffLitresPerHour: number
  readonly runs: readonly ForecastRun[]
  readonly deliveries: readonly ForecastDelivery[]
  /** `held`: only runs that hold their days; `all-asked`: as if every asked run went as well, competing ones too. */
  readonly mode: 'held' | 'all-asked'
}

/** Stock at one instant: low and high hold 80 %. Below zero means a shortage of that many litres. */
export interface ForecastPoint {
  readonly atMs: number
  readonly lowLitres: number
  readonly likelyLitres: number
  readonly highLitres: number
}

/** The forecast: a line with its band, and when it falls under the reserve. */
export interface HeliumForecast {
  readonly mode: ForecastInput['mode']
  /** In order of time; a delivery has two points at one instant, before and after. */
  readonly points: readonly ForecastPoint[]
  /** First instant the likely stock is under the reserve. */
  readonly likelyShortMs?: number
  /** First instant the low end of the band is under the reserve. */
  readonly lowShortMs?: number
  /** Smallest likely stock and when. */
  readonly lowest: ForecastPoint
}

/** Longest step between points: the band is curved between corners. */
const STEP_MS = 6 * MS_PER_HOUR

function fractionDone(draw: ForecastDraw, nowMs: number, atMs: number): number {
  if (draw.endMs <= draw.startMs) return draw.startMs >= nowMs && atMs >= draw.startMs ? 1 : 0
  const length = draw.endMs - draw.startMs
  const from = Math.max(draw.startMs, nowMs)
  return Math.max(0, Math.min(draw.endMs, atMs) - from) / length
}

/** Stock at an instant, deliveries of that very instant counted only when `after`. */
function stockAt(input: ForecastInput, runs: readonly ForecastRun[], atMs: number, after: boolean): ForecastPoint {
  const { nowMs, stockLitres, stockSdLitres, dewarBoilOffLitresPerHour } = input
  let likelyLitres = stockLitres - dewarBoilOffLitresPerHour * (atMs - nowMs) / MS_PER_HOUR
  let variance = stockSdLitres ** 2
  for (const run of runs) {
    let sdOfRun = 0
    for (const draw of run.draws) {
      const done = fractionDone(draw, nowMs, atMs)
      likelyLitres -= done * draw.litres
      // A thirsty run is thirsty throughout, so spreads add up within a run and in squares between runs.
      sdOfRun += done * draw.sdLitres
    }
    variance += sdOfRun ** 2
  }
  for (const delivery of input.deliveries) {
    if (delivery.atMs >= nowMs && (delivery.atMs < atMs || (after && delivery.atMs === atMs))) likelyLitres += delivery.litres
  }
  const half = EIGHTY_PERCENT_Z * Math.sqrt(variance)
  return { atMs, lowLitres: likelyLitres - half, likelyLitres, highLitres: likelyLitres + half }
}

function checkInput(input: ForecastInput): void {
  const { nowMs, untilMs, stockLitres, stockSdLitres, reserveLitres, dewarBoilOffLitresPerHour } = input
  if (!(untilMs > nowMs) || !Number.isFinite(untilMs) || !Number.isFinite(nowMs)) {
    throw new DomainError('invalid', 'A forecast must end after it begins. Choose a later day.', ['until'])
  }
  if (![stockLitres, stockSdLitres, reserveLitres, dewarBoilOffLitresPerHour].every(value => Number.isFinite(value) && value >= 0)) {
    throw new DomainError('invalid', 'Stock, reserve and boil-off of the dewars must be zero or more litres. Correct the one that is not.', ['stock'])
  }
  for (const run of input.runs) {
    if (!run.draws.every(draw => draw.endMs >= draw.startMs && draw.litres >= 0 && draw.sdLitres >= 0)) {
      throw new DomainError('invalid', 'The plan of a run in the forecast has a phase that ends before it begins or draws less than nothing. Plan that run again.', ['runs', run.runId])
    }
  }
  if (!input.deliveries.every(({ atMs, litres }) => Number.isFinite(atMs) && litres >= 0)) {
    throw new DomainError('invalid', 'A delivery needs a time and litres of zero or more. Correct that delivery.', ['deliveries'])
  }
}

/** First instant between two points at which a value that falls between them meets the reserve. */
function crossingMs(from: ForecastPoint, to: ForecastPoint, below: (atMs: number) => boolean): number {
  let [low, high] = [from.atMs, to.atMs]
  while (high - low > 1000) {
    const middle = (low + high) / 2
    if (below(middle)) high = middle
    else low = middle
  }
  return Math.round(high)
}

/**
 * Carries the stock of liquid helium forward over planned runs and known deliveries. Each run draws evenly over each of its
 * phases; of a phase already begun only the rest counts. The 80 % band grows with the runs' own uncertainty. Nothing is
 * cut off at zero: stock below zero is the shortage.
 *
 * @param input Stock, reserve, runs, deliveries, mode.
 * @returns Line, band, and the first instants under the reserve.
 * @throws DomainError when a time or amount cannot be.
 */
export function forecastStock(input: ForecastInput): HeliumForecast {
  checkInput(input)
  const { nowMs, untilMs, reserveLitres } = input
  const runs = input.runs.filter(run => run.held || input.mode === 'all-asked')
  const deliveryTimes = new Set(input.deliveries.map(delivery => delivery.atMs))
  const times = new Set<number>([nowMs, untilMs, ...deliveryTimes, ...runs.flatMap(run => run.draws.flatMap(({ startMs, endMs }) => [startMs, endMs]))])
  for (let atMs = nowMs + STEP_MS; atMs < untilMs; atMs += STEP_MS) times.add(atMs)

  const points = [...times].filter(atMs => atMs >= nowMs && atMs <= untilMs).sort((a, b) => a - b)
    .flatMap(atMs => deliveryTimes.has(atMs)
      ? [stockAt(input, runs, atMs, false), stockAt(input, runs, atMs, true)]
      : [stockAt(input, runs, atMs, true)])

  const firstShort = (value: (point: ForecastPoint) => number): number | undefined => {
    const index = points.findIndex(point => value(point) < reserveLitres)
    const [from, to] = [points[index - 1], points[index]]
    if (!to) return undefined
    if (!from || from.atMs === to.atMs) return to.atMs
    return crossingMs(from, to, atMs => value(stockAt(input, runs, atMs, false)) < reserveLitres)
  }
  const likelyShortMs = firstShort(point => point.likelyLitres)
  const lowShortMs = firstShort(point => point.lowLitres)
  return {
    mode: input.mode,
    points,
    ...(likelyShortMs === undefined ? {} : { likelyShortMs }),
    ...(lowShortMs === undefined ? {} : { lowShortMs }),
    lowest: points.reduce((least, point) => point.likelyLitres < least.likelyLitres ? point : least),
  }
}
