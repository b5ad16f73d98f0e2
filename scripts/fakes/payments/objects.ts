import type Stripe from 'stripe'
import { ApiError, invalid } from './errors'
import { type CardChoice, objectOf, type PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

/** Makes a customer. */
export function createCustomer(store: PaymentsStore, facts: { email?: string, name?: string, metadata: Record<string, string> }): Stripe.Customer {
  if (facts.email !== undefined && !/^[^\s@]+@[^\s@]+$/.test(facts.email)) throw invalid(`Invalid email address: ${facts.email}`, 'email', 'email_invalid')
  const customer = objectOf<Stripe.Customer>({ id: store.newId('cus'), object: 'customer', created: store.nowS(), livemode: false, email: facts.email ?? null, name: facts.name ?? null, metadata: facts.metadata })
  store.customers.set(customer.id, customer)
  return customer
}

/** What a payment intent is made from. */
export interface IntentFacts { amount: number, currency: string, customer: string | null, description: string | null, metadata: Record<string, string>, savesCard: boolean }

/** Makes a payment intent that still wants a card. */
export function createIntent(store: PaymentsStore, webhooks: Webhooks, facts: IntentFacts): Stripe.PaymentIntent {
  const { savesCard, ...fields } = facts
  const id = store.newId('pi')
  const intent = objectOf<Stripe.PaymentIntent>({
    ...fields, id, object: 'payment_intent', created: store.nowS(), livemode: false, amount_received: 0, status: 'requires_payment_method', payment_method: null, latest_charge: null, last_payment_error: null,
    next_action: null, setup_future_usage: savesCard ? 'off_session' : null, capture_method: 'automatic', confirmation_method: 'automatic', client_secret: `${id}_secret_fake`, payment_method_types: ['card'],
  })
  store.intents.set(intent.id, intent)
  webhooks.emit('payment_intent.created', intent)
  return intent
}

const cardError = (code: string, message: string, declineCode?: string) =>
  objectOf<Stripe.PaymentIntent.LastPaymentError>({ type: 'card_error', code: code as Stripe.PaymentIntent.LastPaymentError.Code, message, ...(declineCode ? { decline_code: declineCode } : {}) })

/** Tries an intent with a card that pays, is declined, or wants the bank's confirmation. */
export function confirmIntent(store: PaymentsStore, webhooks: Webhooks, intent: Stripe.PaymentIntent, card: CardChoice, methodId?: string): Stripe.PaymentIntent {
  mustBeUnpaid(intent)
  const method = (methodId ? store.paymentMethods.get(methodId) : undefined) ?? newCard(store, intent.setup_future_usage ? idOf(intent.customer) : null)
  if (card === 'challenge') {
    Object.assign(intent, { status: 'requires_action', payment_method: method.id, next_action: { type: 'use_stripe_sdk' } })
    webhooks.emit('payment_intent.requires_action', intent)
    return intent
  }
  const isPaid = card === 'pay'
  const charge = objectOf<Stripe.Charge>({
    id: store.newId('ch'), object: 'charge', created: store.nowS(), livemode: false, amount: intent.amount, amount_refunded: 0, currency: intent.currency, customer: idOf(intent.customer), payment_intent: intent.id,
    payment_method: method.id, paid: isPaid, captured: isPaid, refunded: false, status: isPaid ? 'succeeded' : 'failed', metadata: intent.metadata, description: intent.description,
    failure_code: isPaid ? null : 'card_declined', failure_message: isPaid ? null : 'Your card was declined.',
  })
  store.charges.set(charge.id, charge)
  if (isPaid) {
    Object.assign(intent, { status: 'succeeded', amount_received: intent.amount, latest_charge: charge.id, payment_method: method.id, last_payment_error: null, next_action: null })
    if (intent.setup_future_usage && method.customer) webhooks.emit('payment_method.attached', method)
    webhooks.emit('charge.succeeded', charge)
    webhooks.emit('payment_intent.succeeded', intent)
    return intent
  }
  webhooks.emit('charge.failed', charge)
  intent.latest_charge = charge.id
  return failIntent(webhooks, intent, cardError('card_declined', 'Your card was declined.', 'generic_decline'))
}

/** The bank's confirmation was refused, or could not be asked for because nobody is there. */
export function refuseConfirmation(webhooks: Webhooks, intent: Stripe.PaymentIntent, isOffSession: boolean): Stripe.PaymentIntent {
  mustBeUnpaid(intent)
  return failIntent(webhooks, intent, isOffSession
    ? cardError('authentication_required', 'Your card was declined. This transaction requires authentication.', 'authentication_required')
    : cardError('payment_intent_authentication_failure', 'The payment could not be confirmed with the bank.'))
}

function failIntent(webhooks: Webhooks, intent: Stripe.PaymentIntent, error: Stripe.PaymentIntent.LastPaymentError): Stripe.PaymentIntent {
  Object.assign(intent, { status: 'requires_payment_method', payment_method: null, next_action: null, last_payment_error: error })
  webhooks.emit('payment_intent.payment_failed', intent)
  return intent
}

function mustBeUnpaid(intent: Stripe.PaymentIntent) {
  if (intent.status !== 'succeeded' && intent.status !== 'canceled') return
  throw new ApiError(400, { type: 'invalid_request_error', code: 'payment_intent_unexpected_state', message: `This PaymentIntent has a status of ${intent.status}.`, payment_intent: intent })
}

/** Ends an intent that was not paid. */
export function cancelIntent(store: PaymentsStore, webhooks: Webhooks, intent: Stripe.PaymentIntent): Stripe.PaymentIntent {
  mustBeUnpaid(intent)
  Object.assign(intent, { status: 'canceled', canceled_at: store.nowS(), next_action: null })
  webhooks.emit('payment_intent.canceled', intent)
  return intent
}

/** Makes a card, kept with a customer when one is given. */
export function newCard(store: PaymentsStore, customer: string | null): Stripe.PaymentMethod {
  const card = objectOf<Stripe.PaymentMethod.Card>({ brand: 'visa', last4: '4242', exp_month: 12, exp_year: 2099 })
  const method = objectOf<Stripe.PaymentMethod>({ id: store.newId('pm'), object: 'payment_method', created: store.nowS(), livemode: false, type: 'card', customer, card, metadata: {} })
  store.paymentMethods.set(method.id, method)
  return method
}

/** The id of a reference that may be expanded. */
export const idOf = (reference: string | { id: string } | null | undefined): string | null => typeof reference === 'string' ? reference : reference?.id ?? null
