import { existsSync, readFileSync } from 'node:fs'
import { expect, it } from 'vitest'
import { parse } from 'yaml'
import { readConfig } from '#server/utils/config'
import { FAKE_PORTS } from '../../../scripts/fakes/ports'

const root = new URL('../../../', import.meta.url)
const compose = parse(readFileSync(new URL('docker-compose.fake.yml', root), 'utf8')) as {
  services: Record<string, { image: string, ports: string[], command?: string[], environment: Record<string, string>, volumes: string[] }>
  volumes: Record<string, null>
}

it('offers the ports that the code uses, on loopback only', () => {
  expect(compose.services.fakes?.ports).toEqual([FAKE_PORTS.payments, FAKE_PORTS.mailSmtp, FAKE_PORTS.mailWeb].map(port => `127.0.0.1:${port}:${port}`))
  expect(compose.services.postgres?.ports).toEqual([`127.0.0.1:${FAKE_PORTS.postgres}:${FAKE_PORTS.postgres}`])
})

it('runs the fakes that the demo runs, on the Node line of .nvmrc, and a PostgreSQL that the code supports', () => {
  const script = /scripts\/fakes\/\S+\.ts/.exec(compose.services.fakes?.command?.join(' ') ?? '')?.[0]
  expect(script && existsSync(new URL(script, root))).toBe(true)
  expect(compose.services.fakes?.image).toContain(`node:${readFileSync(new URL('.nvmrc', root), 'utf8').trim()}-`)
  expect(Number(/postgres:(\d+)/.exec(compose.services.postgres?.image ?? '')?.[1])).toBeGreaterThanOrEqual(15)
})

it('names every volume that its services mount', () => {
  const mounted = Object.values(compose.services).flatMap(service => service.volumes).map(volume => volume.split(':')[0]!).filter(name => !name.startsWith('.'))
  expect(mounted.toSorted()).toEqual(Object.keys(compose.volumes).toSorted())
})

it('has an example of every variable that the server reads', () => {
  const example = readFileSync(new URL('.env.example', root), 'utf8')
  const source = readFileSync(new URL('server/utils/config.ts', root), 'utf8')
  for (const [, name] of source.matchAll(/^ {2}([A-Z_]+): z/gm)) expect(example).toContain(`${name}=`)
})

it('reads a complete environment, and names each variable that is missing', () => {
  const config = readConfig({ PORT: '4000', AUTH_SECRET: 'x'.repeat(32), PAYMENTS_SECRET_KEY: 'sk', PAYMENTS_WEBHOOK_SECRET: 'new, old', SMTP_URL: 'smtp://127.0.0.1', MAIL_FROM: 'desk@skerry.example' })
  expect(config).toMatchObject({ origin: 'http://localhost:4000', payments: { webhookSecrets: ['new', 'old'] } })
  expect(() => readConfig({})).toThrow(/AUTH_SECRET[\s\S]*PAYMENTS_SECRET_KEY[\s\S]*SMTP_URL/)
})
