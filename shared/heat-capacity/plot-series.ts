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
 * Where an edge of the window goes when it is moved by whole data points, so that each step takes in or leaves out one point.
 *
 * @param temperatureK rising, K
 * @param fromK where the edge is, K
 * @param steps points to move by; negative is colder
 * @returns the temperature of a data point, K; `fromK` when there are none
 */
export function stepToPoint(temperatureK: readonly number[], fromK: number, steps: number): number {
  const colder = temperatureK.findLastIndex(temperature => temperature <= fromK)
  const isOnPoint = temperatureK[colder] === fromK
  const start = steps < 0 && !isOnPoint ? colder + 1 : colder
  return temperatureK[Math.min(temperatureK.length - 1, Math.max(0, start + steps))] ?? fromK
}
