import type { Actor } from '#shared/access/rules'
import type { Database } from '#server/db/client'
import { enqueueJob } from '#server/jobs/queue'
import { changeRunState, type Run } from './change-state'
import { lockRun } from './lock-run'

/**
 * Withdraws a run before it starts and frees its days; a paid deposit comes back by the facility's ladder.
 *
 * @param db database
 * @param input the run, who withdraws, why, and the instant
 * @throws DomainError when the run has started or is over
 */
export async function withdrawRun(db: Database, input: { runId: string, actor: Actor, reason: string, now: Date }): Promise<Run> {
  return db.transaction(async (tx) => {
    const run = await lockRun(tx, input.runId, input.actor, 'run:withdraw')
    const withdrawn = await changeRunState(tx, { run, step: 'withdraw', actorId: input.actor.personId, reason: input.reason, now: input.now })
    if (run.state !== 'asked') await enqueueJob(tx, 'refund-deposit', { runId: run.id })
    return withdrawn
  })
}
