import { DomainError } from '#shared/errors'
import { predictionBand } from '#shared/heat-capacity/prediction'
import type { HeatCapacityCurve, LowTemperatureFit } from '#shared/heat-capacity/types'

/**
 * Heat capacity of everything but the sample, in the same unit as the sample's curve: mJ/(mol K) with the sample's own amount. A table
 * of the whole addenda (J/K) is converted with the sample's mass and molar mass, as the total is.
 */
export type Addenda = { readonly kind: 'table', readonly curve: HeatCapacityCurve } | { readonly kind: 'fit', readonly fit: LowTemperatureFit }

/** The share of the addenda in the total, point by point of the net curve. */
export interface AddendaShare {
  readonly share: readonly number[]
  /** Whether the addenda stated uncertainties; without them their errors are not in σ. */
  readonly hasUncertainty: boolean
}

/** A curve with its addenda taken off. */
export interface NetCurve extends AddendaShare {
  readonly curve: HeatCapacityCurve
  /** Index into the total curve of each point kept. */
  readonly indices: readonly number[]
}

/**
 * Takes addenda off a curve, their uncertainty in quadrature with that of the points. Between the points of a table ln C is a straight
 * line in ln T, which is exact for any power of T. Nothing is extrapolated: points outside the addenda's range stay only out of the window.
 *
 * @param total measured, mJ/(mol K), rising temperatures in K
 * @param addenda table or fit in the same unit
 * @param windowK temperatures that must be covered, K; all of them when left out
 * @returns net curve with the share of the addenda; σ only where the total states it
 * @throws DomainError when a point inside the window lies outside the addenda's range
 */
export function subtractAddenda(total: HeatCapacityCurve, addenda: Addenda, windowK: readonly [number, number] = [0, Infinity]): NetCurve {
  const [low, high] = rangeOf(addenda)
  const indices: number[] = []
  total.temperatureK.forEach((temperature, index) => {
    const covered = temperature >= low && temperature <= high
    if (covered) indices.push(index)
    else if (temperature >= windowK[0] && temperature <= windowK[1]) {
      throw new DomainError('invalid', `The addenda reach from ${short(low)} K to ${short(high)} K, but the sample was measured at ${short(temperature)} K. Narrow the window, or measure the addenda there: they are not extrapolated.`, ['addenda'])
    }
  })
  const taken = valuesOf(addenda, indices.map(index => total.temperatureK[index]!))
  const hasUncertainty = taken.every(each => each.sigma !== undefined)
  return {
    indices,
    hasUncertainty,
    share: indices.map((index, place) => taken[place]!.value / total.heatCapacity[index]!),
    curve: {
      temperatureK: indices.map(index => total.temperatureK[index]!),
      heatCapacity: indices.map((index, place) => total.heatCapacity[index]! - taken[place]!.value),
      ...(total.sigma ? { sigma: indices.map((index, place) => Math.hypot(total.sigma![index]!, taken[place]!.sigma ?? 0)) } : {}),
      ...(total.rowNumbers ? { rowNumbers: indices.map(index => total.rowNumbers![index]!) } : {}),
    },
  }
}

interface Value { readonly value: number, readonly sigma?: number }

function rangeOf(addenda: Addenda): readonly [number, number] {
  if (addenda.kind === 'fit') return addenda.fit.model.windowK
  const { temperatureK } = addenda.curve
  return [temperatureK[0] ?? Infinity, temperatureK[temperatureK.length - 1] ?? -Infinity]
}

/** Values at rising temperatures inside the range. */
function valuesOf(addenda: Addenda, temperatureK: readonly number[]): Value[] {
  if (addenda.kind === 'fit') {
    const band = predictionBand(addenda.fit, temperatureK)
    return temperatureK.map((_, index) => ({ value: band.heatCapacity[index]!, sigma: band.standardError[index]! }))
  }
  const table = withoutRepeats(addenda.curve)
  let upper = 1
  return temperatureK.map((temperature) => {
    while (upper < table.temperatureK.length - 1 && table.temperatureK[upper]! < temperature) upper += 1
    return between(table, upper, temperature)
  })
}

function between({ temperatureK, heatCapacity, sigma }: HeatCapacityCurve, upper: number, temperature: number): Value {
  if (temperatureK.length === 1) return { value: heatCapacity[0]!, sigma: sigma?.[0] }
  const lower = upper - 1
  const [t0, t1, c0, c1] = [temperatureK[lower]!, temperatureK[upper]!, heatCapacity[lower]!, heatCapacity[upper]!]
  if (c0 > 0 && c1 > 0) {
    const share = Math.log(temperature / t0) / Math.log(t1 / t0)
    const value = c0 ** (1 - share) * c1 ** share
    return { value, sigma: sigma && value * Math.hypot((1 - share) * sigma[lower]! / c0, share * sigma[upper]! / c1) }
  }
  const share = (temperature - t0) / (t1 - t0)
  return { value: c0 + share * (c1 - c0), sigma: sigma && Math.hypot((1 - share) * sigma[lower]!, share * sigma[upper]!) }
}

/** Points of one temperature become their mean, so that every interval has a width. */
function withoutRepeats(curve: HeatCapacityCurve): HeatCapacityCurve {
  const temperatureK: number[] = []
  const sums: { value: number, variance: number, count: number }[] = []
  curve.temperatureK.forEach((temperature, index) => {
    if (temperatureK.at(-1) !== temperature) {
      temperatureK.push(temperature)
      sums.push({ value: 0, variance: 0, count: 0 })
    }
    const sum = sums.at(-1)!
    sum.value += curve.heatCapacity[index]!
    sum.variance += (curve.sigma?.[index] ?? 0) ** 2
    sum.count += 1
  })
  return {
    temperatureK,
    heatCapacity: sums.map(sum => sum.value / sum.count),
    sigma: curve.sigma && sums.map(sum => Math.sqrt(sum.variance) / sum.count),
  }
}

function short(value: number): string {
  return String(Number(value.toPrecision(4)))
}
