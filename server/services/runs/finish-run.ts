import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { RunFinish } from '#shared/schemas/run'
import type { Database } from '#server/db/client'
import { enqueueJob } from '#server/jobs/queue'
import { queueRunMail } from '#server/services/mail/queue-run-mail'
import { changeRunState, type Run } from './change-state'
import { lockRun } from './lock-run'

/**
 * Finishes a running run; charging follows as a job of the same transaction.
 *
 * @param db database
 * @param input the run, who finishes it, how it ended, and the instant
 * @throws DomainError when the run is not running, or it was cut short without a reason
 */
export async function finishRun(db: Database, input: { runId: string, actor: Actor, finish: RunFinish, now: Date }): Promise<Run> {
  const { runId, actor, finish, now } = input
  return db.transaction(async (tx) => {
    const run = await lockRun(tx, runId, actor, 'run:finish')
    if (finish.cutShort && finish.reason === '') throw new DomainError('invalid', 'Say why the run was cut short.', ['reason'])
    const finished = await changeRunState(tx, {
      run, step: 'finish', actorId: actor.personId, reason: finish.reason, now, changes: { finishedAt: now, cutShort: finish.cutShort, operatorHours: finish.operatorHours },
    })
    await enqueueJob(tx, 'charge-finished-run', { runId })
    await queueRunMail(tx, 'finished', finished)
    return finished
  })
}
