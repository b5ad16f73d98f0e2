import { and, eq, ne, sql } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { paysDeposit } from '#shared/pricing/rate-card'
import { payByInstant } from '#shared/runs/pay-by'
import type { Database } from '#server/db/client'
import { groups, runs } from '#server/db/schema'
import { enqueueJob } from '#server/jobs/queue'
import { readFacility } from '#server/services/facility/queries'
import { queueRunMail } from '#server/services/mail/queue-run-mail'
import { committedMinor } from './ask-for-run'
import { changeRunState, type Run } from './change-state'
import { lockRun } from './lock-run'

/**
 * Approves a request. An internal run is confirmed at once when its cost code is valid and its PI's cap allows; any other
 * waits for its deposit until its pay-by time. The database refuses an overlap.
 *
 * @param db database
 * @param input the run, who approves, a remark, and the instant
 * @throws DomainError `conflict` when the days are taken, the start has passed, or the cap would be exceeded
 */
export async function approveRun(db: Database, input: { runId: string, actor: Actor, reason: string, now: Date }): Promise<Run> {
  const { runId, actor, reason, now } = input
  return db.transaction(async (tx) => {
    const run = await lockRun(tx, runId, actor, 'run:approve')
    if (run.state === 'asked' && run.slot.startsAt <= now) throw new DomainError('conflict', 'The days asked for have begun. Decline this request and ask the group for other days.', ['slot'])
    const [group] = await tx.select().from(groups).where(eq(groups.id, run.groupId))
    const facility = await readFacility(tx)
    const waitsForDeposit = paysDeposit(group!.class)
    const payBy = waitsForDeposit ? payByInstant(now, run.slot.startsAt, facility.payByHours) : null
    const approved = await changeRunState(tx, { run, step: 'approve', actorId: actor.personId, reason, now, changes: { payBy } })
    if (waitsForDeposit) {
      await enqueueJob(tx, 'lapse-unpaid-run', { runId }, { startAfter: payBy! })
      await queueRunMail(tx, 'approved', approved)
      return approved
    }
    await checkInternal(tx, approved, group!)
    const confirmed = await changeRunState(tx, { run: approved, step: 'confirm', actorId: actor.personId, reason: `Cost code ${approved.costCode}`, now })
    await queueRunMail(tx, 'confirmed', confirmed)
    return confirmed
  })
}

async function checkInternal(tx: Database, run: Run, group: typeof groups.$inferSelect) {
  if (!run.costCode || !group.costCodes.includes(run.costCode)) {
    throw new DomainError('conflict', `${run.costCode ?? 'No code'} is not a valid cost code of ${group.name}. Decline with that reason, or have the group's codes corrected.`, ['costCode'])
  }
  if (group.capMinor === null) return
  const committed = await committedMinor(tx, group.id, run.slot.startsAt.getUTCFullYear(), run.id)
  if (committed + run.quote.totalMinor.likely > group.capMinor) {
    throw new DomainError('conflict', `With this run ${group.name} would pass the cap that its PI has set for the year. Ask the PI to raise it, or decline.`, ['cap'])
  }
}

/**
 * Requests that can no longer be met because another run took their days.
 *
 * @param db database or transaction
 * @param run the run that holds the days now
 */
export async function findLosers(db: Database, run: Run): Promise<Run[]> {
  const { startsAt, endsAt } = run.slot
  return db.select().from(runs).where(and(
    eq(runs.cryostatId, run.cryostatId), eq(runs.state, 'asked'), ne(runs.id, run.id),
    sql`${runs.slot} && tstzrange(${startsAt.toISOString()}::timestamptz, ${endsAt.toISOString()}::timestamptz)`,
  ))
}
