import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { type Bench, deposit, press, startBench, until } from './support'

let bench: Bench
beforeAll(async () => {
  bench = await startBench()
})
beforeEach(() => bench.reset())
afterAll(() => bench.close())

const received = () => bench.received.map(({ body }) => JSON.parse(body.toString()) as { type: string, data: { object: { id: string } } })

describe('a hosted checkout', () => {
  it('is paid by card: the payer comes back, the session is paid, the card is kept, events are sent', async () => {
    const checkout = await bench.payments.createCheckout(deposit())
    expect(checkout).toMatchObject({ status: 'open', isPaid: false, intentId: null })
    const reply = await press(checkout.url, 'pay')
    expect([reply.status, reply.headers.get('location')]).toEqual([303, 'http://127.0.0.1:9/runs/218?paid=checking'])
    const paid = await bench.payments.readCheckout(checkout.sessionId)
    expect(paid).toMatchObject({ status: 'complete', isPaid: true, url: null, customerId: checkout.customerId })
    const intent = await bench.stripe().paymentIntents.retrieve(paid.intentId!, { expand: ['latest_charge', 'payment_method', 'customer'] })
    expect(intent).toMatchObject({ status: 'succeeded', amount: 60_000, currency: 'eur', metadata: { runId: 'run-218' }, latest_charge: { amount: 60_000, paid: true }, payment_method: { customer: checkout.customerId }, customer: { email: 'ida@alder.example' } })
    await until(() => received().some(({ type }) => type === 'checkout.session.completed'))
    expect(received().map(({ type }) => type)).toEqual(expect.arrayContaining(['payment_intent.created', 'charge.succeeded', 'payment_intent.succeeded', 'payment_method.attached', 'checkout.session.completed']))
  })

  it('stays open after a decline, and a second card pays', async () => {
    const checkout = await bench.payments.createCheckout(deposit())
    const reply = await press(checkout.url, 'decline')
    expect(await (await fetch(new URL(reply.headers.get('location')!, bench.fake.url))).text()).toContain('Your card was declined.')
    const declined = await bench.payments.readCheckout(checkout.sessionId)
    expect(declined).toMatchObject({ status: 'open', isPaid: false })
    expect((await bench.stripe().paymentIntents.retrieve(declined.intentId!)).last_payment_error).toMatchObject({ code: 'card_declined' })
    await press(checkout.url, 'pay')
    const paid = await bench.payments.readCheckout(checkout.sessionId)
    expect(paid).toMatchObject({ isPaid: true, intentId: declined.intentId })
    expect(bench.fake.store.balance()).toBe(60_000)
  })

  it('asks the bank: refused it stays open, confirmed it is paid', async () => {
    const checkout = await bench.payments.createCheckout(deposit())
    const challenge = await press(checkout.url, 'challenge')
    const bank = new URL(challenge.headers.get('location')!, bench.fake.url)
    expect(await (await fetch(bank)).text()).toContain('Confirm this payment')
    const { intentId } = await bench.payments.readCheckout(checkout.sessionId)
    expect((await bench.stripe().paymentIntents.retrieve(intentId!)).status).toBe('requires_action')
    await press(checkout.url, 'refuse')
    expect(await bench.stripe().paymentIntents.retrieve(intentId!)).toMatchObject({ status: 'requires_payment_method', last_payment_error: { code: 'payment_intent_authentication_failure' } })
    expect((await bench.payments.readCheckout(checkout.sessionId)).isPaid).toBe(false)
    await press(checkout.url, 'challenge')
    await press(checkout.url, 'confirm')
    expect(await bench.payments.readCheckout(checkout.sessionId)).toMatchObject({ isPaid: true, status: 'complete' })
  })

  it('is not confirmed by the bank\'s button when the bank never asked', async () => {
    const checkout = await bench.payments.createCheckout(deposit())
    await press(checkout.url, 'confirm')
    expect((await bench.payments.readCheckout(checkout.sessionId)).isPaid).toBe(false)
  })

  it('offers a way out without paying, and names itself', async () => {
    const checkout = await bench.payments.createCheckout(deposit({ title: 'Deposit <b>0218</b>' }))
    const page = await (await fetch(checkout.url!)).text()
    expect(page).toContain('Local payment fake')
    expect(page).toContain('<html lang="en">')
    expect(page).toContain('href="http://127.0.0.1:9/runs/218?paid=left"')
    expect(page).not.toContain('<b>0218')
    expect(page).not.toContain('<script')
  })

  it('abandoned, it runs out by the fake\'s clock, sends its event, and takes no money any more', async () => {
    const checkout = await bench.payments.createCheckout(deposit())
    await bench.control({ advanceClockS: 3700 })
    expect(await bench.payments.readCheckout(checkout.sessionId)).toMatchObject({ status: 'expired', isPaid: false, url: null })
    await until(() => received().some(({ type }) => type === 'checkout.session.expired'))
    const page = await press(checkout.url, 'pay')
    expect(await page.text()).toContain('The time for this payment is over')
    expect(bench.fake.store.balance()).toBe(0)
  })

  it('expired on demand is over; one that was paid a moment before is told as paid', async () => {
    const left = await bench.payments.createCheckout(deposit())
    expect(await bench.payments.expireCheckout(left.sessionId)).toMatchObject({ status: 'expired', isPaid: false })
    expect(await bench.payments.expireCheckout(left.sessionId)).toMatchObject({ status: 'expired' })
    const quick = await bench.payments.createCheckout(deposit({ idempotencyKey: 'deposit:218:2' }))
    await press(quick.url, 'pay')
    expect(await bench.payments.expireCheckout(quick.sessionId)).toMatchObject({ status: 'complete', isPaid: true })
  })

  it('shows its line items, and lists sessions in pages', async () => {
    const stripe = bench.stripe()
    for (const attempt of [1, 2, 3]) await bench.payments.createCheckout(deposit({ idempotencyKey: `deposit:218:${attempt}`, title: `Deposit ${attempt}` }))
    const first = await stripe.checkout.sessions.list({ limit: 2 })
    expect([first.data.length, first.has_more]).toEqual([2, true])
    const rest = await stripe.checkout.sessions.list({ limit: 2, starting_after: first.data[1]!.id })
    expect([rest.data.length, rest.has_more]).toEqual([1, false])
    expect((await stripe.checkout.sessions.listLineItems(rest.data[0]!.id)).data).toMatchObject([{ description: 'Deposit 1', amount_total: 60_000, quantity: 1 }])
    expect((await stripe.checkout.sessions.retrieve(rest.data[0]!.id, { expand: ['line_items'] })).line_items?.data).toHaveLength(1)
    const all: string[] = []
    for await (const session of stripe.checkout.sessions.list({ limit: 1 })) all.push(session.id)
    expect(all).toHaveLength(3)
  })

  it.each([
    ['an amount under the least', { amountMinor: 49 }, /at least 50/],
    ['an amount with a fraction', { amountMinor: 600.5 }, /Invalid integer/],
    ['a life of over a day', { expiresAt: new Date(Date.now() + 90_000_000) }, /30 minutes and 24 hours/],
    ['an address that is none', { customerEmail: 'ida at alder' }, /Invalid email/],
  ])('refuses %s with a sentence', async (_, changes, sentence) => {
    await expect(bench.payments.createCheckout(deposit(changes))).rejects.toMatchObject({ code: 'invalid', message: expect.stringMatching(sentence) })
  })

  it('refuses parameters it does not know and a wrong key', async () => {
    await expect(bench.stripe().refunds.create({ payment_intent: 'pi_none', instructions_email: 'a@b.example' })).rejects.toMatchObject({ code: 'parameter_unknown' })
    const reply = await fetch(`${bench.fake.url}/v1/customers`, { headers: { authorization: 'Bearer sk_other' } })
    expect(reply.status).toBe(401)
    expect(reply.headers.get('request-id')).toMatch(/^req_/)
  })
})
