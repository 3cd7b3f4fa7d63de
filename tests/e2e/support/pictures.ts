import axe from 'axe-core'
import type { Express } from 'express'
import { mkdirSync } from 'node:fs'
import type { AddressInfo } from 'node:net'
import path from 'node:path'
import type { Browser, Page } from 'playwright-core'

const FOLDER = path.resolve(import.meta.dirname, '../../../.pictures')

export const DESK_WIDTH = 1440
export const PHONE_WIDTH = 390
const HEIGHTS: Readonly<Record<number, number>> = { [DESK_WIDTH]: 900, [PHONE_WIDTH]: 844 }

export interface Visitor {
  email: string
  password: string
}

/** Serves the application, with its built client, on a free port of this machine. */
export async function serve(app: Express): Promise<{ origin: string; close: () => void }> {
  const server = app.listen(0, '127.0.0.1')
  await new Promise((resolve) => server.once('listening', resolve))
  const close = () => {
    server.close()
    server.closeAllConnections()
  }
  return { origin: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, close }
}

/** A page of a browser profile of its own, at desk width. */
export async function openPage(browser: Browser, origin: string): Promise<Page> {
  const context = await browser.newContext({
    baseURL: origin,
    viewport: { width: DESK_WIDTH, height: HEIGHTS[DESK_WIDTH]! },
    reducedMotion: 'reduce',
    acceptDownloads: true,
    locale: 'en-GB',
    timezoneId: 'Europe/Berlin',
  })
  return context.newPage()
}

/** Signs in through the form, as a person would, and waits for the worklist. */
export async function openAs(browser: Browser, origin: string, { email, password }: Visitor): Promise<Page> {
  const page = await openPage(browser, origin)
  await page.goto('/sign-in')
  await page.getByLabel('Mail address').fill(email)
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.getByRole('heading', { level: 1, name: 'Worklist' }).waitFor()
  return page
}

/** Waits until fonts are there and nothing on the sheet is still being fetched. */
export async function settle(page: Page): Promise<void> {
  await page.waitForFunction(() => !document.querySelector('.winding-wait'), undefined, { timeout: 15_000 })
  await page.evaluate(() => document.fonts.ready.then(() => undefined))
}

/** Leaves `.pictures/<name>-<width>.png` of the whole page for every width, and the page at desk width. */
export async function picture(page: Page, name: string, widths: readonly number[] = [DESK_WIDTH, PHONE_WIDTH]): Promise<void> {
  mkdirSync(FOLDER, { recursive: true })
  for (const width of widths) {
    await page.setViewportSize({ width, height: HEIGHTS[width] ?? 900 })
    await settle(page)
    // What sticks to the top of the screen would stand in the middle of the picture.
    await page.evaluate(() => window.scrollTo(0, 0))
    await page.screenshot({ path: path.join(FOLDER, `${name}-${width}.png`), fullPage: true })
  }
  await page.setViewportSize({ width: DESK_WIDTH, height: HEIGHTS[DESK_WIDTH]! })
}

/** True when the sheet is wider than the screen, which a phone would have to be dragged for. */
export function scrollsSideways(page: Page): Promise<boolean> {
  return page.evaluate(() => document.documentElement.scrollWidth > document.documentElement.clientWidth)
}

/** Runs axe-core on the page and throws with what it finds of serious or critical impact. */
export async function expectNoSeriousAxe(page: Page): Promise<void> {
  await settle(page)
  await page.evaluate(axe.source)
  const found = await page.evaluate(async () => {
    const { violations } = await (window as unknown as { axe: typeof axe }).axe.run(document, { resultTypes: ['violations'] })
    return violations
      .filter(({ impact }) => impact === 'serious' || impact === 'critical')
      .map(({ id, help, nodes }) => `${id}: ${help}\n${nodes.map(({ html, failureSummary }) => `    ${html}\n    ${failureSummary}`).join('\n')}`)
  })
  if (found.length > 0) throw new Error(`${page.url()} fails axe:\n${found.join('\n')}`)
}
