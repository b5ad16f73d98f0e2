import { eq } from 'drizzle-orm'
import type { CheckoutState, Payments } from '#server/adapters/payments/client'
import type { Database } from '#server/db/client'
import { groups, payments, runs } from '#server/db/schema'
import { enqueueJob } from '#server/jobs/queue'
import { queueRunMail } from '#server/services/mail/queue-run-mail'
import { findLosers } from '#server/services/runs/approve-run'
import { changeRunState } from '#server/services/runs/change-state'

/**
 * Brings a stored payment to what the provider says of its checkout. Events are only hints that lead here: the state is
 * read afresh, so that they may come twice, late or out of order.
 *
 * @param db database
 * @param provider the payment provider
 * @param input the checkout and the instant
 */
export async function settleCheckout(db: Database, provider: Payments, input: { sessionId: string, now: Date }): Promise<void> {
  await recordCheckout(db, { checkout: await provider.readCheckout(input.sessionId), now: input.now })
}

/** Writes what a checkout has come to; a payment that is settled already stays as it is. */
export async function recordCheckout(db: Database, input: { checkout: CheckoutState, now: Date }): Promise<void> {
  const { checkout, now } = input
  await db.transaction(async (tx) => {
    const [payment] = await tx.select().from(payments).where(eq(payments.sessionId, checkout.sessionId)).for('update')
    if (!payment || payment.state === 'succeeded' || payment.state === 'expired') return
    if (checkout.isPaid) return succeed(tx, payment, checkout, now)
    if (checkout.status === 'expired') await tx.update(payments).set({ state: 'expired', checkoutUrl: null }).where(eq(payments.id, payment.id))
  })
}

async function succeed(tx: Database, payment: typeof payments.$inferSelect, checkout: CheckoutState, now: Date) {
  await tx.update(payments).set({ state: 'succeeded', intentId: checkout.intentId, settledAt: now, checkoutUrl: null, actionUrl: null, failure: null }).where(eq(payments.id, payment.id))
  const [run] = await tx.select().from(runs).where(eq(runs.id, payment.runId)).for('update')
  if (checkout.customerId) await tx.update(groups).set({ paymentCustomerId: checkout.customerId }).where(eq(groups.id, run!.groupId))
  if (payment.kind === 'balance') {
    if (run!.state !== 'finished') return
    const settled = await changeRunState(tx, { run: run!, step: 'settle', actorId: null, reason: 'The balance was paid.', now })
    await queueRunMail(tx, 'balance-paid', settled, { amountMinor: payment.amountMinor })
    return
  }
  if (run!.state !== 'approved') {
    // Paid after the run lapsed or was withdrawn: the days may be another's, so the money goes back in full.
    await enqueueJob(tx, 'refund-deposit', { runId: run!.id })
    return
  }
  const confirmed = await changeRunState(tx, { run: run!, step: 'confirm', actorId: null, reason: 'The deposit was paid.', now })
  await queueRunMail(tx, 'confirmed', confirmed, { amountMinor: payment.amountMinor })
  for (const loser of await findLosers(tx, confirmed)) await queueRunMail(tx, 'lost-days', loser)
}
