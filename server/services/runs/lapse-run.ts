import { eq } from 'drizzle-orm'
import type { Database } from '#server/db/client'
import { runs } from '#server/db/schema'
import { queueRunMail } from '#server/services/mail/queue-run-mail'
import { changeRunState } from './change-state'

/**
 * Lapses an approved run whose pay-by time has passed and frees its days. A run that was paid, withdrawn or given more
 * time meanwhile is left alone.
 *
 * @param db database
 * @param input the run and the instant
 * @returns whether it lapsed
 */
export async function lapseRun(db: Database, input: { runId: string, now: Date }): Promise<boolean> {
  return db.transaction(async (tx) => {
    const [run] = await tx.select().from(runs).where(eq(runs.id, input.runId)).for('update')
    if (!run || run.state !== 'approved' || !run.payBy || run.payBy > input.now) return false
    const lapsed = await changeRunState(tx, { run, step: 'lapse', actorId: null, reason: 'The deposit was not paid in time.', now: input.now })
    await queueRunMail(tx, 'lapsed', lapsed)
    return true
  })
}
