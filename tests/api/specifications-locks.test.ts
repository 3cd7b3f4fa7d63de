import { asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { specificationReleases, specificationRevisions, specifications } from '#server/db/schema/index'
import { canReadSpecification, readableRevisions, readableSpecifications } from '#server/policies/specifications'
import { sql, type SQL } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildRelease, type TestRelease } from '../support/build-release'
import { buildDraft, buildInCheck } from '../support/build-specification'
import { buildPerson, buildWorld, type TestPerson } from '../support/factories'
import { startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let own: Awaited<ReturnType<typeof buildWorld>>
let foreign: Awaited<ReturnType<typeof buildWorld>>
let release: TestRelease
let both: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  own = await buildWorld(test)
  foreign = await buildWorld(test)
  release = await buildRelease(test, own.engineer, own.checker)
  both = await buildPerson(test, own.buying, ['engineer', 'checker'])
})
afterAll(() => test.stop())

const run = (actor: Actor, statement: SQL) => asActor(test.ctx, actor, async (tx: Transaction) => (await tx.execute(statement)).rows)
const changed = (actor: Actor, statement: SQL) => asActor(test.ctx, actor, async (tx: Transaction) => (await tx.execute(statement)).rowCount)
const refused = (actor: Actor, statement: SQL, code: string) => expect(run(actor, statement)).rejects.toMatchObject({ cause: { code } })
const TABLES = ['specifications', 'specification_revisions', 'specification_releases', 'specification_overrides', 'specification_comments'] as const

describe('row security with the policies in code bypassed', () => {
  it.each(['engineer', 'checker', 'quality', 'buyer', 'approver'] as const)('shows a stranger’s %s no row', async (role) => {
    for (const table of TABLES) expect(await run(foreign[role], sql.raw(`SELECT * FROM ${table}`)), table).toEqual([])
  })

  it('shows who only manages accounts, and a vendor, no row of its own company’s customer', async () => {
    for (const table of TABLES) {
      expect(await run(own.admin, sql.raw(`SELECT * FROM ${table}`)), table).toEqual([])
      expect(await run(own.vendors[0]!.person, sql.raw(`SELECT * FROM ${table}`)), table).toEqual([])
    }
  })

  it('lets nobody write a draft in another’s name or for another company', async () => {
    const insert = (owner: string, company: string) => sql`INSERT INTO specifications (company_id, owner_id, part_number, title) VALUES (${company}, ${owner}, 'X', 'X')`
    await refused(own.engineer, insert(own.checker.personId, own.buying.id), '42501')
    await refused(foreign.engineer, insert(foreign.engineer.personId, own.buying.id), '42501')
    await refused(own.buyer, insert(own.buyer.personId, own.buying.id), '42501')
  })

  it('lets a stranger change and delete nothing', async () => {
    expect(await changed(foreign.engineer, sql`UPDATE specification_revisions SET version = 99 WHERE id = ${release.revisionId}`)).toBe(0)
    await refused(own.engineer, sql`DELETE FROM specification_revisions WHERE id = ${release.revisionId}`, '42501')
  })
})

describe('what was released', () => {
  it.each([
    ['its document', sql`document = 'x'::bytea`],
    ['its evaluation', sql`evaluation = 'x'::bytea`],
    ['its editors', sql`editor_ids = '{}'`],
    ['its checker', sql`checked_by = NULL`],
    ['its draft number', sql`draft_number = 7`],
  ])('keeps %s against the application’s own role', async (_, assignment) => {
    await refused(own.checker, sql`UPDATE specification_revisions SET ${assignment} WHERE id = ${release.revisionId}`, 'DS001')
  })

  it.each(['draft', 'in-check'])('never becomes %s again', async (state) => {
    for (const actor of [own.engineer, own.checker]) await refused(actor, sql`UPDATE specification_revisions SET state = ${state} WHERE id = ${release.revisionId}`, 'DS001')
  })

  it('stays as sealed: no update, no delete, not even by the owner of the database', async () => {
    await refused(own.checker, sql`UPDATE specification_releases SET revision = 'B' WHERE id = ${release.id}`, '42501')
    await refused(own.checker, sql`DELETE FROM specification_releases WHERE id = ${release.id}`, '42501')
    await expect(test.database.query('UPDATE specification_releases SET specification_sha256 = $1 WHERE id = $2', ['0', release.id])).rejects.toMatchObject({ code: 'DS001' })
  })

  it('does not come back from withdrawal', async () => {
    const other = await buildRelease(test, own.engineer, own.checker)
    expect(await changed(own.checker, sql`UPDATE specification_revisions SET state = 'withdrawn', withdrawn_reason = 'x' WHERE id = ${other.revisionId}`)).toBe(1)
    for (const state of ['released', 'draft', 'superseded']) await refused(own.checker, sql`UPDATE specification_revisions SET state = ${state} WHERE id = ${other.revisionId}`, 'DS001')
  })
})

