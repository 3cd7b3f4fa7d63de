import { asActor, type Actor, type Transaction } from '#server/db/as-actor'
import * as contract from '#shared/contracts/specifications'
import type { Revision, SpecificationComment } from '#shared/contracts/specifications'
import { sql, type SQL } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildRelease } from '../support/build-release'
import { buildDraft, revisionParams } from '../support/build-specification'
import { buildWorld, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: Awaited<ReturnType<typeof buildWorld>>
let foreign: Awaited<ReturnType<typeof buildWorld>>
let draft: Revision

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test)
  foreign = await buildWorld(test)
  draft = await buildDraft(test, world.engineer)
})
afterAll(() => test.stop())

const params = () => revisionParams(draft)
const write = (as: TestPerson, place: string, text: string) => request(test.app, contract.writeComment, { as: as.cookie, params: params(), body: { place, text } })
const settle = (as: TestPerson, commentId: string, settled: boolean) => request(test.app, contract.settleComment, { as: as.cookie, params: { ...params(), commentId }, body: { settled } })
const run = (actor: Actor, statement: SQL) => asActor(test.ctx, actor, async (tx: Transaction) => (await tx.execute(statement)).rows)

describe('comments on a revision', () => {
  it('are pinned to a place, read by the company, and settled by anybody of the technical side', async () => {
    const { body } = await write(world.checker, 'windings.[w1].turns', 'Why ten and not eleven?').expect(200)
    expect(body).toMatchObject([{ place: 'windings.[w1].turns', text: 'Why ten and not eleven?', by: { id: world.checker.personId }, settled: null }])
    const [comment] = body as SpecificationComment[]
    const { body: settled } = await settle(world.engineer, comment!.id, true).expect(200)
    expect(settled[0].settled.by.id).toBe(world.engineer.personId)
    // Settling again changes nothing, opening again does.
    expect((await settle(world.quality, comment!.id, true).expect(200)).body[0].settled.by.id).toBe(world.engineer.personId)
    expect((await settle(world.checker, comment!.id, false).expect(200)).body[0].settled).toBeNull()
    const { body: read } = await request(test.app, contract.listComments, { as: world.buyer.cookie, params: params() }).expect(200)
    expect(read).toHaveLength(1)
    const trail = await test.database.query(`SELECT event->>'type' AS type FROM audit_entries WHERE event->>'commentId' = '${comment!.id}' ORDER BY at`)
    expect(trail.map(({ type }: Record<string, unknown>) => type)).toEqual(['comment-written', 'comment-settled', 'comment-settled'])
  })

  it('refuses an empty text and a place that is none, with a sentence', async () => {
    expect((await write(world.engineer, 'core.core', '  ').expect(400)).body.fields.text).toMatch(/comment/i)
    expect((await write(world.engineer, 'core.core; drop', 'x').expect(400)).body.fields.place).toMatch(/dotted path/)
  })

  it('does not know a comment of another revision', async () => {
    const other = await buildDraft(test, world.engineer)
    const { body } = await request(test.app, contract.writeComment, { as: world.engineer.cookie, params: revisionParams(other), body: { place: '', text: 'Elsewhere' } }).expect(200)
    await settle(world.engineer, body[0].id, true).expect(404)
  })
})

describe('row security with the policies in code bypassed', () => {
  const insert = (by: TestPerson, of = world) => sql`INSERT INTO specification_comments (revision_id, company_id, by_id, place, text, at) VALUES (${draft.id}, ${of.buying.id}, ${by.personId}, '', 'x', now())`

  it('lets nobody write in another’s name, for another company, or as a buyer', async () => {
    for (const [actor, statement] of [[world.engineer, insert(world.checker)], [foreign.engineer, insert(foreign.engineer)], [world.buyer, insert(world.buyer)]] as const) {
      await expect(run(actor, statement)).rejects.toMatchObject({ cause: { code: '42501' } })
    }
  })

  it('keeps what was said as it was said, and lets nobody settle for somebody else', async () => {
    const change = (set: SQL) => run(world.engineer, sql`UPDATE specification_comments SET ${set}`)
    await expect(change(sql`text = 'y'`)).rejects.toMatchObject({ cause: { code: '42501' } })
    await expect(change(sql`settled_by = ${world.checker.personId}, settled_at = now()`)).rejects.toMatchObject({ cause: { code: '42501' } })
    await expect(run(world.engineer, sql`DELETE FROM specification_comments`)).rejects.toMatchObject({ cause: { code: '42501' } })
  })
})

describe('what rests on a part', () => {
  it('is nothing for a part that nobody asked for', async () => {
    const release = await buildRelease(test, world.engineer, world.checker)
    const { body } = await request(test.app, contract.specificationUse, { as: world.engineer.cookie, params: { specificationId: release.specificationId } }).expect(200)
    expect(body).toEqual({ enquiries: [], quotes: [], samples: [], orders: [] })
  })
})
