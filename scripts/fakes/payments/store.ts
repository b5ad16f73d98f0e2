import { randomBytes } from 'node:crypto'
import type Stripe from 'stripe'

/** An answer kept under an idempotency key. */
export interface KeptAnswer { fingerprint: string, status: number, body: string, atS: number }

/** What a card does when it is charged: pays, is declined, or wants its bank's confirmation. */
export type CardChoice = 'pay' | 'decline' | 'challenge'

/** What becomes of a refund. A failing one is accepted first, as at the real provider, and comes back. */
export type RefundChoice = 'succeed' | 'fail'

/** A fault to inject into the next requests. `hang` answers late, and holds the idempotency key while it waits. */
export interface Fault {
  kind: 'status' | 'close-before' | 'close-after' | 'hang'
  /** How many requests it meets. */
  left: number
  status?: number
  waitMs?: number
  /** Which requests: `POST` when left out. */
  method?: 'GET' | 'POST'
  /** Only paths that begin so, such as `/v1/refunds`. */
  path?: string
}

/** How events are delivered. */
export type Delivery = 'once' | 'twice' | 'late' | 'shuffled' | 'never' | 'bad-signature' | 'stale' | 'unknown-type' | 'older-version'

/** An event's way to the product: each try with what came of it. */
export interface OutboxEntry { eventId: string, type: string, delivery: Delivery, tries: { at: string, status: number | null }[], done: boolean }

/** What only the fake knows of a checkout session. */
export interface SessionFacts { title: string, savesCard: boolean, intentMetadata: Record<string, string>, items: Stripe.LineItem[] }

/** Everything the fake remembers; one object, so that a reset is simple. */
export class PaymentsStore {
  customers = new Map<string, Stripe.Customer>()
  sessions = new Map<string, Stripe.Checkout.Session>()
  sessionFacts = new Map<string, SessionFacts>()
  intents = new Map<string, Stripe.PaymentIntent>()
  setupIntents = new Map<string, Stripe.SetupIntent>()
  charges = new Map<string, Stripe.Charge>()
  refunds = new Map<string, Stripe.Refund>()
  paymentMethods = new Map<string, Stripe.PaymentMethod>()
  events = new Map<string, Stripe.Event>()
  outbox: OutboxEntry[] = []
  answers = new Map<string, KeptAnswer>()
  inFlight = new Set<string>()
  fault: Fault | null = null
  delivery: Delivery = 'once'
  /** What a saved card does when it is charged off session. */
  savedCard: CardChoice = 'pay'
  refundChoice: RefundChoice = 'succeed'
  clockOffsetS = 0

  /** Forgets everything, faults and clock included. */
  reset() {
    Object.assign(this, new PaymentsStore())
  }

  /** Seconds since 1970 by the fake's own clock. */
  nowS(): number {
    return Math.floor(Date.now() / 1000) + this.clockOffsetS
  }

  newId(prefix: string): string {
    return `${prefix}_${randomBytes(12).toString('hex')}`
  }

  /** Any object by its id, for `expand[]`. */
  lookUp(id: string): unknown {
    const maps: Map<string, unknown>[] = [this.customers, this.sessions, this.intents, this.setupIntents, this.charges, this.refunds, this.paymentMethods]
    return maps.find(map => map.has(id))?.get(id)
  }

  /** What the provider holds for the facility: charges less refunds, minor units. */
  balance(): number {
    const charged = [...this.charges.values()].filter(charge => charge.paid).reduce((sum, charge) => sum + charge.amount, 0)
    const refunded = [...this.refunds.values()].filter(refund => refund.status === 'succeeded').reduce((sum, refund) => sum + refund.amount, 0)
    return charged - refunded
  }
}

/** An object of the provider of which the fields the product reads are filled; each given field is checked by the SDK's type. */
export function objectOf<T>(fields: Partial<T>): T {
  return fields as T
}
