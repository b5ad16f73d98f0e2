import { spawn } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import { expect, it } from 'vitest'
import { tsx, tsxEnvironment } from '../../scripts/lib/steps.mjs'
import { freePort } from '../support/postgres'

const script = fileURLToPath(new URL('../../scripts/fakes/serve.ts', import.meta.url))
const start = (environment: Record<string, string>) => spawn(process.execPath, [...tsx, script], { env: { ...process.env, ...tsxEnvironment, ...environment }, stdio: ['ignore', 'ignore', 'pipe'] })
const ended = (child: ReturnType<typeof start>) => new Promise<number | null>(resolve => child.once('exit', resolve))

it('serves both fakes on the ports it is told, and ends in order when asked to', async () => {
  const [payments, smtp, web] = [await freePort(), await freePort(), await freePort()]
  const child = start({ PAYMENTS_FAKE_PORT: String(payments), MAIL_FAKE_SMTP_PORT: String(smtp), MAIL_FAKE_WEB_PORT: String(web) })
  const end = ended(child)
  const answers = async (url: string) => {
    for (let attempt = 0; attempt < 200; attempt += 1) {
      const reply = await fetch(url).catch(() => null)
      if (reply?.ok) return true
      await new Promise(resolve => setTimeout(resolve, 50))
    }
    return false
  }
  expect(await answers(`http://127.0.0.1:${payments}/_fake`)).toBe(true)
  expect(await answers(`http://127.0.0.1:${web}/api/email`)).toBe(true)
  child.kill('SIGTERM')
  expect(await end).toBe(0)
})

it('says which variable is no port', async () => {
  const child = start({ PAYMENTS_FAKE_PORT: 'twelve' })
  let said = ''
  child.stderr.on('data', (chunk: Buffer) => said += chunk.toString())
  expect(await ended(child)).not.toBe(0)
  expect(said).toContain('PAYMENTS_FAKE_PORT is "twelve"')
})
