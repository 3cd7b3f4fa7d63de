import { asAuth } from '#server/db/as-actor'
import { createToken } from '#server/services/people/sign-in-tokens'
import * as contract from '#shared/contracts/people'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildCompany, buildPerson, buildWorld, linkVendor, PASSWORD, signInAs, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: Awaited<ReturnType<typeof buildWorld>>

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test)
})
afterAll(() => test.stop())

const cookieOf = (answer: { headers: Record<string, unknown> }) => (answer.headers['set-cookie'] as unknown as string[])[0]!.split(';')[0]!
const tokenFor = (personId: string, purpose: 'invitation' | 'password-reset', validHours = 1) =>
  asAuth(test.ctx, (tx) => createToken(tx, { purpose, personId, validHours })).then(({ token }) => token)
const statusOf = async (cookie: string) => (await request(test.app, contract.listPeople, { as: cookie })).status

describe('signing in', () => {
  it('starts a session whose cookie the browser keeps from scripts', async () => {
    const answer = await request(test.app, contract.signIn, { body: { email: world.buyer.email.toUpperCase(), password: PASSWORD } }).expect(200)
    expect(answer.body).toMatchObject({ id: world.buyer.personId, roles: ['buyer'], company: { id: world.buying.id } })
    expect((answer.headers['set-cookie'] as unknown as string[])[0]).toMatch(/^dotside_session=\S+; HttpOnly; .*SameSite=Lax/)
    const session = await request(test.app, contract.readSession, { as: cookieOf(answer) })
    expect(session.body.person.id).toBe(world.buyer.personId)
  })

  it('says the same for a wrong address as for a wrong password', async () => {
    const wrongPassword = await request(test.app, contract.signIn, { body: { email: world.buyer.email, password: 'not the password' } })
    const wrongAddress = await request(test.app, contract.signIn, { body: { email: 'nobody@company.example', password: 'not the password' } })
    for (const { status, body } of [wrongPassword, wrongAddress]) {
      expect({ status, code: body.code, message: body.message }).toEqual({ status: 401, code: 'sign-in-refused', message: 'The mail address or the password is not right.' })
    }
  })

  it('refuses even the right password after too many wrong ones, until the window has passed', async () => {
    const { email } = await buildPerson(test, world.buying, ['engineer'])
    const attempt = (password: string) => request(test.app, contract.signIn, { body: { email, password } })
    for (let i = 0; i < 10; i += 1) await attempt('wrong').expect(401)
    expect((await attempt(PASSWORD)).body.code).toBe('too-many-attempts')
    await test.database.setClock({ minutes: 16 })
    await attempt(PASSWORD).expect(200)
    await test.database.setClock({})
  })

  it('counts attempts at the same moment as it counts others', async () => {
    const { email } = await buildPerson(test, world.buying, ['engineer'])
    const answers = await Promise.all(Array.from({ length: 14 }, () => request(test.app, contract.signIn, { body: { email, password: 'wrong' } })))
    expect(answers.map(({ status }) => status).sort()).toEqual([...Array(10).fill(401), ...Array(4).fill(429)])
  })

  it('keeps only SHA-256 of what the cookie holds', async () => {
    const cookie = await signInAs(test, world.quality)
    const secret = cookie.split('=')[1]!
    const rows = await test.database.query('SELECT id FROM sessions WHERE user_id = $1', [world.quality.personId])
    expect(rows.every(({ id }) => /^[0-9a-f]{64}$/.test(String(id)) && id !== secret)).toBe(true)
  })

  it('ends a session that is used again and again at its absolute end', async () => {
    const person = await buildPerson(test, world.buying, ['engineer'])
    for (let hours = 0; hours < 24 * 7; hours += 8) {
      await test.database.setClock({ hours })
      expect(await statusOf(person.cookie)).toBe(200)
    }
    await test.database.setClock({ days: 7, minutes: 1 })
    expect(await statusOf(person.cookie)).toBe(401)
    await test.database.setClock({})
  })

  it('ends a session after twelve hours without a request', async () => {
    const person = await buildPerson(test, world.buying, ['engineer'])
    await test.database.setClock({ hours: 12, minutes: 1 })
    expect(await statusOf(person.cookie)).toBe(401)
    await test.database.setClock({})
  })

  it('forgets the session on signing out', async () => {
    const cookie = await signInAs(test, world.buyer)
    await request(test.app, contract.signOut, { as: cookie }).expect(200)
    expect(await statusOf(cookie)).toBe(401)
  })

  it.each([null, 'http://elsewhere.example', 'null'])('refuses a change that comes from the origin %s', async (origin) => {
    const answer = await request(test.app, contract.signOut, { as: world.buyer.cookie, origin })
    expect([answer.status, answer.body.code]).toEqual([403, 'wrong-origin'])
  })
})

