import * as contract from '#shared/contracts/specifications'
import { readFile } from 'node:fs/promises'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildChecked, buildDraft, newPartNumber, revisionParams } from '../support/build-specification'
import { launchChromium } from '../support/chromium'
import { buildWorld, PASSWORD, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'
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
const stored = (page: Page) => page.getByText(/^Stored \d{4}/).waitFor()
const section = (page: Page, name: string) => page.getByRole('navigation', { name: 'Sections of the specification' }).getByRole('button', { name }).click()
const look = async (page: Page, name: string) => {
  await picture(page, name, [DESK_WIDTH])
  await expectNoSeriousAxe(page)
}
async function openWorkbench(page: Page, params: { specificationId: string; revisionId: string }) {
  await page.goto(`/specifications/${params.specificationId}/revisions/${params.revisionId}/workbench`)
  await page.getByRole('navigation', { name: 'Sections of the specification' }).waitFor()
}
const read = async (params: { specificationId: string; revisionId: string }) => (await request(test.app, contract.getRevision, { as: world.engineer.cookie, params }).expect(200)).body

describe('the winding sequence', () => {
  it('is reordered by dragging and by keyboard, undone, and tied to the coil both ways', async () => {
    const draft = await buildDraft(test, world.engineer)
    const ids = draft.document.specification.sequence.map(({ id }: { id: string }) => id)
    const page = await enter(world.engineer)
    await openWorkbench(page, revisionParams(draft))
    await section(page, 'Sequence')
    const order = async () => {
      await stored(page)
      return (await read(revisionParams(draft))).document.specification.sequence.map(({ id }: { id: string }) => id)
    }

    await page.locator('.drag-handle').first().dragTo(page.locator('[data-place="sequence.2"] > tr').first())
    await page.getByText('Changed; stored in a moment').waitFor()
    expect((await order()).indexOf(ids[0])).toBeGreaterThan(0)
    await page.getByRole('button', { name: 'Undo' }).click()
    await page.getByText('Changed; stored in a moment').waitFor()
    expect(await order()).toEqual(ids)

    await page.getByRole('button', { name: 'step 1, all fields' }).focus()
    await page.keyboard.press('Alt+ArrowDown')
    await page.getByText('Changed; stored in a moment').waitFor()
    expect((await order()).slice(0, 2)).toEqual([ids[1], ids[0]])
    await page.keyboard.press('Control+z')
    await page.getByText('Changed; stored in a moment').waitFor()
    expect(await order()).toEqual(ids)

    await page.locator('[data-place="sequence.0"]').hover()
    await page.locator('.coil .step.active').first().waitFor()
    await page.locator('.coil .step').first().focus()
    await page.locator('.row-lines.pointed').first().waitFor()
  })
})

describe('a specification as a file', () => {
  it('is exported, refused where it does not fit, and comes back whole as a new part and into a draft', async () => {
    const draft = await buildDraft(test, world.engineer)
    const page = await enter(world.engineer)
    await openWorkbench(page, revisionParams(draft))
    const saved = page.waitForEvent('download')
    await page.locator('summary', { hasText: 'File' }).click()
    await page.getByRole('button', { name: 'Export the specification (JSON)' }).click()
    const text = await readFile((await (await saved).path())!, 'utf8')
    const specification = JSON.parse(text) as Record<string, unknown>
    expect(specification).toEqual(draft.document.specification)

    await page.goto('/specifications/import')
    const give = (content: unknown, name = 'part.json') => page.locator('input[type="file"]').first().setInputFiles({ name, mimeType: 'application/json', buffer: Buffer.from(typeof content === 'string' ? content : JSON.stringify(content)) })
    await give({ ...specification, schema: 'foreign/7', colour: 'grey' })
    await page.getByText('Nothing was taken from this file.').waitFor()
    expect(await page.getByText('This file follows the schema “foreign/7”').count()).toBe(1)
    expect(await page.getByText('This program knows no field “colour” here.').count()).toBe(1)
    await look(page, 'specification-import-refused')

    await give(text)
    await page.getByText('Everything in this file fits:').waitFor()
    await page.getByLabel('Part number').fill(newPartNumber())
    await look(page, 'specification-import')
    await page.getByRole('button', { name: 'Start a draft with this file' }).click()
    await page.getByRole('navigation', { name: 'Sections of the specification' }).waitFor()

    await page.getByLabel('Classification', { exact: true }).fill('typed here')
    await page.locator('summary', { hasText: 'File' }).click()
    await page.getByRole('button', { name: 'Import a file into this draft' }).click()
    await give(text)
    await page.getByRole('button', { name: 'Replace the draft with this file' }).click()
    await page.getByRole('dialog').waitFor({ state: 'hidden' })
    expect(await page.getByLabel('Classification', { exact: true }).inputValue()).not.toBe('typed here')
    await page.getByRole('button', { name: 'Undo' }).click()
    expect(await page.getByLabel('Classification', { exact: true }).inputValue()).toBe('typed here')
  })
})

describe('revisions', () => {
  it('are copied as a new part, compared in words and on the coil, and write the revision block', async () => {
    const checked = await buildChecked(test, world.engineer, world.quality)
    await request(test.app, contract.releaseRevision, { as: world.checker.cookie, params: revisionParams(checked), body: { version: checked.version } }).expect(200)
    const page = await enter(world.engineer)
    await page.goto(`/specifications/${checked.specificationId}/revisions/${checked.id}`)
    await page.getByRole('button', { name: 'Copy as a new part' }).click()
    await page.getByLabel('Part number').fill(newPartNumber())
    await look(page, 'specification-copy')
    await page.getByRole('button', { name: 'Start a draft with this copy' }).click()
    await page.getByRole('navigation', { name: 'Sections of the specification' }).waitFor()

    await page.goto(`/specifications/${checked.specificationId}`)
    await page.getByRole('button', { name: 'New draft' }).click()
    await page.getByRole('navigation', { name: 'Sections of the specification' }).waitFor()
    await section(page, 'Windings')
    const before = await page.getByLabel('Turns, winding 1').inputValue()
    await page.getByLabel('Turns, winding 1').fill('13')
    await stored(page)
    await section(page, 'Notes')
    await page.getByRole('button', { name: 'Write it from the comparison with the last release' }).click()
    await page.getByRole('button', { name: 'revision entry 1, all fields' }).click()
    const block = page.getByLabel(/what changed, revision entry 1/)
    await block.waitFor()
    expect(await block.inputValue()).toMatch(new RegExp(`Turns: ${before} → 13`))
    await stored(page)

    await page.goto(`/specifications/${checked.specificationId}/compare`)
    await page.getByRole('rowheader', { name: /winding .* \[w1\], Turns/ }).waitFor()
    await page.getByText('new samples, first-article report').first().waitFor()
    expect(await page.locator('.coil .step.changed').count()).toBeGreaterThan(1)
    await look(page, 'specification-compare')
  })
})

describe('comments', () => {
  it('are pinned to the field under the cursor, lead back to it, and are settled', async () => {
    const draft = await buildDraft(test, world.engineer)
    const page = await enter(world.checker)
    await openWorkbench(page, revisionParams(draft))
    await page.getByText('Legal owner').first().click()
    await page.getByRole('tab', { name: 'Comments' }).click()
    await page.getByLabel(/New comment on/).fill('Is this the right company?')
    await page.getByRole('button', { name: 'Comment', exact: true }).click()
    await page.getByText('Is this the right company?').waitFor()
    await page.getByRole('img', { name: 'one open comment' }).waitFor()
    await look(page, 'workbench-comments')

    const engineer = await enter(world.engineer)
    await openWorkbench(engineer, revisionParams(draft))
    await section(engineer, 'Core')
    await engineer.getByRole('tab', { name: 'Comments' }).click()
    await engineer.getByRole('button', { name: 'Title block › Legal owner' }).click()
    expect(await engineer.evaluate(() => document.activeElement?.getAttribute('aria-label'))).toBe('Legal owner')
    await engineer.getByRole('button', { name: /^Settle: Is this/ }).click()
    await engineer.getByText('Settled by').waitFor()
  })
})

describe('plots', () => {
  it('show currents and flux per corner, losses and temperature', async () => {
    const draft = await buildDraft(test, world.engineer)
    const page = await enter(world.engineer)
    await openWorkbench(page, revisionParams(draft))
    await page.getByRole('tab', { name: 'Plots' }).click()
    for (const name of [/^Winding currents, one period/, /^Flux density/, /^Loss\./, /^Temperature\./]) await page.getByRole('img', { name }).waitFor()
    await page.getByLabel('Waveforms at').selectOption('maximum-input')
    await look(page, 'workbench-plots')
  })
})
