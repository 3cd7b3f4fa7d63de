import { asActor, asAuth, type Actor, type Transaction } from '#server/db/as-actor'
import { canReadPerson, canReadVendorRelation } from '#server/policies/people'
import { sql, type SQL } from 'drizzle-orm'
import { randomUUID } from 'node:crypto'
import { Client } from 'pg'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildCompany, buildPerson, buildWorld, linkVendor, type TestPerson } from '../support/factories'
import { startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let own: Awaited<ReturnType<typeof buildWorld>>
let foreign: Awaited<ReturnType<typeof buildWorld>>
let operator: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  own = await buildWorld(test)
  foreign = await buildWorld(test)
  operator = await buildPerson(test, await buildCompany(test, 'operator'), ['operator'])
})
afterAll(() => test.stop())

const run = (actor: Actor, statement: SQL) => asActor(test.ctx, actor, async (tx: Transaction) => (await tx.execute(statement)).rows)
const refused = (actor: Actor, statement: SQL, code = '42501') => expect(run(actor, statement)).rejects.toMatchObject({ cause: { code } })
const changed = (actor: Actor, statement: SQL) => asActor(test.ctx, actor, async (tx) => (await tx.execute(statement)).rowCount)

describe('the application’s role without an actor', () => {
  it('sees no row that belongs to anybody, in no table', async () => {
    const tables = await test.database.query<{ name: string; owned: boolean }>(`
      SELECT relname AS name, EXISTS (SELECT FROM pg_attribute a WHERE a.attrelid = c.oid AND a.attname = 'company_id') AS owned
      FROM pg_class c WHERE relnamespace = 'public'::regnamespace AND relkind = 'r' AND relname <> 'clock_offset'
        AND has_table_privilege('dotside_app', c.oid, 'SELECT')`)
    expect(tables.length).toBeGreaterThan(5)
    const client = new Client({ connectionString: test.database.urls.DATABASE_APP_URL })
    await client.connect()
    try {
      for (const { name, owned } of tables) {
        const { rows } = await client.query(`SELECT count(*)::int AS count FROM ${name} ${owned ? 'WHERE company_id IS NOT NULL' : ''}`)
        expect([name, rows[0].count]).toEqual([name, 0])
      }
    } finally {
      await client.end()
    }
  })

  it('keeps no actor for whoever gets the connection next', async () => {
    await Promise.all(Array.from({ length: 20 }, () => run(own.buyer, sql`select 1`)))
    const nobody: Actor = { personId: '', companyId: '', companyKind: 'buying', roles: [] }
    expect(await run(nobody, sql`select * from people`)).toEqual([])
  })
})

