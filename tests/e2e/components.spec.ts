import type { Page } from 'playwright-core'
import { afterAll, describe, expect, it } from 'vitest'
import { closeBrowser, expectAccessible, signInAs } from '../support/browser'

afterAll(closeBrowser)

const open = async (page: Page, tab: string) => {
  await page.goto('/internal/components', { waitUntil: 'networkidle' })
  await page.getByRole('tab', { name: tab }).click()
}

describe.each(['day', 'night'] as const)('the components by %s', (theme) => {
  it.each([1440, 390, 320])('are accessible and fit at %i px', async (width) => {
    const page = await signInAs('manager', { width, theme })
    for (const tab of ['Base', 'Form', 'Table', 'Plot']) {
      await open(page, tab)
      if (tab === 'Form') await page.getByRole('button', { name: 'Check the form' }).click()
      await expectAccessible(page)
      expect(await page.evaluate(() => document.documentElement.scrollWidth - innerWidth), `${tab} does not scroll sideways`).toBeLessThanOrEqual(0)
    }
    await page.context().close()
  })
})

describe('by keyboard', () => {
  it('a dialog takes the focus, holds it, and gives it back', async () => {
    const page = await signInAs('manager')
    await open(page, 'Base')
    const opener = page.getByRole('button', { name: 'Open a dialog' })
    await opener.press('Enter')
    const dialog = page.getByRole('dialog', { name: 'Decline this request?' })
    for (let press = 0; press < 6; press += 1) {
      await page.keyboard.press('Tab')
      expect(await dialog.evaluate(element => element.contains(document.activeElement))).toBe(true)
    }
    await page.keyboard.press('Escape')
    await dialog.waitFor({ state: 'detached' })
    expect(await opener.evaluate(element => element === document.activeElement)).toBe(true)
    await page.context().close()
  })

  it('a refused form names each field and leads to it', async () => {
    const page = await signInAs('manager')
    await open(page, 'Form')
    await page.getByRole('button', { name: 'Check the form' }).press('Enter')
    const summary = page.getByRole('alert').filter({ hasText: 'missing or do not fit' })
    await summary.waitFor()
    expect(await summary.evaluate(element => element === document.activeElement)).toBe(true)
    await summary.getByRole('link', { name: /^Level/ }).press('Enter')
    expect(await page.getByLabel('Level, %').evaluate(element => element === document.activeElement)).toBe(true)
    await page.context().close()
  })

  it('a day is picked from the calendar, and may be typed as well', async () => {
    const page = await signInAs('manager')
    await open(page, 'Form')
    const day = page.getByLabel('Read at', { exact: true })
    await day.fill('2027-05-04')
    await page.getByRole('button', { name: /choose a day/ }).press('Enter')
    const dialog = page.getByRole('dialog', { name: 'Read at' })
    await dialog.getByText('May 2027').waitFor()
    await page.waitForFunction(() => document.activeElement?.classList.contains('vc-day-content'))
    await page.keyboard.press('ArrowDown')
    await page.keyboard.press('Enter')
    await dialog.waitFor({ state: 'detached' })
    expect(await day.inputValue()).toBe('2027-05-11')
    await page.context().close()
  })

  it('the window of a plot moves point by point, and its numbers follow', async () => {
    const page = await signInAs('manager')
    await open(page, 'Plot')
    const edge = page.getByRole('slider', { name: 'Fitted window, upper end' })
    await edge.press('ArrowLeft')
    expect(await edge.getAttribute('aria-valuenow')).toBe('49.8')
    expect(await page.getByLabel('Fitted window, upper end, K²').last().inputValue()).toBe('49.8')
    await page.context().close()
  })
})

describe('the colours', () => {
  it('are set before the first paint where the device is dark, and never flash back', async () => {
    const page = await signInAs('manager')
    await page.context().clearCookies({ name: 'holdtime-theme' })
    await page.emulateMedia({ colorScheme: 'dark' })
    await page.addInitScript(() => {
      const seen: (string | undefined)[] = []
      Object.assign(window, { seenThemes: seen })
      // Only what stands when a frame is drawn can be seen.
      const look = () => {
        if (document.body) seen.push(document.documentElement.dataset.theme)
        requestAnimationFrame(look)
      }
      look()
    })
    await page.goto('/internal/components', { waitUntil: 'networkidle' })
    const seen = await page.evaluate(() => (window as unknown as { seenThemes: string[] }).seenThemes)
    expect(seen.length).toBeGreaterThan(2)
    expect(new Set(seen)).toEqual(new Set(['night']))
    await page.context().close()
  })
})
