import { and, eq, sql } from 'drizzle-orm'
import { refundOf } from '#shared/pricing/refund-ladder'
import type { Payments } from '#server/adapters/payments/client'
import type { Database } from '#server/db/client'
import { payments, runs, runTransitions } from '#server/db/schema'
import { readFacility } from '#server/services/facility/queries'
import { queueRunMail } from '#server/services/mail/queue-run-mail'

/**
 * Pays back what is due of a deposit when a run was withdrawn (by the facility's ladder) or lapsed before the money came
 * (in full). Run again after a crash, it refunds once: the payment's row and key come before the request.
 *
 * @param db database
 * @param provider the payment provider
 * @param input the run and the instant
 */
export async function refundDeposit(db: Database, provider: Payments, input: { runId: string, now: Date }): Promise<void> {
  const { runId, now } = input
  const [deposit] = await db.select().from(payments).where(and(eq(payments.runId, runId), eq(payments.kind, 'deposit'), eq(payments.state, 'succeeded')))
  if (!deposit?.intentId) return
  const amountMinor = await refundDue(db, runId, deposit.amountMinor)
  if (amountMinor > 0) await refundPayment(db, provider, { deposit, amountMinor, now })
}

async function refundDue(db: Database, runId: string, paidMinor: number): Promise<number> {
  const [run] = await db.select().from(runs).where(eq(runs.id, runId))
  if (run?.state === 'lapsed') return paidMinor
  if (run?.state !== 'withdrawn') return 0
  const [withdrawal] = await db.select({ at: runTransitions.at }).from(runTransitions).where(and(eq(runTransitions.runId, runId), eq(runTransitions.toState, 'withdrawn')))
  const facility = await readFacility(db)
  return refundOf(paidMinor, withdrawal!.at, run.slot.startsAt, facility.timeZone, facility.refundLadder).amountMinor
}

/**
 * Refunds part of a paid deposit, once.
 *
 * @param db database
 * @param provider the payment provider
 * @param input the deposit, how much in minor units, and the instant
 */
export async function refundPayment(db: Database, provider: Payments, input: { deposit: typeof payments.$inferSelect, amountMinor: number, now: Date }): Promise<void> {
  const { deposit, amountMinor, now } = input
  const idempotencyKey = `refund:${deposit.id}`
  await db.insert(payments).values({ runId: deposit.runId, kind: 'refund', attempt: 1, state: 'open', amountMinor, currency: deposit.currency, idempotencyKey, intentId: deposit.intentId }).onConflictDoNothing()
  const [row] = await db.select().from(payments).where(eq(payments.idempotencyKey, idempotencyKey))
  if (!row || row.state === 'succeeded') return
  const refund = await provider.refund({ intentId: deposit.intentId!, amountMinor: row.amountMinor, metadata: { runId: deposit.runId, paymentId: row.id }, idempotencyKey })
  await db.transaction(async (tx) => {
    const [done] = await tx.update(payments).set({ state: 'succeeded', refundId: refund.refundId, settledAt: now }).where(and(eq(payments.id, row.id), sql`${payments.state} <> 'succeeded'`)).returning()
    const [run] = await tx.select().from(runs).where(eq(runs.id, deposit.runId))
    if (done && run) await queueRunMail(tx, 'refunded', run, { amountMinor: row.amountMinor })
  })
}
