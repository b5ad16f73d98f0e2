import type Stripe from 'stripe'
import { ApiError, invalid } from './errors'
import type { CardChoice, PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

// The SDK's types list every field of the real objects; the fake fills those the product reads, hence the narrowing casts here.

/** Makes a customer. */
export function createCustomer(store: PaymentsStore, facts: { email?: string, name?: string, metadata: Record<string, string> }): Stripe.Customer {
  const customer = { id: store.newId('cus'), object: 'customer', created: store.nowS(), livemode: false, email: facts.email ?? null, name: facts.name ?? null, metadata: facts.metadata, invoice_settings: { default_payment_method: null } } as unknown as Stripe.Customer
  store.customers.set(customer.id, customer)
  return customer
}

/** What a payment intent is made from. */
export interface IntentFacts { amount: number, currency: string, customer: string | null, description: string | null, metadata: Record<string, string>, savesCard: boolean }

/** Makes a payment intent that still wants a card. */
export function createIntent(store: PaymentsStore, webhooks: Webhooks, facts: IntentFacts): Stripe.PaymentIntent {
  if (!Number.isInteger(facts.amount) || facts.amount < 50) throw new ApiError(400, { type: 'invalid_request_error', code: 'amount_too_small', message: 'Amount must be at least 50.', param: 'amount' })
  const intent = {
    id: store.newId('pi'), object: 'payment_intent', created: store.nowS(), livemode: false, amount: facts.amount, amount_received: 0, currency: facts.currency, customer: facts.customer,
    description: facts.description, metadata: facts.metadata, status: 'requires_payment_method', payment_method: null, latest_charge: null, last_payment_error: null, next_action: null,
    setup_future_usage: facts.savesCard ? 'off_session' : null, capture_method: 'automatic', confirmation_method: 'automatic', client_secret: store.newId('secret'), payment_method_types: ['card'],
  } as unknown as Stripe.PaymentIntent
  store.intents.set(intent.id, intent)
  webhooks.emit('payment_intent.created', intent)
  return intent
}

/** Tries an intent with a card that pays, is declined, or wants the bank's confirmation. */
export function confirmIntent(store: PaymentsStore, webhooks: Webhooks, intent: Stripe.PaymentIntent, card: CardChoice, paymentMethodId?: string): Stripe.PaymentIntent {
  if (intent.status === 'succeeded' || intent.status === 'canceled') throw new ApiError(400, { type: 'invalid_request_error', code: 'payment_intent_unexpected_state', message: `This PaymentIntent's status is ${intent.status}.`, payment_intent: intent })
  if (card === 'challenge') {
    Object.assign(intent, { status: 'requires_action', next_action: { type: 'use_stripe_sdk' } })
    webhooks.emit('payment_intent.requires_action', intent)
    return intent
  }
  const method = paymentMethodId ? store.paymentMethods.get(paymentMethodId) ?? newCard(store, intent) : newCard(store, intent)
  const charge = {
    id: store.newId('ch'), object: 'charge', created: store.nowS(), livemode: false, amount: intent.amount, amount_refunded: 0, currency: intent.currency, customer: intent.customer, payment_intent: intent.id,
    payment_method: method.id, paid: card === 'pay', captured: card === 'pay', refunded: false, status: card === 'pay' ? 'succeeded' : 'failed', metadata: intent.metadata,
    failure_code: card === 'pay' ? null : 'card_declined', failure_message: card === 'pay' ? null : 'Your card was declined.',
  } as unknown as Stripe.Charge
  store.charges.set(charge.id, charge)
  if (card === 'decline') {
    Object.assign(intent, { status: 'requires_payment_method', latest_charge: charge.id, last_payment_error: { type: 'card_error', code: 'card_declined', decline_code: 'generic_decline', message: 'Your card was declined.' } })
    webhooks.emit('charge.failed', charge)
    webhooks.emit('payment_intent.payment_failed', intent)
    return intent
  }
  Object.assign(intent, { status: 'succeeded', amount_received: intent.amount, latest_charge: charge.id, payment_method: method.id, last_payment_error: null, next_action: null })
  webhooks.emit('charge.succeeded', charge)
  webhooks.emit('payment_intent.succeeded', intent)
  return intent
}

function newCard(store: PaymentsStore, intent: Stripe.PaymentIntent): Stripe.PaymentMethod {
  const method = { id: store.newId('pm'), object: 'payment_method', created: store.nowS(), livemode: false, type: 'card', customer: intent.setup_future_usage ? intent.customer : null, card: { brand: 'visa', last4: '4242', exp_month: 12, exp_year: 2099 } } as unknown as Stripe.PaymentMethod
  store.paymentMethods.set(method.id, method)
  return method
}

/** Pays an amount of a succeeded intent back. */
export function createRefund(store: PaymentsStore, webhooks: Webhooks, intent: Stripe.PaymentIntent, amount: number | undefined, metadata: Record<string, string>): Stripe.Refund {
  const charge = typeof intent.latest_charge === 'string' ? store.charges.get(intent.latest_charge) : undefined
  if (intent.status !== 'succeeded' || !charge) throw invalid('This PaymentIntent does not have a successful charge to refund.', 'payment_intent')
  const left = charge.amount - charge.amount_refunded
  const wanted = amount ?? left
  if (!Number.isInteger(wanted) || wanted <= 0 || wanted > left) throw new ApiError(400, { type: 'invalid_request_error', code: 'charge_already_refunded', message: `Refund amount (${wanted}) is greater than unrefunded amount on charge (${left})`, param: 'amount' })
  charge.amount_refunded += wanted
  charge.refunded = charge.amount_refunded === charge.amount
  const refund = { id: store.newId('re'), object: 'refund', created: store.nowS(), amount: wanted, currency: charge.currency, charge: charge.id, payment_intent: intent.id, status: 'succeeded', reason: null, metadata } as unknown as Stripe.Refund
  store.refunds.set(refund.id, refund)
  webhooks.emit('refund.created', refund)
  webhooks.emit('charge.refunded', charge)
  return refund
}
