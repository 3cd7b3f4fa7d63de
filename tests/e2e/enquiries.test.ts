import { getOwnQuote } from '#shared/contracts/quotes'
import type { Rfq } from '#shared/contracts/rfqs'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildIssuedRfq, buildQuote } from '../support/build-rfq'
import { launchChromium } from '../support/chromium'
import { buildPerson, buildWorld, PASSWORD, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'
import { expectNoSeriousAxe, openAs, PHONE_WIDTH, picture, scrollsSideways, serve } from './support/pictures'
import { chooseFrom, confirm, download, inDays } from './support/walk/hands'

let test: TestApp
let site: Awaited<ReturnType<typeof serve>>
let browser: Browser
let world: Awaited<ReturnType<typeof buildWorld>>
let vendor: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  site = await serve(test.app)
  browser = await launchChromium()
  world = await buildWorld(test, 2)
  vendor = world.vendors[0]!.person
})
afterAll(async () => {
  await browser?.close()
  site?.close()
  await test?.stop()
})

const enter = (person = vendor) => openAs(browser, site.origin, { email: person.email, password: PASSWORD })

async function sound(page: Page, name: string) {
  await picture(page, `enquiries-${name}`)
  await expectNoSeriousAxe(page)
  await page.setViewportSize({ width: PHONE_WIDTH, height: 844 })
  expect(await scrollsSideways(page), `${name} at ${PHONE_WIDTH} px`).toBe(false)
  await page.setViewportSize({ width: 1440, height: 900 })
}

async function openEnquiry(page: Page, rfq: Rfq) {
  await page.goto(`/enquiries/${rfq.id}`)
  await page.getByRole('heading', { level: 1, name: `Enquiry ${rfq.number}` }).waitFor()
}

async function accept(page: Page) {
  await page.getByLabel('I accept this for my company').check()
  await page.getByRole('button', { name: 'Accept and open the drawings' }).click()
  await page.getByRole('heading', { name: 'Parts and drawings' }).waitFor()
}

const price = (page: Page, row: number) => page.getByRole('group', { name: `Price break ${row}`, exact: true }).getByLabel(/^Price (each|per)/)

async function fillIn(page: Page) {
  await page.getByLabel('Your quotation number').fill('Q-4711')
  await page.getByLabel('Payment, days net').fill('30')
  await page.getByLabel('Valid until').fill(inDays(90))
  for (const [index, text] of ['1,41', '1.29', '1,21'].entries()) await price(page, index + 1).fill(text)
  await page.getByRole('group', { name: 'One-time cost' }).getByLabel('Amount', { exact: true }).check()
  await page.getByLabel('One-time cost, amount').fill('3500,00')
  await page.getByLabel('What the one-time cost covers').fill('Former mould and fixtures')
  await page.getByRole('group', { name: /^Samples/ }).getByLabel('Free of charge').check()
  await page.getByLabel('Samples, lead time').fill('21')
  await page.getByLabel('First order, lead time').fill('42')
  await page.getByLabel('Minimum order quantity').fill('1000')
  await page.getByLabel('Pack quantity').fill('100')
}

const stored = (page: Page) => page.getByText(/^Draft stored/).waitFor()

describe('an enquiry', () => {
  it('opens its drawings after confidentiality was accepted', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const page = await enter()
    await page.getByRole('link', { name: 'Enquiries' }).first().click()
    await page.getByRole('heading', { level: 1, name: 'Enquiries' }).waitFor()
    await sound(page, 'list')
    await page.getByRole('link', { name: rfq.number }).click()
    await page.getByRole('heading', { name: 'Confidentiality' }).waitFor()
    expect(await page.getByText('Parts and drawings').count()).toBe(0)
    expect(await page.getByRole('timer').innerText()).toMatch(/\d+ min \d+ s/)
    await sound(page, 'confidentiality')
    await accept(page)
    await sound(page, 'blank')
    const { name, bytes } = await download(page, /^Download the drawing/)
    expect(name).toMatch(/\.pdf$/)
    expect(bytes.subarray(0, 5).toString()).toBe('%PDF-')
  })

  it('is declined with a reason, and quoted after all', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const page = await enter()
    await openEnquiry(page, rfq)
    await accept(page)
    await page.getByRole('button', { name: 'Decline with a reason' }).click()
    await chooseFrom(page, 'Reason', 'We do not process this wire, litz or foil')
    await page.getByLabel('Explanation').fill('Litz of 600 strands')
    await sound(page, 'decline')
    await page.getByRole('dialog').getByRole('button', { name: 'Decline', exact: true }).click()
    await page.getByText('Litz of 600 strands').waitFor()
    expect(await page.getByLabel('Your quotation number').count()).toBe(0)
    await page.getByRole('button', { name: 'Quote after all' }).click()
    await page.getByLabel('Your quotation number').waitFor()
    await sound(page, 'declined')
  })
})

