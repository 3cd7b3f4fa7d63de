import * as contract from '#shared/contracts/specifications'
import type { Revision } from '#shared/contracts/specifications'
import { listWorklist } from '#shared/contracts/worklist'
import type { WorklistItem } from '#shared/contracts/worklist'
import type { SpecificationDocument } from '#shared/engine/specification'
import { createHash } from 'node:crypto'
import type { Response } from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildChecked, buildDraft, buildInCheck, letRowsPass, newPartNumber, releasableDocument, revisionParams } from '../support/build-specification'
import { buildPerson, buildWorld, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: Awaited<ReturnType<typeof buildWorld>>
let colleague: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test)
  colleague = await buildPerson(test, world.buying, ['engineer', 'checker'])
})
afterAll(() => test.stop())

const create = (document: unknown, partNumber = newPartNumber(), as = world.engineer) => request(test.app, contract.createSpecification, { as: as.cookie, body: { partNumber, title: 'Inductor', document } })
const read = async (revision: Revision, as = world.engineer): Promise<Revision> => (await request(test.app, contract.getRevision, { as: as.cookie, params: revisionParams(revision) }).expect(200)).body
const save = (revision: Revision, document: SpecificationDocument, version = revision.version, as = world.engineer) =>
  request(test.app, contract.saveDraft, { as: as.cookie, params: revisionParams(revision), body: { version, document } })
const submit = (revision: Revision, as = world.engineer) => request(test.app, contract.submitDraft, { as: as.cookie, params: revisionParams(revision), body: { version: revision.version } })
const release = (revision: Revision, as = world.checker) => request(test.app, contract.releaseRevision, { as: as.cookie, params: revisionParams(revision), body: { version: revision.version } })
const sendBack = (revision: Revision, as = world.checker) => request(test.app, contract.returnDraft, { as: as.cookie, params: revisionParams(revision), body: { reason: 'Name the varnish.' } })
const changed = (document: SpecificationDocument, change: (document: SpecificationDocument) => void) => {
  const copy = structuredClone(document)
  change(copy)
  return copy
}
const items = async (as: TestPerson): Promise<WorklistItem[]> => (await request(test.app, listWorklist, { as: as.cookie }).expect(200)).body.items

describe('a new specification', () => {
  it('is draft P1 of its maker, with exactly the document sent', async () => {
    const partNumber = newPartNumber()
    const document = releasableDocument(partNumber)
    const { body } = await create(document, partNumber).expect(200)
    expect(body).toMatchObject({ label: 'P1', state: 'draft', release: null, createdBy: { id: world.engineer.personId }, editors: [{ id: world.engineer.personId }] })
    expect(body.document).toEqual(document)
  })

  it('refuses a part number that is taken, and says where', async () => {
    const { document } = await buildDraft(test, world.engineer)
    const taken = document.specification.title.partNumber.value!
    const { body } = await create(document, taken).expect(409)
    expect(body).toMatchObject({ code: 'part-number-in-use', fields: { partNumber: expect.stringMatching(/taken/) } })
  })

  it('names the place of everything that does not fit the schema, and stores nothing', async () => {
    const count = () => test.database.query('SELECT count(*)::int FROM specifications')
    const before = await count()
    const document = changed(releasableDocument('T-bad'), ({ specification, requirement }) => {
      specification.windings[0]!.turns = -4
      specification.windings[0]!.wire.parallel = 1.5
      requirement!.ambientC = 4000
      Object.assign(specification.core, { colour: 'red' })
    })
    const { body } = await create(document).expect(400)
    expect(body.code).toBe('invalid-input')
    expect(Object.keys(body.fields)).toEqual(expect.arrayContaining(['document.specification.windings.0.turns', 'document.specification.windings.0.wire.parallel', 'document.requirement.ambientC', 'document.specification.core']))
    expect(await count()).toEqual(before)
  })

  it.each([
    ['no document', {}],
    ['a list for a document', { document: [] }],
    ['text for a document', { document: 'x' }],
    ['another schema', { document: { specification: { schema: 'other/1' }, requirement: null } }],
  ])('answers %s with a refusal, never a failure', async (_, part) => {
    const { status, body } = await request(test.app, contract.createSpecification, { as: world.engineer.cookie, body: { partNumber: newPartNumber(), title: 'X', ...part } })
    expect([status, body.code]).toEqual([400, 'invalid-input'])
  })

  it('takes a contradictory document: a draft may be unfinished', async () => {
    const document = changed(releasableDocument('T-odd'), ({ specification }) => {
      specification.windings[0]!.startTerminal = '99'
      specification.sequence = []
    })
    await create(document).expect(200)
  })
})

