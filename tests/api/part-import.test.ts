import { getPart, importParts, previewPartImport } from '#shared/contracts/parts'
import { shippedLibrary } from '#server/db/seed/parts/library'
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

const HEADINGS = ['id', 'name', 'source', 'edition', 'confidence', 'material', 'boreMm', 'wallMm', 'thermalClassC', 'withstandVRms', 'unverified', 'note']
type Row = Partial<Record<(typeof HEADINGS)[number], string>>
const sleeve = (id: string, row: Row = {}): Row => ({ id, name: `Sleeve ${id}`, source: 'Data sheet', edition: '2024', confidence: 'high', material: 'PTFE', boreMm: '1,5', wallMm: '0,4', thermalClassC: '180', ...row })
const tableOf = (rows: readonly Row[], headings: readonly string[] = HEADINGS) => [headings, ...rows.map((row) => headings.map((heading) => row[heading] ?? ''))].map((cells) => cells.join(';')).join('\r\n')
const fileOf = (content: string | Buffer, name = 'sleeves.csv') => ({ name, content })

const preview = (content: string | Buffer, person = world.engineer, name?: string) => request(test.app, previewPartImport, { as: person.cookie, body: { kind: 'sleeve' }, file: fileOf(content, name) })
const confirm = (content: string, fingerprint: string, person = world.engineer) =>
  request(test.app, importParts, { as: person.cookie, body: { kind: 'sleeve', reason: 'Catalogue of the maker.', fingerprint }, file: fileOf(content) })
const versionsOf = async (id: string, person = world.engineer) => (await request(test.app, getPart, { params: { kind: 'sleeve', id }, as: person.cookie })).body.versions as { row: { version: number; boreMm: number }; origin: string; reason: string }[] | undefined
const stored = async () => Number((await test.database.query<{ count: string }>('SELECT count(*) FROM part_rows WHERE company_id IS NOT NULL'))[0]!.count)

const shipped = shippedLibrary().sleeves[0]!

describe('taking in a table', () => {
  it('shows new, changed and unchanged rows, stores them when confirmed, and tells the trail', async () => {
    const first = tableOf([sleeve('a-1'), sleeve('a-2')])
    const shown = await preview(first).expect(200)
    expect(shown.body.rows.map((row: { line: number; state: string; basedOn: number | null }) => [row.line, row.state, row.basedOn])).toEqual([[2, 'new', null], [3, 'new', null]])
    expect(await stored()).toBe(0)
    expect((await confirm(first, shown.body.fingerprint).expect(200)).body).toEqual({ created: 2, changed: 0, unchanged: 0 })

    const text = (value: number) => String(value).replace('.', ',')
    const own = sleeve(shipped.id, { name: shipped.name, boreMm: text(shipped.boreMm + 0.25), wallMm: text(shipped.wallMm), material: shipped.material })
    const second = tableOf([sleeve('a-1'), sleeve('a-2', { boreMm: '2,5' }), sleeve('a-3'), own])
    const again = await preview(second).expect(200)
    expect(again.body.rows.map((row: { state: string; basedOn: number | null }) => [row.state, row.basedOn])).toEqual([['unchanged', 1], ['changed', 1], ['new', null], ['changed', 1]])
    expect(again.body.rows[1].changes).toEqual(['boreMm'])
    expect((await confirm(second, again.body.fingerprint).expect(200)).body).toEqual({ created: 1, changed: 2, unchanged: 1 })

    expect(await versionsOf('a-1')).toHaveLength(1)
    expect((await versionsOf('a-2'))!.map(({ row }) => [row.version, row.boreMm])).toEqual([[2, 2.5], [1, 1.5]])
    expect((await versionsOf(shipped.id))!.map(({ origin }) => origin)).toEqual(['company', 'shared'])
    expect((await versionsOf('a-2'))![0]!.reason).toBe('Catalogue of the maker.')
    expect(await versionsOf('a-1', stranger)).toBeUndefined()

    const trail = await test.database.query<{ event: { type: string; created?: number; changed?: number } }>(`SELECT event FROM audit_entries WHERE company_id = $1 AND event ->> 'type' LIKE 'part%' ORDER BY id`, [world.buying.id])
    const events = trail.map(({ event }) => event)
    expect(events.filter(({ type }) => type === 'parts-imported').map(({ created, changed }) => [created, changed]).sort()).toEqual([[1, 2], [2, 0]])
    expect(events.filter(({ type }) => type === 'part-created')).toHaveLength(3)
    expect(events.filter(({ type }) => type === 'part-changed')).toHaveLength(2)
  })

  it('makes no version and no entry for a table that changes nothing', async () => {
    const table = tableOf([sleeve('b-1')])
    await confirm(table, (await preview(table)).body.fingerprint).expect(200)
    const before = await stored()
    const again = await preview(table).expect(200)
    expect((await confirm(table, again.body.fingerprint).expect(200)).body).toEqual({ created: 0, changed: 0, unchanged: 1 })
    expect(await stored()).toBe(before)
  })

  it('refuses what changed since its preview: the file, or the library', async () => {
    const table = tableOf([sleeve('c-1')])
    const { body } = await preview(table).expect(200)
    expect((await confirm(tableOf([sleeve('c-1', { boreMm: '9' })]), body.fingerprint).expect(409)).body.code).toBe('stale-version')
    await confirm(table, body.fingerprint).expect(200)
    expect((await confirm(table, body.fingerprint).expect(409)).body.code).toBe('stale-version')
    expect(await versionsOf('c-1')).toHaveLength(1)
  })

  it('lets one of two confirmations at the same time win and keeps nothing of the other', async () => {
    const table = tableOf([sleeve('d-1'), sleeve('d-2')])
    const { body } = await preview(table).expect(200)
    const answers = await Promise.all([confirm(table, body.fingerprint), confirm(table, body.fingerprint)])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(await versionsOf('d-1')).toHaveLength(1)
    expect(await versionsOf('d-2')).toHaveLength(1)
  })
})

