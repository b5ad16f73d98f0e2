import type { ServerResponse } from 'node:http'
import { expireOverdue } from './sessions'
import type { CardChoice, Delivery, Fault, PaymentsStore } from './store'
import type { Webhooks } from './webhooks'

/** What tests and the demo may ask of the fake, as JSON under `/_fake`. */
interface Control { fault?: Fault | null, delivery?: Delivery, savedCard?: CardChoice, advanceClockS?: number, resend?: string }

/** Answers the fake's own controls: GET shows what it holds, POST changes how it behaves. */
export function controls(store: PaymentsStore, webhooks: Webhooks, method: string, url: URL, body: string, response: ServerResponse): void {
  if (method === 'POST') {
    const control = JSON.parse(body || '{}') as Control
    if (control.fault !== undefined) store.fault = control.fault
    if (control.delivery) store.delivery = control.delivery
    if (control.savedCard) store.savedCard = control.savedCard
    if (control.advanceClockS) store.clockOffsetS += control.advanceClockS
    expireOverdue(store, webhooks)
    const event = control.resend ? store.events.find(candidate => candidate.id === control.resend || candidate.type === control.resend) : undefined
    if (event) webhooks.send(event)
  }
  const shown = {
    fault: store.fault, delivery: store.delivery, savedCard: store.savedCard, balance: store.balance(),
    sessions: [...store.sessions.values()].map(({ id, status, amount_total, currency, url: payUrl, metadata }) => ({ id, status, amount_total, currency, url: payUrl, metadata })),
    intents: [...store.intents.values()].map(({ id, status, amount, metadata }) => ({ id, status, amount, metadata })),
    refunds: [...store.refunds.values()].map(({ id, status, amount }) => ({ id, status, amount })),
    events: store.events.map(({ id, type, created }) => ({ id, type, created })),
  }
  response.writeHead(200, { 'content-type': 'application/json' }).end(JSON.stringify(shown, null, 2))
}
