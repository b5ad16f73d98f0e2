import { spawn, type ChildProcess } from 'node:child_process'
import { cpSync, existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, renameSync, rmSync, statSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { startMailFake } from '../../scripts/fakes/mail'
import { startPaymentsFake } from '../../scripts/fakes/payments/server'
import { hashOf, tsx, tsxEnvironment } from '../../scripts/lib/steps.mjs'
import { freePort } from './postgres'

const root = fileURLToPath(new URL('../..', import.meta.url))
const WEBHOOK_SECRET = 'whsec_holdtime_tests'
const PAYMENTS_KEY = 'sk_test_holdtime_tests'

/** A demo account as the seed wrote it. */
export interface DemoSignIn { as: string, email: string, password: string }

/** The running product: the production build with its fakes. */
export interface TestServer {
  origin: string
  paymentsUrl: string
  mailUrl: string
  signIns: DemoSignIn[]
  dataFolder: string
}

/** A started server, with what its owner needs. */
export interface StartedServer extends TestServer {
  process: ChildProcess
  /** Ends the server process only, as a crash does (SIGKILL) or in order (SIGTERM). */
  kill(signal: 'SIGKILL' | 'SIGTERM'): Promise<void>
  /** Starts the server process again on the same data and port. */
  restart(): Promise<void>
  stop(): Promise<void>
}

/** Seeds once for all files and runs of a day; a change of the seed, the schema or the domain seeds anew. */
async function seededFolder(): Promise<string> {
  const key = hashOf(['server/db', 'server/services', 'server/adapters', 'shared', 'scripts/seed.ts', 'drizzle']).slice(0, 16)
  const folder = join(root, 'node_modules/.cache/holdtime-seed')
  const cache = join(folder, `${new Date().toISOString().slice(0, 10)}-${key}`)
  if (!existsSync(cache)) {
    for (const name of existsSync(folder) ? readdirSync(folder) : []) if (statSync(join(folder, name)).mtimeMs < Date.now() - 86_400_000) rmSync(join(folder, name), { recursive: true, force: true })
    const building = `${cache}.${process.pid}`
    mkdirSync(building, { recursive: true })
    await runToEnd(process.execPath, [...tsx, join(root, 'scripts/seed.ts')], { ...serverEnvironment(building, 1, { payments: 1, smtp: 1 }), ...tsxEnvironment })
    // Another run may have been quicker; either copy is the same.
    if (existsSync(cache)) rmSync(building, { recursive: true })
    else renameSync(building, cache)
  }
  return cache
}

/**
 * Starts the production build on seeded data (or, with `databaseUrl`, seeds that PostgreSQL database first).
 */
export async function startServer(options: { databaseUrl?: string } = {}): Promise<StartedServer> {
  if (!existsSync(join(root, '.output/server/index.mjs'))) throw new Error('There is no production build; run `npm run build` first.')
  const dataFolder = mkdtempSync(join(tmpdir(), 'holdtime-server-'))
  const [port, paymentsPort, smtpPort, mailPort] = [await freePort(), await freePort(), await freePort(), await freePort()]
  const environment = { ...serverEnvironment(dataFolder, port, { payments: paymentsPort, smtp: smtpPort }), ...(options.databaseUrl ? { DATABASE_URL: options.databaseUrl } : {}) }
  if (options.databaseUrl) await runToEnd(process.execPath, [...tsx, join(root, 'scripts/seed.ts')], { ...environment, ...tsxEnvironment })
  else cpSync(await seededFolder(), dataFolder, { recursive: true })

  const payments = await startPaymentsFake({ port: paymentsPort, webhookUrl: `http://127.0.0.1:${port}/api/payments/webhook`, webhookSecret: WEBHOOK_SECRET, apiKey: PAYMENTS_KEY, stateFile: join(dataFolder, 'payments-fake.json') })
  const mail = await startMailFake({ smtpPort, webPort: mailPort })
  // From another folder, as an installed server would be.
  const spawnServer = () => spawn(process.execPath, [join(root, '.output/server/index.mjs')], { cwd: tmpdir(), env: { ...process.env, ...environment }, stdio: ['ignore', 'inherit', 'inherit'] })
  const origin = environment.HOLDTIME_ORIGIN
  const started: StartedServer = {
    origin,
    paymentsUrl: `http://127.0.0.1:${paymentsPort}`,
    mailUrl: `http://127.0.0.1:${mailPort}`,
    signIns: JSON.parse(readFileSync(join(dataFolder, 'demo-sign-ins.json'), 'utf8')) as DemoSignIn[],
    dataFolder,
    process: spawnServer(),
    kill: signal => endProcess(started.process, signal),
    restart: async () => {
      started.process = spawnServer()
      await waitUntilHealthy(origin)
    },
    stop: async () => {
      await started.kill('SIGTERM')
      await payments.close()
      await mail.close()
      rmSync(dataFolder, { recursive: true, force: true })
    },
  }
  await waitUntilHealthy(origin)
  return started
}

function serverEnvironment(dataFolder: string, port: number, ports: { payments: number, smtp: number }) {
  return {
    NODE_ENV: 'production',
    PORT: String(port),
    HOST: '127.0.0.1',
    HOLDTIME_DATA: dataFolder,
    HOLDTIME_ORIGIN: `http://127.0.0.1:${port}`,
    AUTH_SECRET: 'a-secret-of-the-tests-that-is-long-enough',
    PAYMENTS_SECRET_KEY: PAYMENTS_KEY,
    PAYMENTS_WEBHOOK_SECRET: WEBHOOK_SECRET,
    PAYMENTS_API_HOST: '127.0.0.1',
    PAYMENTS_API_PORT: String(ports.payments),
    PAYMENTS_API_PROTOCOL: 'http',
    SMTP_URL: `smtp://127.0.0.1:${ports.smtp}`,
    MAIL_FROM: 'Skerry Low-Temperature Facility <desk@skerry.example>',
    LOG_LEVEL: 'warn',
  }
}

function runToEnd(command: string, args: string[], environment: Record<string, string>): Promise<void> {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd: root, env: { ...process.env, ...environment }, stdio: ['ignore', 'ignore', 'inherit'] })
    child.once('error', reject)
    child.once('exit', code => code === 0 ? resolve() : reject(new Error(`${args.at(-1)} ended with code ${code}`)))
  })
}

function endProcess(child: ChildProcess, signal: 'SIGKILL' | 'SIGTERM'): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return Promise.resolve()
  return new Promise((resolve) => {
    const force = setTimeout(() => child.kill('SIGKILL'), 10_000)
    child.once('exit', () => {
      clearTimeout(force)
      resolve()
    })
    child.kill(signal)
  })
}

async function waitUntilHealthy(origin: string) {
  for (let attempt = 0; attempt < 600; attempt += 1) {
    const reply = await fetch(`${origin}/health`).catch(() => null)
    if (reply?.ok) return
    await new Promise(resolve => setTimeout(resolve, 50))
  }
  throw new Error(`the server at ${origin} did not become healthy`)
}
