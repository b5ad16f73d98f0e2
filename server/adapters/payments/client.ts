import Stripe from 'stripe'
import { chargeSavedCard } from './charge-saved-card'
import { createCheckout, expireCheckout, readCheckout } from './checkout'
import { asking } from './errors'
import { readEvent } from './events'
import { refund } from './refund'
import type { Payments, PaymentsConfig } from './types'

export type { ChargeOutcome, CheckoutRequest, CheckoutState, PaymentEvent, Payments, PaymentsConfig } from './types'

const TIMEOUT_MS = 20_000
const RETRIES = 2

/** Connects to the payment provider through its own SDK, which only this folder imports. */
export function connectPayments(config: PaymentsConfig): Payments {
  const stripe = new Stripe(config.secretKey, {
    timeout: TIMEOUT_MS, maxNetworkRetries: RETRIES, telemetry: false,
    ...(config.host ? { host: config.host, port: config.port, protocol: config.protocol ?? 'http' } : {}),
  })
  return {
    createCheckout: request => asking(() => createCheckout(stripe, request)),
    readCheckout: sessionId => asking(() => readCheckout(stripe, sessionId)),
    expireCheckout: sessionId => asking(() => expireCheckout(stripe, sessionId)),
    chargeSavedCard: request => asking(() => chargeSavedCard(stripe, request)),
    refund: request => asking(() => refund(stripe, request)),
    readEvent: (rawBody, signature) => readEvent(stripe, config.webhookSecrets, rawBody, signature),
  }
}
