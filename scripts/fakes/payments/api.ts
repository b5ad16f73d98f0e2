import { attachCard, createCard, createSetupIntent, detachCard } from './cards'
import { ApiError, find } from './errors'
import { type Form, onlyKnown, textAt, textsAt } from './form'
import { confirmPaymentIntent, createPaymentIntent } from './intents'
import { cancelIntent, createCustomer, idOf } from './objects'
import { createRefund } from './refunds'
import { expanded, pageOf } from './reply'
import { createSession, expireOverdue, expireSession } from './sessions'
import type { PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

/** A request to the API: its path after `/v1/`, and the parameters of body and query together. */
export interface ApiRequest { method: string, path: string, form: Form }

/** What an endpoint works with. */
interface Context { store: PaymentsStore, webhooks: Webhooks, payPage: (id: string) => string, form: Form, id: string }

const is = (form: Form, key: string, value: string | null) => textAt(form, key) === undefined || textAt(form, key) === value

/** The endpoints by method and path; `:id` stands for the object's id. */
const ENDPOINTS: Readonly<Record<string, (context: Context) => unknown>> = {
  'POST customers': ({ store, form }) => {
    onlyKnown(form, ['email', 'name', 'metadata', 'description'])
    return createCustomer(store, { email: textAt(form, 'email'), name: textAt(form, 'name'), metadata: textsAt(form, 'metadata') })
  },
  'GET customers': ({ store, form }) => pageOf(store.customers.values(), '/v1/customers', form, customer => is(form, 'email', customer.email)),
  'GET customers/:id': ({ store, id }) => find(store.customers, 'customer', id),

  'POST checkout/sessions': ({ store, form, payPage }) => createSession(store, form, payPage),
  'GET checkout/sessions': ({ store, form }) => pageOf(store.sessions.values(), '/v1/checkout/sessions', form, session => is(form, 'status', session.status) && is(form, 'payment_intent', idOf(session.payment_intent)) && is(form, 'customer', idOf(session.customer))),
  'GET checkout/sessions/:id': ({ store, id }) => find(store.sessions, 'checkout.session', id),
  'POST checkout/sessions/:id/expire': ({ store, webhooks, id }) => expireSession(store, webhooks, find(store.sessions, 'checkout.session', id)),
  'GET checkout/sessions/:id/line_items': ({ store, form, id }) => pageOf(store.sessionFacts.get(find(store.sessions, 'checkout.session', id).id)?.items ?? [], `/v1/checkout/sessions/${id}/line_items`, form),

  'POST payment_intents': ({ store, webhooks, form }) => createPaymentIntent(store, webhooks, form),
  'GET payment_intents': ({ store, form }) => pageOf(store.intents.values(), '/v1/payment_intents', form, intent => is(form, 'customer', idOf(intent.customer))),
  'GET payment_intents/:id': ({ store, id }) => find(store.intents, 'payment_intent', id),
  'POST payment_intents/:id/confirm': ({ store, webhooks, form, id }) => confirmPaymentIntent(store, webhooks, find(store.intents, 'payment_intent', id), form),
  'POST payment_intents/:id/cancel': ({ store, webhooks, id }) => cancelIntent(store, webhooks, find(store.intents, 'payment_intent', id)),

  'POST setup_intents': ({ store, webhooks, form }) => createSetupIntent(store, webhooks, form),
  'GET setup_intents/:id': ({ store, id }) => find(store.setupIntents, 'setup_intent', id),

  'POST payment_methods': ({ store, form }) => createCard(store, form),
  'GET payment_methods': ({ store, form }) => pageOf(store.paymentMethods.values(), '/v1/payment_methods', form, method => is(form, 'customer', idOf(method.customer))),
  'GET payment_methods/:id': ({ store, id }) => find(store.paymentMethods, 'payment_method', id),
  'POST payment_methods/:id/attach': ({ store, webhooks, form, id }) => attachCard(store, webhooks, find(store.paymentMethods, 'payment_method', id), form),
  'POST payment_methods/:id/detach': ({ store, webhooks, id }) => detachCard(webhooks, find(store.paymentMethods, 'payment_method', id)),

  'GET charges': ({ store, form }) => pageOf(store.charges.values(), '/v1/charges', form, charge => is(form, 'payment_intent', idOf(charge.payment_intent))),
  'GET charges/:id': ({ store, id }) => find(store.charges, 'charge', id),

  'POST refunds': ({ store, webhooks, form }) => createRefund(store, webhooks, form),
  'GET refunds': ({ store, form }) => pageOf(store.refunds.values(), '/v1/refunds', form, refund => is(form, 'payment_intent', idOf(refund.payment_intent))),
  'GET refunds/:id': ({ store, id }) => find(store.refunds, 'refund', id),

  'GET events': ({ store, form }) => pageOf(store.events.values(), '/v1/events', form, event => is(form, 'type', event.type) && event.created >= Number(textAt(form, 'created', 'gte') ?? 0)),
  'GET events/:id': ({ store, id }) => find(store.events, 'event', id),
}

/** Answers one request of the provider's API, or throws its error. */
export function answerApi(store: PaymentsStore, webhooks: Webhooks, payPage: (id: string) => string, { method, path, form }: ApiRequest): unknown {
  expireOverdue(store, webhooks)
  const [, kind = '', id = '', verb = ''] = /^(checkout\/sessions|[a-z_]+)(?:\/([^/]+))?(?:\/([a-z_]+))?\/?$/.exec(path) ?? []
  const endpoint = ENDPOINTS[`${method} ${kind}${id ? '/:id' : ''}${verb ? `/${verb}` : ''}`]
  if (!endpoint) throw new ApiError(404, { type: 'invalid_request_error', message: `Unrecognized request URL (${method}: /v1/${path}).` })
  return expanded(store, endpoint({ store, webhooks, payPage, form, id: decodeURIComponent(id) }), form)
}
