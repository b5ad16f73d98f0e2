import { spawnSync } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { type ApiClient, signedInClient } from '../support/client'
import { readRunAs } from '../support/facility-client'
import { type StartedServer, startServer } from '../support/server'
import { eventually } from '../support/wait'

describe('a server that dies half-way', () => {
  let server: StartedServer
  let operator: ApiClient
  let manager: ApiClient

  beforeAll(async () => {
    server = await startServer()
    operator = await signedInClient('operator', server)
    manager = await signedInClient('manager', server)
  })
  afterAll(() => server.stop())

  it('charges a finished run once, although it was killed right after finishing', async () => {
    const { body } = await manager.get<{ items: { id: string, cryostat: string }[] }>('/api/runs?state=running')
    const run = body.items.find(item => item.cryostat === 'Puffin')!
    expect((await operator.post(`/api/runs/${run.id}/finish`, { operatorHours: 2, cutShort: true, reason: 'The compressor stopped.' })).status).toBe(200)
    await server.kill('SIGKILL')
    await server.restart()
    const settled = await eventually(() => readRunAs(manager, run.id), detail => detail.state === 'settled', 60_000)
    expect(settled.invoice).not.toBeNull()
    expect(settled.payments.filter(payment => payment.kind !== 'deposit' && payment.state === 'succeeded')).toHaveLength(1)
    const fake = await (await fetch(`${server.paymentsUrl}/_fake`)).json() as { intents: { status: string, metadata: { kind?: string } }[] }
    expect(fake.intents.filter(intent => intent.metadata.kind === 'balance' && intent.status === 'succeeded').length).toBeLessThanOrEqual(1)
  })

  it('refuses a second process on the same data folder within two seconds, naming the owner', () => {
    const start = Date.now()
    const second = spawnSync(process.execPath, [fileURLToPath(new URL('../../.output/server/index.mjs', import.meta.url))], {
      encoding: 'utf8', timeout: 10_000,
      env: { ...process.env, NODE_ENV: 'production', PORT: '0', HOST: '127.0.0.1', HOLDTIME_DATA: server.dataFolder, HOLDTIME_ORIGIN: 'http://127.0.0.1:1', AUTH_SECRET: 'a-secret-of-the-tests-that-is-long-enough', PAYMENTS_SECRET_KEY: 'sk', PAYMENTS_WEBHOOK_SECRET: 'whsec', SMTP_URL: 'smtp://127.0.0.1:1', MAIL_FROM: 'desk@skerry.example' },
    })
    expect(second.status).toBe(1)
    expect(second.stdout + second.stderr).toContain(`in use by process ${server.process.pid}`)
    expect(Date.now() - start).toBeLessThan(2000)
  })

  it('says what is missing when its environment is incomplete', () => {
    const start = spawnSync(process.execPath, [fileURLToPath(new URL('../../.output/server/index.mjs', import.meta.url))], { encoding: 'utf8', timeout: 10_000, env: { PATH: process.env.PATH, NODE_ENV: 'production', AUTH_SECRET: 'short' } })
    expect(start.status).not.toBe(0)
    for (const words of ['AUTH_SECRET is shorter than 32 characters', 'Set PAYMENTS_SECRET_KEY', 'Set SMTP_URL']) expect(start.stdout + start.stderr).toContain(words)
  })
})
