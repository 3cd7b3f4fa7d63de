import type { Page } from 'playwright-core'
import { expect } from 'vitest'
import { chooseFrom, confirm, download, inDays, look, pathOf } from './hands'
import type { Enquiry } from './enquiry'
import { TAMSEN } from './invitation'
import type { Stage } from './stage'

/** As asked for in the enquiry. */
export const SAMPLES = 5

/** The buyer asks one vendor whose quotation is opened; its people are told by mail. Returns the number of the request. */
export async function askForSamples({ enter, cast, mails }: Stage, rfq: Enquiry): Promise<{ number: string; link: string }> {
  const page = await enter(cast.buyer)
  await page.goto(`/samples/new?rfq=${rfq.id}`)
  await chooseFrom(page, 'Vendor', TAMSEN.name)
  await page.getByLabel('Needed by').fill(inDays(21))
  await look(page, '40-ask-for-samples')
  await page.getByRole('button', { name: 'Ask for samples' }).click()
  const heading = page.getByRole('heading', { level: 1, name: /Samples SR-/ })
  await heading.waitFor()
  const number = (await heading.innerText()).replace('Samples ', '')
  const [mail] = await mails(TAMSEN.email, /asks you for samples/)
  return { number, link: mail!.links[0]! }
}

/** Readings within the limits that stand in the empty table, spread a little from part to part, decimal comma. */
export function fillTemplate(template: string): string[][] {
  const [head, min, nom, max, ...parts] = template.trim().split('\r\n').map((line) => line.split(';'))
  const aim = (column: number) => {
    const [low, middle, high] = [min, nom, max].map((line) => (line![column] ? Number(line![column]!.replace(',', '.')) : null))
    return middle ?? (low != null && high != null ? (low + high) / 2 : high != null ? high * 0.8 : low! * 1.2)
  }
  const reading = (column: number, part: number) => (head![column]!.includes('pass/fail') ? 'PASS' : comma(aim(column) * (1 + (part - 2) * 0.0015)))
  return [head!, min!, nom!, max!, ...parts.map((_, part) => head!.map((__, column) => (column === 0 ? `T${part + 1}` : reading(column, part))))]
}

const comma = (value: number) => String(Number(value.toPrecision(5))).replace('.', ',')
const written = (table: string[][]) => Buffer.from(table.map((line) => `${line.join(';')}\r\n`).join(''))

/** A technician of the vendor fills the table, answers what cannot be read for certain, declares and sends. */
export async function reportSamples({ enter }: Stage, link: string): Promise<void> {
  const page = await enter(TAMSEN)
  await page.goto(pathOf(link))
  await page.getByRole('heading', { name: 'Hand in a report' }).waitFor()
  await look(page, '41-vendor-sample-request', { phone: true })
  const template = await download(page, 'Download the empty table')
  const table = fillTemplate(template.bytes.toString('utf8').replace('\uFEFF', ''))
  expect(table.length).toBe(4 + SAMPLES)
  // One part was read from another range of the meter.
  const inductance = table[0]!.findIndex((heading) => heading.includes('µH'))
  table[5]![inductance] = comma(Number(table[5]![inductance]!.replace(',', '.')) / 1000)
  await page.locator('input[type=file]').first().setInputFiles({ name: 'BM-T5201 pilot.csv', mimeType: 'text/csv', buffer: written(table) })
  await page.getByRole('button', { name: 'Read the report' }).click()
  await answerAndDeclare(page)
}

async function answerAndDeclare(page: Page) {
  await page.getByRole('heading', { name: /^Questions? about / }).waitFor()
  await look(page, '42-vendor-report-question', { phone: true })
  await page.getByRole('group', { name: /^Cell [A-Z]6/ }).getByLabel('Multiply by 1000').check()
  await page.getByRole('button', { name: 'Give the answer' }).click()
  await page.getByText('Save the declaration first.').waitFor()
  await page.getByLabel('Measured on').fill(inDays(-1))
  await page.getByLabel('Temperature of the parts').fill('20,5')
  await page.getByLabel('Measured by').fill('Teun Smits')
  await page.getByLabel('Instruments').fill('LCR meter no. 4711, calibrated until 2027-03; open, short and load compensated')
  await page.getByLabel('As drawn').check()
  await page.getByRole('button', { name: 'Save the declaration' }).click()
  await page.getByText('Save the declaration first.').waitFor({ state: 'detached' })
  await look(page, '43-vendor-report-ready', { phone: true })
  await page.getByRole('button', { name: 'Confirm and send' }).click()
  await confirm(page, 'Send')
  await page.getByRole('heading', { name: 'Your declaration' }).waitFor()
  await look(page, '44-vendor-report-sent', { phone: true })
}

/** Quality reads each reading with its verdict and what they add up to, and decides. */
export async function disposeOf({ enter, cast, mails }: Stage, number: string): Promise<void> {
  const page = await enter(cast.quality)
  await page.getByRole('link', { name: new RegExp(`Decide about the samples ${number}`) }).click()
  await page.getByRole('link', { name: /Report 1/ }).click()
  const readings = page.getByRole('region', { name: 'Readings against the limits of the drawing' })
  await readings.waitFor()
  expect(await readings.getByRole('row', { name: /^n / }).first().innerText()).toMatch(new RegExp(`\\b${SAMPLES}\\b`))
  for (const figure of ['Mean', 'Standard deviation', 'Smallest', 'Largest']) expect(await readings.getByRole('rowheader', { name: figure }).count()).toBe(1)
  await look(page, '45-sample-report')
  await page.getByLabel('Accept', { exact: true }).check()
  await page.getByLabel('Reason').fill('Every reading lies within the limits of the drawing.')
  await page.getByRole('button', { name: 'Decide' }).click()
  await page.getByText('Every reading lies within the limits of the drawing.').waitFor()
  await mails(TAMSEN.email, /was decided about/)
}
