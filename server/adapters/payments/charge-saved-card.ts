import Stripe from 'stripe'
import { DomainError } from '#shared/errors'
import { idOf } from './checkout'
import type { ChargeOutcome, SavedCardCharge } from './types'

const CONFIRM = 'The bank asks for a confirmation.'

/** Charges the card that paid an earlier intent while its owner is away. A decline is an outcome, not an error. */
export async function chargeSavedCard(stripe: Stripe, request: SavedCardCharge): Promise<ChargeOutcome> {
  const paid = await findIntent(stripe, request.paidIntentId)
  if (!paid) return { state: 'declined', intentId: null, reason: 'The payment provider does not know the deposit any more.' }
  const { customer, method } = savedCard(paid)
  if (!customer || !method) return { state: 'declined', intentId: null, reason: 'No card was saved with the deposit.' }
  try {
    const intent = await stripe.paymentIntents.create({
      amount: request.amountMinor, currency: request.currency.toLowerCase(), customer, payment_method: method, off_session: true, confirm: true, description: request.description, metadata: request.metadata,
    }, { idempotencyKey: request.idempotencyKey })
    // The answer kept under the key may be older than the charge.
    return toOutcome(intent.status === 'processing' ? await stripe.paymentIntents.retrieve(intent.id) : intent)
  }
  catch (error) {
    if (!(error instanceof Stripe.errors.StripeCardError)) throw error
    const intentId = error.payment_intent?.id ?? null
    return error.code === 'authentication_required'
      ? { state: 'requires-action', intentId, reason: CONFIRM }
      : { state: 'declined', intentId, reason: 'The saved card was declined.' }
  }
}

/** A card that was used once without being kept belongs to no customer. */
function savedCard(paid: Stripe.PaymentIntent): { customer: string | null, method: string | null } {
  const customer = idOf(paid.customer)
  const method = typeof paid.payment_method === 'object' ? paid.payment_method : null
  return { customer, method: method && idOf(method.customer) === customer ? method.id : null }
}

async function findIntent(stripe: Stripe, intentId: string): Promise<Stripe.PaymentIntent | null> {
  try {
    return await stripe.paymentIntents.retrieve(intentId, { expand: ['payment_method'] })
  }
  catch (error) {
    if (error instanceof Stripe.errors.StripeInvalidRequestError && error.code === 'resource_missing') return null
    throw error
  }
}

function toOutcome(intent: Stripe.PaymentIntent): ChargeOutcome {
  switch (intent.status) {
    case 'succeeded': return { state: 'succeeded', intentId: intent.id }
    case 'requires_action': return { state: 'requires-action', intentId: intent.id, reason: CONFIRM }
    case 'processing': throw new DomainError('unavailable', 'The charge of the saved card is not decided yet. It is asked for again.')
    default: return { state: 'declined', intentId: intent.id, reason: 'The saved card was declined.' }
  }
}
