import { asActor } from '#server/db/as-actor'
import { files, sampleDispositions, sampleReadings, sampleRequests, sampleSets } from '#server/db/schema/index'
import { canReadSampleRequest, canReadSampleSet, readableSampleRequests, readableSampleSets } from '#server/policies/samples'
import {
  answerQuestions,
  cancelSampleRequest,
  confirmSet,
  disposeSet,
  getSampleRequest,
  getSampleSet,
  getVendorSample,
  getVendorSet,
  listSampleRequests,
  listVendorSamples,
  requestSamples,
  sampleFile,
  sampleTemplate,
  saveReport,
  uploadEvidence,
  uploadReport,
  vendorSampleFile,
} from '#shared/contracts/samples'
import { eq } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { BAD_REPORT, buildConfirmedSet, buildOpenedRfq, buildSampleRequest, DECLARATION, GOOD_REPORT, inDays, sampleInput, uploadTo, type OpenedRfq } from '../support/build-opened'
import { buildIssuedRfq, type World } from '../support/build-rfq'
import { buildCompany, buildPerson, buildWorld, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: World
let opened: OpenedRfq
let vendor: TestPerson
let rival: TestPerson
let stranger: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 2)
  vendor = world.vendors[0]!.person
  rival = world.vendors[1]!.person
  stranger = await buildPerson(test, await buildCompany(test, 'buying'), ['quality'])
  opened = await buildOpenedRfq(test, world)
})
afterAll(() => test.stop())

const newRequest = () => buildSampleRequest(test, world, opened.rfq)
const view = (setId: string, as = vendor) => request(test.app, as.companyKind === 'vendor' ? getVendorSet : getSampleSet, { params: { setId }, as: as.cookie })
const dispose = (setId: string, body: unknown, as = world.quality) => request(test.app, disposeSet, { params: { setId }, body, as: as.cookie })
const decision = (disposition: string, concession: unknown = null) => ({ disposition, reason: 'Looked at every row.', concession })
const upload = (requestId: string, content: string | Buffer, name = 'report.csv', as = vendor) => request(test.app, uploadReport, { params: { requestId }, file: { name, content }, as: as.cookie })
const mailsOf = (template: string) => test.database.query<{ to_company_id: string; props: Record<string, unknown> }>('SELECT to_company_id, props FROM mail_events WHERE template = $1 ORDER BY created_at DESC', [template])

describe('asking for samples', () => {
  it('names exactly the released revision of the line and tells the vendor, without a limit in the mail', async () => {
    const asked = await newRequest()
    expect(asked).toMatchObject({ state: 'requested', revision: 'A', quantity: 5, counterpart: world.vendors[0]!.company.name, sets: [] })
    expect(asked.specificationSha256).toBe(opened.rfq.lines[0]!.release.specificationSha256)
    expect(asked.rows.map(({ symbol }) => symbol)).toEqual(['Lp', 'Llk', 'Rdc P', 'HV P–S'])
    const [mail] = await mailsOf('samples-requested')
    expect(mail).toMatchObject({ to_company_id: world.vendors[0]!.company.id, props: { requestId: asked.id, number: asked.number } })
    expect(JSON.stringify(mail!.props)).not.toMatch(/660|Lp|0\.00/)
  })

  it.each([
    ['a date that has passed', { dueOn: '2020-01-01' }, 400, 'dueOn'],
    ['no piece', { quantity: 0 }, 400, 'quantity'],
    ['a kind that does not exist', { sampleKind: 'golden' }, 400, 'sampleKind'],
  ])('refuses %s and says where', async (_, change, status, field) => {
    const { body } = await request(test.app, requestSamples, { body: { ...sampleInput(world, opened.rfq), ...change }, as: world.buyer.cookie }).expect(status)
    expect(Object.keys(body.fields)).toContain(field)
  })

  it('waits for the opening', async () => {
    const sealed = await buildIssuedRfq(test, world)
    const { body } = await request(test.app, requestSamples, { body: sampleInput(world, sealed), as: world.buyer.cookie }).expect(409)
    expect(body.code).toBe('rfq-not-opened')
  })

  it('answers another company and a part of another enquiry as absent', async () => {
    await request(test.app, requestSamples, { body: sampleInput(world, opened.rfq), as: stranger.cookie }).expect(404)
    const other = await buildIssuedRfq(test, world)
    const mixed = { ...sampleInput(world, opened.rfq), lineId: other.lines[0]!.id }
    await request(test.app, requestSamples, { body: mixed, as: world.buyer.cookie }).expect(404)
  })

  it('is seen by the vendor that was asked and by no other', async () => {
    const asked = await newRequest()
    const own = await request(test.app, listVendorSamples, { as: vendor.cookie }).expect(200)
    expect(own.body.map(({ id }: { id: string }) => id)).toContain(asked.id)
    const others = await request(test.app, listVendorSamples, { as: rival.cookie }).expect(200)
    expect(others.body).toEqual([])
    await request(test.app, getVendorSample, { params: { requestId: asked.id }, as: rival.cookie }).expect(404)
  })

  it('can be taken back once, and takes no report after that', async () => {
    const asked = await newRequest()
    const cancel = () => request(test.app, cancelSampleRequest, { params: { requestId: asked.id }, body: { reason: 'Project stopped' }, as: world.buyer.cookie })
    expect((await cancel().expect(200)).body.state).toBe('cancelled')
    expect((await cancel().expect(409)).body.code).toBe('request-cancelled')
    expect((await upload(asked.id, GOOD_REPORT).expect(409)).body.code).toBe('request-cancelled')
  })
})

