import type { ServerResponse } from 'node:http'
import { expireOverdue } from './sessions'
import type { CardChoice, Delivery, Fault, PaymentsStore, RefundChoice } from './store'
import type { Webhooks } from './webhooks'

/** What tests and the demo may change, as JSON to `POST /_fake`; `resend` names an event's id or type. */
interface Control { fault?: Fault | null, delivery?: Delivery, savedCard?: CardChoice, refunds?: RefundChoice, advanceClockS?: number, resend?: string }

/**
 * Answers the fake's own controls: `GET /_fake` shows what it holds, `POST /_fake` changes how it behaves,
 * `POST /_fake/reset` forgets everything, `GET /_fake/outbox` shows each event's way to the product.
 */
export function controls(store: PaymentsStore, webhooks: Webhooks, method: string, url: URL, body: string, response: ServerResponse): void {
  const send = (status: number, reply: unknown) => void response.writeHead(status, { 'content-type': 'application/json' }).end(JSON.stringify(reply, null, 2))
  switch (`${method} ${url.pathname}`) {
    case 'GET /_fake': return send(200, show(store))
    case 'GET /_fake/outbox': return send(200, store.outbox)
    case 'POST /_fake/reset':
      store.reset()
      return send(200, show(store))
    case 'POST /_fake': {
      const control = parse(body)
      if (!control) return send(400, { message: 'The controls want a JSON object.' })
      apply(store, webhooks, control)
      return send(200, show(store))
    }
    default: return send(404, { message: 'Known are GET /_fake, POST /_fake, POST /_fake/reset and GET /_fake/outbox.' })
  }
}

function parse(body: string): Control | null {
  try {
    const parsed: unknown = JSON.parse(body || '{}')
    return typeof parsed === 'object' && parsed !== null && !Array.isArray(parsed) ? parsed : null
  }
  catch {
    return null
  }
}

function apply(store: PaymentsStore, webhooks: Webhooks, control: Control) {
  if (control.fault !== undefined) store.fault = control.fault
  if (control.delivery) store.delivery = control.delivery
  if (control.savedCard) store.savedCard = control.savedCard
  if (control.refunds) store.refundChoice = control.refunds
  if (control.advanceClockS) store.clockOffsetS += control.advanceClockS
  expireOverdue(store, webhooks)
  if (control.resend === undefined) return
  const event = [...store.events.values()].findLast(candidate => candidate.id === control.resend || candidate.type === control.resend)
  if (event) webhooks.send(event, store.delivery === 'never' ? 'once' : store.delivery)
}

function show(store: PaymentsStore) {
  return {
    fault: store.fault, delivery: store.delivery, savedCard: store.savedCard, refundChoice: store.refundChoice, clockOffsetS: store.clockOffsetS, balance: store.balance(),
    sessions: [...store.sessions.values()].map(({ id, status, amount_total, currency, url, metadata }) => ({ id, status, amount_total, currency, url, metadata })),
    intents: [...store.intents.values()].map(({ id, status, amount, metadata }) => ({ id, status, amount, metadata })),
    refunds: [...store.refunds.values()].map(({ id, status, amount }) => ({ id, status, amount })),
    events: [...store.events.values()].toReversed().map(({ id, type, created }) => ({ id, type, created })),
  }
}
