import type Stripe from 'stripe'
import { ApiError, invalid, notFound } from './errors'
import { type FormValue, textAt, textsAt } from './form'
import { confirmIntent, createCustomer, createIntent, createRefund } from './objects'
import { createSession, expireOverdue, expireSession, fakeFacts } from './sessions'
import type { PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

/** A request to the API: its path after `/v1/`, in pieces. */
export interface ApiRequest { method: string, path: string[], form: Record<string, FormValue>, query: URLSearchParams }

const list = <T>(data: T[], url: string) => ({ object: 'list', url, has_more: false, data })

/** Answers one request of the provider's API, or throws its error. */
export function answerApi(store: PaymentsStore, webhooks: Webhooks, payPage: (id: string) => string, request: ApiRequest): unknown {
  expireOverdue(store, webhooks)
  const { method, path: [kind = '', id, verb], form, query } = request
  const route = `${method} ${kind}${id ? '/:id' : ''}${verb ? `/${verb}` : ''}`
  if (kind === 'checkout') return answerCheckout(store, webhooks, payPage, request)
  switch (route) {
    case 'POST customers': return createCustomer(store, { email: textAt(form, 'email'), name: textAt(form, 'name'), metadata: textsAt(form, 'metadata') })
    case 'GET customers/:id': return find(store.customers, 'customer', id)
    case 'POST payment_intents': return createPaymentIntent(store, webhooks, form)
    case 'GET payment_intents/:id': return find(store.intents, 'payment_intent', id)
    case 'POST payment_intents/:id/confirm': return confirmIntent(store, webhooks, find(store.intents, 'payment_intent', id), 'pay', textAt(form, 'payment_method'))
    case 'POST payment_intents/:id/cancel': return cancelIntent(webhooks, find(store.intents, 'payment_intent', id))
    case 'GET payment_methods/:id': return find(store.paymentMethods, 'payment_method', id)
    case 'GET charges/:id': return find(store.charges, 'charge', id)
    case 'POST refunds': {
      const intent = find(store.intents, 'payment_intent', textAt(form, 'payment_intent'))
      const amount = textAt(form, 'amount')
      return createRefund(store, webhooks, intent, amount === undefined ? undefined : Number(amount), textsAt(form, 'metadata'))
    }
    case 'GET refunds/:id': return find(store.refunds, 'refund', id)
    case 'GET events': {
      const limit = Math.min(100, Number(query.get('limit') ?? 10))
      const after = query.get('starting_after')
      const from = after ? store.events.findIndex(event => event.id === after) + 1 : 0
      return { ...list(store.events.slice(from, from + limit), '/v1/events'), has_more: store.events.length > from + limit }
    }
    case 'GET events/:id': {
      const event = store.events.find(candidate => candidate.id === id)
      if (!event) throw notFound('event', id ?? '')
      return event
    }
    default: throw new ApiError(404, { type: 'invalid_request_error', message: `Unrecognized request URL (${method}: /v1/${request.path.join('/')}).` })
  }
}

function answerCheckout(store: PaymentsStore, webhooks: Webhooks, payPage: (id: string) => string, { method, path: [, kind, id, verb], form }: ApiRequest): unknown {
  if (kind !== 'sessions') throw notFound('path', kind ?? '')
  if (method === 'POST' && !id) return show(createSession(store, form, payPage))
  const session = find(store.sessions, 'checkout.session', id)
  if (method === 'POST' && verb === 'expire') return show(expireSession(store, webhooks, session))
  if (method === 'GET' && verb === 'line_items') return list([{ id: store.newId('li'), object: 'item', amount_total: session.amount_total, currency: session.currency, description: fakeFacts(session).title, quantity: 1 }], `/v1/checkout/sessions/${id}/line_items`)
  return show(session)
}

function show(session: Stripe.Checkout.Session) {
  const { fake: _, ...shown } = session as unknown as { fake: unknown }
  return shown
}

function createPaymentIntent(store: PaymentsStore, webhooks: Webhooks, form: Record<string, FormValue>): Stripe.PaymentIntent {
  const methodId = textAt(form, 'payment_method')
  const intent = createIntent(store, webhooks, {
    amount: Number(textAt(form, 'amount')), currency: textAt(form, 'currency') ?? '', customer: textAt(form, 'customer') ?? null, description: textAt(form, 'description') ?? null, metadata: textsAt(form, 'metadata'), savesCard: false,
  })
  if (textAt(form, 'confirm') !== 'true') return intent
  const method = methodId ? store.paymentMethods.get(methodId) : undefined
  if (!method || method.customer !== intent.customer) throw invalid('The PaymentMethod is not attached to this customer.', 'payment_method')
  confirmIntent(store, webhooks, intent, store.savedCard, method.id)
  if (intent.status === 'requires_action') {
    // Off session nobody can confirm: the provider turns the challenge into a refusal of this attempt.
    Object.assign(intent, { status: 'requires_payment_method', next_action: null })
    throw new ApiError(402, { type: 'card_error', code: 'authentication_required', decline_code: 'authentication_required', message: 'Your card was declined. This transaction requires authentication.', payment_intent: intent })
  }
  if (intent.status !== 'succeeded') throw new ApiError(402, { type: 'card_error', code: 'card_declined', decline_code: 'generic_decline', message: 'Your card was declined.', payment_intent: intent })
  return intent
}

function cancelIntent(webhooks: Webhooks, intent: Stripe.PaymentIntent): Stripe.PaymentIntent {
  if (intent.status === 'succeeded') throw new ApiError(400, { type: 'invalid_request_error', code: 'payment_intent_unexpected_state', message: 'You cannot cancel this PaymentIntent because it has a status of succeeded.' })
  intent.status = 'canceled'
  webhooks.emit('payment_intent.canceled', intent)
  return intent
}

function find<T>(map: Map<string, T>, kind: string, id: string | undefined): T {
  const found = map.get(id ?? '')
  if (!found) throw notFound(kind, id ?? '')
  return found
}