describe('the template', () => {
  it('is made from the test rows of the drawing, one line per part', async () => {
    const asked = await newRequest()
    const { text, headers } = await request(test.app, sampleTemplate, { params: { requestId: asked.id }, as: vendor.cookie }).expect(200)
    expect(headers['content-disposition']).toContain(`${asked.number}`)
    const lines = text.replace('\ufeff', '').split('\r\n')
    expect(lines[0]).toBe('Serial;Lp (µH);Llk (µH);Rdc P (mΩ);HV P–S (pass/fail)')
    expect(lines.slice(4, 9)).toEqual(['1;;;;', '2;;;;', '3;;;;', '4;;;;', '5;;;;'])
  })
})

describe('handing in a report', () => {
  it('shows what was read and how it would be judged, to the vendor alone', async () => {
    const asked = await newRequest()
    const set = await uploadTo(test, vendor, asked.id)
    expect(set).toMatchObject({ phase: 'read', kind: 'readings', number: 1, verdict: null, recordSha256: null, judgement: { verdict: 'met' } })
    expect(set.reading!.accepted).toHaveLength(20)
    expect(set.file.sha256).toBe(createHash('sha256').update(GOOD_REPORT).digest('hex'))
    await view(set.id, world.quality).expect(404)
    expect((await request(test.app, getSampleRequest, { params: { requestId: asked.id }, as: world.quality.cookie }).expect(200)).body.sets).toEqual([])
  })

  it('changes nothing when the same file comes again', async () => {
    const asked = await newRequest()
    const first = await uploadTo(test, vendor, asked.id)
    const again = await uploadTo(test, vendor, asked.id)
    expect(again).toEqual(first)
  })

  it('lets another file take the place of an unconfirmed one, which stays in the history and may come back', async () => {
    const asked = await newRequest()
    const first = await uploadTo(test, vendor, asked.id)
    const second = await uploadTo(test, vendor, asked.id, BAD_REPORT)
    expect(second.number).toBe(2)
    expect((await view(first.id).expect(200)).body).toMatchObject({ phase: 'superseded', reading: null })
    const third = await uploadTo(test, vendor, asked.id)
    expect(third.number).toBe(3)
  })

  it('asks about cells, takes answers all or none, and tells a stale page', async () => {
    const asked = await newRequest()
    const set = await uploadTo(test, vendor, asked.id, GOOD_REPORT.replace('602,2', '0,6022').replace('9,3', '01-Feb'))
    expect(set.reading!.questions.map(({ id }) => id)).toEqual(['cell-factor:B3', 'date-for-number:C4'])
    const answer = (version: number, answers: unknown[]) => request(test.app, answerQuestions, { params: { setId: set.id }, body: { version, answers }, as: vendor.cookie })

    const unfitting = await answer(set.version, [{ questionId: 'cell-factor:B3', option: 'scale:3' }, { questionId: 'date-for-number:C4', option: 'keep' }]).expect(400)
    expect(unfitting.body).toMatchObject({ code: 'answer-not-fitting', message: expect.stringContaining('C4') })
    expect((await view(set.id)).body).toMatchObject({ version: set.version, answers: [] })

    const done = await answer(set.version, [{ questionId: 'cell-factor:B3', option: 'scale:3' }, { questionId: 'date-for-number:C4', option: 'typed', text: '9,3' }]).expect(200)
    expect(done.body.reading.questions).toEqual([])
    expect(done.body.judgement.verdict).toBe('met')
    expect((await answer(set.version, [{ questionId: 'cell-factor:B3', option: 'keep' }]).expect(409)).body.code).toBe('stale-version')
  })

  it.each([
    ['0 bytes', 'report.csv', '', 400, 'file-empty'],
    ['a letter', 'report.csv', 'Dear Sirs,\nplease see the attachment.\n', 400, 'file-unreadable'],
    ['quotes that never close', 'report.csv', 'Serial;Lp (µH)\n1;"600\n', 400, 'file-unreadable'],
    ['headings alone', 'report.csv', 'Serial;Lp (µH)\n', 400, 'file-unreadable'],
    ['a spreadsheet', 'report.xls', Buffer.from([0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1, 0, 0]), 415, 'file-type-not-accepted'],
    ['a PDF named as a table', 'report.csv', '%PDF-1.7\n%%EOF\n', 400, 'file-name-mismatch'],
    ['a table of more than 2 MB', 'report.csv', `Serial;Lp (µH)\n${'1;600 \n'.repeat(320_000)}`, 413, 'file-too-large'],
    ['a file of more than 10 MB', 'report.csv', Buffer.alloc(10 * 1024 * 1024 + 1, 0x31), 413, 'file-too-large'],
  ])('refuses %s and keeps nothing', async (_, name, content, status, code) => {
    const asked = await newRequest()
    const { body } = await upload(asked.id, content, name)
    expect([body.code, ERROR_SENTENCE.test(body.message)]).toEqual([code, true])
    expect((await upload(asked.id, content, name)).status).toBe(status)
    expect((await request(test.app, getVendorSample, { params: { requestId: asked.id }, as: vendor.cookie })).body.sets).toEqual([])
  })

  it('keeps a PDF as evidence, which is no pass by itself', async () => {
    const asked = await newRequest()
    const set = await uploadTo(test, vendor, asked.id, '%PDF-1.7\nscan\n%%EOF\n', 'scan.pdf')
    expect(set).toMatchObject({ kind: 'evidence', reading: null, judgement: { verdict: 'not-evidenced' } })
  })
})

