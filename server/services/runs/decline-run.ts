import type { Actor } from '#shared/access/rules'
import type { Database } from '#server/db/client'
import { queueRunMail } from '#server/services/mail/queue-run-mail'
import { changeRunState, type Run } from './change-state'
import { lockRun } from './lock-run'

/**
 * Declines a request; the group is told why.
 *
 * @param db database
 * @param input the run, who declines, the reason, and the instant
 * @throws DomainError when the run is no longer asked for, or no reason is given
 */
export async function declineRun(db: Database, input: { runId: string, actor: Actor, reason: string, now: Date }): Promise<Run> {
  return db.transaction(async (tx) => {
    const run = await lockRun(tx, input.runId, input.actor, 'run:decline')
    const declined = await changeRunState(tx, { run, step: 'decline', actorId: input.actor.personId, reason: input.reason, now: input.now })
    await queueRunMail(tx, 'declined', declined, { reason: input.reason })
    return declined
  })
}
