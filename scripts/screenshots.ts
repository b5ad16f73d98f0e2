// `npm run screenshots`: every page of the production build on demo data, as a person who works with it, day and night, at
// 1440 and 390 px, into docs/screenshots.
import { mkdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { type BrowserContext, chromium } from 'playwright-core'
import { startServer } from '../tests/support/server'
import { CHROMIUM } from './lib/chromium'

const FOLDER = fileURLToPath(new URL('../docs/screenshots', import.meta.url))
const LOOKS = [{ theme: 'day', width: 1440, height: 900 }, { theme: 'night', width: 1440, height: 900 }, { theme: 'day', width: 390, height: 844 }, { theme: 'night', width: 390, height: 844 }] as const
const PAGES: Record<string, { as: string, path: (context: BrowserContext) => Promise<string> | string }> = {
  'sign-in': { as: '', path: () => '/sign-in' },
  'desk': { as: 'manager', path: () => '/desk' },
  'board': { as: 'manager', path: () => '/board' },
  'people': { as: 'manager', path: () => '/people' },
  'today': { as: 'operator', path: () => '/today' },
  'helium': { as: 'operator', path: () => '/helium' },
  'run-sheet': { as: 'operator', path: async context => `/runs/${(await items(context, '/api/runs?state=running')).find(run => run.cryostat === 'Petrel')!.id}/sheet` },
  'plan': { as: 'visiting user, Alder', path: () => '/plan?cryostat=petrel' },
  'runs': { as: 'visiting user, Alder', path: () => '/runs' },
  'run': { as: 'visiting user, Rowan', path: async context => `/runs/${(await items(context, '/api/runs?state=approved'))[0]!.id}` },
  'results': { as: 'PI, Cedar', path: () => '/results' },
  'result': { as: 'PI, Hazel', path: async context => `/results/${(await items(context, '/api/results'))[0]!.datasetId}` },
  'samples': { as: 'PI, Alder', path: () => '/samples' },
  'invoices': { as: 'PI, Alder', path: () => '/invoices' },
  'invoice': { as: 'PI, Alder', path: async context => `/invoices/${((await (await context.request.get('/api/invoices')).json()) as { id: string }[])[0]!.id}` },
  'group': { as: 'PI, Alder', path: async context => `/groups/${((await (await context.request.get('/api/auth/session')).json()) as { user: { groups: { id: string }[] } }).user.groups[0]!.id}` },
  'rates': { as: 'PI, Alder', path: () => '/rates' },
  'cryostat': { as: 'PI, Alder', path: () => '/cryostats/petrel' },
}

async function items(context: BrowserContext, path: string): Promise<{ id: string, cryostat: string, datasetId: string }[]> {
  return ((await (await context.request.get(path)).json()) as { items: { id: string, cryostat: string, datasetId: string }[] }).items
}

const server = await startServer()
const browser = await chromium.launch(CHROMIUM)
try {
  mkdirSync(FOLDER, { recursive: true })
  for (const look of LOOKS) {
    const contexts = new Map<string, BrowserContext>()
    for (const [name, { as, path }] of Object.entries(PAGES)) {
      const context = contexts.get(as) ?? await signedIn(as, look)
      contexts.set(as, context)
      const page = await context.newPage()
      await page.goto(await path(context), { waitUntil: 'load' })
      if (name === 'plan') {
        await page.waitForTimeout(500)
        await page.getByLabel('Sample', { exact: true }).selectOption({ index: 1 })
        for (const [label, value] of [['Title of the run', 'Heavy electrons'], ['From, K', '2'], ['To, K', '12']] as const) await page.getByLabel(label).fill(value)
        await page.getByText('Likely total').waitFor()
      }
      await page.waitForTimeout(900)
      await page.screenshot({ path: `${FOLDER}/${name}-${look.theme}-${look.width}.jpg`, type: 'jpeg', quality: 78 })
      await page.close()
    }
    for (const context of contexts.values()) await context.close()
  }
}
finally {
  await browser.close()
  await server.stop()
}
process.exit(0)

async function signedIn(as: string, look: (typeof LOOKS)[number]): Promise<BrowserContext> {
  const context = await browser.newContext({ baseURL: server.origin, viewport: { width: look.width, height: look.height } })
  await context.addCookies([{ name: 'holdtime-theme', value: look.theme, url: server.origin }])
  if (!as) return context
  const account = server.signIns.find(candidate => candidate.as.startsWith(as))!
  const page = await context.newPage()
  await page.goto('/sign-in', { waitUntil: 'networkidle' })
  await page.getByLabel('E-mail').fill(account.email)
  await page.getByLabel('Password', { exact: true }).fill(account.password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL(url => url.pathname !== '/sign-in' && url.pathname !== '/')
  await page.close()
  return context
}
