import { DomainError } from '#shared/errors'
import { debyeHeatCapacityJPerMolK } from '#shared/materials/debye-heat-capacity'
import type { CalorimeterFacts, PlannedSample } from '#shared/planning/types'

/** Most points a run can be planned with; more is a slip of the keyboard. */
export const MOST_POINTS = 10_000

/** One planned point: where, how long one relaxation lasts, and how long the point takes. */
export interface PlannedPoint {
  readonly temperatureK: number
  /** Relaxation time τ = C/K, s. */
  readonly relaxationTimeS: number
  /** Settling and measuring together, s. */
  readonly durationS: number
}

/** How long a measurement takes by its points. */
export interface MeasurementTime {
  readonly points: readonly PlannedPoint[]
  readonly totalHours: number
  /** The point with the longest relaxation time. */
  readonly slowest: PlannedPoint
}

/**
 * Temperatures evenly spread on a logarithmic scale, as low-temperature heat capacity is usually measured.
 *
 * @param lowestK Lowest temperature, K, above zero.
 * @param highestK Highest temperature, K.
 * @param count Number of points, 1 or more; a single point lies at the lowest temperature.
 * @returns Temperatures, K, rising.
 * @throws DomainError when the range is not positive and rising or the count is not a whole number from 1 to 10 000.
 */
export function spreadTemperaturesK(lowestK: number, highestK: number, count: number): number[] {
  if (!(lowestK > 0 && highestK > lowestK && Number.isFinite(highestK))) {
    throw new DomainError('invalid', 'A temperature range needs a lowest temperature above 0 K and a higher highest one. Enter both in kelvin.', ['temperatureRangeK'])
  }
  if (!(Number.isInteger(count) && count >= 1 && count <= MOST_POINTS)) {
    throw new DomainError('invalid', `The number of points is a whole number from 1 to ${MOST_POINTS}.`, ['points'])
  }
  return Array.from({ length: count }, (_, i) =>
    i === 0 ? lowestK : i === count - 1 ? highestK : lowestK * (highestK / lowestK) ** (i / (count - 1)))
}

/**
 * Heat capacity to expect of a substance: γT and a Debye lattice. Good enough for planning hours; never used to judge a result.
 *
 * @param substance γ in J/(mol K²) and atoms, both per formula unit; Debye temperature, K.
 * @returns Function from temperature in K to J/(mol K) per mole of formula units.
 */
export function expectedHeatCapacity(
  substance: { readonly gammaJPerMolK2: number, readonly debyeTemperatureK: number, readonly atomsPerFormulaUnit: number },
): (temperatureK: number) => number {
  return temperatureK => substance.gammaJPerMolK2 * temperatureK
    + substance.atomsPerFormulaUnit * debyeHeatCapacityJPerMolK(temperatureK, substance.debyeTemperatureK)
}

/**
 * Relaxation time of the calorimeter with a sample on it: τ = (C_sample + C_addenda)/K.
 *
 * @param calorimeter Link and addenda.
 * @param sample Moles and expected heat capacity.
 * @param temperatureK Temperature, K, above zero.
 * @returns τ, s.
 */
export function relaxationTimeS(
  calorimeter: CalorimeterFacts, sample: Pick<PlannedSample, 'amountMol' | 'heatCapacityJPerMolK'>, temperatureK: number,
): number {
  const addendaJPerK = calorimeter.addendaAt1KJPerK * temperatureK ** calorimeter.addendaExponent
  const conductanceWPerK = calorimeter.conductanceAt1KWPerK * temperatureK ** calorimeter.conductanceExponent
  return (sample.amountMol * sample.heatCapacityJPerMolK(temperatureK) + addendaJPerK) / conductanceWPerK
}

/**
 * Time a measurement takes: each point settles, then is followed over a number of relaxation times.
 *
 * @param calorimeter Link, addenda, settling time and relaxation times a point.
 * @param sample Moles and expected heat capacity.
 * @param temperaturesK Temperatures of the points, K.
 * @returns Points with their times, the total in hours, and the slowest point.
 * @throws DomainError when there is no point, the calorimeter has no link, or the sample's expected heat capacity is not a positive number.
 */
export function measurementTime(
  calorimeter: CalorimeterFacts, sample: PlannedSample, temperaturesK: readonly number[],
): MeasurementTime {
  if (!(sample.amountMol > 0 && Number.isFinite(sample.amountMol))) {
    throw new DomainError('invalid', 'The amount of sample must be above zero. Enter its mass and formula.', ['sample', 'amountMol'])
  }
  const points = temperaturesK.map((temperatureK): PlannedPoint => {
    const tau = relaxationTimeS(calorimeter, sample, temperatureK)
    if (!(tau > 0 && Number.isFinite(tau))) {
      throw new DomainError('invalid', `No relaxation time can be computed at ${temperatureK} K. Check the sample's expected heat capacity and the calorimeter's link.`, ['sample'])
    }
    return { temperatureK, relaxationTimeS: tau, durationS: calorimeter.settleS + calorimeter.relaxationTimesPerPoint * tau }
  })
  const [first, ...rest] = points
  if (!first) throw new DomainError('invalid', 'A measurement needs at least one point.', ['points'])
  return {
    points,
    totalHours: points.reduce((sum, point) => sum + point.durationS, 0) / 3600,
    slowest: rest.reduce((slow, point) => point.relaxationTimeS > slow.relaxationTimeS ? point : slow, first),
  }
}
