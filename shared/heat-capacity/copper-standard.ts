import { DomainError } from '#shared/errors'
import type { HeatCapacityCurve } from '#shared/heat-capacity/types'
import { COPPER_REFERENCE_RANGE_K, copperReferenceHeatCapacity } from '#shared/materials/copper-reference'

/** One point of a copper run against the published equation. */
export interface CopperDeviation {
  readonly temperatureK: number
  /** Measured over reference, less one, per cent. */
  readonly deviationPercent: number
  /** Stated uncertainty of the point, per cent. */
  readonly sigmaPercent?: number
}

/** A copper run against the published equation. */
export interface CopperComparison {
  readonly points: readonly CopperDeviation[]
  readonly meanDeviationPercent: number
  /** The deviation of largest size, with its sign. */
  readonly largestDeviationPercent: number
  readonly temperatureRangeK: readonly [number, number]
  readonly pointCount: number
}

/**
 * Compares a copper run with the published reference equation, point by point, over the range in which the equation holds.
 *
 * @param curve of copper, K and mJ/(mol K)
 * @returns deviations in per cent, their mean and the largest
 * @throws DomainError when no point lies in the equation's range
 */
export function compareWithCopper(curve: HeatCapacityCurve): CopperComparison {
  const [low, high] = COPPER_REFERENCE_RANGE_K
  const points = curve.temperatureK.flatMap<CopperDeviation>((temperatureK, index) => {
    if (temperatureK < low || temperatureK > high) return []
    const reference = copperReferenceHeatCapacity(temperatureK)
    return [{ temperatureK, deviationPercent: (curve.heatCapacity[index]! / reference - 1) * 100, sigmaPercent: curve.sigma && curve.sigma[index]! / reference * 100 }]
  })
  if (points.length === 0) throw new DomainError('invalid', `No point lies between ${low} K and ${high} K, where the copper reference equation holds. Measure copper there.`, ['curve'])
  return {
    points,
    meanDeviationPercent: points.reduce((sum, point) => sum + point.deviationPercent, 0) / points.length,
    largestDeviationPercent: points.reduce((worst, point) => Math.abs(point.deviationPercent) > Math.abs(worst.deviationPercent) ? point : worst).deviationPercent,
    temperatureRangeK: [points[0]!.temperatureK, points[points.length - 1]!.temperatureK],
    pointCount: points.length,
  }
}

/** Limits of a control chart, per cent. */
export interface ControlLimits {
  readonly centre: number
  readonly low: number
  readonly high: number
  readonly readingCount: number
}

/** Readings that a cryostat needs before it has limits of its own. */
export const FEWEST_CONTROL_READINGS = 5

/** 3/d₂ for ranges of two readings, d₂ = 1.128. */
const INDIVIDUALS_FACTOR = 3 / 1.128

/**
 * Limits of a control chart of single readings: mean ± 2.66 mean moving range.
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods, 6.3.2.2 (from memory).
 *
 * @param deviationsPercent mean deviation of each earlier copper run of one cryostat, per cent, oldest first
 * @returns limits, or undefined with fewer than five readings
 */
export function controlLimits(deviationsPercent: readonly number[]): ControlLimits | undefined {
  const count = deviationsPercent.length
  if (count < FEWEST_CONTROL_READINGS) return undefined
  const centre = deviationsPercent.reduce((sum, value) => sum + value, 0) / count
  const movingRange = deviationsPercent.slice(1).reduce((sum, value, index) => sum + Math.abs(value - deviationsPercent[index]!), 0) / (count - 1)
  return { centre, low: centre - INDIVIDUALS_FACTOR * movingRange, high: centre + INDIVIDUALS_FACTOR * movingRange, readingCount: count }
}

/** The last copper reading of a cryostat, as the check looks at it. */
export interface StandardReading {
  readonly meanDeviationPercent: number
  readonly ageDays: number
  /** Control limits from the readings before it, per cent; absent while the cryostat has too few. */
  readonly limits?: readonly [number, number]
}

/**
 * The last copper reading of a cryostat, judged by the readings before it.
 *
 * @param readings of one cryostat, oldest first: mean deviation in per cent, and instant
 * @param at the instant of the result that cites it; later readings are passed over
 * @returns the last reading with its age and limits, or undefined when there is none
 */
export function lastStandardReading(readings: readonly { readonly meanDeviationPercent: number, readonly at: Date }[], at: Date): StandardReading | undefined {
  const known = readings.filter(reading => reading.at <= at)
  const last = known.at(-1)
  if (!last) return undefined
  const limits = controlLimits(known.slice(0, -1).map(reading => reading.meanDeviationPercent))
  return { meanDeviationPercent: last.meanDeviationPercent, ageDays: (at.getTime() - last.at.getTime()) / 86_400_000, limits: limits && [limits.low, limits.high] }
}
