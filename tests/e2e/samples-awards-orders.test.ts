import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { BAD_REPORT, buildApproved, buildConfirmedSet, buildOpenedRfq, buildSampleRequest, GOOD_REPORT, inDays, type OpenedRfq } from '../support/build-opened'
import { launchChromium } from '../support/chromium'
import { buildWorld, PASSWORD, type TestPerson } from '../support/factories'
import { startTestApp, type TestApp } from '../support/test-app'
import { expectNoSeriousAxe, openAs, PHONE_WIDTH, picture, scrollsSideways, serve } from './support/pictures'

let test: TestApp
let site: Awaited<ReturnType<typeof serve>>
let browser: Browser
let world: Awaited<ReturnType<typeof buildWorld>>
let opened: OpenedRfq
let vendor: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  site = await serve(test.app)
  browser = await launchChromium()
  world = await buildWorld(test, 2)
  vendor = world.vendors[0]!.person
  opened = await buildOpenedRfq(test, world, [
    { currency: 'USD', deliveryRule: 'FCA', paymentTerms: '60 days net', paymentDays: 60 },
    { currency: 'EUR', deliveryRule: 'DDP' },
  ])
})
afterAll(async () => {
  await browser?.close()
  site?.close()
  await test?.stop()
})

const enter = (person: TestPerson) => openAs(browser, site.origin, { email: person.email, password: PASSWORD })

async function sound(page: Page, name: string, atPhoneWidth = false) {
  await picture(page, name, atPhoneWidth ? [1440, PHONE_WIDTH] : [1440])
  await expectNoSeriousAxe(page)
  if (!atPhoneWidth) return
  await page.setViewportSize({ width: PHONE_WIDTH, height: 844 })
  expect(await scrollsSideways(page), `${name} at ${PHONE_WIDTH} px`).toBe(false)
  await page.setViewportSize({ width: 1440, height: 900 })
}

const chooseFrom = async (page: Page, label: string, option: string | RegExp) => {
  await page.getByRole('combobox', { name: label, exact: true }).click()
  await page.getByRole('option', { name: option }).click()
}

describe('samples', () => {
  it('are asked for by quality and reach the vendor’s worklist', async () => {
    const page = await enter(world.quality)
    await page.goto(`/samples/new?rfq=${opened.rfq.id}`)
    await chooseFrom(page, 'Vendor', world.vendors[0]!.company.name)
    await page.getByLabel('Needed by').fill(inDays(14))
    await sound(page, 'samples-request')
    await page.getByRole('button', { name: 'Ask for samples' }).click()
    await page.getByRole('heading', { level: 1, name: /Samples SR-/ }).waitFor()
    await sound(page, 'samples-one')

    const other = await enter(vendor)
    await other.getByRole('link', { name: /Send 5 samples with their report/ }).click()
    await other.getByRole('heading', { name: 'Hand in a report' }).waitFor()
    await sound(other, 'vendor-sample', true)
  })

  it('are reported by the vendor, asked about by cell, declared and sent', async () => {
    const asked = await buildSampleRequest(test, world, opened.rfq)
    const page = await enter(vendor)
    await page.goto(`/sample-requests/${asked.id}`)
    const choose = page.locator('input[type=file]').first()
    await choose.setInputFiles({ name: 'letter.csv', mimeType: 'text/csv', buffer: Buffer.from('Dear Sirs,\nplease see below.\n') })
    await page.getByRole('button', { name: 'Read the report' }).click()
    await page.getByText('No heading names a test of the drawing').first().waitFor()
    await sound(page, 'vendor-report-refused', true)

    await choose.setInputFiles({ name: 'report.csv', mimeType: 'text/csv', buffer: Buffer.from(GOOD_REPORT.replace('602,2', '0,6022').replace('603,2', '0,6032').replace('9,4', '01-Feb')) })
    await page.getByRole('button', { name: 'Read the report' }).click()
    await page.getByRole('heading', { name: 'Questions about 3 cells' }).waitFor()
    await sound(page, 'vendor-report-questions', true)
    await page.getByRole('group', { name: /Cell B3/ }).getByLabel('Multiply by 1000').check()
    await page.getByRole('button', { name: 'Same answer for the other cell like it' }).click()
    await page.getByRole('group', { name: /Cell C5/ }).getByLabel('Value for cell C5').fill('9,4')
    await page.reload()
    await page.getByRole('button', { name: 'Give 3 of 3 answers' }).click()
    await page.getByText('Save the declaration first.').waitFor()

    await page.getByLabel('Measured on').fill('2026-01-20')
    await page.getByLabel('Temperature of the parts').fill('23,5')
    await page.getByLabel('Measured by').fill('T. Technician')
    await page.getByLabel('Instruments').fill('LCR meter 4711, calibrated until 2026-09')
    await page.getByLabel('As drawn').check()
    await page.getByRole('button', { name: 'Save the declaration' }).click()
    await page.getByText('Save the declaration first.').waitFor({ state: 'detached' })
    await sound(page, 'vendor-report-ready', true)
    await page.getByRole('button', { name: 'Confirm and send' }).click()
    await page.getByRole('dialog').getByRole('button', { name: 'Send' }).click()
    await page.getByRole('heading', { name: 'Your declaration' }).waitFor()
    await sound(page, 'vendor-report-sent', true)
  })

  it('are judged cell by cell and decided about by quality', async () => {
    const asked = await buildSampleRequest(test, world, opened.rfq)
    const set = await buildConfirmedSet(test, vendor, asked.id, BAD_REPORT)
    const page = await enter(world.quality)
    await page.getByRole('link', { name: new RegExp(`Decide about the samples ${asked.number}`) }).click()
    await page.getByRole('link', { name: /Report 1/ }).click()
    await page.getByRole('img', { name: /not met: above the maximum, cell C2/ }).waitFor()
    expect(await page.getByLabel('Accept', { exact: true }).count()).toBe(0)
    await sound(page, 'sample-report')
    await page.getByLabel('Reject; new samples').check()
    await page.getByLabel('Reason').fill('Leakage above its maximum on every part')
    await page.getByRole('button', { name: 'Decide' }).click()
    await page.getByText('Leakage above its maximum on every part').waitFor()
    await sound(page, 'sample-report-decided')
    expect(set.verdict).toBe('not-met')

    const other = await enter(vendor)
    await other.goto(`/sample-requests/${asked.id}`)
    await other.getByText('Decided: Reject; new samples').waitFor()
    await other.goto('/sample-requests')
    await other.getByRole('link', { name: asked.number }).waitFor()
    await sound(other, 'vendor-samples', true)
  })
})