const ERROR_SENTENCE = /^[A-Z“].{10,}\.$/s

describe('confirming a report', () => {
  it('needs the declaration and every answer', async () => {
    const asked = await newRequest()
    const set = await uploadTo(test, vendor, asked.id, GOOD_REPORT.replace('602,2', '0,6022'))
    const confirm = (version: number) => request(test.app, confirmSet, { params: { setId: set.id }, body: { version }, as: vendor.cookie })
    expect((await confirm(set.version).expect(409)).body.code).toBe('report-missing')
    const saved = await request(test.app, saveReport, { params: { setId: set.id }, body: { version: set.version, report: DECLARATION }, as: vendor.cookie }).expect(200)
    const { body } = await confirm(saved.body.version).expect(409)
    expect(body).toMatchObject({ code: 'questions-open', message: expect.stringContaining('B3') })
  })

  it.each([
    ['a measurement in the future', { measuredOn: inDays(3) }, 'report.measuredOn'],
    ['no instrument', { instruments: ' ' }, 'report.instruments'],
    ['a temperature nobody works at', { temperatureC: 900 }, 'report.temperatureC'],
    ['a difference that is not named', { asBuilt: { kind: 'differs', differences: '' } }, 'report.asBuilt.differences'],
  ])('refuses a declaration with %s', async (_, change, field) => {
    const asked = await newRequest()
    const set = await uploadTo(test, vendor, asked.id)
    const { body } = await request(test.app, saveReport, { params: { setId: set.id }, body: { version: set.version, report: { ...DECLARATION, ...change } }, as: vendor.cookie }).expect(400)
    expect(Object.keys(body.fields)).toContain(field)
  })

  it('shows it to the customer, judged by the released limits, with every reading kept once', async () => {
    const asked = await newRequest()
    const set = await buildConfirmedSet(test, vendor, asked.id, BAD_REPORT)
    expect(set).toMatchObject({ phase: 'judged', verdict: 'not-met' })
    const { body } = await view(set.id, world.quality).expect(200)
    expect(body.judgement).toEqual(set.judgement)
    const leakage = body.judgement.rows.find(({ row }: { row: { symbol: string } }) => row.symbol === 'Llk')
    expect(leakage).toMatchObject({ verdict: 'not-met', outOfLimits: ['1', '2', '3', '4', '5'], summary: { n: 5, minimum: 13.1e-6, maximum: 13.5e-6 }, capability: { kind: 'index', preliminary: true, n: 5 } })
    const rows = await asActor(test.ctx, world.quality, (tx) => tx.select().from(sampleReadings).where(eq(sampleReadings.setId, set.id)))
    expect(rows).toHaveLength(20)
    expect((await mailsOf('sample-report'))[0]).toMatchObject({ to_company_id: world.buying.id })
  })

  it('makes it immutable, for the vendor too', async () => {
    const asked = await newRequest()
    const set = await buildConfirmedSet(test, vendor, asked.id)
    const late = await request(test.app, saveReport, { params: { setId: set.id }, body: { version: set.version, report: DECLARATION }, as: vendor.cookie }).expect(409)
    expect(late.body.code).toBe('already-confirmed')
    const evidence = await request(test.app, uploadEvidence, { params: { setId: set.id }, file: { name: 'scan.pdf', content: '%PDF-1.7\n%%EOF\n' }, as: vendor.cookie }).expect(409)
    expect(evidence.body.code).toBe('already-confirmed')
    expect((await uploadTo(test, vendor, asked.id)).id).toBe(set.id)
  })

  it('gives one result when two send at the same moment', async () => {
    const asked = await newRequest()
    const set = await uploadTo(test, vendor, asked.id)
    const saved = await request(test.app, saveReport, { params: { setId: set.id }, body: { version: set.version, report: DECLARATION }, as: vendor.cookie }).expect(200)
    const confirm = () => request(test.app, confirmSet, { params: { setId: set.id }, body: { version: saved.body.version }, as: vendor.cookie })
    const answers = await Promise.all([confirm(), confirm()])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
  })

  it('lets a corrected report supersede one that nobody has decided about, with its history', async () => {
    const asked = await newRequest()
    const first = await buildConfirmedSet(test, vendor, asked.id, BAD_REPORT)
    const second = await buildConfirmedSet(test, vendor, asked.id, GOOD_REPORT)
    const { body } = await request(test.app, getSampleRequest, { params: { requestId: asked.id }, as: world.quality.cookie }).expect(200)
    expect(body.sets.map(({ id, phase }: { id: string; phase: string }) => [id, phase])).toEqual([[first.id, 'superseded'], [second.id, 'judged']])
    expect((await view(first.id, world.quality).expect(200)).body.judgement.verdict).toBe('not-met')
    expect((await dispose(first.id, decision('rejected')).expect(409)).body.code).toBe('conflict')
  })

  it('keeps the original file byte for byte and evidence beside it', async () => {
    const asked = await newRequest()
    const set = await uploadTo(test, vendor, asked.id)
    const scan = '%PDF-1.7\nscan of the signed sheet\n%%EOF\n'
    const withScan = await request(test.app, uploadEvidence, { params: { setId: set.id }, file: { name: 'scan.pdf', content: scan }, as: vendor.cookie }).expect(200)
    expect(withScan.body.evidence).toMatchObject([{ name: 'scan.pdf', kind: 'pdf' }])
    const saved = await request(test.app, saveReport, { params: { setId: set.id }, body: { version: set.version, report: DECLARATION }, as: vendor.cookie }).expect(200)
    await request(test.app, confirmSet, { params: { setId: set.id }, body: { version: saved.body.version }, as: vendor.cookie }).expect(200)

    const download = (fileId: string, as: TestPerson) => request(test.app, as.companyKind === 'vendor' ? vendorSampleFile : sampleFile, { params: { setId: set.id, fileId }, as: as.cookie })
    const { text } = await download(set.file.id, world.quality).expect(200)
    expect(createHash('sha256').update(text).digest('hex')).toBe(set.file.sha256)
    await download(withScan.body.evidence[0].id, world.engineer).expect(200)
    await download(set.file.id, rival).expect(404)
    await download(set.file.id, stranger).expect(404)
  })
})

