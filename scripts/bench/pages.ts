// `npm run bench`: pages and routes of the production build under load, each beside an empty page and a `select 1` of the
// same server in the same run; first-load JavaScript, start, memory, and a refit of 10 000 points.
import { readFileSync, statSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { gzipSync } from 'node:zlib'
import autocannon from 'autocannon'
import { chromium } from 'playwright-core'
import { fitLowTemperature } from '#shared/heat-capacity/fit'
import { demoSignIn, signedInClient } from '../../tests/support/client'
import { type StartedServer, startServer } from '../../tests/support/server'
import { CHROMIUM } from '../lib/chromium'

const USERS = 50
const SECONDS = Number(process.env.BENCH_SECONDS ?? 8)
const PUBLIC = fileURLToPath(new URL('../../.output/public', import.meta.url))

interface Measured { name: string, path: string, requestsPerSecond: number, p95Ms: number, errors: number }

/** Fifty users asking without a pause. */
async function load(server: StartedServer, cookie: string, name: string, path: string): Promise<Measured> {
  const reply = await autocannon({ url: `${server.origin}${path}`, connections: USERS, duration: SECONDS, headers: { cookie } })
  return { name, path, requestsPerSecond: reply.requests.average, p95Ms: reply.latency.p97_5, errors: reply.non2xx + reply.errors }
}

/** JavaScript that the browser asks for on a first visit of a page, compressed, kB. */
async function firstLoadKb(server: StartedServer, as: string, paths: string[]): Promise<Map<string, number>> {
  const browser = await chromium.launch(CHROMIUM)
  const account = demoSignIn(as, server)
  const sizes = new Map<string, number>()
  const signIn = await browser.newContext({ baseURL: server.origin })
  const page = await signIn.newPage()
  await page.goto('/sign-in', { waitUntil: 'networkidle' })
  await page.getByLabel('E-mail').fill(account.email)
  await page.getByLabel('Password', { exact: true }).fill(account.password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL(url => url.pathname !== '/sign-in' && url.pathname !== '/')
  const state = await signIn.storageState()
  for (const path of paths) {
    const context = await browser.newContext({ baseURL: server.origin, storageState: state })
    const visit = await context.newPage()
    const scripts = new Set<string>()
    // What is fetched ahead for pages that a link leads to is not this page's load.
    visit.on('request', (request) => {
      const isAhead = (request.headers()['sec-purpose'] ?? request.headers().purpose ?? '').includes('prefetch')
      if (request.resourceType() === 'script' && !isAhead) scripts.add(new URL(request.url()).pathname)
    })
    await visit.goto(path, { waitUntil: 'load' })
    await visit.waitForTimeout(700)
    sizes.set(path, [...scripts].reduce((sum, script) => sum + gzipSync(readFileSync(`${PUBLIC}${script}`)).length, 0) / 1000)
    await context.close()
  }
  await browser.close()
  return sizes
}

/** Median time of fitting γT + β₃T³ + β₅T⁵ to 10 000 points, ms. */
function refitMs(): number {
  const temperatureK = Array.from({ length: 10_000 }, (_, index) => 1 + index * 9 / 9999)
  const heatCapacity = temperatureK.map((kelvin, index) => 0.6943 * kelvin + 0.0475 * kelvin ** 3 + 1e-3 * Math.sin(index))
  const sigma = heatCapacity.map(value => value * 0.01)
  const times = Array.from({ length: 31 }, () => {
    const start = performance.now()
    fitLowTemperature({ temperatureK, heatCapacity, sigma }, { terms: ['gamma', 'beta3', 'beta5'], windowK: [1, 10] }, { atomsPerFormulaUnit: 1 })
    return performance.now() - start
  }).sort((a, b) => a - b)
  return times[15]!
}

const rssMb = (pid: number) => Number(/VmRSS:\s+(\d+)/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1]) / 1024

const server = await startServer()
try {
  const manager = await signedInClient('manager', server)
  const cookie = [...manager.cookies].map(pair => pair.join('=')).join('; ')
  const { body: runs } = await manager.get<{ items: { id: string }[] }>('/api/runs?state=running')
  const { body: results } = await manager.get<{ items: { datasetId: string }[] }>('/api/results')
  const [runId, datasetId] = [runs.items[0]!.id, results.items[0]?.datasetId]
  const day = (offset: number) => new Date(Date.now() + offset * 86_400_000).toISOString().slice(0, 10)

  await server.kill('SIGTERM')
  const start = performance.now()
  await server.restart()
  const startMs = performance.now() - start

  const routes: [string, string][] = [
    ['select 1', '/health'], ['empty page', '/internal/empty'],
    ['board route', `/api/board?from=${day(-1)}&to=${day(13)}`], ['run list route', '/api/runs'], ['run route', `/api/runs/${runId}`], ['sheet route', `/api/runs/${runId}/sheet`],
    ['board page', '/board'], ['run page', `/runs/${runId}`], ['sheet page', `/runs/${runId}/sheet`],
    ...(datasetId ? [['result route', `/api/datasets/${datasetId}`], ['result page', `/results/${datasetId}`]] as [string, string][] : []),
  ]
  for (const [, path] of routes) await manager.get(path)
  const measured: Measured[] = []
  for (const [name, path] of routes) measured.push(await load(server, cookie, name, path))
  const memoryMb = rssMb(server.process.pid!)
  const pages = ['/internal/empty', '/board', '/desk', '/today', '/plan', '/runs', `/runs/${runId}`, `/runs/${runId}/sheet`, '/results', '/samples', '/invoices', '/helium', ...(datasetId ? [`/results/${datasetId}`] : [])]
  const sizes = await firstLoadKb(server, 'manager', pages)
  const fitMs = refitMs()

  const floor = measured.find(row => row.name === 'empty page')!
  process.stdout.write(`\n${USERS} users without a pause, ${SECONDS} s each, manager's session\n`)
  for (const row of measured) process.stdout.write(`${row.name.padEnd(16)} ${row.requestsPerSecond.toFixed(0).padStart(6)} requests/s   p97.5 ${row.p95Ms.toFixed(0).padStart(5)} ms   ${(row.requestsPerSecond / floor.requestsPerSecond).toFixed(2).padStart(6)} of the empty page   ${row.errors} errors\n`)
  process.stdout.write('\nFirst-load JavaScript, compressed\n')
  for (const [path, kb] of sizes) process.stdout.write(`${path.replace(runId, ':run').replace(datasetId ?? '?', ':dataset').padEnd(22)} ${kb.toFixed(0).padStart(5)} kB\n`)
  process.stdout.write(`\nstart to ready ${startMs.toFixed(0)} ms   memory after load ${memoryMb.toFixed(0)} MB   refit of 10 000 points ${fitMs.toFixed(1)} ms   server bundle ${(statSync(fileURLToPath(new URL('../../.output/server/chunks/nitro/nitro.mjs', import.meta.url))).size / 1000).toFixed(0)} kB\n\n`)
  const key = (name: string) => name.replace(/ (\w)/g, (_, letter: string) => letter.toUpperCase()).replace('select1', 'selectOne')
  process.stdout.write(`RESULT ${JSON.stringify({
    ...Object.fromEntries(measured.flatMap(row => [[`${key(row.name)}_requestsPerSecond`, Number(row.requestsPerSecond.toFixed(1))], [`${key(row.name)}_p97_5_ms`, row.p95Ms]])),
    ...Object.fromEntries([...sizes].map(([path, kb]) => [`firstLoad_${path.replace(runId, 'run').replace(datasetId ?? '?', 'dataset')}_kB`, Number(kb.toFixed(1))])),
    startToReady_ms: Number(startMs.toFixed(0)), memory_MB: Number(memoryMb.toFixed(0)), refit10000_ms: Number(fitMs.toFixed(2)),
  })}\n`)
}
finally {
  await server.stop()
}
process.exit(0)
