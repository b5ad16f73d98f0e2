import { DomainError } from '#shared/errors'

/** One row of a vessel's calibration: the reading of the level gauge and the liquid it stands for. */
export interface VesselCalibrationPoint {
  /** Gauge reading, percent. */
  readonly percent: number
  /** Liquid in the vessel at that reading, litres. */
  readonly litres: number
}

/** A vessel's calibration table, rising, from 0 % to 100 %. */
export type VesselCalibration = readonly VesselCalibrationPoint[]

/**
 * Refuses a calibration table that cannot turn every level from 0 % to 100 % into litres and back.
 *
 * @param calibration Rows of percent and litres.
 * @returns The same table, known to be sound.
 * @throws DomainError naming the row when rows are missing, do not rise or do not run from 0 % to 100 %.
 */
export function checkCalibration(calibration: VesselCalibration): VesselCalibration {
  if (calibration.length < 2 || calibration[0]?.percent !== 0 || calibration.at(-1)?.percent !== 100) {
    throw new DomainError('invalid', 'A calibration table runs from 0 % to 100 %. Add the missing first or last row.', ['calibration'])
  }
  calibration.forEach((point, row) => {
    const before = calibration[row - 1]
    const finite = Number.isFinite(point.percent) && Number.isFinite(point.litres) && point.litres >= 0
    if (!finite || (before && !(point.percent > before.percent && point.litres > before.litres))) {
      throw new DomainError('invalid', `Row ${row + 1} of the calibration table does not rise. Sort the rows and give each a larger level and more litres than the one before.`, ['calibration', row])
    }
  })
  return calibration
}

/** Straight lines between rows: they rise where the table rises, and they turn back exactly. */
function between(value: number, from: number, to: number, resultFrom: number, resultTo: number): number {
  return resultFrom + (resultTo - resultFrom) * (value - from) / (to - from)
}

/**
 * Liquid in a vessel from its level reading.
 *
 * @param calibration The vessel's table.
 * @param levelPercent Level, percent, 0 to 100.
 * @returns Litres of liquid.
 * @throws DomainError for a level outside 0 to 100 % (for example 140 %), for no number, and for an unsound table.
 */
export function litresFromLevel(calibration: VesselCalibration, levelPercent: number): number {
  checkCalibration(calibration)
  if (!(levelPercent >= 0 && levelPercent <= 100)) {
    const said = Number.isFinite(levelPercent) ? `A level of ${levelPercent.toString().replace('-', '−')} % cannot be` : 'The level is not a number'
    throw new DomainError('invalid', `${said}. Enter a level from 0 to 100 %.`, ['levelPercent'])
  }
  const upper = Math.max(1, calibration.findIndex(point => point.percent >= levelPercent))
  const [from, to] = [calibration[upper - 1], calibration[upper]] as [VesselCalibrationPoint, VesselCalibrationPoint]
  return between(levelPercent, from.percent, to.percent, from.litres, to.litres)
}

/**
 * Level reading that a volume of liquid gives: the inverse of `litresFromLevel`.
 *
 * @param calibration The vessel's table.
 * @param litres Litres of liquid.
 * @returns Level, percent, 0 to 100.
 * @throws DomainError when the vessel cannot hold, or cannot show, that many litres.
 */
export function levelFromLitres(calibration: VesselCalibration, litres: number): number {
  checkCalibration(calibration)
  const [least, most] = [calibration[0], calibration.at(-1)] as [VesselCalibrationPoint, VesselCalibrationPoint]
  if (!(litres >= least.litres && litres <= most.litres)) {
    throw new DomainError('invalid', `This vessel shows from ${least.litres} L to ${most.litres} L. Enter litres inside that range.`, ['litres'])
  }
  const upper = Math.max(1, calibration.findIndex(point => point.litres >= litres))
  const [from, to] = [calibration[upper - 1], calibration[upper]] as [VesselCalibrationPoint, VesselCalibrationPoint]
  return between(litres, from.litres, to.litres, from.percent, to.percent)
}

/**
 * Litres the vessel holds at 100 %.
 *
 * @param calibration The vessel's table.
 * @returns Litres of liquid when full.
 * @throws DomainError for an unsound table.
 */
export function vesselCapacityLitres(calibration: VesselCalibration): number {
  return (checkCalibration(calibration).at(-1) as VesselCalibrationPoint).litres
}
