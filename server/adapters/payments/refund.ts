import type Stripe from 'stripe'
import type { RefundRequest } from './types'

/** Pays money back to the card of a paid intent. */
export async function refund(stripe: Stripe, { intentId, amountMinor, metadata, idempotencyKey }: RefundRequest): Promise<{ refundId: string, isDone: boolean }> {
  const made = await stripe.refunds.create({ payment_intent: intentId, amount: amountMinor, metadata }, { idempotencyKey })
  return { refundId: made.id, isDone: made.status === 'succeeded' }
}