describe('the disposition', () => {
  it('is made once, by quality or engineering, and told to the vendor', async () => {
    const asked = await newRequest()
    const set = await buildConfirmedSet(test, vendor, asked.id)
    await dispose(set.id, decision('accepted'), world.buyer).expect(403)
    const { body } = await dispose(set.id, decision('accepted')).expect(200)
    expect(body).toMatchObject({ phase: 'disposed', disposition: { disposition: 'accepted', decidedBy: world.quality.name } })
    expect((await dispose(set.id, decision('rejected'), world.engineer).expect(409)).body.code).toBe('already-decided')
    expect((await view(set.id).expect(200)).body.disposition).toMatchObject({ disposition: 'accepted', decidedBy: world.buying.name })
    expect((await upload(asked.id, BAD_REPORT).expect(409)).body.code).toBe('already-decided')
  })

  it('gives one result and one refusal when two decide at the same moment', async () => {
    const set = await buildConfirmedSet(test, vendor, (await newRequest()).id)
    const answers = await Promise.all([dispose(set.id, decision('accepted')), dispose(set.id, decision('rejected'), world.engineer)])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(answers.find(({ status }) => status === 409)!.body.code).toBe('already-decided')
  })

  it('never accepts plainly what fails, and grants a concession only with quantity and end', async () => {
    const set = await buildConfirmedSet(test, vendor, (await newRequest()).id, BAD_REPORT)
    expect((await dispose(set.id, decision('accepted')).expect(409)).body.code).toBe('disposition-not-possible')
    expect((await dispose(set.id, decision('accepted-with-concession')).expect(400)).body.fields).toHaveProperty('concession')
    expect((await dispose(set.id, decision('accepted-with-concession', { quantity: 100, expiresOn: '2020-01-01' })).expect(400)).body.fields).toHaveProperty(['concession.expiresOn'])
    const { body } = await dispose(set.id, decision('accepted-with-concession', { quantity: 100, expiresOn: inDays(90) })).expect(200)
    expect(body.disposition.concession).toEqual({ quantity: 100, expiresOn: inDays(90) })
  })

  it('never accepts what is not evidenced', async () => {
    const set = await buildConfirmedSet(test, vendor, (await newRequest()).id, GOOD_REPORT.replace('PASS', ''))
    expect(set.verdict).toBe('not-evidenced')
    expect((await dispose(set.id, decision('accepted')).expect(409)).body.code).toBe('disposition-not-possible')
    expect((await dispose(set.id, decision('on-hold')).expect(200)).body.phase).toBe('disposed')
  })

  it('asks the vendor again after a rejection, and keeps the rejected report apart', async () => {
    const asked = await newRequest()
    const first = await buildConfirmedSet(test, vendor, asked.id, BAD_REPORT)
    await dispose(first.id, decision('rejected')).expect(200)
    const second = await buildConfirmedSet(test, vendor, asked.id, GOOD_REPORT)
    const { body } = await request(test.app, getSampleRequest, { params: { requestId: asked.id }, as: world.quality.cookie }).expect(200)
    expect(body.sets.map(({ phase, verdict }: { phase: string; verdict: string }) => [phase, verdict])).toEqual([['disposed', 'not-met'], ['judged', 'met']])
    expect(second.judgement!.rows[0]!.summary.n).toBe(5)
  })
})

