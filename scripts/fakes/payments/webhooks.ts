import { createHmac } from 'node:crypto'
import type Stripe from 'stripe'
import type { PaymentsStore } from './store'

const RETRY_AFTER_MS = [500, 1500, 4000, 10_000]
const STALE_S = 3600

/** Makes events and delivers them, signed, to the product. */
export class Webhooks {
  private readonly pending = new Set<Promise<void>>()
  private closed = false

  constructor(private readonly store: PaymentsStore, private readonly target: { url: string, secret: string }) {}

  /** Keeps an event and sends it the way the controls say. */
  emit(type: string, object: { id: string }) {
    const snapshot = JSON.parse(JSON.stringify(object)) as Record<string, unknown>
    delete snapshot.fake
    const event = { id: this.store.newId('evt'), object: 'event', api_version: '2026-10-28.endive', created: this.store.nowS(), livemode: false, pending_webhooks: 1, request: { id: null, idempotency_key: null }, type, data: { object: snapshot } } as unknown as Stripe.Event
    this.store.events.unshift(event)
    if (this.store.delivery === 'never') return
    this.send(event)
    if (this.store.delivery === 'twice') this.send(event)
  }

  /** Delivers an event again. */
  send(event: Stripe.Event) {
    const delivery = this.deliver(JSON.stringify(event)).finally(() => this.pending.delete(delivery))
    this.pending.add(delivery)
  }

  /** Signs a body as the provider does: HMAC-SHA-256 over time and body. */
  sign(body: string, atS: number): string {
    return `t=${atS},v1=${createHmac('sha256', this.target.secret).update(`${atS}.${body}`).digest('hex')}`
  }

  private async deliver(body: string): Promise<void> {
    for (const delayMs of [0, ...RETRY_AFTER_MS]) {
      await new Promise(resolve => setTimeout(resolve, delayMs).unref())
      if (this.closed) return
      const atS = Math.floor(Date.now() / 1000) - (this.store.delivery === 'stale' ? STALE_S : 0)
      const signature = this.store.delivery === 'bad-signature' ? `t=${atS},v1=${'0'.repeat(64)}` : this.sign(body, atS)
      const reply = await fetch(this.target.url, { method: 'POST', headers: { 'content-type': 'application/json; charset=utf-8', 'stripe-signature': signature }, body }).catch(() => null)
      if (reply?.ok) return
    }
  }

  close() {
    this.closed = true
  }
}
