import { runWorker } from '#server/run-worker'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import path from 'node:path'
import type { Browser, Page } from 'playwright-core'
import { expect } from 'vitest'
import { startMailFake, type StoredMessage } from '../../../../fake-services/mail/mail-fake'
import { launchChromium } from '../../../support/chromium'
import { buildCompany, buildPerson, linkVendor, PASSWORD, type TestCompany, type TestPerson } from '../../../support/factories'
import { startTestApp, type TestApp } from '../../../support/test-app'
import { openAs } from '../pictures'

/** Long enough for a mail on a loaded machine: the worker looks once a second. */
const MAIL_WAIT_MS = 30_000

export interface Stage {
  test: TestApp
  browser: Browser
  origin: string
  cast: Awaited<ReturnType<typeof buildCast>>
  /** Signed in through the form, in a browser profile of its own. */
  enter(person: Pick<TestPerson, 'email'>): Promise<Page>
  /** Mails to one address whose subject matches, as the mail server's JSON shows them; waits until there are as many. */
  mails(to: string, subject: RegExp, count?: number): Promise<StoredMessage[]>
  allMails(): Promise<StoredMessage[]>
  stop(): Promise<void>
}

/** The whole installation: server with its built client, worker, mail server and a browser. */
export async function startStage(): Promise<Stage> {
  const server = createServer()
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  const origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
  const folder = path.resolve(import.meta.dirname, '../../../../.pictures/walk-mails')
  const fake = await startMailFake({ smtpPort: 0, pagePort: 0, folder })
  await fake.clear()
  const test = await startTestApp({ PUBLIC_URL: origin, SMTP_URL: `smtp://127.0.0.1:${fake.smtpPort}` })
  server.on('request', test.app)
  const stopWorker = runWorker(test.ctx)
  const browser = await launchChromium()
  const cast = await buildCast(test)

  const fetchMails = async (query = '') => (await (await fetch(`http://127.0.0.1:${fake.pagePort}/messages.json${query}`)).json()) as StoredMessage[]
  return {
    test,
    browser,
    origin,
    cast,
    enter: ({ email }) => openAs(browser, origin, { email, password: PASSWORD }),
    allMails: () => fetchMails(),
    async mails(to, subject, count = 1) {
      let found: StoredMessage[] = []
      const look = async () => {
        found = (await fetchMails(`?to=${encodeURIComponent(to)}`)).filter((mail) => subject.test(mail.subject))
        return found.length
      }
      await expect.poll(look, { timeout: MAIL_WAIT_MS, interval: 200, message: `mails to ${to} about ${subject}` }).toBe(count)
      return found
    },
    async stop() {
      await browser.close()
      server.close()
      server.closeAllConnections()
      await stopWorker()
      await fake.stop()
      await test.stop()
    },
  }
}

async function buildCast(test: TestApp) {
  const buying = await buildCompany(test, 'buying', { name: 'Brightmoor Power Works' })
  const quillon = await buildCompany(test, 'vendor', { name: 'Quillon Windings' })
  const oakhollow = await buildCompany(test, 'vendor', { name: 'Oakhollow Wound Parts' })
  for (const vendor of [quillon, oakhollow]) await linkVendor(test, buying, vendor)
  const member = (company: TestCompany, roles: TestPerson['roles'], name: string, email: string) => buildPerson(test, company, [...roles], { name, email })
  return {
    buying,
    quillon,
    oakhollow,
    admin: await member(buying, ['admin'], 'Aino Reinholt', 'admin@brightmoor.example'),
    engineer: await member(buying, ['engineer'], 'Edda Marling', 'engineer@brightmoor.example'),
    checker: await member(buying, ['checker'], 'Corin Falk', 'checker@brightmoor.example'),
    quality: await member(buying, ['quality'], 'Quinn Haldane', 'quality@brightmoor.example'),
    buyer: await member(buying, ['buyer'], 'Bodil Ness', 'buyer@brightmoor.example'),
    approver: await member(buying, ['approver'], 'Arne Sund', 'approver@brightmoor.example'),
    quillonSales: await member(quillon, ['vendor'], 'Runa Quill', 'runa@quillon.example'),
    quillonTest: await member(quillon, ['vendor'], 'Tove Lind', 'tove@quillon.example'),
    oakhollowSales: await member(oakhollow, ['vendor'], 'Ossian Holl', 'ossian@oakhollow.example'),
  }
}
