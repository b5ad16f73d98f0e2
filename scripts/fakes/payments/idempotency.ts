import { ApiError, invalid } from './errors'
import type { KeptAnswer, PaymentsStore } from './store'

const FORGET_AFTER_S = 24 * 3600
const LONGEST_KEY = 255

/**
 * The answer kept under a key.
 *
 * @throws ApiError when the key came with another request, or its first request is still being worked on
 */
export function rememberedAnswer(store: PaymentsStore, key: string, fingerprint: string): KeptAnswer | null {
  if (key.length > LONGEST_KEY) throw invalid(`Keys for idempotent requests have at most ${LONGEST_KEY} characters.`)
  if (store.inFlight.has(key)) throw new ApiError(409, { type: 'idempotency_error', code: 'idempotency_key_in_use', message: 'There is currently another in-progress request using this Idempotency-Key.' }, { 'stripe-should-retry': 'true' })
  const kept = store.answers.get(key)
  if (!kept || kept.atS < store.nowS() - FORGET_AFTER_S) return null
  if (kept.fingerprint !== fingerprint) throw new ApiError(400, { type: 'idempotency_error', message: 'Keys for idempotent requests can only be used with the same parameters they were first used with.' })
  return kept
}

/**
 * Marks a key as being worked on; the returned function keeps the answer. Nothing is kept when the request itself was not
 * valid or was turned away before any work (400, 404, 409, 429); a decline or an error of the provider is kept and replayed.
 */
export function startAnswer(store: PaymentsStore, key: string, fingerprint: string): (answer: { status: number, text: string }) => void {
  store.inFlight.add(key)
  return ({ status, text }) => {
    store.inFlight.delete(key)
    if (status < 400 || status === 402 || status >= 500) store.answers.set(key, { fingerprint, status, body: text, atS: store.nowS() })
  }
}
