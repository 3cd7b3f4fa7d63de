import { asActor, asWorker } from '#server/db/as-actor'
import { queueMail } from '#server/mail/queue-mail'
import { retrySeconds, sendOutbox } from '#server/mail/send-outbox'
import { createTransport } from '#server/mail/transport'
import * as mailContract from '#shared/contracts/mail'
import * as contract from '#shared/contracts/people'
import { spawn, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { startMailFake, type MailFake, type MailFault } from '../../fake-services/mail/mail-fake'
import { buildCompany, buildPerson, buildWorld } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))

let test: TestApp
let fake: MailFake
let folder: string
let world: Awaited<ReturnType<typeof buildWorld>>

beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'dotside-mail-'))
  fake = await startMailFake({ smtpPort: 0, pagePort: 0, folder })
  test = await startTestApp({ SMTP_URL: `smtp://127.0.0.1:${fake.smtpPort}` }, { mail: createTransport(`smtp://127.0.0.1:${fake.smtpPort}`) })
  world = await buildWorld(test)
})
afterAll(async () => {
  await test.stop()
  await fake.stop()
  await rm(folder, { recursive: true, force: true })
})
beforeEach(async () => {
  fake.behave()
  await fake.clear()
  await test.database.query('TRUNCATE outbox_mails, mail_events CASCADE')
})
afterEach(() => test.database.setClock({}))

/** Tells the six people of a buying company something, as one event. */
const tellBuyingCompany = () =>
  asActor(test.ctx, world.admin, (tx) =>
    queueMail(tx, world.admin, { template: 'password-set', props: { at: '2026-12-01T16:00:00.000Z' }, to: { companyId: world.buying.id } }),
  )

/** Plays the fault for the first try of each recipient. */
function failFirstTries(fault: MailFault): void {
  const tried = new Set<string>()
  fake.behave(({ recipient }) => {
    if (tried.has(recipient)) return undefined
    tried.add(recipient)
    return fault
  })
}

const states = async () => (await test.database.query<{ state: string }>('SELECT state FROM outbox_mails ORDER BY state')).map(({ state }) => state)