describe('input that does not fit', () => {
  it('names each field and what is wrong with it', async () => {
    const { status, body } = await request(test.app, contract.signIn, { body: { email: 'no address', password: '' } })
    expect([status, body.code]).toEqual([400, 'invalid-input'])
    expect(body.fields).toEqual({ email: 'This is not a mail address; it is written like name@company.example.', password: 'The password is missing.' })
  })

  it.each([
    ['a character that PostgreSQL cannot hold', { name: 'A\u0000B', email: 'a@b.example', roles: ['engineer'] }],
    ['an unknown field', { name: 'A', email: 'a@b.example', roles: ['engineer'], companyId: 'x' }],
    ['a name of 10 000 characters', { name: 'A'.repeat(10_000), email: 'a@b.example', roles: ['engineer'] }],
    ['a limit beyond what is kept', { name: 'A', email: 'a@b.example', roles: ['approver'], approvalLimit: '1'.repeat(20), approvalCurrency: 'EUR' }],
    ['an approver without a limit', { name: 'A', email: 'a@b.example', roles: ['approver'] }],
    ['an administrator who buys', { name: 'A', email: 'a@b.example', roles: ['admin', 'buyer'] }],
    ['a vendor in a buying company', { name: 'A', email: 'a@b.example', roles: ['vendor'] }],
    ['a list instead of an object', []],
  ])('refuses %s', async (_, body) => {
    const answer = await request(test.app, contract.invitePerson, { as: world.admin.cookie, body })
    expect([answer.status, answer.body.code]).toEqual([400, 'invalid-input'])
  })

  it('refuses what is not JSON', async () => {
    const answer = await request(test.app, contract.signIn, {}).set('content-type', 'application/json').send('{"email":')
    expect([answer.status, answer.body.code]).toEqual([400, 'invalid-json'])
  })

  it('refuses an identifier that is none, and a broken address, without failing', async () => {
    expect((await request(test.app, contract.readVendor, { as: world.buyer.cookie, params: { vendorId: "1' or '1'='1" } })).status).toBe(400)
    const broken = { ...contract.readVendor, path: '/api/vendors/%E0%A4%A' as const }
    expect((await request(test.app, broken, { as: world.buyer.cookie })).status).toBe(400)
  })
})

