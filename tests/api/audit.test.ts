import { asActor, asWorker, type Transaction } from '#server/db/as-actor'
import { recordAudit } from '#server/services/audit/record-audit'
import { auditChainHeadHash, chainEntries, verifyChain } from '#server/services/audit/chain'
import { chainAudit } from '#server/services/audit/chain-audit'
import { canReadAuditEntry } from '#server/policies/audit'
import { listAudit, type AuditArea, type AuditEntry, type AuditEvent } from '#shared/contracts/audit'
import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildCompany, buildPerson, buildWorld, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: Awaited<ReturnType<typeof buildWorld>>

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test)
})
afterAll(() => test.stop())

const write = (actor: TestPerson, event: AuditEvent, place = {}) => asActor(test.ctx, actor, (tx) => recordAudit(tx, actor, event, place))
const accountEvent = (): AuditEvent => ({ type: 'company-updated', companyId: randomUUID() })
const purchasingEvent = (): AuditEvent => ({ type: 'vendor-updated', vendorCompanyId: randomUUID(), approval: 'approved' })
const readBy = async (person: TestPerson) => (await request(test.app, listAudit, { as: person.cookie }).expect(200)).body as AuditEntry[]

describe('reading the trail', () => {
  it('shows each role its part, newest first', async () => {
    await write(world.admin, accountEvent())
    await write(world.buyer, purchasingEvent())
    const [ofBuyer, ofAdmin, ofEngineer] = [await readBy(world.buyer), await readBy(world.admin), await readBy(world.engineer)]
    expect(ofBuyer.slice(0, 2).map(({ area }) => area)).toEqual(['purchasing', 'account'])
    expect(ofAdmin.every(({ area }) => area === 'account')).toBe(true)
    expect(ofAdmin[0]).toMatchObject({ actorName: world.admin.name, event: { type: 'company-updated' } })
    expect(ofEngineer).toEqual([])
  })

  it('shows a vendor its own acts towards a customer, and its competitor nothing', async () => {
    const [own, rival] = [world.vendors[0]!.person, world.vendors[1]!.person]
    await write(own, { type: 'customer-accepted', buyingCompanyId: world.buying.id }, { companyId: world.buying.id })
    expect((await readBy(own)).map(({ event }) => event.type)).toContain('customer-accepted')
    expect(await readBy(rival)).toEqual([])
  })

  it('keeps a sealed entry from every role of the company whose trail it is', async () => {
    await write(world.vendors[0]!.person, purchasingEvent(), { companyId: world.buying.id, sealedBy: randomUUID() })
    const sealed = (await readBy(world.vendors[0]!.person)).find(({ area }) => area === 'purchasing')!
    for (const role of ['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin'] as const) {
      expect((await readBy(world[role])).map(({ id }) => id)).not.toContain(sealed.id)
    }
  })

  it('goes on from a page to the next without gap or repetition', async () => {
    const all = (await readBy(world.buyer)).map(({ id }) => id)
    const seen: string[] = []
    for (;;) {
      const page = (await request(test.app, listAudit, { as: world.buyer.cookie, query: { limit: 1, ...(seen.length > 0 && { before: seen.at(-1) }) } })).body as AuditEntry[]
      if (page.length === 0) break
      seen.push(...page.map(({ id }) => id))
    }
    expect(seen).toEqual(all)
  })

  it('is decided alike in code and in row security', async () => {
    const stranger = await buildPerson(test, await buildCompany(test, 'buying'), ['buyer', 'engineer'])
    await write(stranger, accountEvent())
    const operator = await buildPerson(test, await buildCompany(test, 'operator'), ['operator'])
    const rows = await test.database.query<{ id: string; company_id: string; actor_person_id: string; actor_company_id: string; area: AuditArea; sealed: boolean }>(
      'SELECT id, company_id, actor_person_id, actor_company_id, area, sealed_by IS NOT NULL AS sealed FROM audit_entries',
    )
    const everybody = [world.engineer, world.quality, world.buyer, world.approver, world.admin, stranger, operator, ...world.vendors.map(({ person }) => person)]
    for (const person of everybody) {
      const byDatabase = await asActor(test.ctx, person, async (tx) => (await tx.execute<{ id: string }>('SELECT id FROM audit_entries')).rows.map(({ id }) => id))
      const byCode = rows.filter((row) =>
        canReadAuditEntry(person, { companyId: row.company_id, actorPersonId: row.actor_person_id, actorCompanyId: row.actor_company_id, area: row.area, isSealed: row.sealed }),
      )
      expect(byCode.map(({ id }) => id).sort(), person.roles.join()).toEqual(byDatabase.sort())
    }
  })
})