describe('what does not fit', () => {
  it.each([
    { name: 'a number that is none', rows: () => [sleeve('x-1'), sleeve('x-2', { boreMm: 'wide' })], line: 3, column: 'boreMm' },
    { name: 'an identifier that stands there twice', rows: () => [sleeve('x-1'), sleeve('x-1')], line: 3, column: 'id' },
  ])('shows $name in the preview and stores nothing of the whole file', async ({ rows, line, column }) => {
    const table = tableOf(rows())
    const before = await stored()
    const { body } = await preview(table).expect(200)
    const unfit = body.rows.filter((row: { state: string }) => row.state === 'unfit')
    expect(unfit).toEqual([expect.objectContaining({ line, problems: [expect.objectContaining({ column })] })])
    const refused = await confirm(table, body.fingerprint).expect(400)
    expect(refused.body).toMatchObject({ code: 'invalid-input', message: expect.stringContaining(`Line ${line}, ${column}`) })
    expect(Object.keys(refused.body.fields)).toEqual([`file.${line}.${column}`])
    expect(await stored()).toBe(before)
  })

  it.each([
    { name: 'a missing column', headings: HEADINGS.filter((heading) => heading !== 'boreMm'), column: 'boreMm' },
    { name: 'an unknown column', headings: [...HEADINGS, 'price'], column: 'price' },
  ])('says $name', async ({ headings, column }) => {
    const { body } = await preview(tableOf([sleeve('x-1')], headings)).expect(200)
    expect(body).toMatchObject({ rows: [], problems: [{ line: 1, column }] })
  })

  it.each([
    { name: 'an empty file', content: () => '', status: 400, code: 'file-empty' },
    { name: 'a picture', content: () => Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0]), file: 'rows.png', status: 415, code: 'file-type-not-accepted' },
    { name: 'a picture that is named a table', content: () => Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0]), status: 415, code: 'file-type-not-accepted' },
    { name: 'a file that is too large', content: () => 'x'.repeat(2 * 1024 * 1024 + 1), status: 413, code: 'file-too-large' },
  ])('refuses $name', async ({ content, file, status, code }) => {
    const { body } = await preview(content(), world.engineer, file).expect(status)
    expect(body.code).toBe(code)
  })

  it('refuses a kind that does not exist, no file, and a confirmation without reason or preview', async () => {
    const table = tableOf([sleeve('x-1')])
    const call = (body: object, file: ReturnType<typeof fileOf> | undefined) => request(test.app, importParts, { as: world.engineer.cookie, body, file })
    await request(test.app, previewPartImport, { as: world.engineer.cookie, body: { kind: 'bobbin' }, file: fileOf(table) }).expect(400)
    expect((await request(test.app, previewPartImport, { as: world.engineer.cookie, body: { kind: 'sleeve' } }).expect(400)).body.code).toBe('file-missing')
    expect((await call({ kind: 'sleeve', reason: ' ', fingerprint: 'a'.repeat(64) }, fileOf(table)).expect(400)).body.fields).toHaveProperty('reason')
    expect((await call({ kind: 'sleeve', reason: 'Needed.', fingerprint: 'x' }, fileOf(table)).expect(400)).body.fields).toHaveProperty('fingerprint')
  })
})

describe('who may', () => {
  it('is the engineer alone, as with single rows', async () => {
    for (const person of [world.checker, world.buyer, world.admin, world.vendors[0]!.person]) {
      expect((await preview(tableOf([sleeve('y-1')]), person).expect(403)).body.code).toBe('not-allowed')
    }
  })
})
