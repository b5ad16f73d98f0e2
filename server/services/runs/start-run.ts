import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { Database } from '#server/db/client'
import { changeRunState, type Run } from './change-state'
import { lockRun } from './lock-run'

/** How long before its slot a run may be started, when the cryostat is free. */
const EARLIEST_BEFORE_SLOT_MS = 12 * 3_600_000

/**
 * Starts a confirmed run.
 *
 * @param db database
 * @param input the run, who starts it, and the instant
 * @throws DomainError when the run is not confirmed, or its days are still far off
 */
export async function startRun(db: Database, input: { runId: string, actor: Actor, now: Date }): Promise<Run> {
  return db.transaction(async (tx) => {
    const run = await lockRun(tx, input.runId, input.actor, 'run:advance')
    if (run.state === 'confirmed' && run.slot.startsAt.getTime() - input.now.getTime() > EARLIEST_BEFORE_SLOT_MS) {
      throw new DomainError('conflict', 'The slot of this run begins more than 12 hours from now. Start it then, or ask the manager to move it.', ['slot'])
    }
    return changeRunState(tx, { run, step: 'start', actorId: input.actor.personId, now: input.now, changes: { startedAt: input.now } })
  })
}
