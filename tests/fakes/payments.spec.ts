import { createServer, type Server } from 'node:http'
import Stripe from 'stripe'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { connectPayments, type CheckoutRequest, type Payments } from '#server/adapters/payments/client'
import { type PaymentsFake, startPaymentsFake } from '../../scripts/fakes/payments/server'
import { freePort } from '../support/postgres'

const SECRET = 'whsec_fakes'
let fake: PaymentsFake
let payments: Payments
let receiver: Server
const received: { body: string, signature: string }[] = []

beforeAll(async () => {
  receiver = createServer(async (request, response) => {
    const chunks: Buffer[] = []
    for await (const chunk of request) chunks.push(chunk as Buffer)
    received.push({ body: Buffer.concat(chunks).toString(), signature: String(request.headers['stripe-signature']) })
    response.writeHead(200).end()
  })
  const [port, hook] = [await freePort(), await freePort()]
  await new Promise<void>(resolve => receiver.listen(hook, '127.0.0.1', resolve))
  fake = await startPaymentsFake({ port, webhookUrl: `http://127.0.0.1:${hook}/hook`, webhookSecret: SECRET, apiKey: 'sk_test_fakes' })
  payments = connectPayments({ secretKey: 'sk_test_fakes', webhookSecrets: ['whsec_old', SECRET], host: '127.0.0.1', port, protocol: 'http' })
})
afterAll(async () => {
  await fake.close()
  await new Promise(resolve => receiver.close(resolve))
})
beforeEach(() => {
  received.length = 0
  fake.store.delivery = 'once'
  fake.store.fault = null
  fake.store.savedCard = 'pay'
})

let serial = 0
const request = (changes: Partial<CheckoutRequest> = {}): CheckoutRequest => ({
  amountMinor: 12_300, currency: 'EUR', title: 'Deposit for run 0218', customerEmail: 'a@alder.example', customerId: null, metadata: { runId: 'r' }, successUrl: 'http://127.0.0.1:1/ok', cancelUrl: 'http://127.0.0.1:1/left',
  expiresAt: new Date(Date.now() + 3_600_000), savesCard: true, idempotencyKey: `deposit:test:${serial += 1}`, ...changes,
})
const onPage = (sessionId: string, choice: string, step = '') => fetch(`${fake.url}/pay/${sessionId}${step}`, { method: 'POST', redirect: 'manual', headers: { 'content-type': 'application/x-www-form-urlencoded' }, body: `do=${choice}` })
const until = async (fits: () => boolean) => {
  for (let attempt = 0; attempt < 100 && !fits(); attempt += 1) await new Promise(resolve => setTimeout(resolve, 20))
  expect(fits()).toBe(true)
}
const types = () => received.map(event => (JSON.parse(event.body) as { type: string }).type)

describe('the payments fake, through the unchanged SDK', () => {
  it('takes a payment on the hosted page and tells by signed events', async () => {
    const open = await payments.createCheckout(request())
    expect(open).toMatchObject({ status: 'open', isPaid: false })
    expect((await onPage(open.sessionId, 'pay')).headers.get('location')).toBe('http://127.0.0.1:1/ok')
    expect(await payments.readCheckout(open.sessionId)).toMatchObject({ status: 'complete', isPaid: true })
    await until(() => types().includes('checkout.session.completed'))
    const event = received.find(({ body }) => body.includes('checkout.session.completed'))!
    expect(payments.readEvent(Buffer.from(event.body), event.signature)).toMatchObject({ type: 'checkout.session.completed', objectId: open.sessionId })
    expect(() => payments.readEvent(Buffer.from(event.body.replace('12300', '1')), event.signature)).toThrow('signature')
  })

  it('refuses a signature that is old', async () => {
    fake.store.delivery = 'stale'
    const open = await payments.createCheckout(request())
    await onPage(open.sessionId, 'pay')
    await until(() => received.length > 0)
    expect(() => payments.readEvent(Buffer.from(received[0]!.body), received[0]!.signature)).toThrow('signature')
  })

  it('lets a declined card be tried again, and a challenge be refused or confirmed', async () => {
    const open = await payments.createCheckout(request())
    await onPage(open.sessionId, 'decline')
    expect((await payments.readCheckout(open.sessionId)).status).toBe('open')
    expect((await onPage(open.sessionId, 'challenge')).headers.get('location')).toContain('/challenge')
    expect((await payments.readCheckout(open.sessionId)).isPaid).toBe(false)
    await onPage(open.sessionId, 'confirm', '/challenge')
    expect((await payments.readCheckout(open.sessionId)).isPaid).toBe(true)
  })

  it('ends a session that is left', async () => {
    const open = await payments.createCheckout(request())
    expect((await payments.expireCheckout(open.sessionId)).status).toBe('expired')
    expect((await payments.expireCheckout(open.sessionId)).status).toBe('expired')
    await until(() => types().includes('checkout.session.expired'))
  })

  it('gives the same answer for the same key, and refuses the key with another body', async () => {
    const first = await payments.createCheckout(request({ idempotencyKey: 'same' }))
    const again = request({ idempotencyKey: 'same' })
    await expect(payments.createCheckout({ ...again, amountMinor: 1 })).rejects.toBeInstanceOf(Stripe.errors.StripeError)
    expect(fake.store.answers.get('same')?.body).toContain(first.sessionId)
  })

  it('replays an answer that was lost on the way: one charge, not two', async () => {
    const paid = await payments.createCheckout(request())
    await onPage(paid.sessionId, 'pay')
    const { intentId } = await payments.readCheckout(paid.sessionId)
    const before = fake.store.charges.size
    fake.store.fault = { kind: 'close-after', left: 1 }
    const outcome = await payments.chargeSavedCard({ paidIntentId: intentId!, amountMinor: 4200, currency: 'EUR', description: 'Invoice', metadata: {}, idempotencyKey: 'balance:once' })
    expect(outcome.state).toBe('succeeded')
    expect(fake.store.charges.size).toBe(before + 1)
  })

  it.each([['decline', 'declined'], ['challenge', 'requires-action'], ['pay', 'succeeded']] as const)('charges a saved card that would %s: %s', async (card, state) => {
    const paid = await payments.createCheckout(request())
    await onPage(paid.sessionId, 'pay')
    fake.store.savedCard = card
    const { intentId } = await payments.readCheckout(paid.sessionId)
    expect(await payments.chargeSavedCard({ paidIntentId: intentId!, amountMinor: 4200, currency: 'EUR', description: 'Invoice', metadata: {}, idempotencyKey: `balance:${card}` })).toMatchObject({ state })
  })

  it('refunds part of a payment, never more than was paid', async () => {
    const paid = await payments.createCheckout(request())
    await onPage(paid.sessionId, 'pay')
    const { intentId } = await payments.readCheckout(paid.sessionId)
    expect((await payments.refund({ intentId: intentId!, amountMinor: 6150, metadata: {}, idempotencyKey: `refund:${paid.sessionId}` })).isDone).toBe(true)
    await expect(payments.refund({ intentId: intentId!, amountMinor: 6151, metadata: {}, idempotencyKey: `refund2:${paid.sessionId}` })).rejects.toThrow('greater')
  })

  it('refuses a wrong key', async () => {
    const stranger = connectPayments({ secretKey: 'sk_other', webhookSecrets: [SECRET], host: '127.0.0.1', port: fake.port, protocol: 'http' })
    await expect(stranger.readCheckout('cs_1')).rejects.toThrow('API Key')
  })
})
