import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { API_KEY, type Bench, deposit, paidDeposit, startBench, until } from './support'

let bench: Bench
beforeAll(async () => {
  bench = await startBench()
})
beforeEach(() => bench.reset())
afterAll(() => bench.close())

const post = (path: string, key: string, form: Record<string, string>) =>
  fetch(`${bench.fake.url}/v1/${path}`, { method: 'POST', headers: { 'authorization': `Basic ${Buffer.from(`${API_KEY}:`).toString('base64')}`, 'idempotency-key': key }, body: new URLSearchParams(form) })

describe('idempotency keys', () => {
  it('replay the first answer, marked as such', async () => {
    const first = await post('customers', 'k1', { email: 'ida@alder.example' })
    const again = await post('customers', 'k1', { email: 'ida@alder.example' })
    expect(await again.text()).toBe(await first.text())
    expect([first.headers.get('idempotent-replayed'), again.headers.get('idempotent-replayed')]).toEqual([null, 'true'])
    expect(bench.fake.store.customers.size).toBe(1)
  })

  it('refuse another request under the same key', async () => {
    await bench.payments.createCheckout(deposit())
    await expect(bench.payments.createCheckout(deposit({ amountMinor: 70_000 }))).rejects.toMatchObject({ code: 'conflict' })
    expect(bench.fake.store.sessions.size).toBe(1)
  })

  it('refuse a second request while the first is worked on, with the hint to try again', async () => {
    await bench.control({ fault: { kind: 'hang', waitMs: 300, left: 1 } })
    const first = post('customers', 'k2', { email: 'ida@alder.example' })
    await until(() => bench.fake.store.inFlight.has('k2'))
    const second = await post('customers', 'k2', { email: 'ida@alder.example' })
    expect([second.status, second.headers.get('stripe-should-retry')]).toEqual([409, 'true'])
    expect(await second.json()).toMatchObject({ error: { code: 'idempotency_key_in_use' } })
    expect((await first).status).toBe(200)
    expect(bench.fake.store.customers.size).toBe(1)
  })

  it('are forgotten after a day of the fake\'s clock', async () => {
    await post('customers', 'k3', { email: 'ida@alder.example' })
    await bench.control({ advanceClockS: 24 * 3600 - 5 })
    expect((await post('customers', 'k3', { email: 'ida@alder.example' })).headers.get('idempotent-replayed')).toBe('true')
    await bench.control({ advanceClockS: 10 })
    expect((await post('customers', 'k3', { email: 'ida@alder.example' })).headers.get('idempotent-replayed')).toBeNull()
    expect(bench.fake.store.customers.size).toBe(2)
  })

  it('keep nothing of a request that was not valid', async () => {
    expect((await post('customers', 'k4', { email: 'no address' })).status).toBe(400)
    expect((await post('customers', 'k4', { email: 'ida@alder.example' })).status).toBe(200)
    expect((await post('customers', 'k'.repeat(256), {})).status).toBe(400)
  })

  it('keep an error of the provider, which is then replayed', async () => {
    await bench.control({ fault: { kind: 'status', status: 500, left: 1 } })
    expect((await post('customers', 'k5', {})).status).toBe(500)
    const again = await post('customers', 'k5', {})
    expect([again.status, again.headers.get('idempotent-replayed')]).toEqual([500, 'true'])
    expect((await post('customers', 'k6', {})).status).toBe(200)
  })

  it('charge once when the connection breaks after the effect: the SDK\'s own retry finds the answer', async () => {
    const { intentId } = await paidDeposit(bench)
    await bench.control({ fault: { kind: 'close-after', left: 1 } })
    const outcome = await bench.payments.chargeSavedCard({ paidIntentId: intentId, amountMinor: 163_760, currency: 'EUR', description: 'Invoice 2027-0041', metadata: {}, idempotencyKey: 'balance:41:1' })
    expect(outcome.state).toBe('succeeded')
    expect(bench.fake.store.charges.size).toBe(2)
    expect(bench.fake.store.balance()).toBe(60_000 + 163_760)
  })

  it('charge once when our process asks again with its own key, and twice with another', async () => {
    const { intentId } = await paidDeposit(bench)
    const charge = (idempotencyKey: string) => bench.payments.chargeSavedCard({ paidIntentId: intentId, amountMinor: 10_000, currency: 'EUR', description: 'Invoice', metadata: {}, idempotencyKey })
    const [first, again, other] = [await charge('balance:41:1'), await charge('balance:41:1'), await charge('balance:41:2')]
    expect(again).toEqual(first)
    expect(other).not.toEqual(first)
    expect(bench.fake.store.balance()).toBe(80_000)
  })
})
