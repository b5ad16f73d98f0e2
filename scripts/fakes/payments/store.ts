import { randomBytes } from 'node:crypto'
import type Stripe from 'stripe'

/** An answer kept under an idempotency key. */
export interface KeptAnswer { fingerprint: string, status: number, body: string, at: number }

/** What the hosted page did with a card. */
export type CardChoice = 'pay' | 'decline' | 'challenge'

/** A fault to inject into the next requests that change something. */
export interface Fault { kind: 'status' | 'close-before' | 'close-after', status?: number, left: number }

/** How events are delivered. */
export type Delivery = 'once' | 'twice' | 'never' | 'bad-signature' | 'stale'

/** Everything the fake remembers; one object, so that a reset is simple. */
export class PaymentsStore {
  customers = new Map<string, Stripe.Customer>()
  sessions = new Map<string, Stripe.Checkout.Session>()
  intents = new Map<string, Stripe.PaymentIntent>()
  charges = new Map<string, Stripe.Charge>()
  refunds = new Map<string, Stripe.Refund>()
  paymentMethods = new Map<string, Stripe.PaymentMethod>()
  events: Stripe.Event[] = []
  answers = new Map<string, KeptAnswer>()
  inFlight = new Set<string>()
  fault: Fault | null = null
  delivery: Delivery = 'once'
  /** What a saved card does when it is charged off session. */
  savedCard: CardChoice = 'pay'
  clockOffsetS = 0

  /** Seconds since 1970 by the fake's own clock. */
  nowS(): number {
    return Math.floor(Date.now() / 1000) + this.clockOffsetS
  }

  newId(prefix: string): string {
    return `${prefix}_${randomBytes(12).toString('hex')}`
  }

  /** What the provider holds for the facility: charges less refunds, minor units. */
  balance(): number {
    const charged = [...this.charges.values()].filter(charge => charge.paid).reduce((sum, charge) => sum + charge.amount, 0)
    const refunded = [...this.refunds.values()].filter(refund => refund.status === 'succeeded').reduce((sum, refund) => sum + refund.amount, 0)
    return charged - refunded
  }
}
