import Stripe from 'stripe'
import { DomainError } from '#shared/errors'

/** How the payment provider is reached; host, port and protocol only for a local fake. */
export interface PaymentsConfig { secretKey: string, webhookSecrets: string[], host?: string, port?: number, protocol?: 'http' | 'https' }

/** What a hosted checkout is for. */
export interface CheckoutRequest {
  amountMinor: number
  currency: string
  title: string
  customerEmail: string
  customerId: string | null
  metadata: Record<string, string>
  successUrl: string
  cancelUrl: string
  expiresAt: Date
  /** Keeps the card for the balance. */
  savesCard: boolean
  /** Made from the business fact; the same key always means the same request. */
  idempotencyKey: string
}

/** How a checkout stands. */
export interface CheckoutState { sessionId: string, status: 'open' | 'complete' | 'expired', isPaid: boolean, url: string | null, intentId: string | null, customerId: string | null }

/** What came of charging a saved card. */
export type ChargeOutcome = { state: 'succeeded', intentId: string } | { state: 'requires-action' | 'declined', intentId: string | null, reason: string }

/** An event of the provider, verified. */
export interface PaymentEvent { id: string, type: string, objectId: string, payload: Record<string, unknown> }

/** The payment provider as the product needs it. */
export interface Payments {
  createCheckout(request: CheckoutRequest): Promise<CheckoutState>
  readCheckout(sessionId: string): Promise<CheckoutState>
  expireCheckout(sessionId: string): Promise<CheckoutState>
  chargeSavedCard(request: { paidIntentId: string, amountMinor: number, currency: string, description: string, metadata: Record<string, string>, idempotencyKey: string }): Promise<ChargeOutcome>
  refund(request: { intentId: string, amountMinor: number, metadata: Record<string, string>, idempotencyKey: string }): Promise<{ refundId: string, isDone: boolean }>
  readEvent(rawBody: Buffer, signature: string): PaymentEvent
}

const TIMEOUT_MS = 20_000
const SIGNATURE_TOLERANCE_S = 300

/** Connects to the payment provider through its own SDK; the only importer of it. */
export function connectPayments(config: PaymentsConfig): Payments {
  const stripe = new Stripe(config.secretKey, {
    timeout: TIMEOUT_MS, maxNetworkRetries: 2, telemetry: false,
    ...(config.host ? { host: config.host, port: config.port, protocol: config.protocol ?? 'http' } : {}),
  })
  return {
    createCheckout: async request => toCheckoutState(await stripe.checkout.sessions.create({
      mode: 'payment',
      line_items: [{ quantity: 1, price_data: { currency: request.currency.toLowerCase(), unit_amount: request.amountMinor, product_data: { name: request.title } } }],
      ...(request.customerId ? { customer: request.customerId } : { customer_email: request.customerEmail, customer_creation: 'always' as const }),
      metadata: request.metadata,
      payment_intent_data: { metadata: request.metadata, ...(request.savesCard ? { setup_future_usage: 'off_session' as const } : {}) },
      success_url: request.successUrl, cancel_url: request.cancelUrl, expires_at: Math.floor(request.expiresAt.getTime() / 1000),
    }, { idempotencyKey: request.idempotencyKey })),
    readCheckout: async sessionId => toCheckoutState(await stripe.checkout.sessions.retrieve(sessionId)),
    expireCheckout: async (sessionId) => {
      try {
        return toCheckoutState(await stripe.checkout.sessions.expire(sessionId))
      }
      catch (error) {
        // It was paid or expired a moment before: how it stands decides.
        if (error instanceof Stripe.errors.StripeInvalidRequestError) return toCheckoutState(await stripe.checkout.sessions.retrieve(sessionId))
        throw error
      }
    },
    chargeSavedCard: request => chargeSavedCard(stripe, request),
    refund: async ({ intentId, amountMinor, metadata, idempotencyKey }) => {
      const refund = await stripe.refunds.create({ payment_intent: intentId, amount: amountMinor, metadata }, { idempotencyKey })
      return { refundId: refund.id, isDone: refund.status === 'succeeded' }
    },
    readEvent: (rawBody, signature) => readEvent(stripe, config.webhookSecrets, rawBody, signature),
  }
}

function toCheckoutState(session: Stripe.Checkout.Session): CheckoutState {
  return {
    sessionId: session.id,
    status: session.status === 'complete' ? 'complete' : session.status === 'expired' ? 'expired' : 'open',
    isPaid: session.payment_status === 'paid',
    url: session.url,
    intentId: idOf(session.payment_intent),
    customerId: idOf(session.customer),
  }
}

const idOf = (reference: string | { id: string } | null): string | null => typeof reference === 'string' ? reference : reference?.id ?? null

async function chargeSavedCard(stripe: Stripe, request: Parameters<Payments['chargeSavedCard']>[0]): Promise<ChargeOutcome> {
  const paid = await stripe.paymentIntents.retrieve(request.paidIntentId).catch((error: unknown) => {
    if (error instanceof Stripe.errors.StripeInvalidRequestError && error.code === 'resource_missing') return null
    throw error
  })
  if (!paid) return { state: 'declined', intentId: null, reason: 'The payment provider does not know the deposit any more.' }
  const [customer, method] = [idOf(paid.customer), idOf(paid.payment_method)]
  if (!customer || !method) return { state: 'declined', intentId: null, reason: 'No card was saved with the deposit.' }
  try {
    const intent = await stripe.paymentIntents.create({
      amount: request.amountMinor, currency: request.currency.toLowerCase(), customer, payment_method: method, off_session: true, confirm: true, description: request.description, metadata: request.metadata,
    }, { idempotencyKey: request.idempotencyKey })
    return intent.status === 'succeeded' ? { state: 'succeeded', intentId: intent.id } : { state: 'requires-action', intentId: intent.id, reason: 'The bank asks for a confirmation.' }
  }
  catch (error) {
    if (!(error instanceof Stripe.errors.StripeCardError)) throw error
    const intentId = error.payment_intent?.id ?? null
    return error.code === 'authentication_required'
      ? { state: 'requires-action', intentId, reason: 'The bank asks for a confirmation.' }
      : { state: 'declined', intentId, reason: 'The saved card was declined.' }
  }
}

/** Verified with either secret, so that one can be replaced while the other still signs. */
function readEvent(stripe: Stripe, secrets: string[], rawBody: Buffer, signature: string): PaymentEvent {
  for (const secret of secrets) {
    try {
      const event = stripe.webhooks.constructEvent(rawBody, signature, secret, SIGNATURE_TOLERANCE_S)
      const object = event.data.object as { id?: string }
      return { id: event.id, type: event.type, objectId: object.id ?? '', payload: event as unknown as Record<string, unknown> }
    }
    catch (error) {
      if (!(error instanceof Stripe.errors.StripeSignatureVerificationError)) throw error
    }
  }
  throw new DomainError('invalid', 'The signature of this event does not fit. It was not taken.')
}
