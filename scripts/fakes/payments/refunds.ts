import type Stripe from 'stripe'
import { ApiError, find, invalid } from './errors'
import { type Form, onlyKnown, textAt, textsAt } from './form'
import { idOf } from './objects'
import { objectOf, type PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

/** Pays an amount of a succeeded charge back. */
export function createRefund(store: PaymentsStore, webhooks: Webhooks, form: Form): Stripe.Refund {
  onlyKnown(form, ['payment_intent', 'charge', 'amount', 'metadata', 'reason'])
  const charge = chargeToRefund(store, form)
  const left = charge.amount - charge.amount_refunded
  const asked = textAt(form, 'amount')
  if (asked !== undefined && !/^[1-9]\d*$/.test(asked)) throw invalid(`Invalid positive integer: ${asked}`, 'amount', 'parameter_invalid_integer')
  const amount = asked === undefined ? left : Number(asked)
  if (left === 0) throw invalid(`Charge ${charge.id} has already been refunded.`, undefined, 'charge_already_refunded')
  if (amount > left) throw invalid(`Refund amount (${amount}) is greater than unrefunded amount on charge (${left})`, 'amount')
  const fails = store.refundChoice === 'fail'
  const refund = objectOf<Stripe.Refund>({
    id: store.newId('re'), object: 'refund', created: store.nowS(), amount, currency: charge.currency, charge: charge.id, payment_intent: idOf(charge.payment_intent), status: fails ? 'pending' : 'succeeded', reason: null, metadata: textsAt(form, 'metadata'),
  })
  store.refunds.set(refund.id, refund)
  book(charge, amount)
  const answer = structuredClone(refund)
  webhooks.emit('refund.created', refund)
  webhooks.emit('charge.refunded', charge)
  if (fails) {
    // The card's bank sends the money back: the charge counts as not refunded again.
    Object.assign(refund, { status: 'failed', failure_reason: 'lost_or_stolen_card' })
    book(charge, -amount)
    webhooks.emit('refund.failed', refund)
  }
  return answer
}

function chargeToRefund(store: PaymentsStore, form: Form): Stripe.Charge {
  const chargeId = textAt(form, 'charge')
  if (chargeId) return find(store.charges, 'charge', chargeId)
  const intent = find(store.intents, 'payment_intent', textAt(form, 'payment_intent'))
  if (intent.status !== 'succeeded') throw new ApiError(400, { type: 'invalid_request_error', message: 'This PaymentIntent does not have a successful charge to refund.', param: 'payment_intent' })
  return find(store.charges, 'charge', idOf(intent.latest_charge) ?? '')
}

function book(charge: Stripe.Charge, amount: number) {
  charge.amount_refunded += amount
  charge.refunded = charge.amount_refunded === charge.amount
}
