import { DomainError } from '#shared/errors'
import type { PhaseId, RunEstimate } from '#shared/planning/types'
import { MS_PER_HOUR } from '#shared/units/helium-units'

/** A phase laid over real time. */
export interface LaidPhase {
  readonly phase: PhaseId
  /** Start and end, ms since 1970-01-01T00:00Z. */
  readonly startMs: number
  readonly endMs: number
}

/**
 * Lays phases end to end over real time. Hours are true hours: where the clocks change, the local time of the end shifts,
 * not the length.
 *
 * @param startMs Start of the first phase, ms UTC.
 * @param phases Phases in order with their hours.
 * @returns The phases with start and end; each starts where the one before ends.
 * @throws DomainError when the start is no instant or a length is negative or no number.
 */
export function layPhases(startMs: number, phases: readonly { readonly phase: PhaseId, readonly hours: number }[]): LaidPhase[] {
  if (!Number.isFinite(startMs)) throw new DomainError('invalid', 'The start of the run is not a time. Choose a day and an hour.', ['start'])
  let elapsedHours = 0
  let endMs = startMs
  return phases.map(({ phase, hours }) => {
    if (!(hours >= 0 && Number.isFinite(hours))) {
      throw new DomainError('invalid', `The hours of the phase ${phase} must be zero or more. Enter hours as a number.`, ['phases', phase])
    }
    const phaseStartMs = endMs
    elapsedHours += hours
    // Rounded from the whole length so far, so that roundings do not add up over the phases.
    endMs = Math.round(startMs + elapsedHours * MS_PER_HOUR)
    return { phase, startMs: phaseStartMs, endMs }
  })
}

/**
 * Lays the likely hours of an estimate over real time.
 *
 * @param estimate Estimate of a run.
 * @param startMs Start, ms UTC.
 * @returns Phases with start and end.
 * @throws DomainError when the start is no instant.
 */
export function layEstimate(estimate: Pick<RunEstimate, 'phases'>, startMs: number): LaidPhase[] {
  return layPhases(startMs, estimate.phases.map(({ phase, hours }) => ({ phase, hours: hours.likely })))
}

/**
 * Phase that is on at an instant.
 *
 * @param laid Phases over real time.
 * @param atMs Instant, ms UTC.
 * @returns The phase, or undefined before the first and from the end of the last.
 */
export function phaseAt(laid: readonly LaidPhase[], atMs: number): LaidPhase | undefined {
  return laid.find(phase => atMs >= phase.startMs && atMs < phase.endMs)
}

/**
 * True length of a stretch of time.
 *
 * @param startMs Start, ms UTC.
 * @param endMs End, ms UTC.
 * @returns Hours.
 */
export function trueHours(startMs: number, endMs: number): number {
  return (endMs - startMs) / MS_PER_HOUR
}
