import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import type Stripe from 'stripe'
import type { PaymentsStore } from './store'

const MAPS = ['customers', 'sessions', 'intents', 'charges', 'refunds', 'paymentMethods', 'answers'] as const

/** Brings a store to what was kept in a file, so that the fake remembers payments over a restart as the real provider does. */
export function loadState(file: string, store: PaymentsStore) {
  if (!existsSync(file)) return
  const kept = JSON.parse(readFileSync(file, 'utf8')) as Record<string, [string, never][]>
  for (const name of MAPS) for (const [id, object] of kept[name] ?? []) store[name].set(id, object)
}

/** Keeps a store in a file. */
export function saveState(file: string, store: PaymentsStore) {
  writeFileSync(file, JSON.stringify(Object.fromEntries(MAPS.map(name => [name, [...store[name]]]))))
}

/** A payment that the seed says was made before the fake was started. */
export interface PastPayment { intentId: string, amountMinor: number, currency: string, runId: string }

/** Adds past payments with saved cards to a store. */
export function addPastPayments(store: PaymentsStore, past: readonly PastPayment[]) {
  for (const { intentId, amountMinor, currency, runId } of past) {
    const [customer, method, charge] = [`cus_${intentId}`, `pm_${intentId}`, `ch_${intentId}`]
    store.customers.set(customer, { id: customer, object: 'customer' } as unknown as Stripe.Customer)
    store.paymentMethods.set(method, { id: method, object: 'payment_method', type: 'card', customer } as unknown as Stripe.PaymentMethod)
    store.charges.set(charge, { id: charge, object: 'charge', amount: amountMinor, amount_refunded: 0, currency: currency.toLowerCase(), paid: true, refunded: false, customer, payment_intent: intentId, payment_method: method, metadata: { runId } } as unknown as Stripe.Charge)
    store.intents.set(intentId, { id: intentId, object: 'payment_intent', status: 'succeeded', amount: amountMinor, amount_received: amountMinor, currency: currency.toLowerCase(), customer, payment_method: method, latest_charge: charge, metadata: { runId, kind: 'deposit' } } as unknown as Stripe.PaymentIntent)
  }
}