describe('storing a draft', () => {
  it('refuses a change made from an older version and keeps the stored one', async () => {
    const draft = await buildDraft(test, world.engineer)
    const theirs = changed(draft.document, ({ specification }) => (specification.title.title.value = 'Theirs'))
    await save(draft, theirs).expect(200)
    const { body } = await save(draft, changed(draft.document, ({ specification }) => (specification.title.title.value = 'Mine'))).expect(409)
    expect(body.code).toBe('stale-version')
    expect((await read(draft)).document.specification.title.title.value).toBe('Theirs')
  })

  it('lets one of two who store at the same moment win', async () => {
    const draft = await buildDraft(test, world.engineer)
    const answers = await Promise.all([save(draft, draft.document), save(draft, draft.document, draft.version, colleague)])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
  })

  it('writes every editor down and shows the newest title in the list', async () => {
    const draft = await buildDraft(test, world.engineer)
    const { body } = await save(draft, changed(draft.document, ({ specification }) => (specification.title.title.value = 'Renamed part')), draft.version, colleague).expect(200)
    expect(body.editors.map(({ id }: { id: string }) => id)).toEqual([world.engineer.personId, colleague.personId])
    const { body: list } = await request(test.app, contract.listSpecifications, { as: world.buyer.cookie, query: { search: 'renamed' } }).expect(200)
    expect(list).toMatchObject({ total: 1, rows: [{ title: 'Renamed part' }] })
  })

  it('is refused while in check and after release', async () => {
    const inCheck = await buildInCheck(test, world.engineer)
    const { body } = await save(inCheck, inCheck.document).expect(409)
    expect(body.code).toBe('not-a-draft')
  })
})

describe('checking', () => {
  it('waits for every checker who did not work on it, and goes back to its author with the reason', async () => {
    const draft = await buildDraft(test, world.engineer)
    const edited = (await save(draft, draft.document, draft.version, colleague).expect(200)).body
    const inCheck = (await submit(edited).expect(200)).body
    const mine = (list: WorklistItem[]) => list.filter(({ link }) => link.params.revisionId === draft.id).map(({ kind, state }) => `${kind} ${state}`)
    expect(mine(await items(world.checker))).toEqual(['revision-check open'])
    expect(mine(await items(colleague))).toEqual([])

    await sendBack(inCheck).expect(200)
    expect((await read(draft)).returnedReason).toBe('Name the varnish.')
    expect(mine(await items(world.engineer))).toEqual(['draft-returned open'])
    expect(mine(await items(world.checker))).toEqual([])
    const mails = await test.database.query('SELECT template FROM mail_events WHERE props->>$1 = $2 ORDER BY created_at', ['revisionId', draft.id])
    expect(mails.map(({ template }) => template)).toEqual(['check-requested', 'draft-returned'])
  })

  it('is refused to whoever worked on the draft, with all roles in hand', async () => {
    const draft = await buildDraft(test, colleague)
    const inCheck = (await submit(draft, colleague).expect(200)).body
    for (const attempt of [release(inCheck, colleague), sendBack(inCheck, colleague)]) expect((await attempt.expect(403)).body.code).toBe('second-person-needed')
  })

  it('lets a check pass once, by a second person', async () => {
    const inCheck = await buildInCheck(test, world.engineer)
    const pass = (as: TestPerson) => request(test.app, contract.overrideCheck, { as: as.cookie, params: revisionParams(inCheck), body: { code: 'Q06', path: 'electrical.selfResonance', reason: 'Known from the earlier part.' } })
    expect((await pass(world.quality).expect(200)).body.overrides).toMatchObject([{ code: 'Q06', path: 'electrical.selfResonance', by: { id: world.quality.personId } }])
    expect((await pass(world.checker).expect(409)).body.code).toBe('already-decided')
  })

  it('lets a check pass at one place only, and asks for that place', async () => {
    const inCheck = await buildInCheck(test, world.engineer)
    const pass = (body: object) => request(test.app, contract.overrideCheck, { as: world.quality.cookie, params: revisionParams(inCheck), body: body as { code: string; path: string; reason: string } })
    expect((await pass({ code: 'L01', reason: 'Seen.' }).expect(400)).body.fields).toHaveProperty('path')
    const tape = inCheck.document.specification.sequence.findIndex(({ kind }) => kind === 'tape')
    await pass({ code: 'L01', path: `sequence.${tape}.tape`, reason: 'Compared with the roll on the bench.' }).expect(200)
    // The former's figures are nobody's either, and nobody has answered for them.
    expect((await release(inCheck).expect(409)).body.fields).toHaveProperty('L01')
    await letRowsPass(test, await read(inCheck), world.checker, [`sequence.${tape}.tape`])
    await release(inCheck).expect(200)
  })

  it('asks again about a check that was let pass before the draft was changed', async () => {
    const inCheck = await buildInCheck(test, world.engineer)
    const pass = () => request(test.app, contract.overrideCheck, { as: world.checker.cookie, params: revisionParams(inCheck), body: { code: 'Q14', path: 'tests', reason: 'Seen.' } })
    await pass().expect(200)
    const back = (await sendBack(inCheck).expect(200)).body
    const worse = changed(back.document, ({ specification }) => (specification.tests = []))
    const again = (await submit((await save(back, worse).expect(200)).body).expect(200)).body
    expect(again.overrides).toEqual([])
    expect(Object.keys((await release(again).expect(409)).body.fields)).toContain('Q14')
    expect((await pass().expect(200)).body.overrides).toHaveLength(1)
  })
})