describe('releasing past the service', () => {
  it('is refused to an editor who is a checker too', async () => {
    const inCheck = await buildInCheck(test, both)
    await refused(both, sql`UPDATE specification_revisions SET state = 'released', checked_by = ${both.personId} WHERE id = ${inCheck.id}`, '23514')
  })

  it('is refused in somebody else’s name, without the role, and from a draft', async () => {
    const inCheck = await buildInCheck(test, own.engineer)
    await refused(own.checker, sql`UPDATE specification_revisions SET state = 'released', checked_by = ${both.personId} WHERE id = ${inCheck.id}`, 'DS001')
    await refused(own.engineer, sql`UPDATE specification_revisions SET state = 'released', checked_by = ${own.checker.personId} WHERE id = ${inCheck.id}`, 'DS001')
    const draft = await buildDraft(test, own.engineer)
    await refused(own.checker, sql`UPDATE specification_revisions SET state = 'released', checked_by = ${own.checker.personId} WHERE id = ${draft.id}`, 'DS001')
  })

  it('finds no editor struck out and no change without an editor', async () => {
    const draft = await buildDraft(test, own.engineer)
    await refused(both, sql`UPDATE specification_revisions SET document = 'x'::bytea WHERE id = ${draft.id}`, 'DS001')
    await refused(both, sql`UPDATE specification_revisions SET editor_ids = ARRAY[${both.personId}]::uuid[] WHERE id = ${draft.id}`, 'DS001')
  })

  it('finds no document changed while it is in check', async () => {
    const inCheck = await buildInCheck(test, own.engineer)
    await refused(own.engineer, sql`UPDATE specification_revisions SET document = 'x'::bytea WHERE id = ${inCheck.id}`, 'DS001')
  })
})

describe('letting a check pass past the service', () => {
  it('is refused to an editor and in another’s name', async () => {
    const inCheck = await buildInCheck(test, both)
    const insert = (by: string) => sql`INSERT INTO specification_overrides (revision_id, company_id, by_id, code, path, reason, submitted_at, at) VALUES (${inCheck.id}, ${own.buying.id}, ${by}, 'E01', 'core.material', 'x', app_now(), app_now())`
    await refused(both, insert(both.personId), '42501')
    await refused(own.checker, insert(own.quality.personId), '42501')
    await run(own.checker, insert(own.checker.personId))
    await refused(own.checker, sql`UPDATE specification_overrides SET reason = 'y' WHERE revision_id = ${inCheck.id}`, '42501')
  })
})

describe('policies in code and their twins for lists', () => {
  it.each(['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin'] as const)('agree about every row for a %s', async (role) => {
    for (const actor of [own[role], foreign[role]]) {
      const listed = await asActor(test.ctx, own.engineer, (tx) => tx.select({ id: specifications.id }).from(specifications).where(readableSpecifications(actor)))
      const allowed = canReadSpecification(actor, { companyId: own.buying.id })
      expect(listed.length > 0).toBe(allowed)
      const revisions = await asActor(test.ctx, own.engineer, (tx) => tx.select({ id: specificationRevisions.id }).from(specificationRevisions).where(readableRevisions(actor)))
      expect(revisions.length > 0).toBe(allowed)
    }
  })

  it('finds every sealed release readable by the people of its company', async () => {
    for (const actor of [own.engineer, own.buyer, own.quality]) {
      expect(await asActor(test.ctx, actor, (tx) => tx.select({ id: specificationReleases.id }).from(specificationReleases))).not.toEqual([])
    }
  })
})
