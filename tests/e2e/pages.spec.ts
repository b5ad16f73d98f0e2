import type { Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { closeBrowser, expectAccessible, openContext, signInAs } from '../support/browser'
import { signedInClient } from '../support/client'

// Every page as a person who works with it: it opens without an error in the console, nothing serious for axe, and nothing
// that scrolls sideways, day and night, on a desk and on a phone.
const PAGES: { path: string, as: string }[] = [
  { path: '/desk', as: 'manager' },
  { path: '/board', as: 'manager' },
  { path: '/people', as: 'manager' },
  { path: '/invoices', as: 'manager' },
  { path: '/helium', as: 'operator' },
  { path: '/today', as: 'operator' },
  { path: ':run/sheet', as: 'operator' },
  { path: '/plan', as: 'visiting user, Alder' },
  { path: '/runs', as: 'visiting user, Alder' },
  { path: ':ownRun', as: 'visiting user, Alder' },
  { path: ':ownRun/results', as: 'visiting user, Alder' },
  { path: '/results', as: 'PI, Alder' },
  { path: ':result', as: 'PI, Alder' },
  { path: ':invoice', as: 'PI, Alder' },
  { path: ':group', as: 'PI, Alder' },
  { path: '/samples', as: 'PI, Alder' },
  { path: '/samples/new', as: 'PI, Alder' },
  { path: '/rates', as: 'PI, Alder' },
  { path: '/cryostats/petrel', as: 'PI, Alder' },
  { path: '/sessions', as: 'PI, Alder' },
]
const LOOKS = [{ theme: 'day', width: 1440 }, { theme: 'night', width: 1440 }, { theme: 'day', width: 390 }, { theme: 'night', width: 390 }] as const
const names: Record<string, string> = {}

beforeAll(async () => {
  const [manager, pi] = [await signedInClient('manager'), await signedInClient('PI, Alder')]
  names[':run'] = `/runs/${(await manager.get<{ items: { id: string }[] }>('/api/runs?state=running')).body.items[0]!.id}`
  names[':ownRun'] = `/runs/${(await pi.get<{ items: { id: string }[] }>('/api/runs?state=settled')).body.items[0]!.id}`
  names[':result'] = `/results/${(await pi.get<{ items: { datasetId: string }[] }>('/api/results')).body.items[0]!.datasetId}`
  const [invoice] = (await pi.get<{ id: string }[]>('/api/invoices')).body
  names[':invoice'] = `/invoices/${invoice!.id}`
  names[':group'] = `/groups/${(await pi.get<{ user: { groups: { id: string }[] } }>('/api/auth/session')).body.user.groups[0]!.id}`
})
afterAll(closeBrowser)

const pages = new Map<string, Page>()
async function pageOf(as: string, look: (typeof LOOKS)[number]): Promise<Page> {
  const key = `${as} ${look.theme} ${look.width}`
  const page = pages.get(key) ?? await signInAs(as, { ...look, height: look.width === 390 ? 844 : 900 })
  pages.set(key, page)
  return page
}

describe.each(LOOKS)('by $theme at $width px', (look) => {
  it.each(PAGES)('$path as $as', async ({ path, as }) => {
    const page = await pageOf(as, look)
    const problems: string[] = []
    const hear = (message: { type(): string, text(): string }) => message.type() === 'error' && problems.push(message.text())
    const fail = (error: Error) => problems.push(error.message)
    page.on('console', hear)
    page.on('pageerror', fail)
    const reply = await page.goto(path.replace(/^:[a-zA-Z]+/, name => names[name]!), { waitUntil: 'load' })
    await page.waitForTimeout(600)
    page.off('console', hear)
    page.off('pageerror', fail)
    expect(reply?.status()).toBe(200)
    expect(problems).toEqual([])
    expect(await page.title()).toMatch(/ · Holdtime$/)
    expect(await page.evaluate(() => document.documentElement.scrollWidth - innerWidth), 'scrolls sideways').toBeLessThanOrEqual(0)
    await expectAccessible(page)
  })
})

describe('what goes wrong', () => {
  it('asks people who are not signed in to sign in, and takes them on to where they wanted', async () => {
    const page = await (await openContext()).newPage()
    await page.goto('/helium')
    expect(new URL(page.url()).searchParams.get('return')).toBe('/helium')
  })

  it('says at the form that address and password do not match, and keeps the address', async () => {
    const page = await (await openContext()).newPage()
    await page.goto('/sign-in', { waitUntil: 'networkidle' })
    await page.getByLabel('E-mail').fill('nobody@alder.example')
    await page.getByLabel('Password', { exact: true }).fill('not the password')
    await page.getByRole('button', { name: 'Sign in' }).click()
    await page.getByRole('alert').getByText('do not match').waitFor()
    expect(await page.getByLabel('E-mail').inputValue()).toBe('nobody@alder.example')
  })

  it('shows a page of another role, or none at all, as nothing to be seen here', async () => {
    const page = await signInAs('visiting user, Rowan')
    expect((await page.goto('/desk'))?.status()).toBe(404)
    await page.getByText('There is nothing here').waitFor()
    expect((await page.goto('/no/such/page'))?.status()).toBe(404)
  })

  it('keeps what was typed when the session ends meanwhile, and says what to do', async () => {
    const page = await signInAs('PI, Cedar')
    await page.goto('/samples/new', { waitUntil: 'networkidle' })
    await page.getByLabel('Name').fill('Typed before the session ended')
    await page.getByLabel('Chemical formula').fill('Au')
    const sessions = await (await page.request.get('/api/sessions')).json() as { id: string }[]
    for (const { id } of sessions) await page.request.delete(`/api/sessions/${id}`)
    await page.getByRole('button', { name: 'Save the sheet' }).click()
    await page.getByText(/session has ended/).first().waitFor()
    expect(await page.getByLabel('Name').inputValue()).toBe('Typed before the session ended')
  })

  it('signs out for good: going back shows nothing', async () => {
    const page = await signInAs('operator, second shift')
    await page.getByRole('button', { name: 'Sign out' }).first().click()
    await page.waitForURL('**/sign-in')
    await page.goto('/today')
    await page.waitForURL(/sign-in/)
  })
})

describe('by keyboard alone', () => {
  it('the board is one stop: arrows move by day and lane, Enter opens what is there', async () => {
    const page = await signInAs('manager')
    await page.goto('/board', { waitUntil: 'networkidle' })
    const grid = page.getByRole('grid').first()
    await grid.focus()
    for (const key of ['Home', 'ArrowRight', 'ArrowRight', 'ArrowDown', 'ArrowUp', 'PageDown', 'PageUp']) await page.keyboard.press(key)
    expect(await page.evaluate(() => document.activeElement?.closest('[role=grid]') !== null)).toBe(true)
  })
})
