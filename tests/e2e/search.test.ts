import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { launchChromium } from '../support/chromium'
import { buildWorld, PASSWORD } from '../support/factories'
import { startTestApp, type TestApp } from '../support/test-app'
import { DESK_WIDTH, expectNoSeriousAxe, openAs, picture, serve } from './support/pictures'

let test: TestApp
let site: Awaited<ReturnType<typeof serve>>
let browser: Browser
let world: Awaited<ReturnType<typeof buildWorld>>

beforeAll(async () => {
  test = await startTestApp()
  site = await serve(test.app)
  browser = await launchChromium()
  world = await buildWorld(test, 1)
})
afterAll(async () => {
  await browser?.close()
  site?.close()
  await test?.stop()
})

const look = async (page: Page, name: string) => {
  await picture(page, name, [DESK_WIDTH])
  await expectNoSeriousAxe(page)
}

describe('the search from a duty', () => {
  it('ranks, plots and compares candidates, says what fell out, and starts a draft with one of them', async () => {
    const page = await openAs(browser, site.origin, { email: world.engineer.email, password: PASSWORD })
    await page.goto('/specifications/new')
    await page.getByLabel('Part number').fill('BM-T7100')
    await page.getByLabel('Title').fill('Transformer, flyback, searched')
    await page.getByRole('button', { name: 'State it: Current limit' }).click()
    await page.getByText('Narrow the search').click()
    await look(page, 'search-wishes')
    await page.getByRole('button', { name: 'Search the library' }).click()

    const result = page.getByRole('region', { name: 'Result of the search' })
    await result.getByText(/\d+ candidates/).first().waitFor({ timeout: 120_000 })
    await look(page, 'search-result')
    const dots = result.getByRole('group', { name: 'Loss against volume of the candidates' }).getByRole('button')
    expect(await dots.count()).toBeGreaterThan(5)

    // By keyboard from the plot, and by the box in the table.
    await dots.first().focus()
    await page.keyboard.press('Enter')
    await result.getByRole('checkbox', { name: /, rank 2$/ }).check()
    const compared = result.getByRole('region', { name: 'Candidates side by side' })
    await compared.getByRole('article').nth(1).waitFor()
    expect(await compared.getByText('least').count()).toBeGreaterThan(3)
    await look(page, 'search-compare')

    await result.getByRole('button', { name: 'Volume, cm³' }).click()
    const first = await result.getByRole('row').nth(1).innerText()
    await result.getByRole('button', { name: 'Volume, cm³ ↑' }).click()
    expect(await result.getByRole('row').nth(1).innerText()).not.toBe(first)
    await result.getByText('What fell out, and by which check').click()
    await result.getByText(/formers?, by [A-Z]\d\d/).first().waitFor()

    await result.getByRole('button', { name: /^Take .*, rank 2$/ }).click()
    await page.getByRole('heading', { level: 1, name: /BM-T7100/ }).waitFor()
    await page.getByRole('tab', { name: 'Tests' }).click()
    await page.getByRole('button', { name: 'Reckon what the tests find' }).click()
    await page.getByRole('heading', { name: 'found on every part' }).waitFor({ timeout: 120_000 })
    await look(page, 'workbench-coverage')
  })
})
