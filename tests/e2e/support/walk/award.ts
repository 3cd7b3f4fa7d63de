import type { Page } from 'playwright-core'
import { expect } from 'vitest'
import { pdfText } from '../../../support/pdf-tools'
import { confirm, download, inDays, look } from './hands'
import type { Enquiry } from './enquiry'
import { TAMSEN } from './invitation'
import { PART } from './specification'
import type { Stage } from './stage'


/** The buyer states rates and what nobody quotes, compares, and proposes the cheapest landed cost. */
export async function proposeAward({ enter, cast }: Stage, rfq: Enquiry): Promise<string> {
  const page = await enter(cast.buyer)
  await page.getByRole('link', { name: new RegExp(`${rfq.number}`) }).first().waitFor()
  await page.goto(`/comparisons/${rfq.id}`)
  await page.getByLabel('Rates of').fill(inDays(-1))
  await page.getByLabel('Source of the rates').fill('Reference rates of the central bank')
  await page.getByLabel('1 USD is').fill('0,92')
  await page.getByLabel('Duty', { exact: true }).fill('3,7')
  for (const freight of await page.getByLabel('Freight of one shipment').all()) await freight.fill('1400')
  for (const inspection of await page.getByLabel('Incoming inspection of one shipment').all()) await inspection.fill('400')
  for (const loss of await page.getByLabel('Expected loss').all()) await loss.fill('0,3')
  await page.getByRole('button', { name: 'Compare' }).click()
  await page.getByRole('rowheader', { name: 'Landed cost of one' }).waitFor()
  await page.getByText('1 USD = 0.92').waitFor()
  expect(await ranks(page)).toEqual(['2', '1'])
  await look(page, '50-comparison')
  await page.getByRole('radio', { name: new RegExp(TAMSEN.name) }).check()
  await page.getByLabel('Why this quotation').fill('Samples accepted; the lowest landed cost although its price of one is the highest')
  await page.getByRole('button', { name: 'Propose for approval' }).click()
  await page.getByRole('heading', { level: 1, name: `Award for ${rfq.number}` }).waitFor()
  expect(await page.getByRole('button', { name: 'Approve' }).count()).toBe(0)
  await look(page, '51-award-proposed')
  return new URL(page.url()).pathname
}

/** In the order of the offers: Quillon, Tamsen. */
const ranks = (page: Page) => page.getByRole('row', { name: /^Rank/ }).getByRole('cell').allInnerTexts()

export async function approve({ enter, cast, mails }: Stage, rfq: Enquiry): Promise<void> {
  await mails(cast.approver.email, new RegExp(`award for ${rfq.number} waits`))
  const page = await enter(cast.approver)
  await look(page, '52-worklist-approver')
  await page.getByRole('link', { name: `Approve the award for ${rfq.number}` }).click()
  await page.getByRole('button', { name: 'Approve' }).click()
  await confirm(page, 'Approve')
  await page.getByText('Approved by').waitFor()
  await look(page, '53-award-approved')
}

/** The order as a document: what was chosen stands in it. Returns its number. */
export async function order({ enter, cast }: Stage, awardPath: string, price: RegExp): Promise<string> {
  const page = await enter(cast.buyer)
  await page.goto(awardPath)
  await page.getByRole('button', { name: 'Place the order' }).click()
  await page.getByLabel('Delivery on').fill(inDays(60))
  await page.getByLabel('Acknowledge by').fill(inDays(7))
  await page.getByLabel('Invoice address').fill('Brightmoor Power Works\nHarbour Road 1\n12345 Brightmoor')
  await page.getByLabel('Delivery address').fill('Brightmoor Power Works, goods in\nHarbour Road 3\n12345 Brightmoor')
  await look(page, '54-order-form')
  await page.getByRole('button', { name: 'Place the order' }).click()
  const heading = page.getByRole('heading', { level: 1, name: /Purchase order PO-/ })
  await heading.waitFor()
  const number = (await heading.innerText()).replace('Purchase order ', '')
  await look(page, '55-order')

  const pdf = await download(page, 'Download the PDF')
  const text = pdfText(pdf.bytes)
  for (const part of [number, PART, 'rev A', TAMSEN.name]) expect(text).toContain(part)
  expect(text).toMatch(price)
  expect(text).not.toContain(cast.quillon.name)
  return number
}

/** The winner answers; the others hear that it is decided, and nobody hears a price or a name. */
export async function acknowledge({ enter, cast, mails }: Stage, number: string, rfq: Enquiry): Promise<string> {
  const told = await mails(TAMSEN.email, new RegExp(`Purchase order ${number}`))
  const regrets = await Promise.all([cast.quillonSales, cast.quillonTest].map(({ email }) => mails(email, new RegExp(`${rfq.number} has been decided`))))
  for (const { subject, text } of [...told, ...regrets.flat()]) expect(subject + text).not.toMatch(/EUR|USD|Quillon|Tamsen|Oakhollow|\d[.,]\d{2}/)
  const page = await enter(TAMSEN)
  await page.getByRole('link', { name: `Acknowledge the purchase order ${number}` }).click()
  await page.getByLabel('We accept the order as it stands').check()
  await look(page, '56-vendor-order', { phone: true })
  await page.getByRole('button', { name: 'Send the answer' }).click()
  await page.getByRole('heading', { name: 'Answer of the vendor' }).waitFor()
  await mails(cast.buyer.email, new RegExp(`has answered the purchase order ${number}`))
  return new URL(page.url()).pathname
}
