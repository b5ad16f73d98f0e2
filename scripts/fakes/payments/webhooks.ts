import { createHmac } from 'node:crypto'
import type Stripe from 'stripe'
import type { Delivery, OutboxEntry, PaymentsStore } from './store'

const RETRY_AFTER_MS = [500, 1500, 4000, 10_000]
const ANSWER_WITHIN_MS = 10_000
const STALE_S = 3600
const LATE_MS = 1500
/** Events that come within this time of each other are delivered in the reverse of their order. */
const SHUFFLE_MS = 300
const API_VERSION = '2026-10-28.endive'
const OLDER_API_VERSION = '2024-06-20'

/** Makes events and delivers them, signed, to the product. */
export class Webhooks {
  private held: Stripe.Event[] = []
  private closed = false

  constructor(private readonly store: PaymentsStore, private readonly target: { url: string, secret: string }) {}

  /** Keeps an event and sends it the way the controls say. */
  emit(type: string, object: { id: string }) {
    const event = {
      id: this.store.newId('evt'), object: 'event', api_version: API_VERSION, created: this.store.nowS(), livemode: false, pending_webhooks: 1, request: { id: null, idempotency_key: null }, type, data: { object: structuredClone(object) },
    } as unknown as Stripe.Event
    this.store.events.set(event.id, event)
    this.send(event, this.store.delivery)
  }

  /** Delivers an event, as it was or with one of the faults. */
  send(event: Stripe.Event, delivery: Delivery = 'once') {
    switch (delivery) {
      case 'never':
        this.store.outbox.push({ eventId: event.id, type: event.type, delivery, tries: [], done: true })
        return
      case 'twice':
        void this.deliver(event, delivery)
        void this.deliver(event, delivery)
        return
      case 'late':
        this.after(LATE_MS, () => void this.deliver(event, delivery))
        return
      case 'shuffled':
        if (this.held.push(event) === 1) this.after(SHUFFLE_MS, () => this.held.splice(0).toReversed().forEach(one => void this.deliver(one, delivery)))
        return
      case 'unknown-type':
        void this.deliver({ ...event, type: 'terminal.reader.unheard_of' } as unknown as Stripe.Event, delivery)
        return
      case 'older-version':
        void this.deliver({ ...event, api_version: OLDER_API_VERSION }, delivery)
        return
      default:
        void this.deliver(event, delivery)
    }
  }

  /** Signs a body as the provider does: HMAC-SHA-256 over time and body. */
  sign(body: string, atS: number): string {
    return `t=${atS},v1=${createHmac('sha256', this.target.secret).update(`${atS}.${body}`).digest('hex')}`
  }

  private async deliver(event: Stripe.Event, delivery: Delivery): Promise<void> {
    const body = JSON.stringify(event)
    const entry: OutboxEntry = { eventId: event.id, type: event.type, delivery, tries: [], done: false }
    this.store.outbox.push(entry)
    for (const delayMs of [0, ...RETRY_AFTER_MS]) {
      await new Promise<void>(resolve => this.after(delayMs, resolve))
      if (this.closed) return
      // The product checks against its own clock, so signatures carry the real time.
      const atS = Math.floor(Date.now() / 1000) - (delivery === 'stale' ? STALE_S : 0)
      const signature = delivery === 'bad-signature' ? `t=${atS},v1=${'0'.repeat(64)}` : this.sign(body, atS)
      const reply = await fetch(this.target.url, {
        method: 'POST', headers: { 'content-type': 'application/json; charset=utf-8', 'stripe-signature': signature }, body, signal: AbortSignal.timeout(ANSWER_WITHIN_MS),
      }).catch(() => null)
      entry.tries.push({ at: new Date().toISOString(), status: reply?.status ?? null })
      entry.done = reply?.ok ?? false
      if (entry.done) return
    }
  }

  private after(delayMs: number, work: () => void) {
    setTimeout(work, delayMs).unref()
  }

  close() {
    this.closed = true
  }
}
