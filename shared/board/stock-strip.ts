/** A point of the strip: instant in ms UTC and litres. */
export interface StripPoint { readonly atMs: number, readonly litres: number }

/** A point with its band. */
export interface StripBandPoint extends StripPoint { readonly low: number, readonly high: number }

/** How time and litres become coordinates of a drawing. */
export interface StripFrame { readonly x: (atMs: number) => number, readonly y: (litres: number) => number }

const coordinate = (value: number) => String(Math.round(value * 10) / 10)
const pair = (x: number, y: number) => `${coordinate(x)} ${coordinate(y)}`

/**
 * The stock as a line.
 *
 * @param points in order of time
 * @param frame how time and litres become coordinates
 * @returns an SVG path; empty without points
 */
export function stockLine(points: readonly StripPoint[], frame: StripFrame): string {
  return points.map(({ atMs, litres }, index) => `${index === 0 ? 'M' : 'L'}${pair(frame.x(atMs), frame.y(litres))}`).join('')
}

/**
 * The stock as an area down to nothing.
 *
 * @param points in order of time
 * @param frame how time and litres become coordinates
 * @returns a closed SVG path; empty without points
 */
export function stockArea(points: readonly StripPoint[], frame: StripFrame): string {
  const [first, last] = [points[0], points.at(-1)]
  return first && last ? `${stockLine(points, frame)}L${pair(frame.x(last.atMs), frame.y(0))}L${pair(frame.x(first.atMs), frame.y(0))}Z` : ''
}

/**
 * The band of a forecast.
 *
 * @param points in order of time
 * @param frame how time and litres become coordinates
 * @returns a closed SVG path; empty without points
 */
export function stockBand(points: readonly StripBandPoint[], frame: StripFrame): string {
  if (points.length === 0) return ''
  const upper = points.map(({ atMs, high }) => pair(frame.x(atMs), frame.y(high)))
  const lower = points.map(({ atMs, low }) => pair(frame.x(atMs), frame.y(low))).reverse()
  return `M${[...upper, ...lower].join('L')}Z`
}

const STEPS = [1, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10]

/**
 * Top of the litres axis: a round number with room above everything drawn.
 *
 * @param litres everything drawn, the reserve included
 * @returns litres, above zero
 */
export function stripTop(litres: readonly number[]): number {
  const highest = Math.max(1, ...litres) * 1.08
  const decade = 10 ** Math.floor(Math.log10(highest))
  return (STEPS.find(step => step * decade >= highest) ?? 10) * decade
}

/**
 * Stock at an instant, by straight lines between points; after a step, the value behind it.
 *
 * @param points in order of time
 * @param atMs instant, ms UTC
 * @returns litres, or undefined outside the points
 */
export function stockAtMs(points: readonly StripPoint[], atMs: number): number | undefined {
  const next = points.findIndex(point => point.atMs > atMs)
  const [from, to] = next === -1 ? [points.at(-1), undefined] : [points[next - 1], points[next]]
  if (!from) return undefined
  if (!to) return from.atMs === atMs ? from.litres : undefined
  return from.litres + (to.litres - from.litres) * (atMs - from.atMs) / (to.atMs - from.atMs)
}

/**
 * Leaves out points that straight lines between their neighbours replace.
 *
 * @param points in order of time; every number but `atMs` is litres
 * @param toleranceLitres farthest that a left-out point may lie off the line
 * @returns the first, the last, and every point where the line bends or steps
 */
export function thinPoints<Point extends Readonly<Record<string, number>> & { readonly atMs: number }>(points: readonly Point[], toleranceLitres: number): Point[] {
  const kept: Point[] = []
  let from = 0
  const liesBetween = (point: Point, start: Point, end: Point) => Object.keys(point).every((key) => {
    const share = (point.atMs - start.atMs) / (end.atMs - start.atMs)
    return key === 'atMs' || Math.abs((start[key] ?? 0) + share * ((end[key] ?? 0) - (start[key] ?? 0)) - (point[key] ?? 0)) <= toleranceLitres
  })
  points.forEach((point, index) => {
    const [start, end] = [points[from], points[index + 1]]
    const isStep = end?.atMs === point.atMs || points[index - 1]?.atMs === point.atMs
    const replaced = start && end && index > from && !isStep && points.slice(from + 1, index + 1).every(between => liesBetween(between, start, end))
    if (replaced) return
    kept.push(point)
    from = index
  })
  return kept
}
