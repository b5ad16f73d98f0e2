import { createHmac } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { connectPayments } from '#server/adapters/payments/client'
import { API_KEY, type Bench, deposit, paidDeposit, startBench, until, WEBHOOK_SECRET } from './support'

let bench: Bench
beforeAll(async () => {
  bench = await startBench()
})
beforeEach(() => bench.reset())
afterAll(() => bench.close())

const read = ({ body, headers }: { body: Buffer, headers: Record<string, unknown> }) => bench.payments.readEvent(body, String(headers['stripe-signature'] ?? ''))
const idsOf = () => bench.received.map(({ body }) => (JSON.parse(body.toString()) as { id: string }).id)
const REFUSED = { code: 'invalid', message: expect.stringContaining('was not taken') }

describe('signed events', () => {
  it('are taken on their raw bytes', async () => {
    const { sessionId } = await paidDeposit(bench)
    await until(() => bench.received.length >= 5)
    const event = bench.received.map(read).find(({ type }) => type === 'checkout.session.completed')
    expect(event).toMatchObject({ id: expect.stringMatching(/^evt_/), objectId: sessionId, payload: { api_version: '2026-10-28.endive' } })
  })

  it.each([
    ['a changed body', (body: string, signature: string) => [body.replace('60000', '60'), signature]],
    ['no signature', (body: string) => [body, '']],
    ['a signature that is none', (body: string) => [body, 'v1=1234']],
    ['a signature by another secret', (body: string) => [body, sign(body, now(), 'whsec_other')]],
    ['a signature of six minutes ago', (body: string) => [body, sign(body, now() - 360)]],
    ['a new time on an old signature', (body: string, signature: string) => [body, signature.replace(/t=\d+/, `t=${now() + 1}`)]],
  ] as [string, (body: string, signature: string) => [string, string]][])('with %s are refused', async (_, spoil) => {
    await paidDeposit(bench)
    await until(() => bench.received.length > 0)
    const [first] = bench.received
    const [body, signature] = spoil(first!.body.toString(), String(first!.headers['stripe-signature']))
    expect(() => bench.payments.readEvent(Buffer.from(body), signature)).toThrow(expect.objectContaining(REFUSED))
  })

  it('that hold no JSON are refused, though well signed', () => {
    for (const body of ['not json', '{}', 'null']) expect(() => bench.payments.readEvent(Buffer.from(body), sign(body, now()))).toThrow(expect.objectContaining(REFUSED))
  })

  it('of both secrets are taken while one is replaced', async () => {
    const address = { host: '127.0.0.1', port: bench.fake.port }
    const rotating = connectPayments({ secretKey: API_KEY, webhookSecrets: ['whsec_new', WEBHOOK_SECRET], ...address })
    const rotated = connectPayments({ secretKey: API_KEY, webhookSecrets: ['whsec_new'], ...address })
    await paidDeposit(bench)
    await until(() => bench.received.length > 0)
    const { body, headers } = bench.received[0]!
    const signature = String(headers['stripe-signature'])
    expect(rotating.readEvent(body, signature).id).toMatch(/^evt_/)
    expect(rotating.readEvent(body, sign(body.toString(), now(), 'whsec_new')).id).toMatch(/^evt_/)
    expect(() => rotated.readEvent(body, signature)).toThrow(expect.objectContaining(REFUSED))
  })
})

describe('delivery', () => {
  it('is tried again until it is answered with 2xx, and the outbox tells', async () => {
    bench.answerNext(500, 503)
    await bench.payments.createCheckout(deposit())
    const { sessionId } = await bench.payments.createCheckout(deposit({ idempotencyKey: 'deposit:218:2' }))
    await bench.payments.expireCheckout(sessionId)
    await until(() => bench.received.length === 3)
    expect(new Set(idsOf()).size).toBe(1)
    const [entry] = await (await fetch(`${bench.fake.url}/_fake/outbox`)).json() as { done: boolean, tries: { status: number }[] }[]
    expect(entry).toMatchObject({ done: true, tries: [{ status: 500 }, { status: 503 }, { status: 200 }] })
  })

  it('twice brings each event twice', async () => {
    await bench.control({ delivery: 'twice' })
    await paidDeposit(bench)
    const events = bench.fake.store.events.size
    await until(() => bench.received.length === 2 * events)
    expect(new Set(idsOf()).size).toBe(events)
  })

  it('never brings none; the list of events still has them, newest first', async () => {
    await bench.control({ delivery: 'never' })
    await paidDeposit(bench)
    const listed = await bench.stripe().events.list({ limit: 100 })
    expect(listed.data[0]!.type).toBe('checkout.session.completed')
    expect(await bench.stripe().events.retrieve(listed.data[0]!.id)).toEqual(listed.data[0])
    expect((await bench.stripe().events.list({ type: 'charge.succeeded' })).data).toHaveLength(1)
    expect(bench.received).toHaveLength(0)
    await bench.control({ resend: 'checkout.session.completed' })
    await until(() => bench.received.length === 1)
  })

  it('shuffled brings them in the reverse order', async () => {
    await bench.control({ delivery: 'shuffled' })
    await paidDeposit(bench)
    const made = [...bench.fake.store.events.keys()]
    await until(() => bench.received.length === made.length)
    expect(idsOf().toSorted()).toEqual(made.toSorted())
    expect(idsOf().indexOf(made.at(-1)!)).toBeLessThan(idsOf().indexOf(made[0]!))
  })

  it('late comes after the reply', async () => {
    await bench.control({ delivery: 'late' })
    await paidDeposit(bench)
    expect(bench.received).toHaveLength(0)
    await until(() => bench.received.length === bench.fake.store.events.size)
  })

  it.each([['bad-signature'], ['stale']])('%s is refused by the product\'s reader', async (delivery) => {
    await bench.control({ delivery })
    await paidDeposit(bench)
    await until(() => bench.received.length > 0)
    expect(() => read(bench.received[0]!)).toThrow(expect.objectContaining(REFUSED))
  })

  it('of an unheard-of type or an older version is still read', async () => {
    await bench.control({ delivery: 'unknown-type' })
    await paidDeposit(bench)
    await until(() => bench.received.length > 0)
    expect(read(bench.received[0]!).type).toBe('terminal.reader.unheard_of')
    await bench.reset()
    await bench.control({ delivery: 'older-version' })
    await paidDeposit(bench)
    await until(() => bench.received.length > 0)
    expect(read(bench.received[0]!).payload.api_version).toBe('2024-06-20')
  })
})

function now() {
  return Math.floor(Date.now() / 1000)
}

/** The provider's scheme: HMAC-SHA-256 over "time.body" (docs.stripe.com/webhooks, "Verify webhook signatures manually"; from memory). */
function sign(body: string, atS: number, secret = WEBHOOK_SECRET) {
  return `t=${atS},v1=${createHmac('sha256', secret).update(`${atS}.${body}`).digest('hex')}`
}
