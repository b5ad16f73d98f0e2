import { shareOf } from '#shared/money/money'
import { addDays, instantOfWallTime, type WallTime, wallTimeOf } from '#shared/time/facility-time'

/** From so many days before the start, this percentage of the deposit comes back. */
export interface RefundStep {
  readonly fromDaysBefore: number
  readonly refundPercent: number
}

/** Facility defaults: everything until 14 days before, half until 3 days, then nothing. */
export const DEFAULT_REFUND_LADDER: readonly RefundStep[] = [
  { fromDaysBefore: 14, refundPercent: 100 },
  { fromDaysBefore: 3, refundPercent: 50 },
  { fromDaysBefore: 0, refundPercent: 0 },
]

/**
 * What of a deposit comes back. Days are counted on the facility's calendar: 14 days before Monday 09:00 is the Monday
 * two weeks earlier at 09:00, also when the clock changes in between; that very instant still counts as 14 days.
 *
 * @param depositMinor what was paid, minor units
 * @param withdrawnAt when the run is withdrawn
 * @param startsAt when its slot begins
 * @param timeZone of the facility
 * @param ladder its steps
 * @returns the refund in minor units and the percentage it comes from
 */
export function refundOf(depositMinor: number, withdrawnAt: Date, startsAt: Date, timeZone: string, ladder: readonly RefundStep[] = DEFAULT_REFUND_LADDER): { amountMinor: number, percent: number } {
  const start = wallTimeOf(startsAt, timeZone)
  const step = [...ladder].sort((a, b) => b.fromDaysBefore - a.fromDaysBefore)
    .find(({ fromDaysBefore }) => withdrawnAt <= boundary(start, fromDaysBefore, timeZone))
  const percent = step?.refundPercent ?? 0
  return { amountMinor: shareOf(depositMinor, percent * 100), percent }
}

function boundary(start: WallTime, daysBefore: number, timeZone: string): Date {
  const date = addDays(start.date, -daysBefore)
  try {
    return instantOfWallTime({ date, time: start.time }, timeZone)
  }
  catch {
    // The clock is put forward over this time on that day: it is read as if it were not, 24 h after the day before.
    return new Date(instantOfWallTime({ date: addDays(date, -1), time: start.time }, timeZone).getTime() + 86_400_000)
  }
}
