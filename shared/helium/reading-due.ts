import { MS_PER_HOUR } from '#shared/units/helium-units'

/** Hours between level readings of a running cryostat (common practice, no source). */
export const LEVEL_READING_EVERY_HOURS = 4

/**
 * When the level of a running cryostat is to be read next.
 *
 * @param run when it was started and last read, ms UTC; `lastMs` undefined before the first reading
 * @returns ms UTC; in the past when the reading is overdue
 */
export function levelReadingDueMs(run: { readonly startedMs: number, readonly lastMs: number | undefined }): number {
  return Math.max(run.startedMs, run.lastMs ?? run.startedMs) + LEVEL_READING_EVERY_HOURS * MS_PER_HOUR
}
