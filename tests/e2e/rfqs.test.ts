import { uploadQuoteFile } from '#shared/contracts/quotes'
import { acceptConfidentiality, createRfq, declineRfq, updateRfq, type Rfq } from '#shared/contracts/rfqs'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { inDays } from '../support/build-opened'
import { buildRelease, type TestRelease } from '../support/build-release'
import { buildIssuedRfq, buildQuote, rfqInput, type World } from '../support/build-rfq'
import { launchChromium } from '../support/chromium'
import { buildCompany, buildWorld, linkVendor, PASSWORD, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'
import { expectNoSeriousAxe, openAs, PHONE_WIDTH, picture, scrollsSideways, serve } from './support/pictures'

let test: TestApp
let site: Awaited<ReturnType<typeof serve>>
let browser: Browser
let world: World
let release: TestRelease

beforeAll(async () => {
  test = await startTestApp()
  site = await serve(test.app)
  browser = await launchChromium()
  world = await buildWorld(test, 2)
  release = await buildRelease(test, world.engineer, world.checker, 'BM-T-4711')
})
afterAll(async () => {
  await browser?.close()
  site?.close()
  await test?.stop()
})

const PDF = '%PDF-1.4\n1 0 obj\n<< >>\nendobj\ntrailer\n<< /Root 1 0 R >>\n%%EOF\n'

const enter = (person: TestPerson) => openAs(browser, site.origin, { email: person.email, password: PASSWORD })

async function sound(page: Page, name: string) {
  await picture(page, name)
  await expectNoSeriousAxe(page)
  await page.setViewportSize({ width: PHONE_WIDTH, height: 844 })
  expect(await scrollsSideways(page), `${name} at ${PHONE_WIDTH} px`).toBe(false)
  await page.setViewportSize({ width: 1440, height: 900 })
}

const chooseFrom = async (page: Page, label: string, option: string | RegExp) => {
  await page.getByRole('combobox', { name: label, exact: true }).click()
  await page.getByRole('option', { name: option }).click()
}

async function prepared(overrides: Parameters<typeof rfqInput>[2] = {}): Promise<Rfq> {
  const body = rfqInput(release, world.vendors.map(({ company }) => company.id), overrides)
  return (await request(test.app, createRfq, { body, as: world.buyer.cookie }).expect(200)).body as Rfq
}

const vendorNames = () => world.vendors.map(({ company }) => company.name)
/** A field of a form with its sentence. */
const field = (page: Page, label: string | RegExp) => page.locator('.field').filter({ has: page.getByText(label, { exact: typeof label === 'string' }) })

describe('preparing an enquiry', () => {
  it('says on an empty sheet what to do', async () => {
    const page = await enter(world.buyer)
    await page.goto('/rfqs')
    await page.getByText('No enquiry yet').waitFor()
    await sound(page, 'rfqs-empty')
    const other = await enter(world.engineer)
    await other.goto('/rfqs')
    await other.getByText('No enquiry yet').waitFor()
    expect(await other.getByRole('button', { name: 'Prepare an enquiry' }).count()).toBe(0)
  })

  it('says at each entry what is wrong, keeps what was typed through a reload, and offers no blocked vendor', async () => {
    await linkVendor(test, world.buying, await buildCompany(test, 'vendor', { name: 'Zellmark Inductive' }), { accepted: false })
    const blocked = await buildCompany(test, 'vendor', { name: 'Oakhollow Wound Parts' })
    await linkVendor(test, world.buying, blocked)
    await test.database.query(`UPDATE vendor_relations SET approval = 'blocked' WHERE vendor_company_id = $1`, [blocked.id])

    const page = await enter(world.buyer)
    await page.goto('/rfqs')
    await page.getByRole('button', { name: 'Prepare an enquiry' }).click()
    await page.getByLabel('Title').fill('Transformers for the buoy supply')
    await page.getByLabel('Due: date').fill('2024-02-01')
    await chooseFrom(page, 'Released revision', /^BM-T-4711 rev A/)
    await page.getByLabel('Price break 1, per order').fill('5000')
    await page.getByLabel('Price break 2, per order').fill('1000')
    await page.getByLabel('Order quantity').fill('1,250')
    await page.getByText('This can be read in two ways').waitFor()
    await page.getByLabel('Order quantity').fill('1000')
    expect(await page.getByRole('checkbox', { name: /Oakhollow/ }).count()).toBe(0)
    await page.getByText('Blocked, not offered: Oakhollow Wound Parts.').waitFor()
    await page.getByRole('checkbox', { name: /Zellmark Inductive, not assessed; has not accepted the first invitation yet/ }).check()
    await page.getByRole('button', { name: 'Save the enquiry' }).click()
    await field(page, 'Named place').getByText('The named place is missing.').waitFor()
    await field(page, 'Price break 2, per order').getByText('The quantities must rise').waitFor()
    await sound(page, 'rfq-form-refused')

    await page.reload()
    await page.getByText('This is what you typed before').waitFor()
    expect(await page.getByLabel('Title').inputValue()).toBe('Transformers for the buoy supply')
    await page.getByLabel('Named place').fill('Brightmoor')
    await page.getByLabel('Price break 2, per order').fill('10000')
    await page.getByRole('button', { name: 'Save the enquiry' }).click()
    await field(page, 'Due').getByText('The due time lies in the past').waitFor()
    await page.getByText('Offers are compared at this quantity, so it cannot lie below the smallest break').waitFor()

    await page.getByLabel('Due: date').fill(inDays(20))
    await page.getByLabel('Order quantity').fill('5000')
    await page.getByRole('button', { name: 'Save the enquiry' }).click()
    await page.getByRole('button', { name: 'Issue', exact: true }).waitFor()
    await page.getByRole('row', { name: /Zellmark Inductive Not sent yet/ }).waitFor()
    await sound(page, 'rfq-prepared')
  })

  it('loses neither what is typed nor what a colleague stored meanwhile', async () => {
    const rfq = await prepared()
    const page = await enter(world.buyer)
    await page.goto(`/rfqs/${rfq.id}/edit`)
    await page.getByLabel('Named place').fill('Harbour store')
    const body = { ...rfqInput(release, world.vendors.map(({ company }) => company.id), { title: 'Changed by a colleague', dueAt: rfq.dueAt }), version: rfq.version }
    await request(test.app, updateRfq, { params: { rfqId: rfq.id }, body, as: world.buyer.cookie }).expect(200)
    await page.getByRole('button', { name: 'Save', exact: true }).click()
    await page.getByText('Somebody changed the enquiry after you began.').waitFor()
    await page.getByText('It differs from what is stored now in: title, named place.').waitFor()
    expect(await page.getByLabel('Named place').inputValue()).toBe('Harbour store')
    await sound(page, 'rfq-form-stale')

    await page.getByRole('button', { name: 'Take theirs' }).click()
    expect(await page.getByLabel('Title').inputValue()).toBe('Changed by a colleague')
    await page.getByLabel('Named place').fill('Harbour store')
    await page.getByRole('button', { name: 'Save', exact: true }).click()
    await page.getByRole('heading', { level: 1, name: 'Changed by a colleague' }).waitFor()
    await page.getByText('DAP, delivered at place, Harbour store').waitFor()
  })
})

describe('an enquiry', () => {
  it('is issued after its recipients and revisions were shown, and stays sealed', async () => {
    const rfq = await prepared()
    const page = await enter(world.buyer)
    await page.goto(`/rfqs/${rfq.id}`)
    await page.getByRole('button', { name: 'Issue', exact: true }).click()
    const dialog = page.getByRole('dialog')
    for (const { company, person } of world.vendors) {
      await dialog.getByText(company.name).waitFor()
      await dialog.getByText(`${person.name}, ${person.email}`).waitFor()
    }
    await dialog.getByText(`BM-T-4711 rev A, SHA-256 ${release.specificationSha256.slice(0, 12)}`).waitFor()
    await picture(page, 'rfq-issue-dialog')
    await expectNoSeriousAxe(page)
    await dialog.getByRole('button', { name: 'Issue and send' }).click()
    await dialog.waitFor({ state: 'detached' })
    await page.getByText(/After the due time a buyer asks for the opening/).waitFor()
    await sound(page, 'rfq-issued')

    await page.goto(`/rfqs/${rfq.id}/edit`)
    await page.getByText('This enquiry was issued; its content does not change any more.').waitFor()
    await page.goto('/rfqs')
    await page.getByRole('link', { name: rfq.number }).waitFor()
    await sound(page, 'rfqs')
  })

  it('moves its due time later only, and is cancelled with a reason', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const [first, second] = world.vendors
    await request(test.app, declineRfq, { params: { rfqId: rfq.id }, body: { reason: 'capacity', text: 'Until autumn' }, as: first!.person.cookie }).expect(200)
    await buildQuote(test, second!.person, rfq.id)
    const page = await enter(world.buyer)
    await page.goto(`/rfqs/${rfq.id}`)
    await page.getByRole('row', { name: /No capacity: Until autumn/ }).waitFor()
    expect(await page.getByRole('main').innerText()).not.toMatch(/Quoted|Intends|1\.41|Q-100/)

    await page.getByRole('button', { name: 'Move the due time later' }).click()
    const dialog = page.getByRole('dialog')
    await dialog.getByLabel('Reason').fill('The harbour master asked for a week more')
    await dialog.getByRole('button', { name: 'Move it' }).click()
    await dialog.getByText('Choose a later moment than the present due time.').waitFor()
    await picture(page, 'rfq-extend')
    await expectNoSeriousAxe(page)
    await dialog.getByLabel('New due time: date').fill(inDays(40))
    await dialog.getByRole('button', { name: 'Move it' }).click()
    await dialog.waitFor({ state: 'detached' })
    await page.locator('.title-block').getByText(inDays(40)).waitFor()

    await page.getByRole('button', { name: 'Cancel the enquiry' }).click()
    await page.getByRole('dialog').getByLabel('Reason').fill('The supply is redesigned')
    await page.getByRole('dialog').getByRole('button', { name: 'Cancel the enquiry' }).click()
    await page.getByText('The enquiry was cancelled; nothing is opened.').waitFor()
    await page.getByText('The supply is redesigned').waitFor()
    expect(await page.getByRole('main').getByRole('button').count()).toBe(0)
    await sound(page, 'rfq-cancelled')
  })

  it('is opened by two, and then read by purchasing alone', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const [first, second] = world.vendors
    const params = { rfqId: rfq.id }
    await request(test.app, acceptConfidentiality, { params, body: { accepted: true }, as: first!.person.cookie }).expect(200)
    await request(test.app, uploadQuoteFile, { params, file: { name: 'offer 4711.pdf', content: PDF }, as: first!.person.cookie }).expect(200)
    await buildQuote(test, first!.person, rfq.id, { currency: 'USD', deliveryRule: 'FCA', deliveryPlace: 'Shenzhen', remarks: 'Wire in stock' })
    await buildQuote(test, second!.person, rfq.id, { vendorReference: 'TC-9' })
    await buildQuote(test, second!.person, rfq.id, { vendorReference: 'TC-9', reason: 'Copper has become cheaper' })

    const page = await enter(world.buyer)
    await page.goto(`/rfqs/${rfq.id}`)
    await page.getByText(/After the due time/).waitFor()
    await test.database.setClock({ hours: 2 })
    await page.reload()
    await page.getByText('The due time has passed. Ask for the opening; somebody else opens.').waitFor()
    await page.getByRole('button', { name: 'Ask for the opening' }).click()
    await page.getByText(/You asked for the opening. Somebody else/).waitFor()
    expect(await page.getByRole('button', { name: 'Open the quotations' }).count()).toBe(0)
    await sound(page, 'rfq-opening-asked')

    const other = await enter(world.quality)
    await other.goto(`/rfqs/${rfq.id}`)
    await other.getByRole('button', { name: 'Open the quotations' }).click()
    await other.getByRole('dialog').getByRole('button', { name: 'Open', exact: true }).click()
    await other.getByText('The quotations are open. Prices are read by purchasing.').waitFor()
    expect(await other.getByRole('main').innerText()).not.toMatch(/1\.41|1\.29|USD|TC-9/)
    await sound(other, 'rfq-opened-quality')

    await page.reload()
    const prices = page.getByRole('region', { name: `Quotations for ${rfq.lines[0]!.release.partNumber}` })
    await prices.getByRole('row', { name: /Unit price at 5000\spcs, compared here 1\.29\sUSD 1\.29\sEUR/ }).waitFor()
    await page.getByText('Quoted in USD; the enquiry asks for EUR.').waitFor()
    await page.getByText(/revision 2: the one that counts/).waitFor()
    await page.getByText(/Reason: Copper has become cheaper/).waitFor()
    await page.getByText(/revision 1: replaced by a later revision/).waitFor()
    await sound(page, 'rfq-opened')
    const [saved] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: `Download offer 4711.pdf of ${vendorNames()[0]}`, exact: true }).click()])
    expect(saved.suggestedFilename()).toBe('offer 4711.pdf')
    await page.getByRole('link', { name: 'Compare landed cost and propose the award' }).click()
    await page.waitForURL(`**/comparisons/${rfq.id}`)
    await test.database.setClock({})
  })
})