describe('award and order', () => {
  it('compares, proposes, approves, orders and is acknowledged', async () => {
    const page = await enter(world.buyer)
    await page.goto(`/comparisons/${opened.rfq.id}`)
    await page.getByLabel('Rates of').fill('2026-03-27')
    await page.getByLabel('Source of the rates').fill('Reference rates of the central bank')
    await page.getByLabel('1 USD is').fill('0,92')
    for (const freight of await page.getByLabel('Freight of one shipment').all()) await freight.fill('900')
    for (const inspection of await page.getByLabel('Incoming inspection of one shipment').all()) await inspection.fill('400')
    await page.getByRole('button', { name: 'Compare' }).click()
    await page.getByText('Missing: yield loss').first().waitFor()
    for (const loss of await page.getByLabel('Expected loss').all()) await loss.fill('0,3')
    await page.getByRole('button', { name: 'Compare' }).click()
    await page.getByText('Missing: yield loss').first().waitFor({ state: 'detached' })
    await page.getByRole('row', { name: /Freight/ }).locator('summary').first().click()
    await page.getByText('freight per shipment × rate USD / order quantity').waitFor()
    await sound(page, 'comparison')

    await page.getByRole('radio').first().check()
    await page.getByLabel('Why this quotation').fill('Lowest landed cost among the compliant offers')
    await page.getByRole('button', { name: 'Propose for approval' }).click()
    await page.getByRole('heading', { level: 1, name: `Award for ${opened.rfq.number}` }).waitFor()

    const approver = await enter(world.approver)
    await approver.getByRole('link', { name: `Approve the award for ${opened.rfq.number}` }).click()
    await approver.getByRole('button', { name: 'Approve' }).waitFor()
    await sound(approver, 'award')
    await approver.getByRole('button', { name: 'Approve' }).click()
    await approver.getByRole('dialog').getByRole('button', { name: 'Approve' }).click()
    await approver.getByText('Approved by').waitFor()

    await page.reload()
    await page.getByRole('button', { name: 'Place the order' }).click()
    await page.getByLabel('Delivery on').fill(inDays(60))
    await page.getByLabel('Acknowledge by').fill(inDays(7))
    await page.getByLabel('Invoice address').fill('Brightmoor Power Works\nHarbour Road 1')
    await sound(page, 'order-form')
    await page.getByRole('button', { name: 'Place the order' }).click()
    await page.getByRole('heading', { level: 1, name: /Purchase order PO-/ }).waitFor()
    await sound(page, 'order')
    const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: 'Download the PDF' }).click()])
    expect(download.suggestedFilename()).toMatch(/^PO-.*\.pdf$/)

    const winner = world.vendors.find(({ company }) => company.id === opened.quotes[0]!.vendorCompanyId)!.person
    const other = await enter(winner)
    await other.getByRole('link', { name: /Acknowledge the purchase order PO-/ }).click()
    await other.getByLabel('We accept it with changes').check()
    await other.getByLabel('What changes').fill('Delivery one week later')
    await sound(other, 'vendor-order', true)
    await other.getByRole('button', { name: 'Send the answer' }).click()
    await other.getByText('Delivery one week later').waitFor()
    await other.goto('/purchase-orders')
    await sound(other, 'vendor-orders', true)
  })

  it('says why an approver may not approve', async () => {
    const next = await buildOpenedRfq(test, world)
    await buildApproved(test, world, next)
    const page = await enter(world.engineer)
    await page.goto('/awards')
    await page.getByRole('link', { name: next.rfq.number }).click()
    await page.getByText('Approved by').waitFor()
    expect(await page.getByRole('button', { name: 'Approve' }).count()).toBe(0)
  })
})
