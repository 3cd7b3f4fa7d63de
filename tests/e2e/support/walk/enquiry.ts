import type { Page } from 'playwright-core'
import { expect } from 'vitest'
import { plainBlanks } from '../../../support/pdf-tools'
import { confirm, chooseFrom, look } from './hands'
import { TAMSEN } from './invitation'
import { PART } from './specification'
import type { Stage } from './stage'

export interface Enquiry {
  id: string
  number: string
}

/** Price breaks that are asked for; offers are compared at the second. */
const BREAKS = ['1000', '5000', '10000']
export const ZONE = 'Europe/Berlin'

/** Hours from now until the due time; the test's clock is moved past it later. */
const DUE_IN_HOURS = 2
export const AFTER_DUE = { hours: DUE_IN_HOURS + 1 }

/** Any of what the vendors have written. */
const PRICES = /1[.,](18|29|39)|Q-4711|TC-2026|FCA|Shenzhen/

/** Date and time that a clock on a wall in the zone shows. */
function wallClock(moment: Date, zone: string): { date: string; time: string } {
  const [date, time] = moment.toLocaleString('sv-SE', { timeZone: zone }).split(' ')
  return { date: date!, time: time!.slice(0, 5) }
}

/** The buyer prepares an enquiry for the released drawing, sees who would get it, and issues it. */
export async function enquire({ enter, cast }: Stage): Promise<Enquiry> {
  const page = await enter(cast.buyer)
  await page.goto('/rfqs')
  await page.getByRole('button', { name: 'Prepare an enquiry' }).click()
  await page.getByLabel('Title').fill('Transformers for the buoy supply')
  const due = wallClock(new Date(Date.now() + DUE_IN_HOURS * 3_600_000), ZONE)
  await page.getByLabel('Due: date').fill(due.date)
  await page.getByLabel('Due: time').fill(due.time)
  await chooseZone(page)
  await chooseFrom(page, 'Delivery, Incoterms 2020', /^DDP/)
  await page.getByLabel('Named place').fill('Brightmoor')
  await chooseFrom(page, 'Released revision', new RegExp(`^${PART} rev A`))
  await page.getByRole('button', { name: 'Add a price break' }).click()
  for (const [index, quantity] of BREAKS.entries()) await page.getByLabel(`Price break ${index + 1}, per order`).fill(quantity)
  await page.getByLabel('Order quantity').fill('5000')
  await page.getByLabel('Annual quantity').fill('20000')
  await page.getByLabel('Samples', { exact: true }).fill('5')
  for (const vendor of [cast.quillon.name, cast.oakhollow.name, TAMSEN.name]) await page.getByRole('checkbox', { name: new RegExp(vendor) }).check()
  await look(page, '10-new-enquiry')
  await page.getByRole('button', { name: 'Save the enquiry' }).click()
  await page.getByRole('button', { name: 'Issue', exact: true }).click()
  const dialog = page.getByRole('dialog')
  for (const vendor of [cast.quillon.name, cast.oakhollow.name, TAMSEN.name]) await dialog.getByText(vendor).waitFor()
  await look(page, '11-issue')
  await confirm(page, 'Issue and send')
  await page.getByText(/Quotations stay sealed until the opening/).waitFor()
  await look(page, '12-enquiry-issued')
  const number = /RFQ-\S+/.exec(await page.getByRole('main').innerText())![0]
  return { id: new URL(page.url()).pathname.split('/').at(-1)!, number }
}

async function chooseZone(page: Page) {
  await page.getByRole('combobox', { name: 'Due: zone' }).click()
  await page.getByRole('searchbox').fill(ZONE)
  await page.getByRole('option', { name: ZONE, exact: true }).click()
}

/** One mail per person of each vendor, and in none of them a price, a limit or another vendor. */
export async function readInvitations({ cast, mails }: Stage, { number }: Enquiry): Promise<{ tamsen: string }> {
  const people = [cast.quillonSales.email, cast.quillonTest.email, cast.oakhollowSales.email, TAMSEN.email]
  const found = await Promise.all(people.map(async (to) => (await mails(to, new RegExp(`asks for a quotation: ${number}`)))[0]!))
  for (const { text, html, subject, to } of found) {
    expect(`${subject}${text}${html ?? ''}`).not.toMatch(/EUR|USD|Quillon|Oakhollow|Tamsen|BM-T|µH|5000/)
    expect(to.split(',')).toHaveLength(1)
  }
  expect(new Set(found.map(({ messageId }) => messageId)).size).toBe(people.length)
  return { tamsen: found[3]!.links[0]! }
}

/** Before the due time nobody of the buying side finds a quotation, a price or a word that one came in. */
export async function findItSealed({ enter, cast }: Stage, { id }: Enquiry): Promise<void> {
  const page = await enter(cast.buyer)
  await page.goto(`/rfqs/${id}`)
  await page.getByText(/Quotations stay sealed until the opening/).waitFor()
  expect(await page.getByRole('main').innerText()).not.toMatch(PRICES)
  expect(await page.getByRole('button', { name: 'Ask for the opening' }).count()).toBe(0)
  await page.goto(`/comparisons/${id}`)
  await page.getByText('The quotations are sealed until the enquiry is opened.').waitFor()
  expect(await page.getByRole('main').innerText()).not.toMatch(PRICES)
  await look(page, '30-comparison-sealed')
}

/** After the due time the buyer asks, and a second person with another role opens. */
export async function open({ enter, cast, test, mails }: Stage, { id, number }: Enquiry): Promise<void> {
  await test.database.setClock(AFTER_DUE)
  await mails(cast.buyer.email, new RegExp(`${number} is closed for quotations`))
  const page = await enter(cast.buyer)
  await look(page, '31-worklist-buyer')
  await page.goto(`/rfqs/${id}`)
  await page.getByRole('button', { name: 'Ask for the opening' }).click()
  await page.getByRole('button', { name: 'Ask for the opening' }).waitFor({ state: 'detached' })
  expect(await page.getByRole('button', { name: 'Open the quotations' }).count()).toBe(0)
  await look(page, '32-opening-asked')

  await mails(cast.quality.email, new RegExp(`${number} waits to be opened`))
  const second = await enter(cast.quality)
  await look(second, '33-worklist-quality')
  await second.getByRole('link', { name: new RegExp(number) }).first().click()
  await second.getByRole('button', { name: 'Open the quotations' }).click()
  await confirm(second, 'Open')
  await second.getByText('The quotations are open. Prices are read by purchasing.').waitFor()
  await look(second, '34-opened-quality')

  await page.reload()
  const columns = page.getByRole('region', { name: `Quotations for ${PART}` })
  await columns.waitFor()
  await look(page, '35-quotations')
  const text = plainBlanks(await columns.innerText())
  for (const part of [cast.quillon.name, TAMSEN.name, 'Q-4711, revision 1', 'TC-2026-9, revision 2', '1.18 USD', '1.29 EUR']) expect(text).toContain(part)
  expect(text).not.toContain(cast.oakhollow.name)
}
