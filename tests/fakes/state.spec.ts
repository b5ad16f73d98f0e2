import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, expect, it } from 'vitest'
import { connectPayments } from '#server/adapters/payments/client'
import { startPaymentsFake } from '../../scripts/fakes/payments/server'
import { addPastPayments, saveState } from '../../scripts/fakes/payments/state'
import { PaymentsStore } from '../../scripts/fakes/payments/store'
import { deposit, press } from './support'

const folder = mkdtempSync(join(tmpdir(), 'holdtime-fake-state-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const start = async () => {
  const fake = await startPaymentsFake({ port: 0, webhookUrl: 'http://127.0.0.1:9/hook', webhookSecret: 'whsec_state', stateFile: join(folder, 'payments-fake.json') })
  return { fake, payments: connectPayments({ secretKey: 'sk_state', webhookSecrets: [], host: '127.0.0.1', port: fake.port }) }
}
const charge = { amountMinor: 5000, currency: 'EUR', description: 'Invoice', metadata: {} }

it('remembers payments, cards and answers over a restart, and payments that were seeded', async () => {
  const seeded = new PaymentsStore()
  addPastPayments(seeded, [{ intentId: 'pi_seeded', amountMinor: 40_000, currency: 'EUR', runId: 'run-1' }])
  saveState(join(folder, 'payments-fake.json'), seeded)

  const first = await start()
  const open = await first.payments.createCheckout(deposit())
  await press(open.url, 'pay')
  const { intentId } = await first.payments.readCheckout(open.sessionId)
  const before = await first.payments.chargeSavedCard({ ...charge, paidIntentId: 'pi_seeded', idempotencyKey: 'balance:1' })
  expect(before.state).toBe('succeeded')
  await first.fake.close()

  const second = await start()
  expect(await second.payments.readCheckout(open.sessionId)).toMatchObject({ isPaid: true })
  expect(await second.payments.chargeSavedCard({ ...charge, paidIntentId: 'pi_seeded', idempotencyKey: 'balance:1' })).toEqual(before)
  expect((await second.payments.chargeSavedCard({ ...charge, paidIntentId: intentId!, idempotencyKey: 'balance:2' })).state).toBe('succeeded')
  expect(second.fake.store.balance()).toBe(40_000 + 60_000 + 5000 + 5000)
  await second.fake.close()
})
