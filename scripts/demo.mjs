// `npm run demo`: installs, builds, migrates, seeds and serves the whole product with its fakes. `--dev` serves from source.
import { spawn } from 'node:child_process'
import { randomBytes } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { build, checkNode, fail, install, mustBeFree, mustRun, nuxt, root, step, tsx, tsxEnvironment } from './lib/steps.mjs'

const isDev = process.argv.includes('--dev')
const port = Number(process.env.PORT ?? 3000)
const ports = { payments: Number(process.env.PAYMENTS_FAKE_PORT ?? 12111), smtp: Number(process.env.MAIL_FAKE_SMTP_PORT ?? 1025), mail: Number(process.env.MAIL_FAKE_WEB_PORT ?? 1080) }
const dataFolder = resolve(root, process.env.HOLDTIME_DATA ?? '.data')

checkNode()
await mustBeFree(port, 'Holdtime', 'PORT')
await mustBeFree(ports.payments, 'payments fake', 'PAYMENTS_FAKE_PORT')
await mustBeFree(ports.smtp, 'mail fake, SMTP', 'MAIL_FAKE_SMTP_PORT')
await mustBeFree(ports.mail, 'mail fake, reading', 'MAIL_FAKE_WEB_PORT')

if (process.argv.includes('--reset')) rmSync(dataFolder, { recursive: true, force: true })
mkdirSync(dataFolder, { recursive: true })
await install()
if (!isDev) await build()

const environment = demoEnvironment()
const signInsFile = join(dataFolder, 'demo-sign-ins.json')
if (!existsSync(signInsFile)) {
  await step('seed an invented facility', () => mustRun(process.execPath, [...tsx, join(root, 'scripts/seed.ts')], { env: { ...environment, ...tsxEnvironment } }))
}

const children = []
let stopping = false
const stop = (code) => {
  if (stopping) return
  stopping = true
  process.stdout.write('\nstopping …\n')
  // The server first: it finishes its jobs, which may still need the fakes.
  void children.toReversed().reduce((before, child) => before.then(() => end(child)), Promise.resolve()).then(() => process.exit(code))
}
process.on('SIGINT', () => stop(0))
process.on('SIGTERM', () => stop(0))

start('fakes', [...tsx, join(root, 'scripts/fakes/serve.ts')], { ...environment, ...tsxEnvironment })
if (isDev) start('server', [nuxt, 'dev', '--port', String(port), '--host', '127.0.0.1'], environment)
else start('server', [join(root, '.output/server/index.mjs')], { ...environment, NODE_ENV: 'production' })

await step('start', () => waitFor(`http://127.0.0.1:${port}/health`))
printTable()

function demoEnvironment() {
  const secretsFile = join(dataFolder, 'demo-secrets.json')
  if (!existsSync(secretsFile)) {
    writeFileSync(secretsFile, JSON.stringify({ auth: randomBytes(32).toString('hex'), webhook: `whsec_${randomBytes(24).toString('hex')}` }), { mode: 0o600 })
  }
  const secrets = JSON.parse(readFileSync(secretsFile, 'utf8'))
  return {
    PORT: String(port),
    HOST: '127.0.0.1',
    HOLDTIME_DATA: dataFolder,
    HOLDTIME_ORIGIN: process.env.HOLDTIME_ORIGIN ?? `http://localhost:${port}`,
    AUTH_SECRET: secrets.auth,
    PAYMENTS_SECRET_KEY: 'sk_test_holdtime_demo',
    PAYMENTS_WEBHOOK_SECRET: secrets.webhook,
    PAYMENTS_WEBHOOK_URL: `http://127.0.0.1:${port}/api/payments/webhook`,
    PAYMENTS_API_HOST: '127.0.0.1',
    PAYMENTS_API_PORT: String(ports.payments),
    PAYMENTS_API_PROTOCOL: 'http',
    PAYMENTS_FAKE_PORT: String(ports.payments),
    MAIL_FAKE_SMTP_PORT: String(ports.smtp),
    MAIL_FAKE_WEB_PORT: String(ports.mail),
    SMTP_URL: `smtp://127.0.0.1:${ports.smtp}`,
    MAIL_FROM: 'Skerry Low-Temperature Facility <desk@skerry.example>',
    LOG_LEVEL: process.env.LOG_LEVEL ?? 'warn',
  }
}

function start(name, args, env) {
  const child = spawn(process.execPath, args, { cwd: root, stdio: ['ignore', 'inherit', 'inherit'], env: { ...process.env, NUXT_TELEMETRY_DISABLED: '1', ...env }, detached: true })
  child.once('exit', (code) => {
    child.ended = true
    if (!stopping) {
      process.stderr.write(`\n✗ The ${name} ended by itself (code ${code}); see its output above.\n`)
      stop(1)
    }
  })
  children.push(child)
}

function end(child) {
  if (child.ended) return Promise.resolve()
  return new Promise((done) => {
    const force = setTimeout(() => child.kill('SIGKILL'), 10_000)
    child.once('exit', () => {
      clearTimeout(force)
      done()
    })
    child.kill('SIGTERM')
  })
}

async function waitFor(url) {
  for (let attempt = 0; attempt < 1200; attempt += 1) {
    try {
      if ((await fetch(url)).ok) return
    }
    catch {
      // Not listening yet.
    }
    await new Promise(done => setTimeout(done, 100))
  }
  fail(`The server did not answer at ${url} within two minutes.`)
}

function printTable() {
  const people = JSON.parse(readFileSync(signInsFile, 'utf8'))
  const rows = [
    ['Holdtime', environment.HOLDTIME_ORIGIN, ''],
    ['mail that was sent', `http://localhost:${ports.mail}`, ''],
    ['payments fake', `http://localhost:${ports.payments}/_fake`, ''],
    ['', '', ''],
    ['sign in as', 'e-mail', 'password'],
    ...people.map(person => [person.as, person.email, person.password]),
  ]
  const widths = [0, 1, 2].map(column => Math.max(...rows.map(row => row[column].length)))
  process.stdout.write(`\n${rows.map(row => row.map((cell, column) => cell.padEnd(widths[column])).join('   ').trimEnd()).join('\n')}\n\nData: ${dataFolder}. Stop with Ctrl-C; \`npm run demo -- --reset\` starts afresh.\n`)
}
