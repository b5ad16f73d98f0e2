import type Stripe from 'stripe'
import { find, invalid } from './errors'
import { amountOf, type Form, onlyKnown, requiredText, textAt, textsAt } from './form'
import { cancelIntent, confirmIntent, createCustomer, createIntent, idOf, refuseConfirmation } from './objects'
import { type CardChoice, objectOf, type PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

const SHORTEST_S = 30 * 60
const LONGEST_S = 24 * 3600
/** Clocks of the asker and the provider differ a little. */
const CLOCK_S = 60
const KNOWN = ['mode', 'line_items', 'customer', 'customer_email', 'customer_creation', 'client_reference_id', 'metadata', 'payment_intent_data', 'success_url', 'cancel_url', 'expires_at', 'payment_method_types', 'locale']

/** Makes a hosted checkout session in payment mode. */
export function createSession(store: PaymentsStore, form: Form, payPage: (id: string) => string): Stripe.Checkout.Session {
  onlyKnown(form, KNOWN)
  if (requiredText(form, 'mode') !== 'payment') throw invalid('Only mode=payment is known here.', 'mode')
  const successUrl = requiredText(form, 'success_url')
  const items = readItems(store, form)
  const amount = items.reduce((sum, item) => sum + item.amount_total, 0)
  const currency = items[0]!.currency
  const expiresAt = Number(textAt(form, 'expires_at') ?? store.nowS() + LONGEST_S)
  if (!(expiresAt >= store.nowS() + SHORTEST_S - CLOCK_S && expiresAt <= store.nowS() + LONGEST_S + CLOCK_S)) throw invalid('The `expires_at` timestamp must be between 30 minutes and 24 hours from now.', 'expires_at')
  const id = store.newId('cs_test')
  const session = objectOf<Stripe.Checkout.Session>({
    id, object: 'checkout.session', created: store.nowS(), livemode: false, mode: 'payment', status: 'open', payment_status: 'unpaid', amount_total: amount, amount_subtotal: amount, currency, customer: customerOf(store, form),
    customer_email: textAt(form, 'customer_email') ?? null, client_reference_id: textAt(form, 'client_reference_id') ?? null, metadata: textsAt(form, 'metadata'), success_url: successUrl, cancel_url: textAt(form, 'cancel_url') ?? null,
    expires_at: expiresAt, payment_intent: null, setup_intent: null, url: payPage(id),
  })
  store.sessions.set(id, session)
  store.sessionFacts.set(id, {
    title: items.map(item => item.description).join(', '), savesCard: textAt(form, 'payment_intent_data', 'setup_future_usage') === 'off_session', intentMetadata: textsAt(form.payment_intent_data, 'metadata'), items,
  })
  return session
}

function readItems(store: PaymentsStore, form: Form): Stripe.LineItem[] {
  const given = Array.isArray(form.line_items) ? form.line_items : []
  if (given.length === 0) throw invalid('Missing required param: line_items.', 'line_items', 'parameter_missing')
  return given.map((item, index) => {
    const currency = textAt(item, 'price_data', 'currency')
    if (!currency || !/^[a-z]{3}$/.test(currency)) throw invalid(`Invalid currency: ${currency ?? ''}`, `line_items[${index}][price_data][currency]`)
    const quantity = Number(textAt(item, 'quantity') ?? 1)
    if (!Number.isInteger(quantity) || quantity < 1) throw invalid('Invalid positive integer.', `line_items[${index}][quantity]`)
    const total = amountOf(textAt(item, 'price_data', 'unit_amount'), `line_items[${index}][price_data][unit_amount]`) * quantity
    return objectOf<Stripe.LineItem>({ id: store.newId('li'), object: 'item', amount_subtotal: total, amount_total: total, currency, quantity, description: textAt(item, 'price_data', 'product_data', 'name') ?? 'Payment' })
  })
}

function customerOf(store: PaymentsStore, form: Form): string | null {
  const customer = textAt(form, 'customer')
  if (customer) return find(store.customers, 'customer', customer).id
  return textAt(form, 'customer_creation') === 'always' ? createCustomer(store, { email: textAt(form, 'customer_email'), metadata: {} }).id : null
}

/** Ends sessions whose time is over. */
export function expireOverdue(store: PaymentsStore, webhooks: Webhooks) {
  for (const session of store.sessions.values()) if (session.status === 'open' && session.expires_at <= store.nowS()) expireSession(store, webhooks, session)
}

/** Ends an open session. */
export function expireSession(store: PaymentsStore, webhooks: Webhooks, session: Stripe.Checkout.Session): Stripe.Checkout.Session {
  if (session.status !== 'open') throw invalid(`Only Checkout Sessions with a status in ["open"] can be expired. This one has a status of ${session.status}.`)
  Object.assign(session, { status: 'expired', url: null })
  const intent = store.intents.get(idOf(session.payment_intent) ?? '')
  if (intent) cancelIntent(store, webhooks, intent)
  webhooks.emit('checkout.session.expired', session)
  return session
}

/** What the payer does on the hosted page, or on the page of the bank. */
export function payOnPage(store: PaymentsStore, webhooks: Webhooks, session: Stripe.Checkout.Session, card: CardChoice | 'refuse'): Stripe.PaymentIntent {
  const facts = store.sessionFacts.get(session.id)!
  const intent = store.intents.get(idOf(session.payment_intent) ?? '') ?? createIntent(store, webhooks, {
    amount: session.amount_total ?? 0, currency: session.currency ?? 'eur', customer: idOf(session.customer), description: facts.title, metadata: facts.intentMetadata, savesCard: facts.savesCard,
  })
  session.payment_intent = intent.id
  if (card === 'refuse') return refuseConfirmation(webhooks, intent, false)
  confirmIntent(store, webhooks, intent, card)
  if (intent.status === 'succeeded') {
    Object.assign(session, { status: 'complete', payment_status: 'paid', url: null })
    webhooks.emit('checkout.session.completed', session)
  }
  return intent
}
