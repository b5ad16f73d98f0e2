import { DomainError } from '#shared/errors'
import { addDays, daysBetween, startOfDay } from '#shared/time/facility-time'

/** One day of the facility on the board. */
export interface BoardDay {
  /** `YYYY-MM-DD` */
  readonly day: string
  readonly startMs: number
  readonly endMs: number
  /** Left edge and width as shares of the board's width. */
  readonly left: number
  readonly width: number
  readonly isWeekend: boolean
}

/** Time along the board: whole days of the facility, each as wide as it is long. */
export interface BoardScale {
  readonly startMs: number
  readonly endMs: number
  readonly days: readonly BoardDay[]
}

/** Most days a board shows at once. */
export const MOST_BOARD_DAYS = 92

/**
 * Lays days of the facility along the board. Widths follow true hours: a day of 23 h is narrower than one of 24 h.
 *
 * @param range first day and the day after the last, `YYYY-MM-DD`, and the facility's IANA zone
 * @returns the scale
 * @throws DomainError when the range is empty, too long or not of days
 */
export function boardScale({ from, to, timeZone }: { readonly from: string, readonly to: string, readonly timeZone: string }): BoardScale {
  const count = daysBetween(from, to)
  if (!(count >= 1 && count <= MOST_BOARD_DAYS)) {
    throw new DomainError('invalid', `The board shows 1 to ${MOST_BOARD_DAYS} days. Choose a last day after the first.`, ['to'])
  }
  const starts = Array.from({ length: count + 1 }, (_, index) => startOfDay(addDays(from, index), timeZone).getTime())
  const startMs = starts[0] ?? 0
  const endMs = starts[count] ?? 0
  const days = starts.slice(0, count).map((dayStartMs, index): BoardDay => {
    const day = addDays(from, index)
    const dayEndMs = starts[index + 1] ?? endMs
    return {
      day,
      startMs: dayStartMs,
      endMs: dayEndMs,
      left: (dayStartMs - startMs) / (endMs - startMs),
      width: (dayEndMs - dayStartMs) / (endMs - startMs),
      isWeekend: [0, 6].includes(new Date(`${day}T12:00:00Z`).getUTCDay()),
    }
  })
  return { startMs, endMs, days }
}

/**
 * Place of an instant on the board.
 *
 * @param scale the board's scale
 * @param atMs instant, ms UTC
 * @returns share of the width; below 0 or above 1 outside the board
 */
export function positionOf(scale: BoardScale, atMs: number): number {
  return (atMs - scale.startMs) / (scale.endMs - scale.startMs)
}

/**
 * The part of a span that the board shows.
 *
 * @param scale the board's scale
 * @param startMs start, ms UTC
 * @param endMs end, ms UTC
 * @returns left edge and width as shares of the board's width, both 0 to 1
 */
export function visibleSpan(scale: BoardScale, startMs: number, endMs: number): { left: number, width: number } {
  const left = Math.min(1, Math.max(0, positionOf(scale, startMs)))
  return { left, width: Math.min(1, Math.max(0, positionOf(scale, endMs))) - left }
}

/**
 * The day at a place on the board.
 *
 * @param scale the board's scale
 * @param share place as a share of the width; outside the board the nearest day
 * @returns index of the day
 */
export function dayIndexAt(scale: BoardScale, share: number): number {
  const index = scale.days.findIndex(day => share < day.left + day.width)
  return index === -1 ? scale.days.length - 1 : index
}

/**
 * Days that a span touches.
 *
 * @param scale the board's scale
 * @param startMs start, ms UTC
 * @param endMs end, ms UTC; a span that ends at midnight does not touch the day after
 * @returns indices of the first and last day shown, or undefined when the board shows none of it
 */
export function daysTouched(scale: BoardScale, startMs: number, endMs: number): { first: number, last: number } | undefined {
  const first = scale.days.findIndex(day => day.endMs > startMs && day.startMs < endMs)
  if (first === -1) return undefined
  return { first, last: scale.days.findLastIndex(day => day.startMs < endMs) }
}

/**
 * A share as a CSS percentage, as fine as a screen shows.
 *
 * @param share share of the width
 * @returns e.g. `12.345%`
 */
export function percentOf(share: number): string {
  return `${Math.round(share * 1e5) / 1e3}%`
}
