import type { Page } from 'playwright-core'
import { expect } from 'vitest'
import { pdfText } from '../../../support/pdf-tools'
import { letAllPass } from '../let-pass'
import { confirm, download, look } from './hands'
import type { Stage } from './stage'

export const PART = 'BM-T5201'
const TITLE = 'Transformer, flyback, buoy supply'

const OUTPUTS = [
  { name: '+5.2 V', voltage: '5,2', drop: '0,5', full: '3', light: '300 mA' },
  { name: '+15 V', voltage: '15', drop: '0,7', full: '0,4', light: '40 mA' },
  { name: '−15 V', voltage: '-15', drop: '0,7', full: '0,4', light: '40 mA' },
]

async function fillOutput(page: Page, number: number, { name, voltage, drop, full, light }: (typeof OUTPUTS)[number]) {
  await page.getByLabel(`Name, output S${number}`).fill(name)
  const column = (label: string) => page.getByLabel(`${label}, output ${name}`)
  await column('Voltage, signed').fill(voltage)
  await column('Rectifier drop').fill(drop)
  await column('Current at full load').fill(full)
  await column('Current at light load').fill(light)
}

async function typeDuty(page: Page) {
  await page.getByLabel('Input, d.c., minimum').fill('18')
  await page.getByLabel('Input, d.c., maximum').fill('32')
  for (const [index, output] of OUTPUTS.entries()) {
    if (index > 0) await page.getByRole('button', { name: 'Add an output' }).click()
    await fillOutput(page, index + 1, output)
  }
  await page.getByLabel('Ripple over mean on-time current').fill('60')
  await page.getByLabel('Efficiency at full load').fill('82')
  await page.getByLabel('Drop of the closed switch').fill('0,3')
  await page.getByRole('button', { name: 'State it: Current limit' }).click()
  await page.getByLabel('Current limit, nominal').fill('6,2')
  await page.getByLabel('Current limit, delay').fill('150 ns')
  await page.getByLabel('Air around the part').fill('55')
  await page.getByLabel('Permitted temperature rise').fill('45')
  await page.getByLabel('Current density aimed at').fill('5,5')
}

/** The engineer types a duty, takes the proposal, looks what one turn does, and hands the draft to check. Returns its address. */
export async function specify(page: Page): Promise<string> {
  await page.goto('/specifications')
  await page.getByRole('button', { name: 'New specification' }).click()
  await page.getByLabel('Part number').fill(PART)
  await page.getByLabel('Title').fill(TITLE)
  await typeDuty(page)
  await look(page, '02-duty')
  await page.getByRole('button', { name: 'Propose', exact: true }).click()
  await page.getByRole('button', { name: 'Start a draft with this proposal' }).waitFor()
  await look(page, '03-proposal')
  await page.getByRole('button', { name: 'Start a draft with this proposal' }).click()
  await page.getByRole('heading', { level: 1, name: new RegExp(PART) }).waitFor()
  await changeTurns(page)

  await page.getByRole('button', { name: 'Hand to check' }).click()
  await look(page, '05-hand-to-check')
  await page.getByRole('dialog').getByRole('button', { name: 'Hand to check' }).click()
  await page.getByText('a checker who did not work on it releases it').waitFor()
  expect(await page.getByRole('button', { name: 'Release' }).count()).toBe(0)
  await look(page, '06-in-check')
  return new URL(page.url()).pathname
}

/** One turn more on the first winding moves the flux; the change is taken back and the draft is stored. */
async function changeTurns(page: Page) {
  await page.getByRole('tab', { name: 'Figures' }).click()
  const flux = () => page.locator('.figure-line').filter({ hasText: 'Worst flux density' }).locator('dd').first().innerText()
  const before = await flux()
  await page.getByRole('navigation', { name: 'Sections of the specification' }).getByRole('button', { name: 'Windings' }).click()
  const turns = page.getByLabel('Turns, winding 1')
  await turns.fill(String(Number(await turns.inputValue()) + 1))
  await expect.poll(flux).not.toBe(before)
  await look(page, '04-workbench')
  await page.getByRole('button', { name: 'Undo' }).click()
  await expect.poll(flux).toBe(before)
  await page.getByText(/^Stored \d{4}/).waitFor()
}

/** Everything that stops the release is answered for by the checker, in words that stay with the drawing. */
async function letPass(page: Page) {
  await letAllPass(page, 'Figures measured on the first series and kept with it.')
}

/** Another person checks, answers for what a person has to answer for, and releases; the PDF says what was released. */
export async function release({ enter, cast }: Stage): Promise<{ sha256: string; pdfSha256: string }> {
  const page = await enter(cast.checker)
  await look(page, '07-worklist-checker')
  await page.getByRole('link', { name: `Check ${PART}, P1` }).click()
  await page.getByRole('heading', { name: 'Checks' }).waitFor()
  await look(page, '08-checks')
  await letPass(page)
  await page.getByRole('button', { name: 'Release' }).click()
  await confirm(page, 'Release')
  await page.getByRole('heading', { name: 'Seal' }).waitFor()
  expect(await page.getByRole('group', { name: /sheet 1 of/ }).innerHTML()).toContain(PART)
  await look(page, '09-released')

  const seal = (name: string) => page.locator('.fact-lines div').filter({ hasText: name }).locator('dd').innerText()
  const sha256 = await seal('SHA-256 of the specification')
  const pdf = await download(page, 'Download PDF')
  const text = pdfText(pdf.bytes)
  for (const part of [PART, TITLE, sha256]) expect(text).toContain(part)
  expect(pdf.name).toContain(`${PART}-A`)
  return { sha256, pdfSha256: await seal('SHA-256 of the PDF') }
}
