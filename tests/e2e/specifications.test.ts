import * as contract from '#shared/contracts/specifications'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildDraft, buildInCheck, revisionParams } from '../support/build-specification'
import { launchChromium } from '../support/chromium'
import { buildPerson, buildWorld, PASSWORD, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'
import { letAllPass } from './support/let-pass'
import { DESK_WIDTH, expectNoSeriousAxe, openAs, picture, serve } from './support/pictures'

let test: TestApp
let site: Awaited<ReturnType<typeof serve>>
let browser: Browser
let world: Awaited<ReturnType<typeof buildWorld>>
let colleague: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  site = await serve(test.app)
  browser = await launchChromium()
  world = await buildWorld(test, 1)
  colleague = await buildPerson(test, world.buying, ['engineer'])
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

describe('from a duty to a released drawing', () => {
  it('goes by proposal, workbench, check and release, and each sheet holds what was typed', async () => {
    const page = await enter(world.engineer)
    await page.goto('/specifications')
    await page.getByText('No winding specification yet').waitFor()
    await look(page, 'specifications-empty')

    await page.getByRole('button', { name: 'New specification' }).click()
    await page.getByLabel('Part number').fill('BM-T7001')
    await page.getByLabel('Title').fill('Transformer, flyback, buoy supply')
    await page.getByLabel('Voltage, signed, output S1').fill('5,2')
    await page.getByRole('button', { name: 'Add an output' }).click()
    await page.getByLabel('Voltage, signed, output S2').fill('-15')
    await page.getByLabel('Current at full load, output S2').fill('200 mA')
    await page.getByRole('button', { name: 'State it: Current limit' }).click()

    // Typed before, there after a reload.
    await page.reload()
    expect(await page.getByLabel('Voltage, signed, output S2').inputValue()).toBe('-15')
    await page.getByRole('button', { name: 'Propose', exact: true }).click()
    await page.getByRole('button', { name: 'Start a draft with this proposal' }).waitFor()
    await look(page, 'specification-proposal')
    await page.getByRole('button', { name: 'Start a draft with this proposal' }).click()
    await page.getByRole('heading', { level: 1, name: /BM-T7001/ }).waitFor()
    await look(page, 'workbench-title')

    await section(page, 'Windings')
    await page.getByRole('button', { name: 'winding 1, all fields' }).click()
    await look(page, 'workbench-windings')
    await page.getByLabel('Turns, winding 1').fill('3')
    await page.getByText('Worst-case flux density stays below').first().waitFor()
    await page.getByRole('button', { name: 'Undo' }).click()
    await stored(page)

    await page.getByRole('tab', { name: 'Figures' }).click()
    await page.getByRole('button', { name: 'why? Worst flux density' }).click()
    await page.getByRole('region', { name: 'Working of Worst flux density' }).getByText('Faraday').waitFor()
    await look(page, 'workbench-why')
    await page.keyboard.press('Escape')

    await page.getByRole('button', { name: 'Hand to check' }).click()
    await page.getByRole('dialog').getByRole('button', { name: 'Hand to check' }).click()
    await page.getByText('a checker who did not work on it releases it').waitFor()
    await look(page, 'revision-in-check')

    const checker = await enter(world.checker)
    await checker.getByRole('link', { name: 'Check BM-T7001, P1' }).click()
    await letAllPass(checker, 'Compared with the part on the bench.')
    await checker.getByRole('button', { name: 'Release' }).click()
    await checker.getByRole('dialog').getByRole('button', { name: 'Release' }).click()
    await checker.getByRole('heading', { name: 'Seal' }).waitFor()
    expect(await checker.getByRole('group', { name: /sheet 1 of/ }).innerHTML()).toContain('BM-T7001')
    await look(checker, 'revision-released')
  })
})

describe('the workbench', () => {
  it('brings the work of two engineers in one draft together, and asks only where both changed one field', async () => {
    const draft = await buildDraft(test, world.engineer)
    const page = await enter(world.engineer)
    await openWorkbench(page, revisionParams(draft))
    const theirs = structuredClone(draft.document)
    theirs.specification.title.classification.value = 'theirs'
    const store = (version: number) => request(test.app, contract.saveDraft, { as: colleague.cookie, params: revisionParams(draft), body: { version, document: theirs } }).expect(200)
    await store(draft.version)

    const reference = page.getByLabel('Technical reference', { exact: true })
    await reference.fill('mine')
    const taken = page.getByRole('status', { name: 'Taken over from a colleague' })
    await taken.getByText('Classification').waitFor()
    await stored(page)
    await look(page, 'workbench-brought-together')
    expect(await page.getByLabel('Classification', { exact: true }).inputValue()).toBe('theirs')
    const together = (await request(test.app, contract.getRevision, { as: colleague.cookie, params: revisionParams(draft) }).expect(200)).body
    expect([together.document.specification.title.classification.value, together.document.specification.title.technicalReference.value]).toEqual(['theirs', 'mine'])

    theirs.specification.title.technicalReference.value = 'their reference'
    theirs.specification.title.responsibleDepartment.value = 'their department'
    await store(together.version)
    await reference.fill('mine again')
    const asked = page.getByRole('alert', { name: 'Changes of two people' })
    await asked.getByText('One field was changed by both').waitFor()
    await look(page, 'workbench-conflict')
    expect(await asked.getByRole('button', { name: 'Store this' }).isDisabled()).toBe(true)
    const copy = page.waitForEvent('download')
    await asked.getByRole('button', { name: 'Save a copy of mine' }).click()
    expect((await copy).suggestedFilename()).toMatch(/my-copy\.json$/)
    await asked.getByRole('radio', { name: /theirs, their reference/ }).check()
    await asked.getByRole('button', { name: 'Store this' }).click()
    await stored(page)
    expect(await reference.inputValue()).toBe('their reference')
    expect(await page.getByLabel('Responsible department', { exact: true }).inputValue()).toBe('their department')
  })

  it('keeps what cannot be read as typed, asks what is meant, and brings back after a reload what was not stored', async () => {
    const draft = await buildDraft(test, world.engineer)
    const page = await enter(world.engineer)
    await openWorkbench(page, revisionParams(draft))
    await section(page, 'Requirement')
    await page.getByLabel('Output voltage').fill('twelve')
    await page.getByText(/number/).first().waitFor()
    expect(await page.getByRole('button', { name: 'Hand to check' }).isDisabled()).toBe(true)
    await page.getByLabel('Output voltage').fill('1,250')
    await page.getByRole('button', { name: '1.25 V' }).click()
    expect(await page.getByLabel('Output voltage').inputValue()).toBe('1.25')
    await stored(page)

    await page.route('**/document', (route) => route.abort())
    await page.getByLabel('Output voltage').fill('13')
    await page.getByText('Kept in this tab, not stored').waitFor()
    await look(page, 'workbench-offline')
    await page.unroute('**/document')
    await page.reload()
    expect(await page.getByLabel('Output voltage').inputValue()).toBe('13')
    await stored(page)
  })

  it('leads from a check to its field, and everything there works by keyboard', async () => {
    const draft = await buildDraft(test, world.engineer)
    const page = await enter(world.engineer)
    await openWorkbench(page, revisionParams(draft))
    await page.getByRole('button', { name: 'Marking, packing › REACH candidate list of' }).focus()
    await page.keyboard.press('Enter')
    await page.locator(':focus').and(page.getByLabel('REACH candidate list of')).waitFor()
    await page.keyboard.type('2025-06-25')

    await section(page, 'Sequence')
    await page.getByLabel(/^Wind|^Tape|^Winding, step 1/).first().focus()
    const first = () => page.locator('.row-lines').first().innerText()
    const before = await first()
    await page.keyboard.press('Alt+ArrowDown')
    await page.waitForFunction((text) => document.querySelector('.row-lines')?.textContent !== text, before)
    expect(await first()).not.toBe(before)
    await look(page, 'workbench-sequence')
  })

  it('can be read, and not changed, by who only reads', async () => {
    const draft = await buildDraft(test, world.engineer)
    const page = await enter(world.buyer)
    await openWorkbench(page, revisionParams(draft))
    expect(await page.getByLabel('Title', { exact: true }).isDisabled()).toBe(true)
    expect(await page.getByRole('button', { name: 'Hand to check' }).count()).toBe(0)
    await look(page, 'workbench-read')
  })
})

describe('checking', () => {
  it('names the checks that stop a release, lets one pass with a reason, and sends back with a reason', async () => {
    const draft = await buildDraft(test, world.engineer)
    const worse = structuredClone(draft.document)
    worse.specification.insulation.standardEdition.value = null
    const saved = (await request(test.app, contract.saveDraft, { as: world.engineer.cookie, params: revisionParams(draft), body: { version: draft.version, document: worse } }).expect(200)).body
    await request(test.app, contract.submitDraft, { as: world.engineer.cookie, params: revisionParams(draft), body: { version: saved.version } }).expect(200)

    const page = await enter(world.checker)
    await page.goto(`/specifications/${draft.specificationId}/revisions/${draft.id}`)
    await page.getByText(/Release is stopped by .*I01/).waitFor()
    await page.getByRole('button', { name: 'Release' }).click()
    await page.getByRole('dialog').getByRole('button', { name: 'Release' }).click()
    await page.getByRole('dialog').getByText('I01: Product standard and edition are named. Not met.').waitFor()
    await look(page, 'revision-release-stopped')
    await page.getByRole('dialog').getByRole('button', { name: 'Cancel' }).click()

    await page.getByRole('button', { name: 'Let I01 pass at' }).click()
    await page.getByLabel('Why I01 may pass').fill('The edition is agreed with the laboratory.')
    await page.getByRole('button', { name: 'Let pass', exact: true }).click()
    await page.getByRole('heading', { name: 'Checks let pass' }).waitFor()
    await page.getByText(/Release is stopped by P21, L01/).waitFor()
    await look(page, 'revision-let-pass')

    await page.getByRole('button', { name: 'Send back' }).click()
    await page.getByLabel('What has to change').fill('Name the edition.')
    await page.getByRole('dialog').getByRole('button', { name: 'Send back' }).click()
    await page.getByText('Sent back by the checker:').waitFor()
  })

  it('explains to a checker who worked on the draft why there is nothing to press', async () => {
    const both = await buildPerson(test, world.buying, ['engineer', 'checker'])
    const inCheck = await buildInCheck(test, both)
    const page = await enter(both)
    await page.goto(`/specifications/${inCheck.specificationId}/revisions/${inCheck.id}`)
    await page.getByText('You worked on this draft').waitFor()
    expect(await page.getByRole('button', { name: 'Release' }).count()).toBe(0)
  })
})
