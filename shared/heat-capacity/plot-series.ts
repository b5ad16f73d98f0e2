import { termValue } from '#shared/heat-capacity/terms'
import type { HeatCapacityCurve, LowTemperatureFit } from '#shared/heat-capacity/types'

/** Points ready to be drawn; all arrays have the same length. */
export interface PlotSeries {
  readonly x: readonly number[]
  readonly y: readonly number[]
  /** Half length of the error bars in units of y; absent when no sigma is stated. */
  readonly error?: readonly number[]
  /** Index into the curve of each point. */
  readonly index: readonly number[]
}

/**
 * The heat capacity of a fit at a temperature.
 *
 * @param fit coefficients in mJ/(mol K^(n+1))
 * @param temperatureK temperature, K, above 0
 * @returns mJ/(mol K)
 */
export function fittedHeatCapacity(fit: Pick<LowTemperatureFit, 'model' | 'coefficients'>, temperatureK: number): number {
  return fit.model.terms.reduce((sum, term) => sum + (fit.coefficients[term]?.value ?? 0) * termValue(term, temperatureK), 0)
}

/**
 * C/T against T²: the plot in which γT + β₃T³ is a straight line that meets the axis at γ.
 *
 * @param curve temperatures in K, heat capacities in mJ/(mol K)
 * @returns x in K², y in mJ/(mol K²)
 */
export function reducedSeries(curve: HeatCapacityCurve): PlotSeries {
  return {
    x: curve.temperatureK.map(temperature => temperature ** 2),
    y: curve.heatCapacity.map((value, index) => value / curve.temperatureK[index]!),
    error: curve.sigma?.map((value, index) => value / curve.temperatureK[index]!),
    index: curve.temperatureK.map((_, index) => index),
  }
}

/**
 * C against T for logarithmic axes; points that are not above zero have no place on them and are left out.
 *
 * @param curve temperatures in K, heat capacities in mJ/(mol K)
 */
export function directSeries(curve: HeatCapacityCurve): PlotSeries {
  const index = curve.temperatureK.map((_, each) => each).filter(each => curve.heatCapacity[each]! > 0 && curve.temperatureK[each]! > 0)
  return {
    x: index.map(each => curve.temperatureK[each]!),
    y: index.map(each => curve.heatCapacity[each]!),
    error: curve.sigma && index.map(each => curve.sigma![each]!),
    index,
  }
}

/**
 * The fitted line over C/T against T².
 *
 * @param fit its terms and coefficients
 * @param rangeK lowest and highest temperature to draw, K
 * @param count points of the line
 */
export function fitLine(fit: Pick<LowTemperatureFit, 'model' | 'coefficients'>, rangeK: readonly [number, number], count = 160): PlotSeries {
  const [from, to] = [rangeK[0] ** 2, rangeK[1] ** 2]
  const x = Array.from({ length: count }, (_, step) => from + (to - from) * step / (count - 1))
  const y = x.map(square => square > 0 ? fittedHeatCapacity(fit, Math.sqrt(square)) / Math.sqrt(square) : fit.coefficients.gamma?.value ?? 0)
  return { x, y, index: x.map((_, step) => step) }
}

/**
 * Thins a long series for drawing: in each of `columns` slices of x the lowest and the highest point stay, so that no spike is lost.
 *
 * @param series with x rising
 * @param columns about one a pixel column
 * @returns the series itself when it is short enough
 */
export function thinSeries(series: PlotSeries, columns: number): PlotSeries {
  const length = series.x.length
  if (length <= 2 * columns) return series
  const first = series.x[0]!
  const width = (series.x[length - 1]! - first) / columns || 1
  const lowest = new Map<number, number>()
  const highest = new Map<number, number>()
  for (let each = 0; each < length; each += 1) {
    const column = Math.min(columns - 1, Math.floor((series.x[each]! - first) / width))
    const low = lowest.get(column)
    const high = highest.get(column)
    if (low === undefined || series.y[each]! < series.y[low]!) lowest.set(column, each)
    if (high === undefined || series.y[each]! > series.y[high]!) highest.set(column, each)
  }
  const kept = [...new Set([...lowest.values(), ...highest.values()])].sort((a, b) => a - b)
  return { x: kept.map(each => series.x[each]!), y: kept.map(each => series.y[each]!), error: series.error && kept.map(each => series.error![each]!), index: kept.map(each => series.index[each]!) }
}

/**
 * Moves one edge of the window by whole data points, never past the other edge.
 *
 * @param temperatureK rising, K
 * @param windowK lowest and highest temperature used, K
 * @param edge which one moves
 * @param steps points to move by; negative is colder
 * @returns the new window, whose moved edge lies on a data point
 */
export function moveWindowEdge(temperatureK: readonly number[], windowK: readonly [number, number], edge: 'low' | 'high', steps: number): [number, number] {
  const [low, high] = windowK
  if (temperatureK.length === 0) return [low, high]
  const firstInside = temperatureK.findIndex(temperature => temperature >= low)
  const current = edge === 'high' ? temperatureK.findLastIndex(temperature => temperature <= high) : firstInside < 0 ? temperatureK.length : firstInside
  const bounded = Math.min(temperatureK.length - 1, Math.max(0, current + steps))
  const moved = temperatureK[bounded]!
  return edge === 'low' ? [Math.min(moved, high), high] : [low, Math.max(moved, low)]
}
