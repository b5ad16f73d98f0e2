import type Stripe from 'stripe'
import { ApiError, invalid } from './errors'
import { type FormValue, textAt, textsAt } from './form'
import { confirmIntent, createCustomer, createIntent } from './objects'
import type { CardChoice, PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

const SHORTEST_S = 30 * 60
const LONGEST_S = 24 * 3600

/** Makes a hosted checkout session in payment mode. */
export function createSession(store: PaymentsStore, form: Record<string, FormValue>, payPage: (id: string) => string): Stripe.Checkout.Session {
  if (textAt(form, 'mode') !== 'payment') throw invalid('Only mode=payment is known here.', 'mode')
  const successUrl = textAt(form, 'success_url')
  if (!successUrl) throw invalid('Missing required param: success_url.', 'success_url')
  const items = Array.isArray(form.line_items) ? form.line_items : []
  if (items.length === 0) throw invalid('Missing required param: line_items.', 'line_items')
  const amount = items.reduce<number>((sum, item) => sum + Number(textAt(item, 'price_data', 'unit_amount')) * Number(textAt(item, 'quantity') ?? 1), 0)
  const currency = textAt(items[0], 'price_data', 'currency') ?? 'eur'
  if (!Number.isInteger(amount) || amount < 50) throw new ApiError(400, { type: 'invalid_request_error', code: 'amount_too_small', message: 'The Checkout Session\'s total amount must be at least 50.', param: 'line_items' })
  const expiresAt = Number(textAt(form, 'expires_at') ?? store.nowS() + LONGEST_S)
  if (expiresAt < store.nowS() + SHORTEST_S - 60 || expiresAt > store.nowS() + LONGEST_S + 60) throw invalid('The `expires_at` timestamp must be between 30 minutes and 24 hours from now.', 'expires_at')
  const customer = textAt(form, 'customer') ?? createCustomer(store, { email: textAt(form, 'customer_email'), metadata: {} }).id
  const id = store.newId('cs_test')
  const session = {
    id, object: 'checkout.session', created: store.nowS(), livemode: false, mode: 'payment', status: 'open', payment_status: 'unpaid', amount_total: amount, amount_subtotal: amount, currency, customer,
    customer_email: textAt(form, 'customer_email') ?? null, client_reference_id: textAt(form, 'client_reference_id') ?? null, metadata: textsAt(form, 'metadata'), success_url: successUrl, cancel_url: textAt(form, 'cancel_url') ?? null,
    expires_at: expiresAt, payment_intent: null, url: payPage(id),
    // Kept for the pay page and the intent; the real object does not show them.
    fake: { title: items.map(item => textAt(item, 'price_data', 'product_data', 'name') ?? 'Payment').join(', '), savesCard: textAt(form, 'payment_intent_data', 'setup_future_usage') === 'off_session', intentMetadata: textsAt(form.payment_intent_data, 'metadata') },
  } as unknown as Stripe.Checkout.Session
  store.sessions.set(id, session)
  return session
}

/** What only the fake knows of a session. */
export function fakeFacts(session: Stripe.Checkout.Session): { title: string, savesCard: boolean, intentMetadata: Record<string, string> } {
  return (session as unknown as { fake: { title: string, savesCard: boolean, intentMetadata: Record<string, string> } }).fake
}

/** Ends sessions whose time is over. */
export function expireOverdue(store: PaymentsStore, webhooks: Webhooks) {
  for (const session of store.sessions.values()) if (session.status === 'open' && session.expires_at <= store.nowS()) expireSession(store, webhooks, session)
}

/** Ends an open session. */
export function expireSession(store: PaymentsStore, webhooks: Webhooks, session: Stripe.Checkout.Session): Stripe.Checkout.Session {
  if (session.status !== 'open') throw invalid('Only Checkout Sessions with a status in ["open"] can be expired.')
  session.status = 'expired'
  session.url = null
  webhooks.emit('checkout.session.expired', session)
  return session
}

/** What the payer does on the hosted page. */
export function payOnPage(store: PaymentsStore, webhooks: Webhooks, session: Stripe.Checkout.Session, card: CardChoice): Stripe.PaymentIntent {
  const facts = fakeFacts(session)
  const existing = typeof session.payment_intent === 'string' ? store.intents.get(session.payment_intent) : undefined
  const intent = existing ?? createIntent(store, webhooks, {
    amount: session.amount_total ?? 0, currency: session.currency ?? 'eur', customer: typeof session.customer === 'string' ? session.customer : null, description: facts.title, metadata: facts.intentMetadata, savesCard: facts.savesCard,
  })
  session.payment_intent = intent.id
  confirmIntent(store, webhooks, intent, card)
  if (intent.status === 'succeeded') {
    Object.assign(session, { status: 'complete', payment_status: 'paid', url: null })
    webhooks.emit('checkout.session.completed', session)
  }
  return intent
}
