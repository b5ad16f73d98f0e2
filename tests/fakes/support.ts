import { createServer, type IncomingHttpHeaders, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import Stripe from 'stripe'
import { connectPayments } from '#server/adapters/payments/client'
import { type PaymentsFake, startPaymentsFake } from '../../scripts/fakes/payments/server'

export const API_KEY = 'sk_test_of_the_fakes'
export const WEBHOOK_SECRET = 'whsec_of_the_fakes'

/** An event as it came to the receiver. */
export interface Received { headers: IncomingHttpHeaders, body: Buffer }

/** The fake with a receiver of its events, our adapter and the unchanged SDK at it. */
export async function startBench() {
  const received: Received[] = []
  const answers: number[] = []
  const receiver = await listen(received, answers)
  const fake = await startPaymentsFake({ port: 0, webhookUrl: `http://127.0.0.1:${(receiver.address() as AddressInfo).port}/hook`, webhookSecret: WEBHOOK_SECRET, apiKey: API_KEY })
  const address = { host: '127.0.0.1', port: fake.port, protocol: 'http' as const }
  return {
    fake, received,
    /** Status of the receiver's next answers; 200 when there is none. */
    answerNext: (...statuses: number[]) => void answers.push(...statuses),
    payments: connectPayments({ secretKey: API_KEY, webhookSecrets: [WEBHOOK_SECRET], ...address }),
    stripe: (options: Stripe.StripeConfig = {}) => new Stripe(API_KEY, { maxNetworkRetries: 0, telemetry: false, ...address, ...options }),
    control: (change: object) => control(fake, '/_fake', change),
    reset: async () => {
      await control(fake, '/_fake/reset', {})
      received.length = 0
      answers.length = 0
    },
    close: async () => {
      await fake.close()
      receiver.closeAllConnections()
      await new Promise(resolve => receiver.close(resolve))
    },
  }
}

export type Bench = Awaited<ReturnType<typeof startBench>>

async function listen(received: Received[], answers: number[]): Promise<Server> {
  const server = createServer((request, response) => {
    const chunks: Buffer[] = []
    request.on('data', (chunk: Buffer) => chunks.push(chunk)).on('end', () => {
      received.push({ headers: request.headers, body: Buffer.concat(chunks) })
      response.writeHead(answers.shift() ?? 200).end()
    })
  })
  await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
  return server
}

async function control(fake: PaymentsFake, path: string, change: object) {
  const reply = await fetch(`${fake.url}${path}`, { method: 'POST', body: JSON.stringify(change) })
  if (!reply.ok) throw new Error(`the controls answered ${reply.status}`)
}

/** Presses a button of the hosted page; tells where it leads. */
export async function press(url: string | null, choice: string): Promise<Response> {
  if (!url) throw new Error('this session has no page any more')
  return fetch(url, { method: 'POST', redirect: 'manual', body: new URLSearchParams({ do: choice }) })
}

/** A checkout of a deposit as the product opens it; the key and parts may be changed. */
export function deposit(changes: Partial<Parameters<Bench['payments']['createCheckout']>[0]> = {}) {
  return {
    amountMinor: 60_000, currency: 'EUR', title: 'Deposit for run 0218', customerEmail: 'ida@alder.example', customerId: null, metadata: { runId: 'run-218' },
    successUrl: 'http://127.0.0.1:9/runs/218?paid=checking', cancelUrl: 'http://127.0.0.1:9/runs/218?paid=left', expiresAt: new Date(Date.now() + 3_600_000), savesCard: true, idempotencyKey: 'deposit:218:1', ...changes,
  }
}

/** A deposit that was paid by card. */
export async function paidDeposit({ payments }: Bench, changes: Parameters<typeof deposit>[0] = {}) {
  const checkout = await payments.createCheckout(deposit(changes))
  await press(checkout.url, 'pay')
  const paid = await payments.readCheckout(checkout.sessionId)
  return { ...paid, intentId: paid.intentId! }
}

/** Waits until something holds, at most five seconds. */
export async function until(holds: () => boolean | Promise<boolean>): Promise<void> {
  for (let attempt = 0; attempt < 500; attempt += 1) {
    if (await holds()) return
    await new Promise(resolve => setTimeout(resolve, 10))
  }
  throw new Error('this did not come about within five seconds')
}
