import { existsSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import type Stripe from 'stripe'
import { objectOf, type PaymentsStore } from './store'

const MAPS = ['customers', 'sessions', 'sessionFacts', 'intents', 'setupIntents', 'charges', 'refunds', 'paymentMethods', 'events', 'answers'] as const
const SAVE_AFTER_MS = 200

/** Brings a store to what was kept in a file, so that the fake remembers payments over a restart as the real provider does. */
export function loadState(file: string, store: PaymentsStore) {
  if (!existsSync(file)) return
  const kept = JSON.parse(readFileSync(file, 'utf8')) as Record<string, [string, never][]>
  for (const name of MAPS) for (const [id, object] of kept[name] ?? []) store[name].set(id, object)
}

/** Keeps a store in a file, whole or not at all. */
export function saveState(file: string, store: PaymentsStore) {
  writeFileSync(`${file}.new`, JSON.stringify(Object.fromEntries(MAPS.map(name => [name, [...store[name]]]))))
  renameSync(`${file}.new`, file)
}

/** Loads a store from its file and saves it shortly after each change; without a file, nothing is kept. */
export function keepState(file: string | undefined, store: PaymentsStore): { changed(): void, close(): void } {
  if (!file) return { changed: () => undefined, close: () => undefined }
  loadState(file, store)
  let timer: NodeJS.Timeout | undefined
  const save = () => {
    clearTimeout(timer)
    timer = undefined
    saveState(file, store)
  }
  return {
    changed: () => {
      timer ??= setTimeout(save, SAVE_AFTER_MS)
    },
    close: () => {
      if (timer) save()
    },
  }
}

/** A payment that the seed says was made before the fake was started. */
export interface PastPayment { intentId: string, amountMinor: number, currency: string, runId: string }

/** Adds past payments with saved cards to a store. */
export function addPastPayments(store: PaymentsStore, past: readonly PastPayment[]) {
  for (const { intentId, amountMinor, currency, runId } of past) {
    const [customer, method, charge] = [`cus_${intentId}`, `pm_${intentId}`, `ch_${intentId}`]
    const sums = { amount: amountMinor, currency: currency.toLowerCase(), customer, metadata: { runId, kind: 'deposit' }, livemode: false }
    store.customers.set(customer, objectOf<Stripe.Customer>({ id: customer, object: 'customer', email: null, metadata: {} }))
    store.paymentMethods.set(method, objectOf<Stripe.PaymentMethod>({ id: method, object: 'payment_method', type: 'card', customer, metadata: {} }))
    store.charges.set(charge, objectOf<Stripe.Charge>({ ...sums, id: charge, object: 'charge', amount_refunded: 0, paid: true, captured: true, refunded: false, status: 'succeeded', payment_intent: intentId, payment_method: method }))
    store.intents.set(intentId, objectOf<Stripe.PaymentIntent>({ ...sums, id: intentId, object: 'payment_intent', status: 'succeeded', amount_received: amountMinor, payment_method: method, latest_charge: charge, setup_future_usage: 'off_session', last_payment_error: null }))
  }
}