describe('writing the trail', () => {
  it.each(['UPDATE audit_entries SET area = area', 'DELETE FROM audit_entries', 'TRUNCATE audit_entries CASCADE', 'UPDATE audit_chain SET hash = hash', 'DELETE FROM audit_chain'])(
    'refuses the owner of the database: %s',
    async (statement) => {
      await asWorker(test.ctx, (tx) => chainEntries(tx, true))
      const changing = statement.replace('area = area', "area = 'engineering'").replace('hash = hash', "hash = 'x'")
      await expect(test.database.query(changing)).rejects.toMatchObject({ code: 'DS001' })
    },
  )

  it('refuses an entry in another person’s name, and one in a stranger’s trail', async () => {
    const elsewhere = await buildCompany(test, 'buying')
    const asAnother = asActor(test.ctx, world.buyer, (tx) => recordAudit(tx, world.admin, accountEvent()))
    await expect(asAnother).rejects.toMatchObject({ cause: { code: '42501' } })
    await expect(write(world.buyer, accountEvent(), { companyId: elsewhere.id })).rejects.toMatchObject({ cause: { code: '42501' } })
  })
})

describe('the chain', () => {
  const verify = () => asWorker(test.ctx, verifyChain)

  it('links every committed entry, also when two workers chain at the same moment', async () => {
    for (let i = 0; i < 20; i += 1) await write(world.admin, accountEvent())
    await Promise.all([chainAudit(test.ctx), chainAudit({ ...test.ctx })])
    const [{ count } = { count: 0 }] = await test.database.query<{ count: number }>('SELECT count(*)::int AS count FROM audit_entries')
    expect(await verify()).toMatchObject({ linked: count, broken: null })
    expect((await readBy(world.admin)).every(({ chainHash }) => chainHash !== null)).toBe(true)
  })

  it('does not hold up who writes while it is being chained', async () => {
    await write(world.admin, accountEvent())
    await asWorker(test.ctx, async (tx: Transaction) => {
      await chainEntries(tx, true)
      await write(world.admin, accountEvent())
    })
    await chainAudit(test.ctx)
    expect((await verify()).broken).toBeNull()
  })

  it('tells its last hash to the buying side, for records of decision, and not to a vendor', async () => {
    const { head } = await verify()
    expect(await asActor(test.ctx, world.buyer, auditChainHeadHash)).toBe(head)
    expect(await asActor(test.ctx, world.vendors[0]!.person, auditChainHeadHash)).toBe('')
  })

  it('names the first entry that somebody changed past every lock', async () => {
    await test.database.query('ALTER TABLE audit_entries DISABLE TRIGGER append_only')
    await test.database.query(`UPDATE audit_entries SET event = jsonb_set(event, '{approval}', '"blocked"') WHERE id = (SELECT entry_id FROM audit_chain JOIN audit_entries e ON e.id = entry_id WHERE e.event ? 'approval' ORDER BY position LIMIT 1)`)
    const [first] = await test.database.query<{ position: string }>("SELECT min(position) AS position FROM audit_chain JOIN audit_entries e ON e.id = entry_id WHERE e.event ->> 'approval' = 'blocked'")
    expect((await verify()).broken).toEqual({ position: Number(first!.position), reason: 'the entry is not what was chained' })
  })
})
