import { describe, expect, it } from 'vitest'
import { basinPath, blockPath, floorSpan, temperatureTicks, type BasinRun } from '#shared/board/basin'

const HOUR = 3_600_000
// One unit an hour; rim at 0, deepest floor at 100.
const frame = { x: (atMs: number) => atMs / HOUR, rimY: 0, floorY: 100 }
const phases = [{ phase: 'prepare', hours: 4 }, { phase: 'cool-to-77', hours: 12 }, { phase: 'cool-to-base', hours: 8 }, { phase: 'measure', hours: 16 }, { phase: 'warm-up', hours: 6 }, { phase: 'turn-round', hours: 2 }] as const
const run: BasinRun = { startMs: 0, endMs: 48 * HOUR, phasesStartMs: 0, phases, lowestK: 1.5 }

/** Corner and control points of a path, in order. */
const pointsOf = (path: string) => [...path.matchAll(/(-?[\d.]+) (-?[\d.]+)/g)].map(match => ({ x: Number(match[1]), y: Number(match[2]) }))

describe('basinPath', () => {
  it('goes from the rim to the floor and back, by the phases', () => {
    const path = basinPath(run, frame)
    // ln(300/1.5)/ln(300/0.01) = 0.5140; at 77 K 0.1319.
    expect(path).toMatch(/^M0 0L4 0C.* 16 13\.2C.* 24 51\.4L40 51\.4C.* 46 0L48 0Z$/)
  })

  it('falls all the way down and rises all the way up, never beyond the floor', () => {
    const points = pointsOf(basinPath(run, frame))
    const floor = points.findIndex(point => point.y === 51.4)
    points.slice(1, floor).forEach((point, index) => expect(point.y).toBeGreaterThanOrEqual(points[index]?.y ?? 0))
    expect(Math.max(...points.map(point => point.y))).toBe(51.4)
    points.slice(1).forEach((point, index) => expect(point.x).toBeGreaterThanOrEqual(points[index]?.x ?? 0))
  })

  it('leaves the rim sharply and eases into the floor', () => {
    const simple = basinPath({ ...run, endMs: 12 * HOUR, phases: [{ phase: 'cool-to-base', hours: 6 }, { phase: 'warm-up', hours: 6 }], lowestK: 0.01 }, frame)
    // First control point on the straight line to the floor, second at the height of the floor; warm-up the mirror image.
    expect(simple).toBe('M0 0C2 33.3 4 100 6 100C8 100 10 33.3 12 0Z')
  })

  it('cuts deeper for a colder run', () => {
    const depth = (lowestK: number) => Math.max(...pointsOf(basinPath({ ...run, lowestK }, frame)).map(point => point.y))
    expect(depth(0.02)).toBeGreaterThan(depth(0.3))
    expect(depth(0.3)).toBeGreaterThan(depth(4.2))
  })

  it('draws phases in when they are longer than the slot, and stays at the rim when they are shorter', () => {
    expect(basinPath({ ...run, endMs: 24 * HOUR }, frame)).toMatch(/^M0 0L2 0C.* 8 13\.2C.* 12 51\.4L20 51\.4C.* 23 0L24 0Z$/)
    expect(basinPath({ ...run, endMs: 60 * HOUR }, frame)).toMatch(/L48 0L60 0Z$/)
  })

  it('starts cooling late where a run was started late', () => {
    expect(basinPath({ ...run, endMs: 60 * HOUR, phasesStartMs: 6 * HOUR }, frame)).toMatch(/^M0 0L6 0L10 0C/)
  })
})

describe('floorSpan', () => {
  it('is the time at the lowest temperature', () => {
    expect(floorSpan(run)).toEqual({ startMs: 24 * HOUR, endMs: 40 * HOUR })
    expect(floorSpan({ ...run, phases: [{ phase: 'prepare', hours: 4 }] })).toEqual({ startMs: 0, endMs: 48 * HOUR })
  })
})

describe('blockPath', () => {
  it('is a rectangle under the rim', () => {
    expect(blockPath({ startMs: 2 * HOUR, endMs: 5 * HOUR }, frame, 30)).toBe('M2 0H5V30H2Z')
  })
})

describe('temperatureTicks', () => {
  it('goes down to what the cryostat reaches', () => {
    expect(temperatureTicks(3.1).map(tick => tick.temperatureK)).toEqual([300, 77, 4.2])
    expect(temperatureTicks(0.02).map(tick => tick.temperatureK)).toEqual([300, 77, 4.2, 0.3, 0.02])
  })
})
