import type { Page } from 'playwright-core'
import { PASSWORD } from '../../../support/factories'
import { openPage } from '../pictures'
import { chooseFrom, look, pathOf } from './hands'
import type { Stage } from './stage'

export const TAMSEN = { name: 'Tamsen Coilwork', contact: 'Teun Smits', email: 'teun@tamsen.example' }

/** The administrator makes a vendor known that nobody here has worked with; the invitation goes out by mail. */
export async function inviteVendor({ enter, cast, mails }: Stage): Promise<void> {
  const page = await enter(cast.admin)
  await page.goto('/vendors')
  await page.getByRole('button', { name: 'Invite a vendor' }).click()
  await page.getByLabel('Vendor', { exact: true }).fill(TAMSEN.name)
  await page.getByLabel('First contact').fill(TAMSEN.contact)
  await page.getByLabel('Mail address of the contact').fill(TAMSEN.email)
  await chooseFrom(page, 'Country', 'Netherlands')
  await look(page, '01-invite-vendor')
  await page.getByRole('button', { name: 'Send the invitation' }).click()
  await page.getByRole('link', { name: TAMSEN.name }).waitFor()
  await mails(TAMSEN.email, /invites you as a vendor/)
}

/** Who has no password yet sets one on the way from a mail to what the mail is about. */
export async function enterByMail({ browser, origin }: Stage, link: string, name: string): Promise<Page> {
  const page = await openPage(browser, origin)
  await page.goto(pathOf(link))
  await page.getByRole('heading', { name: 'Accept the invitation' }).waitFor()
  await look(page, name, { phone: true })
  await page.getByLabel('Password', { exact: true }).fill(PASSWORD)
  await page.getByRole('button', { name: 'Accept and sign in' }).click()
  await page.getByRole('button', { name: TAMSEN.contact }).waitFor()
  return page
}
