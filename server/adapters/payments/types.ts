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

/** A charge of the card that paid an earlier intent. */
export interface SavedCardCharge { paidIntentId: string, amountMinor: number, currency: string, description: string, metadata: Record<string, string>, idempotencyKey: string }

/** What came of charging a saved card. */
export type ChargeOutcome = { state: 'succeeded', intentId: string } | { state: 'requires-action' | 'declined', intentId: string | null, reason: string }

/** Money back to the card of a paid intent. */
export interface RefundRequest { intentId: string, amountMinor: number, metadata: Record<string, string>, idempotencyKey: string }

/** An event of the provider, verified. */
export interface PaymentEvent { id: string, type: string, objectId: string, payload: Record<string, unknown> }

/**
 * The payment provider as the product needs it. Each promise is refused with a DomainError `unavailable` when the provider
 * does not answer (whether it acted is then not known: ask again with the same key), `invalid` when it refuses the request.
 */
export interface Payments {
  createCheckout(request: CheckoutRequest): Promise<CheckoutState>
  readCheckout(sessionId: string): Promise<CheckoutState>
  /** Ends an open checkout; one that was paid or over a moment before is told as it stands. */
  expireCheckout(sessionId: string): Promise<CheckoutState>
  chargeSavedCard(request: SavedCardCharge): Promise<ChargeOutcome>
  refund(request: RefundRequest): Promise<{ refundId: string, isDone: boolean }>
  /** Verifies an event on its raw bytes. */
  readEvent(rawBody: Buffer, signature: string): PaymentEvent
}
