import { readFile } from 'node:fs/promises'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { launchChromium } from '../support/chromium'
import { buildWorld, PASSWORD, type TestPerson } from '../support/factories'
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

const enter = (person: TestPerson) => openAs(browser, site.origin, { email: person.email, password: PASSWORD })
const look = async (page: Page, name: string) => {
  await picture(page, name, [DESK_WIDTH])
  await expectNoSeriousAxe(page)
}
const HEAD = 'id;name;source;edition;confidence;material;boreMm;wallMm;thermalClassC'
const choose = (page: Page, lines: readonly string[]) => page.locator('input[type=file]').setInputFiles({ name: 'sleeves.csv', mimeType: 'text/csv', buffer: Buffer.from(`\ufeff${[HEAD, ...lines].join('\r\n')}\r\n`) })

describe('the company’s own library', () => {
  it('takes rows in from a table once everything in it fits', async () => {
    const page = await enter(world.engineer)
    await page.goto('/parts/sleeve')
    await page.getByRole('button', { name: 'Import CSV' }).click()
    const [saved] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: 'Download the template' }).click()])
    expect(await readFile((await saved.path())!, 'utf8')).toMatch(/^\ufeffid,name,source,edition,confidence,/)

    await page.getByText('What stands in which column').click()
    await choose(page, ['bm-s1;Sleeve 1,5;Data sheet;2024;high;PTFE;1,5;0,4;180', 'bm-s2;Sleeve 2;Data sheet;2024;high;PTFE;wide;0,4;180'])
    await page.getByRole('button', { name: 'Read the file' }).click()
    await page.getByText('none of it can be taken in').waitFor()
    await page.getByText('“wide” is not a number.').waitFor()
    expect(await page.getByRole('button', { name: /^Take in/ }).count()).toBe(0)
    await look(page, 'parts-import-unfit')

    await choose(page, ['bm-s1;Sleeve 1,5;Data sheet;2024;high;PTFE;1,5;0,4;180', 'bm-s2;Sleeve 2;Data sheet;2024;high;PTFE;2;0,4;180'])
    await page.getByRole('button', { name: 'Read the file' }).click()
    await page.getByText('Everything in the file fits.').waitFor()
    await page.getByRole('button', { name: 'Take in 2 rows' }).click()
    await page.getByText('The reason is missing.').waitFor()
    await look(page, 'parts-import-fits')
    await page.getByLabel('Reason').fill('Data book of the maker, 2024.')
    await page.getByRole('button', { name: 'Take in 2 rows' }).click()
    await page.getByText('2 rows new').waitFor()
    await page.getByRole('link', { name: 'Show your own sleeves' }).click()
    await page.getByRole('link', { name: 'Sleeve 1,5' }).waitFor()
  })

  it('marks rows as preferred and in the store, and holds a search to the store', async () => {
    const page = await enter(world.engineer)
    const mark = async (path: string, name: string) => {
      await page.goto(path)
      await Promise.all([page.waitForResponse((answer) => answer.url().endsWith('/flags') && answer.request().method() === 'PUT'), page.getByRole('checkbox', { name }).first().click()])
    }
    await mark('/parts/core/row/etd34-17-11', 'in store')
    await mark('/parts/former/row/etd34-17-11-h', 'in store')
    await look(page, 'part-flags')
    await mark('/parts/core?search=etd34', 'preferred')
    await page.reload()
    expect(await page.getByRole('checkbox', { name: 'preferred' }).first().isChecked()).toBe(true)
    await look(page, 'parts-flags')

    await page.goto('/specifications/new')
    await page.getByRole('button', { name: 'State it: Current limit' }).click()
    await page.getByText('Narrow the search').click()
    await page.getByText('Marked: cores 1, coil formers 1').waitFor()
    await page.getByLabel('Only what lies in the store').check()
    await page.getByRole('button', { name: 'Search the library' }).click()
    const result = page.getByRole('region', { name: 'Result of the search' })
    await result.waitFor({ timeout: 120_000 })
    const others = (await result.innerText()).match(/\b(E\d|EFD|PQ|RM|EP|ER)\d*[/\d]*/g) ?? []
    expect(others).toEqual([])
    await look(page, 'search-store')
  })
})
