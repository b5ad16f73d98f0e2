import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { connectPayments } from '#server/adapters/payments/client'
import { API_KEY, type Bench, deposit, paidDeposit, startBench } from './support'

let bench: Bench
beforeAll(async () => {
  bench = await startBench()
})
beforeEach(() => bench.reset())
afterAll(() => bench.close())

const UNAVAILABLE = { code: 'unavailable', message: expect.stringMatching(/again|not accept/) }

describe('faults of the provider', () => {
  it('one 409 is got over by the SDK\'s asking again', async () => {
    await bench.control({ fault: { kind: 'status', status: 409, left: 1 } })
    expect(await bench.payments.createCheckout(deposit())).toMatchObject({ status: 'open' })
    expect(bench.fake.store.sessions.size).toBe(1)
  })

  it.each([[409], [429], [500]])('a lasting %i is told as unavailable, and nothing is made', async (status) => {
    await bench.control({ fault: { kind: 'status', status, left: 100 } })
    await expect(bench.payments.createCheckout(deposit())).rejects.toMatchObject(UNAVAILABLE)
    expect(bench.fake.store.sessions.size).toBe(0)
  })

  it('a 429 is not tried again at once, and keeps nothing: the same key works a moment later', async () => {
    await bench.control({ fault: { kind: 'status', status: 429, left: 1 } })
    await expect(bench.payments.createCheckout(deposit())).rejects.toMatchObject(UNAVAILABLE)
    expect(await bench.payments.createCheckout(deposit())).toMatchObject({ status: 'open' })
  })

  it('a 402 on a saved card is a decline', async () => {
    const { intentId } = await paidDeposit(bench)
    await bench.control({ fault: { kind: 'status', status: 402, left: 1, path: '/v1/payment_intents' } })
    expect(await bench.payments.chargeSavedCard({ paidIntentId: intentId, amountMinor: 1000, currency: 'EUR', description: 'Invoice', metadata: {}, idempotencyKey: 'balance:41:1' })).toMatchObject({ state: 'declined' })
  })

  it('a connection closed before the effect leaves nothing, and asking again makes one', async () => {
    await bench.control({ fault: { kind: 'close-before', left: 1 } })
    await bench.payments.createCheckout(deposit())
    expect(bench.fake.store.sessions.size).toBe(1)
    await bench.reset()
    await bench.control({ fault: { kind: 'close-before', left: 100 } })
    await expect(bench.payments.createCheckout(deposit())).rejects.toMatchObject(UNAVAILABLE)
    expect(bench.fake.store.sessions.size).toBe(0)
  })

  it('a connection closed after the effect at every try is unavailable; asked again later, the same one is found', async () => {
    await bench.control({ fault: { kind: 'close-after', left: 1 } })
    await expect(bench.stripe().customers.create({ email: 'ida@alder.example' }, { idempotencyKey: 'c1' })).resolves.toMatchObject({ email: 'ida@alder.example' })
    expect(bench.fake.store.customers.size).toBe(1)
  })

  it('reads can fail too', async () => {
    const { sessionId } = await bench.payments.createCheckout(deposit())
    await bench.control({ fault: { kind: 'status', status: 503, left: 100, method: 'GET' } })
    await expect(bench.payments.readCheckout(sessionId)).rejects.toMatchObject(UNAVAILABLE)
  })

  it('a provider that hangs is given up after the SDK\'s timeout', async () => {
    await bench.control({ fault: { kind: 'hang', waitMs: 5000, left: 2 } })
    await expect(bench.stripe({ timeout: 200 }).customers.create({})).rejects.toThrow(/timeout|timed out|aborted/i)
  })

  it('a refused key and a provider that is away are told apart', async () => {
    const wrong = connectPayments({ secretKey: 'sk_wrong', webhookSecrets: [], host: '127.0.0.1', port: bench.fake.port })
    await expect(wrong.createCheckout(deposit())).rejects.toMatchObject({ code: 'unavailable', message: expect.stringContaining('key') })
    const away = connectPayments({ secretKey: API_KEY, webhookSecrets: [], host: '127.0.0.1', port: 9 })
    await expect(away.readCheckout('cs_1')).rejects.toMatchObject({ code: 'unavailable', message: expect.stringContaining('does not answer') })
  })

  it('the controls refuse what is no JSON', async () => {
    expect((await fetch(`${bench.fake.url}/_fake`, { method: 'POST', body: '[1' })).status).toBe(400)
    expect((await fetch(`${bench.fake.url}/_fake/nothing`)).status).toBe(404)
  })
})