describe('reading past the policies in code', () => {
  it.each(['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin'] as const)('shows a stranger’s %s nothing of another company', async (role) => {
    const stranger = foreign[role]
    expect(await run(stranger, sql`select * from vendor_relations where buying_company_id = ${own.buying.id}`)).toEqual([])
    expect(await run(stranger, sql`select * from vendor_links where buying_company_id = ${own.buying.id}`)).toEqual([])
    expect(await run(stranger, sql`select * from memberships where company_id = ${own.buying.id}`)).toEqual([])
    expect(await run(stranger, sql`select * from people where id = ${own.buyer.personId}`)).toEqual([])
    expect(await run(stranger, sql`select * from companies where id = ${own.buying.id}`)).toEqual([])
  })

  it('shows a vendor neither what is kept about it, nor its competitors, nor its customer’s people', async () => {
    const [vendor, rival] = [own.vendors[0]!.person, own.vendors[1]!.person]
    expect(await run(vendor, sql`select * from vendor_relations`)).toEqual([])
    expect(await run(vendor, sql`select * from vendor_links where vendor_company_id = ${rival.companyId}`)).toEqual([])
    expect(await run(vendor, sql`select * from companies where id = ${rival.companyId}`)).toEqual([])
    expect(await run(vendor, sql`select id from people`)).toEqual([{ id: vendor.personId }])
  })

  it('shows two customers of one vendor nothing of each other through it', async () => {
    await linkVendor(test, foreign.buying, own.vendors[0]!.company)
    expect(await run(foreign.buyer, sql`select buying_company_id from vendor_links`)).not.toContainEqual({ buying_company_id: own.buying.id })
    expect(await run(foreign.buyer, sql`select * from vendor_relations where buying_company_id = ${own.buying.id}`)).toEqual([])
  })

  it('shows a vendor that has not accepted only as far as it was typed in', async () => {
    const waiting = await buildCompany(test, 'vendor')
    const contact = await buildPerson(test, waiting, ['vendor'])
    await linkVendor(test, own.buying, waiting, { accepted: false })
    expect(await run(own.admin, sql`select * from companies where id = ${waiting.id}`)).toEqual([])
    expect(await run(own.admin, sql`select * from people where id = ${contact.personId}`)).toEqual([])
    expect(await run(contact, sql`select * from companies where id = ${own.buying.id}`)).toHaveLength(1)
  })

  it('is decided alike in code and in row security', async () => {
    const rows = await test.database.query<{ person_id: string; company_id: string }>('SELECT person_id, company_id FROM memberships')
    const links = await test.database.query<{ buying_company_id: string; vendor_company_id: string }>('SELECT * FROM vendor_links WHERE accepted_at IS NOT NULL')
    const relations = await test.database.query<{ buying_company_id: string; vendor_company_id: string }>('SELECT * FROM vendor_relations')
    for (const actor of [own.engineer, own.admin, foreign.buyer, operator, own.vendors[0]!.person]) {
      const accepted = links.filter((link) => link.buying_company_id === actor.companyId).map((link) => link.vendor_company_id)
      const people = (await run(actor, sql`select person_id from memberships`)).map((row) => row.person_id)
      expect(people.sort()).toEqual(rows.filter((row) => canReadPerson(actor, { companyId: row.company_id }, accepted)).map((row) => row.person_id).sort())
      const kept = await run(actor, sql`select vendor_company_id from vendor_relations`)
      expect(kept).toHaveLength(relations.filter((row) => canReadVendorRelation(actor, { buyingCompanyId: row.buying_company_id })).length)
    }
  })
})

