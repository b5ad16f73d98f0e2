import type { PhaseId } from '#shared/planning/types'
import { MS_PER_HOUR } from '#shared/units/helium-units'

/** A phase with its hours. */
interface PhaseHours { readonly phase: PhaseId, readonly hours: number }

/**
 * Phases of a run as far as it has gone: what was logged takes the place of the plan, phases still to come keep their planned
 * hours, and phases that were passed over are left out.
 *
 * @param planned phases in order with their planned hours
 * @param logged when each phase began, ms UTC, in any order
 * @param end when the run was finished, ms UTC; undefined while it runs
 * @returns where the first phase begins, ms UTC (undefined where nothing was logged), and the phases in order
 */
export function phasesAsRun(
  planned: readonly PhaseHours[], logged: readonly { readonly phase: PhaseId, readonly atMs: number }[], end?: number,
): { startMs: number | undefined, phases: PhaseHours[] } {
  const begun = [...logged].sort((a, b) => a.atMs - b.atMs)
  const last = begun.at(-1)
  if (!last) return { startMs: undefined, phases: [...planned] }
  const past = begun.slice(0, -1).map((entry, index) => ({ phase: entry.phase, hours: ((begun[index + 1]?.atMs ?? entry.atMs) - entry.atMs) / MS_PER_HOUR }))
  const at = planned.findIndex(({ phase }) => phase === last.phase)
  const current = { phase: last.phase, hours: end === undefined ? planned[at]?.hours ?? 0 : Math.max(0, end - last.atMs) / MS_PER_HOUR }
  return { startMs: begun[0]?.atMs, phases: [...past, current, ...(end === undefined && at !== -1 ? planned.slice(at + 1) : [])] }
}