describe('release', () => {
  let inCheck: Revision
  let released: Revision

  beforeAll(async () => {
    inCheck = await buildChecked(test, world.engineer, world.quality)
    released = (await release(inCheck).expect(200)).body
  })

  it('gives the letter A, with the hash of the very bytes that are handed out', async () => {
    expect(released).toMatchObject({ label: 'A', state: 'released', checkedBy: { id: world.checker.personId } })
    const sealed = await request(test.app, contract.releasedDocument, { as: world.buyer.cookie, params: revisionParams(inCheck) }).buffer(true).parse(binary).expect(200)
    expect(createHash('sha256').update(sealed.body).digest('hex')).toBe(released.release!.specificationSha256)
    const content = JSON.parse(sealed.body.toString('utf8'))
    expect(content.specification).toEqual(inCheck.document.specification)
    expect(JSON.stringify(content)).not.toContain('"requirement"')
  })

  it('archives one PDF whose bytes stay', async () => {
    const pdf = () => request(test.app, contract.draftPdf, { as: world.engineer.cookie, params: revisionParams(inCheck) }).buffer(true).parse(binary).expect(200)
    const [first, second] = [await pdf(), await pdf()]
    expect(createHash('sha256').update(first.body).digest('hex')).toBe(released.release!.pdfSha256)
    expect(second.body.equals(first.body)).toBe(true)
  })

  it('keeps what was calculated and drawn', async () => {
    const { body } = await request(test.app, contract.releasedResults, { as: world.quality.cookie, params: revisionParams(inCheck) }).expect(200)
    expect(body.evaluation.engine).toBe(released.release!.engine)
    expect(body.sheets.length).toBeGreaterThan(2)
  })

  it('has results only once it is released', async () => {
    const draft = await buildDraft(test, world.engineer)
    await request(test.app, contract.releasedResults, { as: world.engineer.cookie, params: revisionParams(draft) }).expect(404)
    await request(test.app, contract.releasedDocument, { as: world.engineer.cookie, params: revisionParams(draft) }).expect(404)
  })

  it('is stopped by what is not met and by what could not be checked, naming each check, and nothing is stored', async () => {
    const draft = await buildDraft(test, world.engineer)
    const worse = changed(draft.document, ({ specification }) => {
      specification.insulation.productStandard.value = null
      specification.tests = []
    })
    const stopped = (await submit((await save(draft, worse).expect(200)).body).expect(200)).body
    const { body } = await release(stopped).expect(409)
    expect(body.code).toBe('release-stopped')
    expect(Object.keys(body.fields)).toEqual(expect.arrayContaining(['I01', 'Q14']))
    expect(await read(draft)).toMatchObject({ state: 'in-check', release: null })
  })

  it('is stopped by a character that no font of the sheets has, before any PDF is made', async () => {
    const draft = await buildDraft(test, world.engineer)
    const worse = changed(draft.document, ({ specification }) => (specification.title.legalOwner.value = '磁性部品'))
    const stopped = await letRowsPass(test, (await submit((await save(draft, worse).expect(200)).body).expect(200)).body, world.quality)
    const { body } = await release(stopped).expect(409)
    expect(body).toMatchObject({ code: 'unprintable-text', fields: { 'title.legalOwner.value': expect.stringContaining('磁') } })
  })

  it('happens once when two checkers press at the same moment', async () => {
    const other = await buildPerson(test, world.buying, ['checker'])
    const revision = await buildChecked(test, world.engineer, world.quality)
    const answers = await Promise.all([release(revision), release(revision, other)])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(await test.database.query('SELECT id FROM specification_releases WHERE revision_id = $1', [revision.id])).toHaveLength(1)
  })

  it('supersedes the one before, skips no letter, and one draft is open at a time', async () => {
    const nextDraft = () => request(test.app, contract.createDraft, { as: world.engineer.cookie, params: { specificationId: inCheck.specificationId } })
    const draft = (await nextDraft().expect(200)).body
    expect(draft).toMatchObject({ label: 'P2', state: 'draft' })
    expect((await nextDraft().expect(409)).body.code).toBe('draft-open')

    const again = await letRowsPass(test, (await submit(draft).expect(200)).body, world.quality)
    const next = (await release(again).expect(200)).body
    expect(next.label).toBe('B')
    expect((await read(inCheck)).state).toBe('superseded')
    const { body } = await request(test.app, contract.listReleases, { as: world.buyer.cookie }).expect(200)
    const ours = body.filter(({ specificationId }: { specificationId: string }) => specificationId === inCheck.specificationId)
    expect(ours.map(({ revision, current }: { revision: string; current: boolean }) => [revision, current])).toEqual([['B', true], ['A', false]])
  })
})

