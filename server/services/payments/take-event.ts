import { eq } from 'drizzle-orm'
import type { PaymentEvent, Payments } from '#server/adapters/payments/client'
import type { Database } from '#server/db/client'
import { paymentEvents } from '#server/db/schema'
import { enqueueJob } from '#server/jobs/queue'
import { settleCheckout } from './settle-checkout'

/**
 * Stores a verified event once, by its id, and queues its handling in the same transaction.
 *
 * @param db database
 * @param event as verified
 * @returns whether it was new
 */
export async function takePaymentEvent(db: Database, event: PaymentEvent): Promise<boolean> {
  return db.transaction(async (tx) => {
    const [row] = await tx.insert(paymentEvents).values(event).onConflictDoNothing().returning({ id: paymentEvents.id })
    if (row) await enqueueJob(tx, 'handle-payment-event', { eventId: event.id })
    return row !== undefined
  })
}

/**
 * Handles a stored event: reads its object afresh and brings the payment to it. Types that say nothing new are only marked.
 *
 * @param db database
 * @param provider the payment provider
 * @param input the event's id and the instant
 */
export async function handlePaymentEvent(db: Database, provider: Payments, input: { eventId: string, now: Date }): Promise<void> {
  const [event] = await db.select().from(paymentEvents).where(eq(paymentEvents.id, input.eventId))
  if (!event || event.processedAt) return
  if (event.type.startsWith('checkout.session.')) await settleCheckout(db, provider, { sessionId: event.objectId, now: input.now })
  await db.update(paymentEvents).set({ processedAt: input.now }).where(eq(paymentEvents.id, event.id))
}
