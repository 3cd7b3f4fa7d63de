import { asAuth } from '#server/db/as-actor'
import { createToken } from '#server/services/people/sign-in-tokens'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { launchChromium } from '../support/chromium'
import { buildCompany, buildPerson, buildWorld, linkVendor, PASSWORD, type TestPerson } from '../support/factories'
import { startTestApp, type TestApp } from '../support/test-app'
import { expectNoSeriousAxe, openAs, openPage, PHONE_WIDTH, picture, scrollsSideways, serve } from './support/pictures'

let test: TestApp
let site: Awaited<ReturnType<typeof serve>>
let browser: Browser
let world: Awaited<ReturnType<typeof buildWorld>>

beforeAll(async () => {
  test = await startTestApp()
  site = await serve(test.app)
  browser = await launchChromium()
  world = await buildWorld(test, 2)
})
afterAll(async () => {
  await browser?.close()
  site?.close()
  await test?.stop()
})

const enter = (person: TestPerson) => openAs(browser, site.origin, { email: person.email, password: PASSWORD })

async function look(page: Page, path: string, title: string, name: string) {
  await page.goto(path)
  await page.getByRole('heading', { level: 1, name: title }).waitFor()
  await picture(page, name)
  await expectNoSeriousAxe(page)
  await page.setViewportSize({ width: PHONE_WIDTH, height: 844 })
  expect(await scrollsSideways(page), `${path} at ${PHONE_WIDTH} px`).toBe(false)
}

describe('signing in', () => {
  it('asks nobody in without saying why, then leads to where the person was going', async () => {
    const page = await openPage(browser, site.origin)
    await page.goto('/vendors')
    await page.getByRole('heading', { name: 'Sign in' }).waitFor()
    await picture(page, 'sign-in')
    await expectNoSeriousAxe(page)

    await page.getByLabel('Mail address').fill(world.buyer.email)
    await page.getByLabel('Password', { exact: true }).fill('not the password')
    await page.getByRole('button', { name: 'Sign in' }).click()
    await page.getByRole('alert').waitFor()
    expect(await page.getByLabel('Mail address').inputValue()).toBe(world.buyer.email)
    await picture(page, 'sign-in-refused')

    await page.getByLabel('Password', { exact: true }).fill(PASSWORD)
    await page.keyboard.press('Enter')
    await page.getByRole('heading', { name: 'Vendors' }).waitFor()
  })

  it('shows the same sheet for what is another role’s as for what does not exist', async () => {
    const page = await enter(world.engineer)
    const texts: string[] = []
    for (const path of ['/companies', '/no-such-sheet']) {
      await page.goto(path)
      await page.getByRole('heading', { name: 'Not found' }).waitFor()
      texts.push(await page.getByRole('main').innerText())
    }
    expect(texts[0]).toBe(texts[1])
  })

  it('signs out and forgets the person', async () => {
    const page = await enter(world.engineer)
    await page.getByRole('button', { name: world.engineer.name }).click()
    await page.getByRole('menuitem', { name: 'Sign out' }).click()
    await page.getByRole('heading', { name: 'Sign in' }).waitFor()
    await page.goto('/people')
    await page.getByRole('heading', { name: 'Sign in' }).waitFor()
  })
})