const binary = (response: Response, done: (error: Error | null, body: Buffer) => void) => {
  const chunks: Buffer[] = []
  response.on('data', (chunk: Buffer) => chunks.push(chunk))
  response.on('end', () => done(null, Buffer.concat(chunks)))
}

describe('withdrawing', () => {
  it('is an engineer’s for a draft and a checker’s for a release', async () => {
    const draft = await buildDraft(test, world.engineer)
    const withdraw = (as: TestPerson, reason = 'Replaced by another part.') => request(test.app, contract.withdrawRevision, { as: as.cookie, params: revisionParams(draft), body: { reason } })
    expect((await withdraw(world.engineer, ' x ').expect(400)).body.fields.reason).toMatch(/why/)
    expect((await withdraw(world.checker).expect(409)).body.code).toBe('conflict')
    expect((await withdraw(world.engineer).expect(200)).body.state).toBe('withdrawn')
    expect((await save(draft, draft.document).expect(409)).body.code).toBe('not-a-draft')
  })
})

describe('the list', () => {
  it('shows the release in force when a later draft was given up', async () => {
    const { id, specificationId } = (await release(await buildChecked(test, world.engineer, world.quality, 'Still in force')).expect(200)).body
    const draft = (await request(test.app, contract.createDraft, { as: world.engineer.cookie, params: { specificationId } }).expect(200)).body
    await request(test.app, contract.withdrawRevision, { as: world.engineer.cookie, params: revisionParams(draft), body: { reason: 'Not needed after all.' } }).expect(200)
    const { body } = await request(test.app, contract.listSpecifications, { as: world.engineer.cookie, query: { search: 'Still in force' } }).expect(200)
    expect(body.rows.map(({ current }: { current: { id: string; state: string } }) => [current.id, current.state])).toEqual([[id, 'released']])
  })

  it('takes per cent and underscore as typed, not as patterns', async () => {
    await buildDraft(test, world.engineer)
    const { body } = await request(test.app, contract.listSpecifications, { as: world.engineer.cookie, query: { search: '%' } }).expect(200)
    expect(body).toEqual({ total: 0, rows: [] })
  })

  it('finds a part by the words of its document, by their beginnings, and not by the circuit behind it', async () => {
    const draft = await buildDraft(test, world.engineer)
    const words = changed(draft.document, ({ specification }) => (specification.impregnation.resin = { value: 'Polyurethane resin, solventless', status: 'mandatory', origin: { kind: 'entered' } }))
    await save(draft, words).expect(200)
    const find = async (search: string) => (await request(test.app, contract.listSpecifications, { as: world.engineer.cookie, query: { search } }).expect(200)).body
    expect(await find('solventl polyur')).toMatchObject({ total: 1, rows: [{ id: draft.specificationId, figures: { windings: 2, core: expect.stringMatching(/^[A-Z]/), inductanceH: expect.any(Number) } }] })
    expect((await find('rippleRatio')).total).toBe(0)
    for (const odd of ["'", "a' | 'b", ':*', '&', '\\', '((']) expect((await find(odd)).total).toBeGreaterThanOrEqual(0)
  })

  it('pages and sorts on the server, each row once', async () => {
    const page = async (offset: number, sort: string) => (await request(test.app, contract.listSpecifications, { as: world.engineer.cookie, query: { offset, limit: 3, sort } }).expect(200)).body
    const first = await page(0, 'partNumber')
    const numbers: string[] = []
    for (let offset = 0; offset < first.total; offset += 3) numbers.push(...(await page(offset, 'partNumber')).rows.map(({ partNumber }: { partNumber: string }) => partNumber))
    expect(numbers).toHaveLength(first.total)
    expect(new Set(numbers).size).toBe(first.total)
    expect((await page(0, '-partNumber')).rows[0].partNumber).toBe(numbers.at(-1))
    for (const sort of contract.SPECIFICATION_SORTS) expect((await page(0, sort)).total).toBe(first.total)
    await request(test.app, contract.listSpecifications, { as: world.engineer.cookie, query: { sort: 'password' } }).expect(400)
  })
})

describe('the schema of the attached document', () => {
  it('is JSON Schema and public', async () => {
    const { body } = await request(test.app, contract.specificationJsonSchema).expect(200)
    expect(body.$schema).toMatch(/json-schema\.org/)
    expect(body.required).toEqual(expect.arrayContaining(['windings', 'sequence', 'insulation']))
  })
})