describe('invitation', () => {
  const invite = (admin: TestPerson, email: string, roles = ['engineer']) => request(test.app, contract.invitePerson, { as: admin.cookie, body: { name: 'New Person', email, roles } })

  it('lets the invited person set a password once and sign in', async () => {
    const { body: person } = await invite(world.admin, 'new.person@company.example').expect(200)
    expect(person).toMatchObject({ state: 'invited', roles: ['engineer'] })
    const token = await tokenFor(person.id, 'invitation')
    const link = await request(test.app, contract.readSignInLink, { body: { token } }).expect(200)
    expect(link.body).toMatchObject({ purpose: 'invitation', email: 'new.person@company.example', companyName: world.buying.name })
    const used = await request(test.app, contract.useSignInLink, { body: { token, password: 'a long enough password' } }).expect(200)
    expect(await statusOf(cookieOf(used))).toBe(200)
    const again = await request(test.app, contract.useSignInLink, { body: { token, password: 'another long password' } })
    expect([again.status, again.body.code]).toEqual([410, 'link-expired'])
  })

  it('refuses an expired link with a sentence', async () => {
    const { body: person } = await invite(world.admin, 'late.person@company.example').expect(200)
    const token = await tokenFor(person.id, 'invitation')
    await test.database.setClock({ hours: 2 })
    const answer = await request(test.app, contract.useSignInLink, { body: { token, password: 'a long enough password' } })
    expect(answer.status).toBe(410)
    expect(answer.body.message).toContain('has expired or was used before')
    await test.database.setClock({})
  })

  it('refuses a second invitation of the same address to the same company', async () => {
    await invite(world.admin, 'twice@company.example').expect(200)
    expect((await invite(world.admin, 'twice@company.example')).body.code).toBe('already-invited')
  })

  it('answers the same for an address that signs in elsewhere, and tells only who follows the link', async () => {
    const elsewhere = await buildPerson(test, await buildCompany(test, 'buying'), ['engineer'])
    const known = await invite(world.admin, elsewhere.email).expect(200)
    const unknown = await invite(world.admin, 'unknown@company.example').expect(200)
    const shape = ({ id: _id, email: _email, createdAt: _at, ...rest }: Record<string, unknown>) => rest
    expect(shape(known.body)).toEqual(shape(unknown.body))
    const used = await request(test.app, contract.useSignInLink, { body: { token: await tokenFor(known.body.id, 'invitation'), password: 'a long enough password' } })
    expect([used.status, used.body.code]).toEqual([409, 'address-in-use'])
  })
})

describe('a new password', () => {
  it('ends every other session and goes on with a new one', async () => {
    const person = await buildPerson(test, world.buying, ['engineer'])
    const body = { currentPassword: PASSWORD, newPassword: 'quite another password' }
    const answer = await request(test.app, contract.changePassword, { as: person.cookie, body }).expect(200)
    expect(await statusOf(person.cookie)).toBe(401)
    expect(await statusOf(cookieOf(answer))).toBe(200)
  })

  it('comes by a single-use link, and asking for one answers the same for any address', async () => {
    const person = await buildPerson(test, world.buying, ['engineer'])
    for (const email of [person.email, 'nobody@company.example']) {
      expect((await request(test.app, contract.requestPasswordReset, { body: { email } }).expect(200)).body).toEqual({})
    }
    const waiting = await test.database.query("SELECT FROM mail_events WHERE template = 'password-reset' AND to_person_id = $1", [person.personId])
    expect(waiting).toHaveLength(1)
    const token = await tokenFor(person.personId, 'password-reset')
    await request(test.app, contract.useSignInLink, { body: { token, password: 'quite another password' } }).expect(200)
    expect(await statusOf(person.cookie)).toBe(401)
    await request(test.app, contract.signIn, { body: { email: person.email, password: 'quite another password' } }).expect(200)
  })
})