describe('the outbox', () => {
  it('sends each recipient a mail of its own, with plain text and a fixed Message-ID', async () => {
    await tellBuyingCompany()
    await sendOutbox(test.ctx)
    const mails = await fake.messages()
    expect(mails).toHaveLength(6)
    expect(mails.every(({ envelope, html }) => envelope.to.length === 1 && html === null)).toBe(true)
    const stored = await test.database.query<{ message_id: string }>('SELECT message_id FROM outbox_mails')
    expect(mails.map(({ messageId }) => messageId).sort()).toEqual(stored.map(({ message_id }) => message_id).sort())
    expect(new Set(mails.map(({ messageId }) => messageId)).size).toBe(6)
  })

  it('sends only to those of a company who hold a role', async () => {
    await asActor(test.ctx, world.vendors[0]!.person, (tx) =>
      queueMail(tx, world.vendors[0]!.person, { template: 'password-set', props: { at: '2026-12-01T16:00:00.000Z' }, to: { companyId: world.buying.id, roles: ['buyer', 'approver'] } }),
    )
    await sendOutbox(test.ctx)
    expect((await fake.messages()).map(({ envelope }) => envelope.to[0]).sort()).toEqual([world.buyer.email, world.approver.email].sort())
  })

  it('sends nothing of a transaction that failed', async () => {
    const failing = asActor(test.ctx, world.admin, async (tx) => {
      await queueMail(tx, world.admin, { template: 'password-reset', props: {}, to: { personId: world.buyer.personId } })
      throw new Error('failed afterwards')
    })
    await expect(failing).rejects.toThrow('failed afterwards')
    await sendOutbox(test.ctx)
    expect(await fake.messages()).toEqual([])
  })

  it('sends each mail once when several workers send at the same moment', async () => {
    await Promise.all([tellBuyingCompany(), tellBuyingCompany(), tellBuyingCompany()])
    await Promise.all([sendOutbox(test.ctx), sendOutbox(test.ctx), sendOutbox(test.ctx)])
    expect(await fake.messages()).toHaveLength(18)
  })

  it('tries again later when the connection breaks before the mail, and the mail arrives once', async () => {
    failFirstTries({ kind: 'drop-before-data' })
    await tellBuyingCompany()
    await sendOutbox(test.ctx)
    expect(await fake.messages()).toEqual([])
    await sendOutbox(test.ctx)
    expect(await fake.messages()).toEqual([])
    await test.database.setClock({ seconds: 31 })
    await sendOutbox(test.ctx)
    expect(await fake.messages()).toHaveLength(6)
    expect(await states()).toEqual(Array(6).fill('sent'))
  })

  it('sends again under the same Message-ID when it could not hear whether the mail was taken', async () => {
    failFirstTries({ kind: 'drop-before-accept' })
    await tellBuyingCompany()
    await sendOutbox(test.ctx)
    await test.database.setClock({ seconds: 31 })
    await sendOutbox(test.ctx)
    const mails = await fake.messages()
    expect(mails).toHaveLength(12)
    expect(new Set(mails.map(({ messageId }) => messageId)).size).toBe(6)
  })

  it('waits twice as long after each failure, up to an hour', () => {
    expect([1, 2, 3, 4, 12].map(retrySeconds)).toEqual([30, 60, 120, 240, 3600])
  })

  it('gives a single-use link to a mail and keeps no token that could be used', async () => {
    const admin = await buildPerson(test, await buildCompany(test, 'buying'), ['admin'])
    const invited = await request(test.app, contract.invitePerson, { as: admin.cookie, body: { name: 'Mail Reader', email: 'mail.reader@company.example', roles: ['engineer'] } })
    await sendOutbox(test.ctx)
    const [mail] = await fake.messages('mail.reader@company.example')
    const token = /\/link#(\S+)/.exec(mail!.text)![1]!
    const kept = await test.database.query('SELECT row_to_json(t)::text AS row FROM (SELECT * FROM sign_in_tokens) t UNION ALL SELECT row_to_json(m)::text FROM mail_events m')
    expect(kept.some(({ row }) => String(row).includes(token))).toBe(false)
    const used = await request(test.app, contract.useSignInLink, { body: { token, password: 'a long enough password' } }).expect(200)
    expect(used.body.person.id).toBe(invited.body.id)
  })

  it('leads a vendor who has never signed in from the invitation on to its page, and one who has to the page', async () => {
    const known = world.vendors[1]!.person
    const other = await buildPerson(test, await buildCompany(test, 'buying'), ['admin'])
    const invite = (contactEmail: string) =>
      request(test.app, contract.inviteVendor, { as: other.cookie, body: { name: 'Coil House', country: 'DE', contactName: 'Contact', contactEmail } })
    await invite('fresh@vendor.example').expect(200)
    await asActor(test.ctx, world.admin, (tx) => queueMail(tx, world.admin, { template: 'vendor-invitation', props: { buyingCompanyName: 'X' }, to: { personId: known.personId } }))
    await sendOutbox(test.ctx)
    expect((await fake.messages('fresh@vendor.example'))[0]!.text).toMatch(/\/link\?next=%2Fcustomers#\S+/)
    expect((await fake.messages(known.email))[0]!.text).toContain('http://dotside.test/customers\n')
  })
})

describe('an undeliverable address', () => {
  it('is shown to those who caused the mail, does not undo the fact, and can be tried again', async () => {
    fake.behave(({ recipient }) => (recipient === 'no.mailbox@company.example' ? { kind: 'reject-recipient' } : undefined))
    const body = { name: 'No Mailbox', email: 'no.mailbox@company.example', roles: ['engineer'] }
    await request(test.app, contract.invitePerson, { as: world.admin.cookie, body }).expect(200)
    await sendOutbox(test.ctx)
    const list = (as: string) => request(test.app, mailContract.listUndeliverable, { as })
    const [mail] = (await list(world.admin.cookie)).body
    expect(mail).toMatchObject({ template: 'invitation', address: 'no.mailbox@company.example', attempts: 1, lastError: expect.stringContaining('550') })
    expect((await list(world.vendors[0]!.person.cookie)).body).toEqual([])

    fake.behave()
    const stranger = await request(test.app, mailContract.retryMail, { as: world.vendors[0]!.person.cookie, params: { mailId: mail.id } })
    expect(stranger.status).toBe(404)
    await request(test.app, mailContract.retryMail, { as: world.admin.cookie, params: { mailId: mail.id } }).expect(200)
    await sendOutbox(test.ctx)
    expect(await fake.messages('no.mailbox@company.example')).toHaveLength(1)
  })
})

describe('a worker that is killed', () => {
  function startWorker(): ChildProcess {
    const { config, database } = { config: test.ctx.config, database: test.database }
    const env = { ...process.env, ...database.urls, SMTP_URL: config.SMTP_URL, PUBLIC_URL: config.PUBLIC_URL, DATA_DIR: config.DATA_DIR, MAIL_FROM: config.MAIL_FROM }
    return spawn(process.execPath, ['--import', 'tsx', 'server/worker.ts'], { cwd: ROOT, env, stdio: 'ignore' })
  }

  async function until(condition: () => Promise<boolean>): Promise<void> {
    for (let i = 0; i < 150; i += 1) {
      if (await condition()) return
      await new Promise((resolve) => setTimeout(resolve, 100))
    }
    throw new Error('It did not happen in 15 seconds.')
  }

  async function killThenRunAgain(fault: 'before DATA' | 'before the mark') {
    const first = startWorker()
    const ended = once(first, 'exit')
    fake.behave(() => {
      if (fault === 'before the mark') return { kind: 'delay', milliseconds: 60_000 }
      first.kill('SIGKILL')
      return { kind: 'drop-before-data' }
    })
    await tellBuyingCompany()
    if (fault === 'before the mark') {
      await until(async () => (await fake.messages()).length > 0)
      first.kill('SIGKILL')
    }
    await ended
    const left = await states()
    fake.behave()
    await test.database.setClock({ seconds: 120 })
    const second = startWorker()
    await until(async () => (await states()).every((state) => state === 'sent'))
    second.kill('SIGTERM')
    await once(second, 'exit')
    return { left, mails: await fake.messages() }
  }

  it('before DATA leaves the mail to be sent once', async () => {
    const { left, mails } = await killThenRunAgain('before DATA')
    expect(left).toEqual(Array(6).fill('waiting'))
    expect(mails).toHaveLength(6)
  }, 60_000)

  it('between the answer of the mail server and the mark sends again, with the same Message-ID and none missing', async () => {
    const { left, mails } = await killThenRunAgain('before the mark')
    expect(left).toEqual(Array(6).fill('waiting'))
    expect(mails.length).toBeGreaterThan(6)
    const expected = await test.database.query<{ message_id: string }>('SELECT message_id FROM outbox_mails')
    expect([...new Set(mails.map(({ messageId }) => messageId))].sort()).toEqual(expected.map(({ message_id }) => message_id).sort())
  }, 60_000)
})

describe('mail rows', () => {
  it('are closed to the application, which only writes events', async () => {
    await tellBuyingCompany()
    const read = asActor(test.ctx, world.admin, (tx) => tx.execute('SELECT * FROM mail_events'))
    await expect(read).rejects.toMatchObject({ cause: { code: '42501' } })
    const rows = await asWorker(test.ctx, (tx) => tx.execute('SELECT * FROM mail_events'))
    expect(rows.rows).toHaveLength(1)
  })
})