describe('a mail link', () => {
  async function linkFor(person: TestPerson, purpose: 'invitation' | 'password-reset') {
    const { token } = await asAuth(test.ctx, (tx) => createToken(tx, { purpose, personId: person.personId, validHours: 1 }))
    return token
  }

  it('takes a newcomer from the invitation to the sheet it is about, once', async () => {
    const newcomer = await buildPerson(test, world.vendors[1]!.company, ['vendor'], { invited: true, name: 'Zoë Marks' })
    const token = await linkFor(newcomer, 'invitation')
    const page = await openPage(browser, site.origin)
    await page.goto(`/link?next=%2Fcustomers#${token}`)
    await page.getByRole('heading', { name: 'Accept the invitation' }).waitFor()
    await picture(page, 'accept-invitation')
    await expectNoSeriousAxe(page)
    await page.getByLabel('Password', { exact: true }).fill(PASSWORD)
    await page.getByRole('button', { name: 'Accept and sign in' }).click()
    await page.getByRole('heading', { name: 'Customers' }).waitFor()
    await page.getByRole('button', { name: 'Zoë Marks' }).waitFor()

    const again = await openPage(browser, site.origin)
    await again.goto(`/link#${token}`)
    await again.getByRole('alert').waitFor()
    await picture(again, 'link-used')
    await expectNoSeriousAxe(again)
  })

  it('sets a new password after a forgotten one', async () => {
    const page = await openPage(browser, site.origin)
    await page.goto('/forgotten-password')
    await page.getByLabel('Mail address').fill(world.quality.email)
    await picture(page, 'forgotten-password')
    await page.getByRole('button', { name: 'Send the link' }).click()
    await page.getByText('a mail with a link is on its way').waitFor()

    await page.goto(`/link#${await linkFor(world.quality, 'password-reset')}`)
    await page.getByRole('heading', { name: 'Set a new password' }).waitFor()
    await page.getByLabel('Password', { exact: true }).fill('another quite long password')
    await page.getByRole('button', { name: 'Set password and sign in' }).click()
    await page.getByRole('heading', { name: 'Worklist' }).waitFor()
  })
})

describe('an ended session', () => {
  it('keeps what was typed and goes on after signing in again in place', async () => {
    const page = await enter(world.admin)
    await page.goto('/people/invitation')
    await page.getByLabel('Name').fill('Sanna Kivi')
    await page.getByLabel('Mail address').fill('sanna@brightmoor.example')
    await page.getByLabel('Engineer').check()
    await test.database.query('DELETE FROM sessions WHERE user_id = $1', [world.admin.personId])

    await page.getByRole('button', { name: 'Send the invitation' }).click()
    const dialog = page.getByRole('dialog', { name: 'Your session has ended' })
    await dialog.waitFor()
    await picture(page, 'session-ended')
    await expectNoSeriousAxe(page)
    await dialog.getByLabel('Password', { exact: true }).fill(PASSWORD)
    await dialog.getByRole('button', { name: 'Sign in and go on' }).click()

    await page.getByRole('heading', { name: 'People' }).waitFor()
    await page.getByRole('cell', { name: 'sanna@brightmoor.example' }).waitFor()
  })
})

