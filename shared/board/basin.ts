import { basinDepth, RIM_TEMPERATURE_K, temperatureProfile } from '#shared/planning/profile'
import type { PhaseId } from '#shared/planning/types'
import { MS_PER_HOUR } from '#shared/units/helium-units'

/** What the outline of a run is drawn from. */
export interface BasinRun {
  readonly startMs: number
  readonly endMs: number
  /** Where the first phase begins, ms UTC. */
  readonly phasesStartMs: number
  readonly phases: readonly { readonly phase: PhaseId, readonly hours: number }[]
  /** Temperature at the floor, K. */
  readonly lowestK: number
}

/** How time and depth become coordinates of a drawing. */
export interface BasinFrame {
  readonly x: (atMs: number) => number
  /** Coordinates of the rim (300 K) and of the deepest floor. */
  readonly rimY: number
  readonly floorY: number
}

/** A corner of the basin: instant, depth from 0 (rim) to 1. */
interface Corner { readonly atMs: number, readonly depth: number }

const coordinate = (value: number) => String(Math.round(value * 10) / 10)

/**
 * Corners of a run's basin over time. Phases that together are longer than the slot are drawn in together to fit it; where
 * they are shorter, the rest of the slot stays at the rim.
 */
function corners(run: BasinRun): Corner[] {
  const totalMs = run.phases.reduce((sum, { hours }) => sum + hours, 0) * MS_PER_HOUR
  const roomMs = run.endMs - run.phasesStartMs
  const shrink = totalMs > roomMs && totalMs > 0 ? roomMs / totalMs : 1
  const inside = temperatureProfile(run.phases, run.lowestK).map(({ hour, temperatureK }) => ({
    atMs: run.phasesStartMs + hour * MS_PER_HOUR * shrink,
    depth: basinDepth(temperatureK),
  }))
  return [{ atMs: run.startMs, depth: 0 }, ...inside, { atMs: run.endMs, depth: 0 }]
}

/**
 * The time a run spends on its floor, where its words find room.
 *
 * @param run slot, phases and floor of the run
 * @returns from reaching the lowest temperature to leaving it, ms UTC; the whole slot where it never leaves the rim
 */
export function floorSpan(run: BasinRun): { startMs: number, endMs: number } {
  const all = corners(run)
  const deepest = Math.max(...all.map(({ depth }) => depth))
  if (deepest === 0) return { startMs: run.startMs, endMs: run.endMs }
  const onFloor = all.filter(({ depth }) => depth === deepest)
  return { startMs: onFloor[0]?.atMs ?? run.startMs, endMs: onFloor.at(-1)?.atMs ?? run.endMs }
}

/** Slope of the outline where two stretches meet, so that it never swings over (harmonic mean, Fritsch and Butland 1984). */
function meetingSlope(before: number, after: number): number {
  return before * after > 0 ? 2 * before * after / (before + after) : 0
}

/**
 * Outline of a run on the board: 300 K at the rim, the lowest planned temperature at the floor, on a logarithmic scale.
 * Cooldown leaves the rim sharply and eases into the floor; warm-up mirrors it.
 *
 * @param run slot, phases and floor of the run
 * @param frame how time and depth become coordinates
 * @returns a closed SVG path, its top edge along the rim
 */
export function basinPath(run: BasinRun, frame: BasinFrame): string {
  const points = corners(run).map(({ atMs, depth }) => ({ x: frame.x(atMs), depth }))
  const y = (depth: number) => frame.rimY + depth * (frame.floorY - frame.rimY)
  const secant = (index: number) => {
    const [from, to] = [points[index], points[index + 1]]
    return from && to && to.x > from.x ? (to.depth - from.depth) / (to.x - from.x) : 0
  }
  let path = ''
  points.forEach((to, index) => {
    const from = points[index - 1]
    if (!from) {
      path = `M${coordinate(to.x)} ${coordinate(y(to.depth))}`
      return
    }
    if (to.x <= from.x && to.depth === from.depth) return
    const slope = secant(index - 1)
    if (slope === 0) {
      path += `L${coordinate(to.x)} ${coordinate(y(to.depth))}`
      return
    }
    // At the rim the outline breaks; everywhere else it is smooth.
    const slopeOut = from.depth === 0 ? slope : meetingSlope(secant(index - 2), slope)
    const slopeIn = to.depth === 0 ? slope : meetingSlope(slope, secant(index))
    const third = (to.x - from.x) / 3
    const control = (x: number, depth: number) => `${coordinate(x)} ${coordinate(y(depth))}`
    path += `C${control(from.x + third, from.depth + slopeOut * third)} ${control(to.x - third, to.depth - slopeIn * third)} ${control(to.x, to.depth)}`
  })
  return `${path}Z`
}

/**
 * Outline of days about which nothing more is known: a plain block under the rim.
 *
 * @param span start and end, ms UTC
 * @param frame how time and depth become coordinates
 * @param height height of the block in coordinates
 * @returns a closed SVG path
 */
export function blockPath(span: { readonly startMs: number, readonly endMs: number }, frame: BasinFrame, height: number): string {
  return `M${coordinate(frame.x(span.startMs))} ${coordinate(frame.rimY)}H${coordinate(frame.x(span.endMs))}V${coordinate(frame.rimY + height)}H${coordinate(frame.x(span.startMs))}Z`
}

/** A line of the temperature axis of a lane. */
export interface TemperatureTick { readonly temperatureK: number, readonly label: string, readonly depth: number }

/** Temperatures people know: room, nitrogen, helium, ³He and dilution. */
const TICKS_K: readonly (readonly [number, string])[] = [[RIM_TEMPERATURE_K, '300\u2009K'], [77, '77'], [4.2, '4.2'], [0.3, '0.3'], [0.02, '20\u2009mK']]

/**
 * Ticks of the temperature axis of a lane, down to what its cryostat reaches.
 *
 * @param baseTemperatureK lowest temperature of the cryostat, K
 * @returns ticks from the rim down
 */
export function temperatureTicks(baseTemperatureK: number): TemperatureTick[] {
  return TICKS_K.filter(([temperatureK]) => temperatureK >= baseTemperatureK)
    .map(([temperatureK, label]) => ({ temperatureK, label, depth: basinDepth(temperatureK) }))
}
