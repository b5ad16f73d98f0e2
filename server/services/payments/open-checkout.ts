import { eq } from 'drizzle-orm'
import { DomainError } from '#shared/errors'
import type { Payments } from '#server/adapters/payments/client'
import type { Database } from '#server/db/client'
import { groups, payments, runs } from '#server/db/schema'
import { useServerConfig } from '#server/utils/config'
import { findRunRecipients } from '#server/services/mail/recipients'

/** The provider's shortest life of a session, with a margin for clocks. */
const SHORTEST_MS = 31 * 60_000
const LONGEST_MS = 23 * 3_600_000

/**
 * Opens the hosted page of a stored payment; asked again, the same page is returned.
 *
 * @param db database
 * @param provider the payment provider
 * @param input the payment's row and the instant
 * @returns address of the page
 */
export async function openCheckout(db: Database, provider: Payments, input: { payment: typeof payments.$inferSelect, now: Date }): Promise<string> {
  const { payment, now } = input
  if (payment.checkoutUrl) return payment.checkoutUrl
  const [row] = await db.select({ run: runs, group: groups }).from(runs).innerJoin(groups, eq(groups.id, runs.groupId)).where(eq(runs.id, payment.runId))
  const { run, group } = row!
  const recipients = await findRunRecipients(db, run)
  const number = String(run.number).padStart(4, '0')
  const page = `${useServerConfig().origin}/runs/${run.id}`
  const untilPayBy = payment.kind === 'deposit' && run.payBy ? run.payBy.getTime() - now.getTime() : LONGEST_MS
  const checkout = await provider.createCheckout({
    amountMinor: payment.amountMinor, currency: payment.currency, title: `${payment.kind === 'deposit' ? 'Deposit' : 'Balance'} for run ${number}`,
    customerId: group.paymentCustomerId, customerEmail: recipients.requester, metadata: { runId: run.id, paymentId: payment.id, kind: payment.kind },
    successUrl: `${page}?paid=checking`, cancelUrl: `${page}?paid=left`,
    // Whole minutes of the payment's own time, so that a retry sends the same body under the same key.
    expiresAt: new Date(payment.createdAt.getTime() + Math.max(SHORTEST_MS, Math.min(LONGEST_MS, untilPayBy + now.getTime() - payment.createdAt.getTime()))),
    savesCard: true, idempotencyKey: payment.idempotencyKey,
  })
  if (!checkout.url) throw new DomainError('conflict', 'This payment is over. Reload the page to see how it stands.')
  await db.update(payments).set({ sessionId: checkout.sessionId, checkoutUrl: checkout.url }).where(eq(payments.id, payment.id))
  if (checkout.customerId && !group.paymentCustomerId) await db.update(groups).set({ paymentCustomerId: checkout.customerId }).where(eq(groups.id, group.id))
  return checkout.url
}
