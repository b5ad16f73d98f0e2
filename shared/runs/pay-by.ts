const HOUR_MS = 3_600_000

/** Hours before the start by which a deposit must be there whatever the usual term, so that others can still use the days. */
const LATEST_BEFORE_START_H = 24

/**
 * The instant by which a deposit must be paid: so many hours after approval, but at least a day before the start; for a
 * run approved at short notice, an hour after approval at the earliest, and never after the start.
 *
 * @param approvedAt when the run was approved
 * @param startsAt when its slot begins
 * @param payByHours the facility's term, hours
 */
export function payByInstant(approvedAt: Date, startsAt: Date, payByHours: number): Date {
  const usual = approvedAt.getTime() + payByHours * HOUR_MS
  const latest = startsAt.getTime() - LATEST_BEFORE_START_H * HOUR_MS
  const earliest = approvedAt.getTime() + HOUR_MS
  return new Date(Math.min(startsAt.getTime(), Math.max(earliest, Math.min(usual, latest))))
}
