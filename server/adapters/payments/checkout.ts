import Stripe from 'stripe'
import type { CheckoutRequest, CheckoutState } from './types'

/** Opens a hosted page for one amount. */
export async function createCheckout(stripe: Stripe, request: CheckoutRequest): Promise<CheckoutState> {
  return toState(await stripe.checkout.sessions.create({
    mode: 'payment',
    line_items: [{ quantity: 1, price_data: { currency: request.currency.toLowerCase(), unit_amount: request.amountMinor, product_data: { name: request.title } } }],
    ...(request.customerId ? { customer: request.customerId } : { customer_email: request.customerEmail, customer_creation: 'always' as const }),
    metadata: request.metadata,
    payment_intent_data: { metadata: request.metadata, ...(request.savesCard ? { setup_future_usage: 'off_session' as const } : {}) },
    success_url: request.successUrl, cancel_url: request.cancelUrl, expires_at: Math.floor(request.expiresAt.getTime() / 1000),
  }, { idempotencyKey: request.idempotencyKey }))
}

/** How a checkout stands now. */
export async function readCheckout(stripe: Stripe, sessionId: string): Promise<CheckoutState> {
  return toState(await stripe.checkout.sessions.retrieve(sessionId))
}

/** Ends an open checkout. */
export async function expireCheckout(stripe: Stripe, sessionId: string): Promise<CheckoutState> {
  try {
    return toState(await stripe.checkout.sessions.expire(sessionId, undefined, { idempotencyKey: `expire:${sessionId}` }))
  }
  catch (error) {
    // It was paid or expired a moment before: how it stands decides.
    if (error instanceof Stripe.errors.StripeInvalidRequestError) return readCheckout(stripe, sessionId)
    throw error
  }
}

function toState(session: Stripe.Checkout.Session): CheckoutState {
  return {
    sessionId: session.id,
    status: session.status === 'complete' ? 'complete' : session.status === 'expired' ? 'expired' : 'open',
    isPaid: session.payment_status === 'paid',
    url: session.url,
    intentId: idOf(session.payment_intent),
    customerId: idOf(session.customer),
  }
}

/** The id of a reference that may be expanded. */
export const idOf = (reference: string | { id: string } | null): string | null => typeof reference === 'string' ? reference : reference?.id ?? null