describe('people and vendors', () => {
  it('gives back a half-typed form after a reload', async () => {
    const page = await enter(world.admin)
    await page.goto('/vendors/invitation')
    await page.getByLabel('Vendor', { exact: true }).fill('Tamsen Coilwork')
    await page.reload()
    await page.getByText('This is what you typed before').waitFor()
    expect(await page.getByLabel('Vendor', { exact: true }).inputValue()).toBe('Tamsen Coilwork')

    await page.getByLabel('First contact').fill('Teun Smits')
    await page.getByLabel('Mail address of the contact').fill('not an address')
    await page.locator('form').evaluate((form) => form.setAttribute('novalidate', ''))
    await page.getByRole('button', { name: 'Send the invitation' }).click()
    await page.getByText('This is not a mail address').waitFor()
    expect(await page.getByLabel('First contact').inputValue()).toBe('Teun Smits')

    await page.getByLabel('Mail address of the contact').fill('teun@tamsen.example')
    await page.getByRole('button', { name: 'Send the invitation' }).click()
    await page.getByRole('heading', { name: 'Vendors' }).waitFor()
    await page.getByRole('link', { name: 'Tamsen Coilwork' }).click()
    await page.getByText('The vendor has not answered the invitation yet.').waitFor()
  })

  it('lets an administrator ask for new roles and a second one confirm them', async () => {
    const second = await buildPerson(test, world.buying, ['admin'])
    const page = await enter(world.admin)
    await page.goto('/people')
    await page.getByRole('button', { name: `Change ${world.checker.name}` }).click()
    await page.getByLabel('Approver').check()
    await page.getByLabel('Approves orders up to').fill('12,500')
    await page.getByRole('button', { name: /12.500\.00/ }).click()
    await picture(page, 'change-person')
    await page.getByRole('button', { name: 'Ask for this change' }).click()
    await page.getByText('Roles become Checker, Approver').waitFor()

    const other = await enter(second)
    await other.getByRole('link', { name: `Confirm new roles for ${world.checker.name}` }).click()
    await other.getByRole('button', { name: `Confirm the change for ${world.checker.name}` }).click()
    const dialog = other.getByRole('dialog')
    await dialog.waitFor()
    await picture(other, 'confirm-change')
    await dialog.getByRole('button', { name: 'Confirm' }).click()
    await other.getByRole('cell', { name: 'Checker, Approver' }).waitFor()
  })

  it('keeps the record and the signed agreement about a vendor', async () => {
    const page = await enter(world.buyer)
    await page.goto(`/vendors/${world.vendors[0]!.company.id}`)
    await page.getByLabel('Confidentiality agreed on').fill('2026-01-15')
    await page.getByLabel('Notes').fill('Winds litz in house.')
    await page.getByRole('button', { name: 'Save' }).click()
    await page.getByText('Saved.').waitFor()

    const choose = page.locator('input[type=file]')
    await choose.setInputFiles({ name: 'empty.pdf', mimeType: 'application/pdf', buffer: Buffer.alloc(0) })
    await page.getByText('“empty.pdf” is empty (0 bytes)').waitFor()
    await choose.setInputFiles({ name: 'agreement.pdf', mimeType: 'application/pdf', buffer: Buffer.from('%PDF-1.4\n1 0 obj\n<< >>\nendobj\ntrailer\n<< /Root 1 0 R >>\n%%EOF\n') })
    await page.getByRole('button', { name: 'Send the file' }).click()
    await page.getByRole('button', { name: 'Download agreement.pdf' }).waitFor()
    const [saved] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: 'Download agreement.pdf' }).click()])
    expect(saved.suggestedFilename()).toBe('agreement.pdf')
  })
})

describe('every sheet', () => {
  it('passes axe and fits a phone for an administrator', async () => {
    const page = await enter(world.admin)
    await look(page, '/', 'Worklist', 'worklist-admin')
    await look(page, '/people', 'People', 'people')
    await look(page, '/people/invitation', 'Invite a person', 'invite-person')
    await look(page, '/company', world.buying.name, 'company')
    await look(page, '/vendors', 'Vendors', 'vendors')
    await look(page, '/vendors/invitation', 'Invite a vendor', 'invite-vendor')
    await look(page, '/account', 'Your account', 'account')
    await look(page, '/nowhere', 'Not found', 'not-found')
  })

  it('passes axe and fits a phone for a vendor', async () => {
    const { company, person } = world.vendors[0]!
    await linkVendor(test, await buildCompany(test, 'buying', { name: 'Ternwick Instruments' }), company, { accepted: false })
    const page = await enter(person)
    await look(page, '/', 'Worklist', 'worklist-vendor')
    await page.getByRole('button', { name: 'Menu' }).click()
    await page.getByRole('dialog').waitFor()
    await picture(page, 'drawer', [PHONE_WIDTH])
    await look(page, '/customers', 'Customers', 'customers')
    await look(page, '/people', 'People', 'people-vendor')
    await look(page, '/people/invitation', 'Invite a person', 'invite-person-vendor')
  })

  it('passes axe and fits a phone for an operator', async () => {
    const page = await enter(await buildPerson(test, await buildCompany(test, 'operator'), ['operator']))
    await look(page, '/companies', 'Companies', 'companies')
    await look(page, '/companies/new', 'Set up a company', 'create-company')
  })

  it('passes axe and fits a phone for a buyer looking at a vendor', async () => {
    await look(await enter(world.buyer), `/vendors/${world.vendors[1]!.company.id}`, world.vendors[1]!.company.name, 'vendor')
  })
})
