import { DomainError } from '#shared/errors'
import type { FitWeights, HeatCapacityCurve } from '#shared/heat-capacity/types'

/** Share of C taken as its σ where a file states none; only χ² depends on it, not the coefficients nor their scaled errors. */
export const DEFAULT_RELATIVE_SIGMA = 0.01

/** The points of a curve inside a window, with the σ that the weights stand for. */
export interface WindowPoints {
  readonly indices: readonly number[]
  readonly temperatureK: Float64Array
  readonly heatCapacity: Float64Array
  readonly sigma: Float64Array
  readonly distinctTemperatures: number
}

/**
 * Takes the points inside a window and their weights.
 *
 * @param curve rising temperatures in K, heat capacities in mJ/(mol K)
 * @param windowK lowest and highest temperature, K, both included
 * @param weights `stated-sigma` (1/σ²), `relative` (1/C²: every point is as good in per cent) or `uniform`
 * @param relativeSigma share of C taken as σ with `relative` weights
 * @throws DomainError for a window that is none, arrays of unlike length, a temperature that is not above zero, a number that is not finite,
 *   a missing or impossible σ
 */
export function pointsInWindow(curve: HeatCapacityCurve, windowK: readonly [number, number], weights: FitWeights, relativeSigma = DEFAULT_RELATIVE_SIGMA): WindowPoints {
  const [low, high] = windowK
  const total = curve.temperatureK.length
  if (!(low >= 0 && high > low)) throw new DomainError('invalid', 'The window must run from a lower to a higher temperature, 0 K or above. Enter it anew.', ['windowK'])
  if (curve.heatCapacity.length !== total || (curve.sigma && curve.sigma.length !== total)) {
    throw new DomainError('invalid', 'Temperatures, heat capacities and uncertainties must be equally many. Check the columns of the table.', ['curve'])
  }
  if (weights === 'stated-sigma' && !curve.sigma) throw new DomainError('invalid', 'The table states no uncertainties. Choose relative weights, or name the column that holds them.', ['weights'])
  if (!(relativeSigma > 0)) throw new DomainError('invalid', 'The relative uncertainty must be above zero. Enter it anew.', ['relativeSigma'])
  const indices: number[] = []
  for (let i = 0; i < total; i += 1) {
    const temperature = curve.temperatureK[i]!
    if (temperature >= low && temperature <= high) indices.push(i)
    else if (!Number.isFinite(temperature)) throw new DomainError('invalid', `Point ${i + 1} has no temperature. Leave it out or mend it.`, ['curve', i])
  }
  const temperatureK = new Float64Array(indices.length)
  const heatCapacity = new Float64Array(indices.length)
  const sigma = new Float64Array(indices.length)
  const distinct = new Set<number>()
  indices.forEach((index, i) => {
    temperatureK[i] = curve.temperatureK[index]!
    heatCapacity[i] = curve.heatCapacity[index]!
    sigma[i] = sigmaOf(curve, index, weights, relativeSigma)
    // Only whether there are a few or many matters.
    if (distinct.size < 32) distinct.add(temperatureK[i]!)
  })
  return { indices, temperatureK, heatCapacity, sigma, distinctTemperatures: distinct.size }
}

function sigmaOf(curve: HeatCapacityCurve, index: number, weights: FitWeights, relativeSigma: number): number {
  const temperature = curve.temperatureK[index]!
  const value = curve.heatCapacity[index]!
  if (!(temperature > 0) || !Number.isFinite(value)) {
    throw new DomainError('invalid', `Point ${index + 1} (${temperature} K) is no measurement: temperature must be above zero and the heat capacity a number. Leave it out or mend it.`, ['curve', index])
  }
  if (weights === 'uniform') return 1
  if (weights === 'relative') {
    if (!(value > 0)) {
      throw new DomainError('invalid', `Point ${index + 1} (${temperature} K) has a heat capacity that is not above zero, so it can have no relative weight. State uncertainties, use uniform weights, or leave it out.`, ['curve', index])
    }
    return relativeSigma * value
  }
  const stated = curve.sigma![index]!
  if (!(stated > 0 && Number.isFinite(stated))) {
    throw new DomainError('invalid', `Point ${index + 1} (${temperature} K) states an uncertainty that is not above zero. Mend it, leave the point out, or use relative weights.`, ['curve', index])
  }
  return stated
}
