import { createHash } from 'node:crypto'
import type { Page } from 'playwright-core'
import { expect } from 'vitest'
import { PASSWORD } from '../../../support/factories'
import { pdfText } from '../../../support/pdf-tools'
import { openPage } from '../pictures'
import type { Enquiry } from './enquiry'
import { chooseFrom, confirm, download, inDays, look, pathOf } from './hands'
import { enterByMail, TAMSEN } from './invitation'
import { PART } from './specification'
import type { Stage } from './stage'

const QUOTATION_PDF = Buffer.from('%PDF-1.4\n1 0 obj\n<< /Type /Catalog >>\nendobj\ntrailer\n<< /Root 1 0 R >>\n%%EOF\n')

interface Offer {
  reference: string
  currency: RegExp
  rule: RegExp
  place: string
  /** As typed, one for each asked quantity. */
  prices: readonly string[]
  oneTimeCost: string
  leadTime: string
}

export const OFFERS = {
  quillon: { reference: 'Q-4711', currency: /^USD/, rule: /^FCA/, place: 'Shenzhen', prices: ['1,27', '1,18', '1,12'], oneTimeCost: '3500', leadTime: '56' },
  tamsen: { reference: 'TC-2026-9', currency: /^EUR/, rule: /^DDP/, place: 'Brightmoor', prices: ['1,52', '1,39', '1,27'], oneTimeCost: '2900', leadTime: '42' },
} as const satisfies Record<string, Offer>
/** What Tamsen asks at the order quantity after thinking again. */
export const TAMSEN_LATER = '1,29'

/** Accepts confidentiality and takes the drawing: an own copy with the company's name across it, made from the same specification. */
async function readDrawing(page: Page, vendor: string, seal: { sha256: string; pdfSha256: string }, name: string) {
  await page.getByLabel('I accept this for my company').check()
  await look(page, `${name}-confidentiality`, { phone: true })
  await page.getByRole('button', { name: 'Accept and open the drawings' }).click()
  await page.getByRole('heading', { name: 'Parts and drawings' }).waitFor()
  const copy = await download(page, `Download the drawing of ${PART} rev A`)
  const text = pdfText(copy.bytes)
  for (const part of [vendor, PART, seal.sha256]) expect(text).toContain(part)
  expect(createHash('sha256').update(copy.bytes).digest('hex')).not.toBe(seal.pdfSha256)
  return text
}

async function typeOffer(page: Page, { reference, currency, rule, place, prices, oneTimeCost, leadTime }: Offer) {
  await page.getByLabel('Your quotation number').fill(reference)
  await chooseFrom(page, 'Currency', currency)
  await chooseFrom(page, /^Delivery, Incoterms/, rule)
  await page.getByLabel('Named place').fill(place)
  await page.getByLabel('Payment, days net').fill('30')
  await page.getByLabel('Valid until').fill(inDays(90))
  for (const [index, price] of prices.entries()) await priceField(page, index).fill(price)
  await page.getByRole('group', { name: 'One-time cost' }).getByLabel('Amount', { exact: true }).check()
  await page.getByLabel('One-time cost, amount').fill(oneTimeCost)
  await page.getByLabel('What the one-time cost covers').fill('Winding fixture and test adapter, property of the customer')
  await page.getByRole('group', { name: /^Samples/ }).getByLabel('Free of charge').check()
  await page.getByLabel('First order, lead time').fill(leadTime)
  await page.getByLabel('Minimum order quantity').fill('1000')
}

const priceField = (page: Page, index: number) => page.getByRole('group', { name: `Price break ${index + 1}` }).getByLabel('Price each')

async function submit(page: Page, revision: number, name: string) {
  await page.getByRole('button', { name: `Check and submit revision ${revision}` }).click()
  await page.getByRole('dialog').waitFor()
  await look(page, `${name}-submit-${revision}`, { phone: true })
  await confirm(page, `Submit revision ${revision}`)
  await page.getByText(`Revision ${revision} has been received.`).waitFor()
}

