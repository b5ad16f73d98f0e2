import type Stripe from 'stripe'
import { ApiError, find, invalid } from './errors'
import { amountOf, type Form, onlyKnown, requiredText, textAt, textsAt } from './form'
import { confirmIntent, createIntent, idOf, refuseConfirmation } from './objects'
import type { PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

const KNOWN = ['amount', 'currency', 'customer', 'payment_method', 'off_session', 'confirm', 'description', 'metadata', 'payment_method_types', 'setup_future_usage', 'receipt_email']

/** Makes a payment intent, and confirms it at once when asked: so a saved card is charged while its owner is away. */
export function createPaymentIntent(store: PaymentsStore, webhooks: Webhooks, form: Form): Stripe.PaymentIntent {
  onlyKnown(form, KNOWN)
  const amount = amountOf(requiredText(form, 'amount'), 'amount')
  const currency = requiredText(form, 'currency')
  const customer = textAt(form, 'customer') ?? null
  if (customer) find(store.customers, 'customer', customer)
  const confirms = textAt(form, 'confirm') === 'true'
  const method = confirms ? cardOf(store, textAt(form, 'payment_method'), customer) : null
  const intent = createIntent(store, webhooks, { amount, currency, customer, description: textAt(form, 'description') ?? null, metadata: textsAt(form, 'metadata'), savesCard: textAt(form, 'setup_future_usage') === 'off_session' })
  if (!method) return intent
  return confirmApi(store, webhooks, intent, { methodId: method.id, isOffSession: textAt(form, 'off_session') === 'true' })
}

/** Confirms an intent by the API; a decline is an error of its own, as at the provider. */
export function confirmPaymentIntent(store: PaymentsStore, webhooks: Webhooks, intent: Stripe.PaymentIntent, form: Form): Stripe.PaymentIntent {
  onlyKnown(form, ['payment_method', 'off_session', 'return_url'])
  const method = cardOf(store, textAt(form, 'payment_method') ?? idOf(intent.payment_method) ?? undefined, idOf(intent.customer))
  return confirmApi(store, webhooks, intent, { methodId: method.id, isOffSession: textAt(form, 'off_session') === 'true' })
}

function confirmApi(store: PaymentsStore, webhooks: Webhooks, intent: Stripe.PaymentIntent, { methodId, isOffSession }: { methodId: string, isOffSession: boolean }): Stripe.PaymentIntent {
  // Off session nobody can confirm: the provider turns the challenge into a refusal of this attempt.
  if (store.savedCard === 'challenge' && isOffSession) refuseConfirmation(webhooks, intent, true)
  else confirmIntent(store, webhooks, intent, store.savedCard, methodId)
  const error = intent.last_payment_error
  if (intent.status !== 'requires_payment_method' || !error) return intent
  throw new ApiError(402, { type: 'card_error', code: error.code, decline_code: error.decline_code, message: error.message ?? 'Your card was declined.', payment_intent: structuredClone(intent) })
}

function cardOf(store: PaymentsStore, id: string | undefined, customer: string | null): Stripe.PaymentMethod {
  if (!id) throw invalid('You cannot confirm this PaymentIntent because it\'s missing a payment method.', 'payment_method', 'payment_intent_unexpected_state')
  const method = find(store.paymentMethods, 'payment_method', id)
  if (idOf(method.customer) !== customer) throw invalid('The PaymentMethod you provided is not attached to this customer.', 'payment_method')
  return method
}
