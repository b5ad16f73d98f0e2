import AxeBuilder from '@axe-core/playwright'
import { type Browser, type BrowserContext, type Page, chromium } from 'playwright-core'
import { expect, inject } from 'vitest'
import { CHROMIUM } from '../../scripts/lib/chromium'
import { demoSignIn } from './client'

let browser: Browser | undefined

/** Debian's Chromium, started once a file. */
export async function openBrowser(): Promise<Browser> {
  browser ??= await chromium.launch(CHROMIUM)
  return browser
}

/** Closes the browser; call it in `afterAll`. */
export async function closeBrowser() {
  await browser?.close()
  browser = undefined
}

export interface PageOptions { width?: number, height?: number, theme?: 'day' | 'night' }

/** A fresh browser context on the running product. Anything that leaves loopback fails the test. */
export async function openContext(options: PageOptions = {}): Promise<BrowserContext> {
  const { origin } = inject('server')
  const context = await (await openBrowser()).newContext({ baseURL: origin, viewport: { width: options.width ?? 1440, height: options.height ?? 900 }, reducedMotion: 'reduce', locale: 'en-GB', acceptDownloads: true })
  await context.addCookies([{ name: 'holdtime-theme', value: options.theme ?? 'day', url: origin }])
  context.on('request', (request) => {
    const { hostname, protocol } = new URL(request.url())
    if (protocol.startsWith('http') && hostname !== '127.0.0.1' && hostname !== 'localhost') throw new Error(`a page asked for ${request.url()}`)
  })
  return context
}

/** A page signed in through the sign-in form, as a person would. */
export async function signInAs(as: string, options: PageOptions = {}): Promise<Page> {
  const context = await openContext(options)
  const page = await context.newPage()
  const account = demoSignIn(as)
  await page.goto('/sign-in', { waitUntil: 'networkidle' })
  await page.getByLabel('E-mail').fill(account.email)
  await page.getByLabel('Password', { exact: true }).fill(account.password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL(url => url.pathname !== '/sign-in' && url.pathname !== '/')
  return page
}

/** Fails with the list when axe finds something serious or critical. */
export async function expectAccessible(page: Page) {
  const { violations } = await new AxeBuilder({ page }).analyze()
  const serious = violations.filter(violation => violation.impact === 'serious' || violation.impact === 'critical')
  expect(serious.map(violation => `${violation.id}: ${violation.nodes.map(node => node.target.join(' ')).slice(0, 3).join(' | ')}`)).toEqual([])
}