/** A newcomer: from the mail over a new password to a quotation, and to a better one. */
export async function tamsenQuotes(stage: Stage, rfq: Enquiry, link: string, seal: { sha256: string; pdfSha256: string }): Promise<void> {
  const page = await enterByMail(stage, link, '20-accept-invitation')
  await page.getByRole('heading', { name: 'Confidentiality' }).waitFor()
  expect(new URL(page.url()).pathname).toBe(`/enquiries/${rfq.id}`)
  const drawing = await readDrawing(page, TAMSEN.name, seal, '21-tamsen')
  expect(drawing).not.toContain(stage.cast.quillon.name)
  await typeOffer(page, OFFERS.tamsen)
  await page.locator('input[type=file]').setInputFiles({ name: 'quotation TC-2026-9.pdf', mimeType: 'application/pdf', buffer: QUOTATION_PDF })
  await page.getByRole('button', { name: 'Remove quotation TC-2026-9.pdf' }).waitFor()
  await page.getByText(/^Draft stored/).waitFor()
  await look(page, '22-tamsen-quotation', { phone: true })
  await submit(page, 1, '23-tamsen')

  await priceField(page, 1).fill(TAMSEN_LATER)
  await page.getByLabel('Why revision 2 replaces the one before').fill('Wire bought at a lower price')
  await submit(page, 2, '23-tamsen')
  await look(page, '24-tamsen-submitted', { phone: true })
  const receipts = await stage.mails(TAMSEN.email, new RegExp(`^Receipt: your quotation for ${rfq.number}`), 2)
  for (const { text } of receipts) expect(text).not.toMatch(/1[.,]\d\d|EUR/)
}

/** Who has a password signs in on the way from the mail to the enquiry. */
export async function quillonQuotes({ browser, origin, cast, mails }: Stage, rfq: Enquiry, seal: { sha256: string; pdfSha256: string }): Promise<void> {
  const [mail] = await mails(cast.quillonSales.email, new RegExp(`asks for a quotation: ${rfq.number}`))
  const page = await openPage(browser, origin)
  await page.goto(pathOf(mail!.links[0]!))
  await page.getByLabel('Mail address').fill(cast.quillonSales.email)
  await page.getByLabel('Password', { exact: true }).fill(PASSWORD)
  await page.getByRole('button', { name: 'Sign in' }).click()
  const drawing = await readDrawing(page, cast.quillon.name, seal, '25-quillon')
  expect(drawing).not.toContain(TAMSEN.name)
  await typeOffer(page, OFFERS.quillon)
  await submit(page, 1, '26-quillon')
  await refusesOthers(page, rfq)
}

/** The customer's own sheet of the enquiry, and one that does not exist, answer alike. */
async function refusesOthers(page: Page, rfq: Enquiry) {
  const texts: string[] = []
  for (const path of [`/rfqs/${rfq.id}`, `/comparisons/${rfq.id}`, '/rfqs/00000000-0000-4000-8000-000000000000']) {
    await page.goto(path)
    await page.getByRole('heading', { name: 'Not found' }).waitFor()
    texts.push(await page.getByRole('main').innerText())
  }
  expect(new Set(texts).size).toBe(1)
  await look(page, '27-not-found', { phone: true })
}

export async function oakhollowDeclines({ enter, cast }: Stage, rfq: Enquiry): Promise<void> {
  const page = await enter(cast.oakhollowSales)
  await look(page, '28-worklist-vendor', { phone: true })
  await page.getByRole('link', { name: new RegExp(rfq.number) }).first().click()
  await page.getByRole('button', { name: 'Decline with a reason' }).click()
  await chooseFrom(page, 'Reason', /litz/)
  await look(page, '29-decline', { phone: true })
  await page.getByRole('dialog').getByRole('button', { name: 'Decline' }).click()
  await page.getByText('Your company declined:').waitFor()
}

/** What a competitor reports or orders answers like what does not exist. */
export async function expectClosedTo({ enter }: Stage, person: { email: string }, path: string): Promise<void> {
  const page = await enter(person)
  const texts: string[] = []
  for (const address of [path, path.replace(/[^/]+$/, '00000000-0000-4000-8000-000000000000')]) {
    await page.goto(address)
    await page.getByRole('alert').waitFor()
    texts.push(await page.getByRole('main').innerText())
  }
  expect(texts[0]).toBe(texts[1])
}
