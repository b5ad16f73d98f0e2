import { and, desc, eq } from 'drizzle-orm'
import type { Payments } from '#server/adapters/payments/client'
import type { Database } from '#server/db/client'
import { groups, payments, runs } from '#server/db/schema'
import { enqueueJob } from '#server/jobs/queue'
import { queueRunMail } from '#server/services/mail/queue-run-mail'
import { openCheckout } from '#server/services/payments/open-checkout'
import { refundPayment } from '#server/services/payments/refund-deposit'
import { changeRunState } from '#server/services/runs/change-state'
import { type Invoice, issueInvoice } from './issue-invoice'

type Payment = typeof payments.$inferSelect

/**
 * Charges a finished run: issues its invoice from the log, then charges the balance to the saved card, refunds what was
 * paid too much, or books it on the cost code. Every step is stored before the next begins, so that a restart half-way
 * goes on where it stopped and nothing is charged twice.
 *
 * @param db database
 * @param provider the payment provider
 * @param input the run and the instant
 */
export async function chargeFinishedRun(db: Database, provider: Payments, input: { runId: string, now: Date }): Promise<void> {
  const { runId, now } = input
  const invoice = await db.transaction(async (tx) => {
    const [run] = await tx.select().from(runs).where(eq(runs.id, runId)).for('update')
    if (!run || (run.state !== 'finished' && run.state !== 'settled')) return null
    const issued = await issueInvoice(tx, { runId, now })
    await enqueueJob(tx, 'render-invoice', { invoiceId: issued.id })
    return issued
  })
  if (!invoice) return
  const [group] = await db.select().from(groups).where(eq(groups.id, invoice.groupId))
  if (group!.class === 'internal' || invoice.dueMinor === 0) return settle(db, invoice, group!.class === 'internal' ? 'Charged to the cost code.' : 'Paid with the deposit.', now)
  const deposit = await findDeposit(db, runId)
  if (invoice.dueMinor < 0) {
    if (deposit) await refundPayment(db, provider, { deposit, amountMinor: -invoice.dueMinor, now })
    return settle(db, invoice, 'The difference to the deposit was refunded.', now)
  }
  await chargeBalance(db, provider, { invoice, deposit, now })
}

async function findDeposit(db: Database, runId: string): Promise<Payment | undefined> {
  const [deposit] = await db.select().from(payments).where(and(eq(payments.runId, runId), eq(payments.kind, 'deposit'), eq(payments.state, 'succeeded')))
  return deposit
}

async function settle(db: Database, invoice: Invoice, reason: string, now: Date, chargedMinor = 0) {
  await db.transaction(async (tx) => {
    const [run] = await tx.select().from(runs).where(eq(runs.id, invoice.runId)).for('update')
    if (run?.state !== 'finished') return
    const settled = await changeRunState(tx, { run, step: 'settle', actorId: null, reason, now })
    if (chargedMinor > 0) await queueRunMail(tx, 'balance-paid', settled, { amountMinor: chargedMinor })
  })
}

async function chargeBalance(db: Database, provider: Payments, input: { invoice: Invoice, deposit: Payment | undefined, now: Date }) {
  const { invoice, deposit, now } = input
  const payment = await storeBalance(db, invoice)
  // Charged by a process that died before it could settle the run.
  if (payment.state === 'succeeded') return settle(db, invoice, 'The balance was paid.', now, payment.amountMinor)
  if (payment.state !== 'open' || payment.sessionId) return
  if (!deposit?.intentId) return fail(db, payment, 'No card was saved with a deposit.')
  const outcome = await provider.chargeSavedCard({
    paidIntentId: deposit.intentId, amountMinor: payment.amountMinor, currency: payment.currency, description: `Invoice ${invoice.number}`, metadata: { runId: invoice.runId, paymentId: payment.id, kind: 'balance' }, idempotencyKey: payment.idempotencyKey,
  })
  if (outcome.state === 'declined') return fail(db, payment, outcome.reason)
  if (outcome.state === 'succeeded') {
    await db.update(payments).set({ state: 'succeeded', intentId: outcome.intentId, settledAt: now }).where(eq(payments.id, payment.id))
    return settle(db, invoice, 'The balance was charged to the saved card.', now, payment.amountMinor)
  }
  await askForConfirmation(db, provider, { payment, reason: outcome.reason, now })
}

/** The balance's row, made once; its key names the invoice, so that a retry is the same charge. */
async function storeBalance(db: Database, invoice: Invoice): Promise<Payment> {
  await db.insert(payments).values({
    runId: invoice.runId, kind: 'balance', attempt: 1, state: 'open', amountMinor: invoice.dueMinor, currency: invoice.currency, idempotencyKey: `balance:${invoice.id}:1`,
  }).onConflictDoNothing()
  const [row] = await db.select().from(payments).where(and(eq(payments.runId, invoice.runId), eq(payments.kind, 'balance'))).orderBy(desc(payments.attempt)).limit(1)
  return row!
}

async function fail(db: Database, payment: Payment, failure: string) {
  await db.transaction(async (tx) => {
    const [changed] = await tx.update(payments).set({ state: 'failed', failure }).where(and(eq(payments.id, payment.id), eq(payments.state, 'open'))).returning()
    const [run] = await tx.select().from(runs).where(eq(runs.id, payment.runId))
    if (changed && run) await queueRunMail(tx, 'balance-failed', run, { amountMinor: payment.amountMinor })
  })
}

/** The bank wants the payer: the attempt ends, and a hosted page for the same amount is mailed. */
async function askForConfirmation(db: Database, provider: Payments, input: { payment: Payment, reason: string, now: Date }) {
  const { payment, reason, now } = input
  const next = await db.transaction(async (tx) => {
    await tx.update(payments).set({ state: 'failed', failure: reason }).where(eq(payments.id, payment.id))
    const attempt = payment.attempt + 1
    const [row] = await tx.insert(payments).values({ runId: payment.runId, kind: 'balance', attempt, state: 'open', amountMinor: payment.amountMinor, currency: payment.currency, idempotencyKey: payment.idempotencyKey.replace(/:\d+$/, `:${attempt}`) }).returning()
    return row!
  })
  const actionUrl = await openCheckout(db, provider, { payment: next, now })
  await db.transaction(async (tx) => {
    await tx.update(payments).set({ actionUrl }).where(eq(payments.id, next.id))
    const [run] = await tx.select().from(runs).where(eq(runs.id, payment.runId))
    if (run) await queueRunMail(tx, 'balance-confirm', run, { amountMinor: payment.amountMinor, actionUrl })
  })
}