describe('a change of roles, address or membership', () => {
  const ask = (by: TestPerson, about: TestPerson, change: contract.PersonChange) =>
    request(test.app, contract.requestChange, { as: by.cookie, params: { personId: about.personId }, body: change })
  const confirm = (by: TestPerson, changeId: string) => request(test.app, contract.confirmChange, { as: by.cookie, params: { changeId } })
  const toChecker = { kind: 'roles', roles: ['checker'], approvalLimit: null, approvalCurrency: null } as const satisfies contract.PersonChange

  it('needs a second person: not who asked, not whom it concerns, not just anybody', async () => {
    const company = await buildCompany(test, 'buying')
    const [first, second, concerned, other] = [
      await buildPerson(test, company, ['admin']),
      await buildPerson(test, company, ['admin']),
      await buildPerson(test, company, ['engineer', 'quality']),
      await buildPerson(test, company, ['engineer', 'quality']),
    ]
    const { body } = await ask(first, concerned, { ...toChecker, roles: ['checker'] }).expect(200)
    for (const wrong of [first, concerned, other]) expect((await confirm(wrong, body.id)).body.code).toBe('second-person-needed')
    await confirm(second, body.id).expect(200)
    expect((await confirm(second, body.id)).body.code).toBe('already-decided')
    const people = (await request(test.app, contract.listPeople, { as: first.cookie })).body as contract.Person[]
    expect(people.find(({ id }) => id === concerned.personId)?.roles).toEqual(['checker'])
    expect(await statusOf(concerned.cookie)).toBe(401)
  })

  it('is confirmed by quality or an approver where there is a single administrator', async () => {
    const concerned = await buildPerson(test, world.buying, ['engineer'])
    const { body } = await ask(world.admin, concerned, toChecker).expect(200)
    expect((await confirm(world.buyer, body.id)).body.code).toBe('second-person-needed')
    await confirm(world.quality, body.id).expect(200)
    const trail = await test.database.query("SELECT event FROM audit_entries WHERE company_id = $1 AND event ->> 'changeId' = $2 ORDER BY at", [world.buying.id, body.id])
    expect(trail.map(({ event }) => (event as { type: string }).type)).toEqual(['person-change-requested', 'person-change-confirmed'])
  })

  it('yields one decision and one refusal when two decide at the same moment', async () => {
    const concerned = await buildPerson(test, world.buying, ['engineer'])
    const { body } = await ask(world.admin, concerned, toChecker).expect(200)
    const answers = await Promise.all([confirm(world.quality, body.id), confirm(world.approver, body.id)])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
  })

  it('gives a new address its right only when its own mail was read, and then ends the sessions', async () => {
    const concerned = await buildPerson(test, world.buying, ['engineer'])
    const { body } = await ask(world.admin, concerned, { kind: 'email', email: 'moved@company.example' }).expect(200)
    await confirm(world.approver, body.id).expect(200)
    await request(test.app, contract.signIn, { body: { email: concerned.email, password: PASSWORD } }).expect(200)
    const { token } = await asAuth(test.ctx, (tx) => createToken(tx, { purpose: 'address-change', personId: concerned.personId, changeId: body.id, validHours: 1 }))
    await request(test.app, contract.useSignInLink, { body: { token } }).expect(200)
    expect(await statusOf(concerned.cookie)).toBe(401)
    await request(test.app, contract.signIn, { body: { email: 'moved@company.example', password: PASSWORD } }).expect(200)
    await request(test.app, contract.signIn, { body: { email: concerned.email, password: PASSWORD } }).expect(401)
  })

  it('keeps the authorship of who leaves, and refuses to remove the last administrator', async () => {
    const concerned = await buildPerson(test, world.buying, ['engineer'])
    const { body } = await ask(world.admin, concerned, { kind: 'removal' }).expect(200)
    await confirm(world.quality, body.id).expect(200)
    expect(await statusOf(concerned.cookie)).toBe(401)
    const people = (await request(test.app, contract.listPeople, { as: world.admin.cookie })).body as contract.Person[]
    expect(people.find(({ id }) => id === concerned.personId)?.state).toBe('left')
    const last = await ask(world.admin, world.admin, { kind: 'removal' }).expect(200)
    expect((await confirm(world.quality, last.body.id)).body.code).toBe('conflict')
  })

  it('is left to the operator where a company has nobody else', async () => {
    const operator = await buildPerson(test, await buildCompany(test, 'operator'), ['operator'])
    const alone = world.vendors[0]!.person
    const { body } = await ask(alone, alone, { kind: 'email', email: 'vendor.moved@vendor.example' }).expect(200)
    expect((await confirm(world.admin, body.id)).status).toBe(404)
    await confirm(operator, body.id).expect(200)
  })

  it('answers not-found about a person of another company', async () => {
    expect((await ask(world.admin, world.vendors[0]!.person, toChecker)).body.code).toBe('not-found')
    expect((await ask(world.vendors[0]!.person, world.buyer, toChecker)).body.code).toBe('not-found')
  })
})