describe('writing past the policies in code', () => {
  it('lets an administrator put nobody into a vendor, however it is tried', async () => {
    const vendor = own.vendors[0]!.company
    const intruder = randomUUID()
    await asActor(test.ctx, own.admin, (tx) => tx.execute(sql`insert into people (id, name, email, invited_by) values (${intruder}, 'Intruder', 'intruder@company.example', ${own.admin.personId})`))
    const member = (isFirst: boolean) => sql`insert into memberships (person_id, company_id, company_kind, roles, is_first_contact) values (${intruder}, ${vendor.id}, 'vendor', array['vendor'], ${isFirst})`
    await refused(own.admin, member(false))
    await refused(own.admin, member(true), '23505')
  })

  it('lets nobody change roles without the second person', async () => {
    const statement = sql`update memberships set roles = array['buyer'] where person_id = ${own.engineer.personId}`
    for (const actor of [own.admin, own.engineer, own.buyer, operator]) expect(await changed(actor, statement)).toBe(0)
  })

  it('lets the second person set nothing but what was asked for', async () => {
    const admin = await buildPerson(test, own.buying, ['admin'])
    const changeId = randomUUID()
    const change = JSON.stringify({ kind: 'roles', roles: ['checker'], approvalLimit: null, approvalCurrency: null })
    await run(own.admin, sql`insert into change_requests (id, company_id, person_id, change, requested_by, requested_at)
      values (${changeId}, ${own.buying.id}, ${own.engineer.personId}, ${change}::jsonb, ${own.admin.personId}, app_now())`)
    const confirmAndSet = (roles: string) =>
      asActor(test.ctx, admin, async (tx) => {
        await tx.execute(sql`update change_requests set state = 'confirmed', decided_by = ${admin.personId}, decided_at = app_now() where id = ${changeId}`)
        return (await tx.execute(sql`update memberships set roles = array[${roles}] where person_id = ${own.engineer.personId}`)).rowCount
      })
    await expect(confirmAndSet('buyer')).rejects.toMatchObject({ cause: { code: '42501' } })
    expect(await confirmAndSet('checker')).toBe(1)
  })

  it('refuses the same person twice', async () => {
    const changeId = randomUUID()
    await run(own.admin, sql`insert into change_requests (id, company_id, person_id, change, requested_by, requested_at)
      values (${changeId}, ${own.buying.id}, ${own.buyer.personId}, '{"kind":"removal"}', ${own.admin.personId}, app_now())`)
    await refused(own.admin, sql`update change_requests set state = 'confirmed', decided_by = ${own.admin.personId}, decided_at = app_now() where id = ${changeId}`, '23514')
  })

  it.each([
    ['an administrator who buys', `array['admin', 'buyer']`, null],
    ['an administrator who approves', `array['admin', 'approver']`, 10],
    ['a vendor in a buying company', `array['vendor']`, null],
    ['an approver without a limit', `array['approver']`, null],
    ['nobody at all', `array[]::text[]`, null],
  ])('refuses %s in the table itself', async (_, roles, limit) => {
    const personId = randomUUID()
    await test.database.query("INSERT INTO people (id, name, email) VALUES ($1, 'X', 'x@company.example')", [personId])
    const insert = `INSERT INTO memberships (person_id, company_id, company_kind, roles, approval_limit, approval_currency) VALUES ($1, $2, 'buying', ${roles}, $3, $4)`
    await expect(test.database.query(insert, [personId, own.buying.id, limit, limit && 'EUR'])).rejects.toMatchObject({ code: '23514' })
  })

  it('lets only the vendor accept a customer, and only buyer or quality judge a vendor', async () => {
    const waiting = await buildCompany(test, 'vendor')
    await linkVendor(test, own.buying, waiting, { accepted: false })
    const accept = sql`update vendor_links set accepted_at = app_now() where vendor_company_id = ${waiting.id}`
    for (const actor of [own.admin, own.buyer, own.vendors[0]!.person, operator]) expect(await changed(actor, accept)).toBe(0)
    const judge = sql`update vendor_relations set approval = 'approved' where vendor_company_id = ${waiting.id}`
    for (const actor of [own.admin, own.engineer, foreign.buyer, own.vendors[0]!.person, operator]) expect(await changed(actor, judge)).toBe(0)
    expect(await changed(own.quality, judge)).toBe(1)
  })

  it('lets nobody write in another’s name or into another’s files', async () => {
    const file = (companyId: string, by: string) => sql`insert into files (company_id, uploaded_by, sha256, size_bytes, kind, name) values (${companyId}, ${by}, repeat('a', 64), 1, 'pdf', 'x.pdf')`
    await refused(own.buyer, file(own.vendors[0]!.company.id, own.buyer.personId))
    await refused(own.buyer, file(own.buying.id, own.engineer.personId))
    await refused(own.buyer, sql`insert into mail_events (company_id, to_person_id, template, props) values (${foreign.buying.id}, ${own.buyer.personId}, 'invitation', '{}')`)
    await refused(own.buyer, sql`insert into companies (kind, name) values ('operator', 'Own operator')`)
  })

  it('lets the application reach no password, session or link', async () => {
    for (const table of ['credentials', 'sessions', 'sign_in_tokens', 'attempts']) await refused(operator, sql.raw(`select * from ${table}`))
    await expect(asAuth(test.ctx, (tx) => tx.execute(sql`select * from vendor_relations`))).rejects.toMatchObject({ cause: { code: '42501' } })
  })
})
