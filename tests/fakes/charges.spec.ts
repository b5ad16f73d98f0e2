import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { type Bench, deposit, paidDeposit, press, startBench, until } from './support'

let bench: Bench
beforeAll(async () => {
  bench = await startBench()
})
beforeEach(() => bench.reset())
afterAll(() => bench.close())

const balance = (paidIntentId: string, idempotencyKey = 'balance:41:1') =>
  bench.payments.chargeSavedCard({ paidIntentId, amountMinor: 163_760, currency: 'EUR', description: 'Invoice 2027-0041', metadata: { runId: 'run-218' }, idempotencyKey })
const types = () => [...bench.fake.store.events.values()].map(({ type }) => type)

describe('the balance, off session', () => {
  it('is charged to the card that paid the deposit', async () => {
    const { intentId, customerId } = await paidDeposit(bench)
    const outcome = await balance(intentId)
    expect(outcome.state).toBe('succeeded')
    expect(await bench.stripe().paymentIntents.retrieve(outcome.intentId!, { expand: ['latest_charge'] })).toMatchObject({ customer: customerId, amount_received: 163_760, description: 'Invoice 2027-0041', latest_charge: { status: 'succeeded', payment_intent: outcome.intentId } })
  })

  it('is declined as an outcome, not an error', async () => {
    const { intentId } = await paidDeposit(bench)
    await bench.control({ savedCard: 'decline' })
    expect(await balance(intentId)).toMatchObject({ state: 'declined', reason: 'The saved card was declined.', intentId: expect.stringMatching(/^pi_/) })
    expect(types().slice(-2)).toEqual(['charge.failed', 'payment_intent.payment_failed'])
    expect(bench.fake.store.balance()).toBe(60_000)
  })

  it('tells when the bank wants the payer, who then confirms on a page', async () => {
    const { intentId, customerId } = await paidDeposit(bench)
    await bench.control({ savedCard: 'challenge' })
    const outcome = await balance(intentId)
    expect(outcome.state).toBe('requires-action')
    expect(await bench.stripe().paymentIntents.retrieve(outcome.intentId!)).toMatchObject({ status: 'requires_payment_method', last_payment_error: { code: 'authentication_required' } })
    const page = await bench.payments.createCheckout(deposit({ amountMinor: 163_760, customerId, idempotencyKey: 'balance:41:2' }))
    await press(page.url, 'challenge')
    await press(page.url, 'confirm')
    expect(await bench.payments.readCheckout(page.sessionId)).toMatchObject({ isPaid: true, customerId })
  })

  it('is declined without a word to the provider when no card was saved', async () => {
    const { intentId } = await paidDeposit(bench, { savesCard: false })
    expect(await balance(intentId)).toMatchObject({ state: 'declined' })
    expect(bench.fake.store.intents.size).toBe(1)
  })

  it('is declined when the provider does not know the deposit', async () => {
    expect(await balance('pi_none')).toMatchObject({ state: 'declined', intentId: null, reason: expect.stringContaining('does not know') })
  })

  it('cannot be charged to a card of another customer', async () => {
    const { intentId } = await paidDeposit(bench)
    const stripe = bench.stripe()
    const other = await stripe.customers.create({ email: 'ola@cedar.example' })
    const { payment_method: card } = await stripe.paymentIntents.retrieve(intentId)
    await expect(stripe.paymentIntents.create({ amount: 1000, currency: 'eur', customer: other.id, payment_method: card as string, confirm: true, off_session: true })).rejects.toMatchObject({ param: 'payment_method' })
    await expect(stripe.paymentMethods.retrieve('pm_none')).rejects.toMatchObject({ code: 'resource_missing' })
  })

  it('may be given up: a cancelled intent is not confirmed any more', async () => {
    const stripe = bench.stripe()
    const { customerId } = await paidDeposit(bench)
    const intent = await stripe.paymentIntents.create({ amount: 1000, currency: 'eur', customer: customerId! })
    expect(await stripe.paymentIntents.cancel(intent.id)).toMatchObject({ status: 'canceled' })
    const [card] = (await stripe.paymentMethods.list({ customer: customerId! })).data
    await expect(stripe.paymentIntents.confirm(intent.id, { payment_method: card!.id })).rejects.toMatchObject({ code: 'payment_intent_unexpected_state' })
  })

  it('can use a card that was attached by hand, or kept by a set-up intent', async () => {
    const stripe = bench.stripe()
    const customer = await stripe.customers.create({ email: 'ida@alder.example' })
    const card = await stripe.paymentMethods.create({ type: 'card', card: { token: 'tok_visa' } })
    await stripe.paymentMethods.attach(card.id, { customer: customer.id })
    const setup = await stripe.setupIntents.create({ customer: customer.id, payment_method: card.id, confirm: true })
    expect(await stripe.setupIntents.retrieve(setup.id)).toMatchObject({ status: 'succeeded', payment_method: card.id })
    expect(await stripe.paymentIntents.create({ amount: 1000, currency: 'eur', customer: customer.id, payment_method: card.id, confirm: true, off_session: true })).toMatchObject({ status: 'succeeded' })
  })
})

describe('refunds', () => {
  it('pay back in parts, never more than was charged', async () => {
    const { intentId } = await paidDeposit(bench)
    const refund = (amountMinor: number, idempotencyKey: string) => bench.payments.refund({ intentId, amountMinor, metadata: {}, idempotencyKey })
    const first = await refund(30_000, 'refund:1')
    expect(first).toMatchObject({ isDone: true })
    expect(await refund(30_000, 'refund:1')).toEqual(first)
    await expect(refund(30_001, 'refund:2')).rejects.toMatchObject({ code: 'invalid', message: expect.stringContaining('30000') })
    await refund(30_000, 'refund:3')
    await expect(refund(1, 'refund:4')).rejects.toMatchObject({ code: 'invalid', message: expect.stringContaining('already been refunded') })
    expect(bench.fake.store.balance()).toBe(0)
    expect(await bench.stripe().refunds.retrieve(first.refundId, { expand: ['charge'] })).toMatchObject({ amount: 30_000, charge: { refunded: true, amount_refunded: 60_000 } })
  })

  it('may fail later: it is pending at first, then comes back', async () => {
    const { intentId } = await paidDeposit(bench)
    await bench.control({ refunds: 'fail' })
    const refund = await bench.payments.refund({ intentId, amountMinor: 60_000, metadata: {}, idempotencyKey: 'refund:1' })
    expect(refund.isDone).toBe(false)
    await until(() => types().includes('refund.failed'))
    expect(await bench.stripe().refunds.retrieve(refund.refundId)).toMatchObject({ status: 'failed' })
    expect(bench.fake.store.balance()).toBe(60_000)
  })

  it('of a payment that was never made are refused', async () => {
    const checkout = await bench.payments.createCheckout(deposit())
    await press(checkout.url, 'decline')
    const { intentId } = await bench.payments.readCheckout(checkout.sessionId)
    await expect(bench.payments.refund({ intentId: intentId!, amountMinor: 100, metadata: {}, idempotencyKey: 'refund:1' })).rejects.toMatchObject({ code: 'invalid' })
  })
})