describe('vendors', () => {
  const invite = (admin: TestPerson, contactEmail: string, name = 'Coil House') =>
    request(test.app, contract.inviteVendor, { as: admin.cookie, body: { name, country: 'DE', contactName: 'First Contact', contactEmail } })

  it('shows the same of a vendor that is known here as of a new one, until it accepts', async () => {
    const elsewhere = await buildCompany(test, 'vendor')
    const known = await buildPerson(test, elsewhere, ['vendor'], { isFirstContact: true })
    const other = await buildPerson(test, await buildCompany(test, 'buying'), ['admin'])
    const ofKnown = await invite(other, known.email).expect(200)
    const ofNew = await invite(other, 'brand.new@vendor.example').expect(200)
    const shape = ({ id: _id, contactEmail: _email, invitedAt: _at, ...rest }: contract.Vendor) => rest
    expect(shape(ofKnown.body)).toEqual(shape(ofNew.body))
    expect(ofKnown.body).toMatchObject({ name: 'Coil House', state: 'invited', people: [] })
    expect(ofKnown.body.id).toBe(elsewhere.id)

    await request(test.app, contract.acceptCustomer, { as: known.cookie, params: { customerId: other.companyId } }).expect(200)
    const accepted = await request(test.app, contract.readVendor, { as: other.cookie, params: { vendorId: elsewhere.id } })
    expect(accepted.body).toMatchObject({ state: 'accepted', people: [{ email: known.email }] })
  })

  it('keeps two buying companies of one vendor apart', async () => {
    const second = await buildCompany(test, 'buying')
    const secondBuyer = await buildPerson(test, second, ['buyer'])
    const shared = world.vendors[0]!
    await linkVendor(test, second, shared.company, { name: 'Our winder' })
    const note = { name: 'Theirs', approval: 'approved', confidentialityAgreedOn: '2026-01-01', confidentialityExpiresOn: null, notes: 'pays late' }
    await request(test.app, contract.updateVendor, { as: world.buyer.cookie, params: { vendorId: shared.company.id }, body: note }).expect(200)
    const seen = await request(test.app, contract.readVendor, { as: secondBuyer.cookie, params: { vendorId: shared.company.id } })
    expect(seen.body).toMatchObject({ name: 'Our winder', approval: 'not-assessed', notes: '' })
    const customers = await request(test.app, contract.listCustomers, { as: shared.person.cookie })
    expect(customers.body.map(({ id }: contract.Customer) => id).sort()).toEqual([world.buying.id, second.id].sort())
  })

  it('lets nobody of the buying side add a second person to a vendor', async () => {
    const { body: vendor } = await invite(world.admin, 'lonely@vendor.example').expect(200)
    const again = await invite(world.admin, 'lonely@vendor.example')
    expect(again.body.code).toBe('already-invited')
    const colleague = { name: 'Colleague', email: 'colleague@vendor.example', roles: ['vendor'] }
    const [first] = await test.database.query<{ person_id: string }>('SELECT person_id FROM memberships WHERE company_id = $1', [vendor.id])
    const used = await request(test.app, contract.useSignInLink, { body: { token: await tokenFor(first!.person_id, 'invitation'), password: 'a long enough password' } })
    await request(test.app, contract.invitePerson, { as: cookieOf(used), body: colleague }).expect(200)
    const seen = await request(test.app, contract.readVendor, { as: world.admin.cookie, params: { vendorId: vendor.id } })
    expect(seen.body.people).toHaveLength(2)
  })

  it('answers not-found about a vendor that is another company’s', async () => {
    const stranger = await buildPerson(test, await buildCompany(test, 'buying'), ['buyer'])
    const answer = await request(test.app, contract.readVendor, { as: stranger.cookie, params: { vendorId: world.vendors[1]!.company.id } })
    expect([answer.status, answer.body.code]).toEqual([404, 'not-found'])
  })
})