describe('a quotation', () => {
  it('reads decimal comma and point, asks about 1,250, and says what is missing beside its entry', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const page = await enter()
    await openEnquiry(page, rfq)
    await accept(page)
    await price(page, 1).fill('9,85')
    await page.getByText('Read as 9.85\u00a0EUR each').waitFor()
    await price(page, 2).fill('1,250')
    await page.getByRole('group', { name: 'Which amount is meant?' }).waitFor()
    await page.getByRole('button', { name: /Check and submit/ }).click()
    await sound(page, 'asked')
    await page.getByRole('button', { name: /^1\.25/ }).click()
    await page.getByRole('button', { name: /Check and submit/ }).click()
    await page.getByText('Your quotation number is missing.').waitFor()
    await page.getByText('Say whether a one-time cost is asked for').waitFor()
    expect(await page.getByRole('dialog').count()).toBe(0)
    await price(page, 2).fill('9,90')
    await page.getByText('From 5000 pieces the price is higher than from 1000.').waitFor()
    await sound(page, 'missing')
  })

  it('is there after a reload, submitted with its file and a receipt, replaced and withdrawn', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const page = await enter()
    await openEnquiry(page, rfq)
    await accept(page)
    await fillIn(page)
    await stored(page)
    await page.reload()
    expect(await price(page, 1).inputValue()).toBe('1.41')
    expect(await page.getByLabel('One-time cost, amount').inputValue()).toBe('3500')

    const file = page.locator('input[type=file]')
    for (const [name, content, sentence] of [
      ['empty.pdf', '', 'is empty (0 bytes)'],
      ['offer.exe', 'MZ', 'is of a kind that is not taken here'],
      ['offer.pdf', '<html>', /Accepted: /],
    ] as const) {
      await file.setInputFiles({ name, mimeType: 'application/pdf', buffer: Buffer.from(content) })
      await page.getByRole('alert').filter({ hasText: sentence }).waitFor()
    }
    await sound(page, 'file-refused')
    await file.setInputFiles({ name: 'Q-4711.pdf', mimeType: 'application/pdf', buffer: Buffer.from('%PDF-1.4\n1 0 obj<</Type/Catalog>>endobj\ntrailer<</Root 1 0 R>>\n%%EOF\n') })
    await page.getByRole('button', { name: 'Remove Q-4711.pdf' }).waitFor()
    await sound(page, 'filled')

    await page.getByRole('button', { name: 'Check and submit revision 1' }).click()
    await page.getByRole('dialog').getByText('With the file Q-4711.pdf.').waitFor()
    await sound(page, 'summary')
    await confirm(page, 'Submit revision 1')
    await page.getByText('Revision 1 has been received.').waitFor()
    const { body } = await request(test.app, getOwnQuote, { params: { rfqId: rfq.id }, as: vendor.cookie }).expect(200)
    await page.getByText(body.submitted[0].sha256).first().waitFor()
    expect(body.submitted[0].lines[0].priceBreaks.map(({ price: amount }: { price: string }) => amount)).toEqual(['1.410000', '1.290000', '1.210000'])
    await sound(page, 'receipt')

    await price(page, 2).fill('1,19')
    await page.getByRole('button', { name: 'Check and submit revision 2' }).click()
    await page.getByText('Say why this revision replaces the one before.').waitFor()
    await page.getByLabel(/^Why revision 2/).fill('Wire has become cheaper')
    await page.getByRole('button', { name: 'Check and submit revision 2' }).click()
    await confirm(page, 'Submit revision 2')
    await page.getByText('Replaced by a later revision').waitFor()
    await page.getByRole('button', { name: 'Withdraw', exact: true }).click()
    await confirm(page, 'Withdraw revision 2')
    await page.getByText(/^Revision 2 · Withdrawn/).waitFor()
    await sound(page, 'withdrawn')
  })

  it('leaves the choice to a person when a colleague typed as well', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const colleague = await buildPerson(test, world.vendors[0]!.company, ['vendor'])
    const [mine, theirs] = [await enter(), await enter(colleague)]
    await openEnquiry(mine, rfq)
    await accept(mine)
    await openEnquiry(theirs, rfq)
    await mine.getByLabel('Your quotation number').fill('mine')
    await stored(mine)
    await theirs.getByLabel('Your quotation number').fill('theirs')
    await theirs.getByText('A colleague has stored this quotation since you loaded it.').waitFor()
    await sound(theirs, 'conflict')
    expect(await theirs.getByLabel('Your quotation number').inputValue()).toBe('theirs')
    await theirs.getByRole('button', { name: 'Load theirs' }).click()
    await stored(theirs)
    expect(await theirs.getByLabel('Your quotation number').inputValue()).toBe('mine')
  })

  it('can only be read after the due time, which the page notices by itself', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await buildQuote(test, vendor, rfq.id)
    const page = await enter()
    const untilDue = (Date.parse(rfq.dueAt) - Date.now()) / 1000
    await test.database.setClock({ seconds: Math.floor(untilDue - 20) })
    await openEnquiry(page, rfq)
    await page.getByRole('button', { name: 'Check and submit revision 2' }).waitFor()
    await page.getByText('The due time has passed.').waitFor({ timeout: 60_000 })
    expect(await page.getByRole('button', { name: /submit|Withdraw/ }).count()).toBe(0)
    await page.getByText('What revision 1 says').click()
    await sound(page, 'closed')
    await test.database.setClock({})
  })
})
