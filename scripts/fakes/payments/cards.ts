import type Stripe from 'stripe'
import { find } from './errors'
import { type Form, onlyKnown, requiredText, textAt, textsAt } from './form'
import { idOf, newCard } from './objects'
import { objectOf, type PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

/** Keeps a card with a customer. */
export function attachCard(store: PaymentsStore, webhooks: Webhooks, method: Stripe.PaymentMethod, form: Form): Stripe.PaymentMethod {
  onlyKnown(form, ['customer'])
  method.customer = find(store.customers, 'customer', requiredText(form, 'customer')).id
  webhooks.emit('payment_method.attached', method)
  return method
}

/** Takes a card from its customer. */
export function detachCard(webhooks: Webhooks, method: Stripe.PaymentMethod): Stripe.PaymentMethod {
  method.customer = null
  webhooks.emit('payment_method.detached', method)
  return method
}

/** Makes a card without a page, as the SDK does with a test token. */
export function createCard(store: PaymentsStore, form: Form): Stripe.PaymentMethod {
  onlyKnown(form, ['type', 'card', 'metadata'])
  return Object.assign(newCard(store, null), { metadata: textsAt(form, 'metadata') })
}

/** Keeps a card for later without charging it. */
export function createSetupIntent(store: PaymentsStore, webhooks: Webhooks, form: Form): Stripe.SetupIntent {
  onlyKnown(form, ['customer', 'payment_method', 'confirm', 'usage', 'metadata', 'payment_method_types'])
  const customer = textAt(form, 'customer') ?? null
  const methodId = textAt(form, 'payment_method')
  const method = methodId ? find(store.paymentMethods, 'payment_method', methodId) : null
  const isDone = method !== null && textAt(form, 'confirm') === 'true'
  const setup = objectOf<Stripe.SetupIntent>({
    id: store.newId('seti'), object: 'setup_intent', created: store.nowS(), livemode: false, customer, payment_method: method?.id ?? null, usage: 'off_session', metadata: textsAt(form, 'metadata'), payment_method_types: ['card'],
    status: isDone ? 'succeeded' : method ? 'requires_confirmation' : 'requires_payment_method',
  })
  store.setupIntents.set(setup.id, setup)
  if (isDone) {
    if (customer && idOf(method.customer) === null) Object.assign(method, { customer })
    webhooks.emit('setup_intent.succeeded', setup)
  }
  return setup
}
