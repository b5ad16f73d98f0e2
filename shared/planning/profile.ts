import type { PhaseId } from '#shared/planning/types'

/** One corner of the planned temperature: hours after the start and the temperature there. */
export interface ProfilePoint {
  readonly hour: number
  readonly temperatureK: number
}

/** Temperature of the room at which a run begins and ends, K. */
export const RIM_TEMPERATURE_K = 300

/** Temperature at the deepest floor a board draws, K: what a dilution cryostat reaches. */
export const FLOOR_TEMPERATURE_K = 0.01

/** Temperature that nitrogen cools to, K. */
const NITROGEN_K = 77

/**
 * Planned temperature of a run: corners at the boundaries of its phases. Between corners a board draws straight lines on
 * its logarithmic scale, which makes the run a basin: down in cooldown, level while measuring, up in warm-up.
 *
 * @param phases Phases in order with their hours.
 * @param lowestK Temperature the run goes down to, K, above zero.
 * @returns Corners from hour 0 to the end, hours never falling.
 */
export function temperatureProfile(
  phases: readonly { readonly phase: PhaseId, readonly hours: number }[], lowestK: number,
): ProfilePoint[] {
  const endOf: Readonly<Record<PhaseId, number>> = {
    'prepare': RIM_TEMPERATURE_K,
    'cool-to-77': NITROGEN_K,
    'cool-to-base': lowestK,
    'measure': lowestK,
    'warm-up': RIM_TEMPERATURE_K,
    'turn-round': RIM_TEMPERATURE_K,
  }
  const points: ProfilePoint[] = [{ hour: 0, temperatureK: RIM_TEMPERATURE_K }]
  let hour = 0
  for (const { phase, hours } of phases) {
    hour += hours
    points.push({ hour, temperatureK: endOf[phase] })
  }
  return points
}

/**
 * Temperature of a profile at an hour, by straight lines on the logarithmic scale.
 *
 * @param profile Corners, hours never falling.
 * @param hour Hours after the start; before the first and after the last corner the end values hold.
 * @returns Temperature, K.
 */
export function profileTemperatureK(profile: readonly ProfilePoint[], hour: number): number {
  const next = profile.findIndex(point => point.hour > hour)
  if (next === -1) return profile.at(-1)?.temperatureK ?? RIM_TEMPERATURE_K
  const to = profile[next]
  const from = profile[next - 1]
  if (!to) return RIM_TEMPERATURE_K
  if (!from) return to.temperatureK
  return from.temperatureK * (to.temperatureK / from.temperatureK) ** ((hour - from.hour) / (to.hour - from.hour))
}

/**
 * Depth of a temperature in the basin a board draws: logarithmic, 0 at the rim (300 K), 1 at the deepest floor.
 *
 * @param temperatureK Temperature, K, above zero.
 * @param floorK Temperature at depth 1, K.
 * @returns Depth, held between 0 and 1.
 */
export function basinDepth(temperatureK: number, floorK = FLOOR_TEMPERATURE_K): number {
  const depth = Math.log(RIM_TEMPERATURE_K / temperatureK) / Math.log(RIM_TEMPERATURE_K / floorK)
  return Math.min(1, Math.max(0, depth))
}
