import type { Page } from 'playwright-core'
import { readFile } from 'node:fs/promises'
import { expect } from 'vitest'
import { DESK_WIDTH, expectNoSeriousAxe, PHONE_WIDTH, picture, scrollsSideways } from '../pictures'

/** Leaves a picture of the sheet and holds it against axe; a vendor’s sheet must fit a phone as well. */
export async function look(page: Page, name: string, { phone = false } = {}): Promise<void> {
  await picture(page, `walk-${name}`, phone ? [DESK_WIDTH, PHONE_WIDTH] : [DESK_WIDTH])
  await expectNoSeriousAxe(page)
  if (!phone) return
  await page.setViewportSize({ width: PHONE_WIDTH, height: 844 })
  expect(await scrollsSideways(page), `${name} at ${PHONE_WIDTH} px`).toBe(false)
  await page.setViewportSize({ width: DESK_WIDTH, height: 900 })
}

/** What the person gets by pressing a button that downloads. */
export async function download(page: Page, button: string | RegExp): Promise<{ name: string; bytes: Buffer }> {
  const [file] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: button }).first().click()])
  return { name: file.suggestedFilename(), bytes: await readFile(await file.path()) }
}

export async function chooseFrom(page: Page, label: string | RegExp, option: string | RegExp): Promise<void> {
  await page.getByRole('combobox', { name: label }).first().click()
  await page.getByRole('option', { name: option }).first().click()
}

/** Confirms the question that a button asks. */
export async function confirm(page: Page, button: string): Promise<void> {
  const dialog = page.getByRole('dialog')
  await dialog.getByRole('button', { name: button, exact: true }).click()
  await dialog.waitFor({ state: 'detached' })
}

/** The path of a link in a mail, so that the page’s own address is used. */
export const pathOf = (link: string): string => {
  const { pathname, search, hash } = new URL(link)
  return `${pathname}${search}${hash}`
}

export const inDays = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10)