describe('straight at the database', () => {
  const asRival = <T>(work: Parameters<typeof asActor<T>>[2]) => asActor(test.ctx, rival, work)

  it('shows no vendor another’s request, report, reading or file', async () => {
    const asked = await newRequest()
    const set = await buildConfirmedSet(test, vendor, asked.id)
    await asRival(async (tx) => {
      expect(await tx.select().from(sampleRequests)).toEqual([])
      expect(await tx.select().from(sampleSets)).toEqual([])
      expect(await tx.select().from(sampleReadings)).toEqual([])
      expect(await tx.select().from(files).where(eq(files.id, set.file.id))).toEqual([])
    })
  })

  it('shows the customer no report that was not confirmed', async () => {
    const set = await uploadTo(test, vendor, (await newRequest()).id)
    const seen = await asActor(test.ctx, world.quality, (tx) => tx.select().from(sampleSets).where(eq(sampleSets.id, set.id)))
    expect(seen).toEqual([])
  })

  it.each([
    ['an administrator', () => world.admin],
    ['another company', () => stranger],
  ])('shows nothing to %s', async (_, who) => {
    await buildConfirmedSet(test, vendor, (await newRequest()).id)
    expect(await asActor(test.ctx, who(), (tx) => tx.select().from(sampleSets))).toEqual([])
  })

  it.each([
    ['a confirmed report', (id: string) => `UPDATE sample_sets SET report = NULL WHERE id = '${id}'`],
    ['its record', (id: string) => `UPDATE sample_sets SET record = '\\x00' WHERE id = '${id}'`],
    ['a reading', (id: string) => `UPDATE sample_readings SET value = 0 WHERE set_id = '${id}'`],
    ['a report away', (id: string) => `DELETE FROM sample_sets WHERE id = '${id}'`],
  ])('changes not even for the owner of the database: %s', async (_, attack) => {
    const set = await buildConfirmedSet(test, vendor, (await newRequest()).id)
    await expect(test.database.query(attack(set.id))).rejects.toMatchObject({ code: 'DS001' })
  })

  it('lets nobody write readings into a report that is sent', async () => {
    const set = await buildConfirmedSet(test, vendor, (await newRequest()).id)
    const owners = { setId: set.id, companyId: world.buying.id, vendorCompanyId: vendor.companyId }
    const row = { ...owners, testRowId: 't9', symbol: 'x', serial: '1', run: 1, address: 'A1', text: '', kind: 'value' as const, verdict: 'met' as const, reason: '' }
    await expect(asActor(test.ctx, vendor, (tx) => tx.insert(sampleReadings).values(row))).rejects.toMatchObject({ cause: { code: '42501' } })
  })

  it('accepts no failing report by the back door', async () => {
    const set = await buildConfirmedSet(test, vendor, (await newRequest()).id, BAD_REPORT)
    const row = { setId: set.id, companyId: world.buying.id, vendorCompanyId: vendor.companyId, decidedBy: world.quality.personId, disposition: 'accepted' as const, reason: 'x', decidedAt: new Date() }
    await expect(asActor(test.ctx, world.quality, (tx) => tx.insert(sampleDispositions).values(row))).rejects.toMatchObject({ cause: { code: '42501' } })
  })

  it('says the same as the policies in code', async () => {
    await buildConfirmedSet(test, vendor, (await newRequest()).id)
    const allRequests = await test.database.query<{ id: string; company_id: string; vendor_company_id: string }>('SELECT id, company_id, vendor_company_id FROM sample_requests')
    const allSets = await test.database.query<{ id: string; company_id: string; vendor_company_id: string; confirmed_at: Date | null }>('SELECT id, company_id, vendor_company_id, confirmed_at FROM sample_sets')
    const parties = (row: { company_id: string; vendor_company_id: string }) => ({ companyId: row.company_id, vendorCompanyId: row.vendor_company_id })
    for (const who of [vendor, rival, stranger, world.quality, world.buyer, world.approver, world.checker, world.admin]) {
      const [byRule, bySql, setsBySql] = await asActor(test.ctx, who, async (tx) => [
        await tx.select({ id: sampleRequests.id }).from(sampleRequests),
        await tx.select({ id: sampleRequests.id }).from(sampleRequests).where(readableSampleRequests(who)),
        await tx.select({ id: sampleSets.id }).from(sampleSets).where(readableSampleSets(who)),
      ])
      const wanted = allRequests.filter((row) => canReadSampleRequest(who, parties(row))).map(({ id }) => id)
      const wantedSets = allSets.filter((row) => canReadSampleSet(who, { ...parties(row), confirmedAt: row.confirmed_at })).map(({ id }) => id)
      expect(byRule.map(({ id }) => id).sort(), who.roles[0]).toEqual(wanted.sort())
      expect(bySql.map(({ id }) => id).sort(), who.roles[0]).toEqual(wanted.sort())
      expect(setsBySql.map(({ id }) => id).sort(), who.roles[0]).toEqual(wantedSets.sort())
    }
  })
})

it('lists requests of one enquiry', async () => {
  const { body } = await request(test.app, listSampleRequests, { query: { rfqId: opened.rfq.id }, as: world.approver.cookie }).expect(200)
  expect(new Set(body.map(({ rfqId }: { rfqId: string }) => rfqId))).toEqual(new Set([opened.rfq.id]))
})
