import { DomainError } from '#shared/errors'

/** A span of time, `[startsAt, endsAt)`. */
export interface Slot {
  readonly startsAt: Date
  readonly endsAt: Date
}

/** Whether two slots share an instant; one may start when the other ends. */
export function overlaps(a: Slot, b: Slot): boolean {
  return a.startsAt < b.endsAt && b.startsAt < a.endsAt
}

/** Farthest ahead that days can be asked for. */
export const FARTHEST_DAYS_AHEAD = 370

/**
 * Refuses a slot that cannot be asked for.
 *
 * @param slot what is asked for
 * @param now the instant
 * @throws DomainError for a slot that is past, empty, or too far ahead
 */
export function checkAskable(slot: Slot, now: Date): void {
  if (slot.startsAt <= now) throw new DomainError('invalid', 'This start is in the past. Choose a later day.', ['startsAt'])
  if (slot.endsAt <= slot.startsAt) throw new DomainError('invalid', 'The run ends before it starts. Choose a later end.', ['endsAt'])
  if (slot.startsAt.getTime() - now.getTime() > FARTHEST_DAYS_AHEAD * 86_400_000) {
    throw new DomainError('invalid', `Days can be asked for up to ${FARTHEST_DAYS_AHEAD} days ahead. Choose an earlier day.`, ['startsAt'])
  }
}
