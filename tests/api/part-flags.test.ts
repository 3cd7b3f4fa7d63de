import { getPart, getPartFlags, listParts, setPartFlags } from '#shared/contracts/parts'
import { asActor } from '#server/db/as-actor'
import { partFlags } from '#server/db/schema/index'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildCompany, buildPerson, buildWorld, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: Awaited<ReturnType<typeof buildWorld>>
let stranger: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 1)
  stranger = await buildPerson(test, await buildCompany(test, 'buying'), ['engineer'])
})
afterAll(() => test.stop())

const CORE = 'etd34-17-11'
const set = (person: TestPerson, kind: string, id: string, flags: object) => request(test.app, setPartFlags, { params: { kind, id }, body: flags, as: person.cookie })
const flagged = async (person: TestPerson) => (await request(test.app, getPartFlags, { as: person.cookie }).expect(200)).body
const trail = () => test.database.query(`SELECT event FROM audit_entries WHERE event ->> 'type' = 'part-flagged'`)

describe('preferred and in the store', () => {
  it('is said of a row, shown with it, and handed to a search, of the own company alone', async () => {
    await set(world.engineer, 'core', CORE, { preferred: true, stocked: false }).expect(200)
    await set(world.engineer, 'former', `${CORE}-h`, { preferred: true, stocked: true }).expect(200)
    expect(await flagged(world.buyer)).toEqual({ preferredRows: [`core/${CORE}`, `former/${CORE}-h`], stockedRows: [`former/${CORE}-h`] })
    expect(await flagged(stranger)).toEqual({ preferredRows: [], stockedRows: [] })

    const one = await request(test.app, getPart, { params: { kind: 'core', id: CORE }, as: world.checker.cookie }).expect(200)
    expect(one.body.flags).toEqual({ preferred: true, stocked: false })
    expect(one.body.versions).toHaveLength(1)
    const list = async (person: TestPerson) => (await request(test.app, listParts, { query: { kind: 'core', search: CORE }, as: person.cookie }).expect(200)).body.rows[0].flags
    expect(await list(world.engineer)).toEqual({ preferred: true, stocked: false })
    expect(await list(stranger)).toEqual({ preferred: false, stocked: false })
  })

  it('is taken back, and saying the same again leaves no trace', async () => {
    await set(world.engineer, 'core', CORE, { preferred: false, stocked: false }).expect(200)
    const entries = (await trail()).length
    await set(world.engineer, 'core', CORE, { preferred: false, stocked: false }).expect(200)
    expect(await trail()).toHaveLength(entries)
    expect((await flagged(world.engineer)).preferredRows).toEqual([`former/${CORE}-h`])
  })

  it('is refused for what is not there, half said, or not an engineer’s to say', async () => {
    const both = { preferred: true, stocked: true }
    expect((await set(world.engineer, 'core', 'no-such-core', both).expect(404)).body.code).toBe('not-found')
    expect((await set(world.engineer, 'core', CORE, { preferred: true }).expect(400)).body.fields).toHaveProperty('stocked')
    for (const person of [world.checker, world.buyer, world.admin, world.vendors[0]!.person]) await set(person, 'core', CORE, both).expect(403)
  })
})

describe('row security, with the code’s own lock open', () => {
  const everything = (person: TestPerson) => asActor(test.ctx, person, (tx) => tx.select().from(partFlags))
  const insert = (person: TestPerson, companyId: string) =>
    asActor(test.ctx, person, (tx) => tx.insert(partFlags).values({ companyId, kind: 'core', partId: 'x', preferred: true, stocked: true, updatedBy: person.personId, updatedAt: new Date() }))

  it('shows the own company’s flags to its engineering, and nobody else’s', async () => {
    expect(await everything(world.checker)).toHaveLength(2)
    for (const person of [stranger, world.admin, world.vendors[0]!.person]) expect(await everything(person)).toEqual([])
  })

  it('takes flags from an engineer for the own company alone', async () => {
    for (const [person, companyId] of [[stranger, world.buying.id], [world.checker, world.buying.id], [world.admin, world.buying.id]] as const) {
      await expect(insert(person, companyId)).rejects.toMatchObject({ cause: { code: '42501' } })
    }
    const changed = await asActor(test.ctx, stranger, (tx) => tx.update(partFlags).set({ preferred: false, updatedBy: stranger.personId }).returning({ id: partFlags.partId }))
    expect(changed).toEqual([])
  })
})
