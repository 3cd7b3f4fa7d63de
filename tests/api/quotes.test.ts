import { asActor, asWorker } from '#server/db/as-actor'
import { auditEntries, mailEvents, quoteDrafts, quoteLines, quotePriceBreaks, quotes, quoteStates, rfqInvitations, rfqs } from '#server/db/schema/index'
import { getOwnQuote, listQuotes, quoteFile, removeQuoteFile, saveQuoteDraft, submitQuote, uploadQuoteFile, withdrawQuote, ownQuoteFile, type Quote } from '#shared/contracts/quotes'
import { acceptConfidentiality, cancelRfq, getRfq, getVendorRfq, type Rfq } from '#shared/contracts/rfqs'
import { listAudit } from '#shared/contracts/audit'
import { canonicalJson } from '#shared/canonical-json'
import { eq, sql } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildIssuedRfq, buildQuote, openAfterDue, quoteInput, type World } from '../support/build-rfq'
import { buildPerson, buildWorld, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: World
let first: TestPerson
let second: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 2)
  first = world.vendors[0]!.person
  second = world.vendors[1]!.person
})
afterAll(() => test.stop())

const PDF = Buffer.from('%PDF-1.4\n1 0 obj<</Type/Catalog>>endobj\ntrailer<</Root 1 0 R>>\n%%EOF\n')

async function acceptedRfq(): Promise<Rfq> {
  const rfq = await buildIssuedRfq(test, world)
  await request(test.app, acceptConfidentiality, { params: { rfqId: rfq.id }, body: { accepted: true }, as: first.cookie }).expect(200)
  return rfq
}

const submit = (rfqId: string, body: unknown, as = first) => request(test.app, submitQuote, { params: { rfqId }, body, as: as.cookie })

describe('quoting', () => {
  it('submits a complete revision and mails a receipt with its hash', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const { submitted } = await buildQuote(test, first, rfq.id)
    expect(submitted).toHaveLength(1)
    expect(submitted[0]).toMatchObject({ revision: 1, state: 'submitted', currency: 'EUR', issueNumber: 1 })
    expect(submitted[0].lines[0].priceBreaks[1]).toEqual({ fromQuantity: 5000, price: '1.290000', unitPrice: '1.29' })
    const mails = await asWorker(test.ctx, (tx) => tx.select().from(mailEvents).where(sql`template = 'quote-received' and props ->> 'rfqId' = ${rfq.id}`))
    expect(mails[0]!.props).toMatchObject({ sha256: submitted[0].sha256 })
  })

  it('replaces by a whole new revision and keeps the earlier one', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await buildQuote(test, first, rfq.id)
    const { body } = await submit(rfq.id, quoteInput(rfq, { reason: 'Own error in the tooling.' })).expect(200)
    expect(body.submitted.map(({ revision, state }: Quote) => [revision, state])).toEqual([
      [2, 'submitted'],
      [1, 'superseded'],
    ])
  })

  it('wants to know why a later revision replaces the one before', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await buildQuote(test, first, rfq.id)
    const { body } = await submit(rfq.id, quoteInput(rfq)).expect(400)
    expect(body.fields.reason).toMatch(/why/)
  })

  it('seals the file with what was typed: another file is another hash', async () => {
    const rfq = await acceptedRfq()
    const upload = (content: Buffer) => request(test.app, uploadQuoteFile, { params: { rfqId: rfq.id }, file: { name: 'offer.pdf', content }, as: first.cookie }).expect(200)
    await upload(PDF)
    const { body: second } = await submit(rfq.id, quoteInput(rfq)).expect(200)
    const own = await request(test.app, getVendorRfq, { params: { rfqId: rfq.id }, as: first.cookie }).expect(200)
    expect(own.body.quotation).toEqual({ revision: 1, state: 'submitted' })
    const { sha256, vendorReference, file } = second.submitted[0]
    const typed = quoteInput(rfq)
    const hash = (fileSha256: string | null) => createHash('sha256').update(canonicalJson({ schema: 'dotside/quotation/1', revision: 1, issueSha256: rfq.issueSha256, fileSha256, ...typed })).digest('hex')
    expect(vendorReference).toBe(typed.vendorReference)
    expect(sha256).toBe(hash(file.sha256))
    expect(sha256).not.toBe(hash(null))
  })

  it('keeps a price per hundred as written and shows the price of one piece beside it', async () => {
    const rfq = await acceptedRfq()
    const input = quoteInput(rfq)
    const { body } = await submit(rfq.id, { ...input, lines: [{ ...input.lines[0]!, priceUnit: 100, priceBreaks: [{ fromQuantity: 1000, price: '109.00' }] }] }).expect(200)
    expect(body.submitted[0].lines[0].priceBreaks).toEqual([{ fromQuantity: 1000, price: '109.000000', unitPrice: '1.09' }])
  })

  it.each([
    ['a price with a comma', { priceBreaks: [{ fromQuantity: 1000, price: '1,41' }] }, 'lines.0.priceBreaks.0.price'],
    ['a price of zero', { priceBreaks: [{ fromQuantity: 1000, price: '0' }] }, 'lines.0.priceBreaks.0.price'],
    ['breaks out of order', { priceBreaks: [{ fromQuantity: 5000, price: '1' }, { fromQuantity: 1000, price: '2' }] }, 'lines.0.priceBreaks'],
    ['a lead time of zero days', { firstOrderLeadTimeDays: 0 }, 'lines.0.firstOrderLeadTimeDays'],
  ])('refuses %s, says where, and stores nothing', async (_, change, field) => {
    const rfq = await acceptedRfq()
    const input = quoteInput(rfq)
    const { body } = await submit(rfq.id, { ...input, lines: [{ ...input.lines[0]!, ...change }] }).expect(400)
    expect(Object.keys(body.fields)).toContain(field)
    const own = await request(test.app, getOwnQuote, { params: { rfqId: rfq.id }, as: first.cookie }).expect(200)
    expect(own.body.submitted).toEqual([])
  })

  it('refuses a validity that has ended', async () => {
    const rfq = await acceptedRfq()
    const { body } = await submit(rfq.id, quoteInput(rfq, { validUntil: '2020-02-29' })).expect(400)
    expect(body.fields.validUntil).toMatch(/ended/)
  })

  it('flags what is unusual without refusing it', async () => {
    const rfq = await acceptedRfq()
    const input = quoteInput(rfq, { currency: 'USD' })
    const breaks = [{ fromQuantity: 5000, price: '1.20' }, { fromQuantity: 10_000, price: '1.30' }]
    const { body } = await submit(rfq.id, { ...input, lines: [{ ...input.lines[0]!, priceBreaks: breaks, minimumOrderQuantity: 6050 }] }).expect(200)
    expect(body.submitted[0].hints.map(({ code }: { code: string }) => code).sort()).toEqual(['dearer-break', 'minimum-above-break', 'minimum-not-packs', 'other-currency', 'quantity-not-quoted'])
  })

  it('needs accepted confidentiality', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const { body } = await submit(rfq.id, quoteInput(rfq)).expect(409)
    expect(body.code).toBe('terms-not-accepted')
  })

  it('is decided by the database clock: taken before the due moment, refused from it on', async () => {
    const rfq = await acceptedRfq()
    const untilDue = (Date.parse(rfq.dueAt) - Date.now()) / 1000
    await test.database.setClock({ seconds: Math.floor(untilDue - 20) })
    await submit(rfq.id, quoteInput(rfq)).expect(200)
    await test.database.setClock({ seconds: Math.ceil(untilDue) + 1 })
    const late = await submit(rfq.id, quoteInput(rfq)).expect(409)
    await test.database.setClock({})
    expect(late.body.code).toBe('rfq-closed')
  })

  it('is withdrawn until the due time', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const { submitted } = await buildQuote(test, first, rfq.id)
    const withdraw = () => request(test.app, withdrawQuote, { params: { rfqId: rfq.id, quoteId: submitted[0].id }, as: first.cookie })
    const { body } = await withdraw().expect(200)
    expect(body.submitted[0].state).toBe('withdrawn')
    await withdraw().expect(409)
  })

  it('ends with the enquiry', async () => {
    const rfq = await acceptedRfq()
    await request(test.app, cancelRfq, { params: { rfqId: rfq.id }, body: { reason: 'Stopped.' }, as: world.buyer.cookie }).expect(200)
    expect((await submit(rfq.id, quoteInput(rfq)).expect(409)).body.code).toBe('rfq-cancelled')
  })
})

describe('the draft', () => {
  const save = (rfqId: string, version: number, form: object, as = first) => request(test.app, saveQuoteDraft, { params: { rfqId }, body: { version, form }, as: as.cookie })

  it('keeps what was typed, finished or not, and refuses a change made from an older version', async () => {
    const rfq = await acceptedRfq()
    const { body } = await save(rfq.id, 0, { 'lines.0.price': '1,2' }).expect(200)
    expect(body.draft).toMatchObject({ version: 1, form: { 'lines.0.price': '1,2' } })
    await save(rfq.id, 1, { 'lines.0.price': '1,25' }).expect(200)
    expect((await save(rfq.id, 1, {}).expect(409)).body.code).toBe('stale-version')
  })

  it('is not made stale by a file that a colleague lays beside it', async () => {
    const rfq = await acceptedRfq()
    const upload = () => request(test.app, uploadQuoteFile, { params: { rfqId: rfq.id }, file: { name: 'offer.pdf', content: PDF }, as: first.cookie }).expect(200)
    expect((await upload()).body.draft).toMatchObject({ version: 0, form: {} })
    expect((await save(rfq.id, 0, { remarks: 'typed' }).expect(200)).body.draft).toMatchObject({ version: 1, file: { name: 'offer.pdf' } })
    await upload()
    await save(rfq.id, 1, { remarks: 'typed on' }).expect(200)
  })

  it('takes a quotation file by its content, and refuses one that is something else', async () => {
    const rfq = await acceptedRfq()
    const upload = (name: string, content: Buffer) => request(test.app, uploadQuoteFile, { params: { rfqId: rfq.id }, file: { name, content }, as: first.cookie })
    const { body } = await upload('offer.pdf', PDF).expect(200)
    expect(body.draft.file).toMatchObject({ name: 'offer.pdf', sizeBytes: PDF.length })
    expect((await upload('empty.pdf', Buffer.alloc(0)).expect(400)).body.code).toBe('file-empty')
    expect((await upload('offer.docx', PDF).expect(400)).body.code).toBe('file-name-mismatch')
    expect((await upload('offer.pdf', Buffer.from('<html>')).expect(415)).body.code).toBe('file-type-not-accepted')
    const kept = await request(test.app, getOwnQuote, { params: { rfqId: rfq.id }, as: first.cookie }).expect(200)
    expect(kept.body.draft.file.name).toBe('offer.pdf')
    const removed = await request(test.app, removeQuoteFile, { params: { rfqId: rfq.id }, as: first.cookie }).expect(200)
    expect(removed.body.draft.file).toBeNull()
  })
})

describe('the seal', () => {
  let rfq: Rfq
  let own: { submitted: Quote[] }

  beforeAll(async () => {
    rfq = await buildIssuedRfq(test, world)
    await request(test.app, acceptConfidentiality, { params: { rfqId: rfq.id }, body: { accepted: true }, as: first.cookie }).expect(200)
    await request(test.app, uploadQuoteFile, { params: { rfqId: rfq.id }, file: { name: 'offer.pdf', content: PDF }, as: first.cookie }).expect(200)
    own = await buildQuote(test, first, rfq.id)
  })

  const tables = { quotes, quoteStates, quoteLines, quotePriceBreaks, quoteDrafts }

  it.each(['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin'] as const)('gives the %s no row of any table before the opening, with the policies in code left out', async (role) => {
    for (const table of Object.values(tables)) {
      expect(await asActor(test.ctx, world[role], (tx) => tx.select().from(table))).toEqual([])
    }
  })

  it('gives no row to one who claims every role of the company', async () => {
    const all = { ...world.buyer, roles: ['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin'] as const }
    for (const table of Object.values(tables)) expect(await asActor(test.ctx, all, (tx) => tx.select().from(table))).toEqual([])
  })

  it('holds after the due time until the act of opening', async () => {
    await test.database.setClock({ hours: 2 })
    const rows = await asActor(test.ctx, world.buyer, (tx) => tx.select().from(quotes))
    const { body } = await request(test.app, listQuotes, { params: { rfqId: rfq.id }, as: world.buyer.cookie }).expect(200)
    await test.database.setClock({})
    expect(rows).toEqual([])
    expect(body).toEqual([])
  })

  it('cannot be broken by writing the opening into the enquiry', async () => {
    const forge = (values: object) => asActor(test.ctx, world.buyer, (tx) => tx.update(rfqs).set(values).where(eq(rfqs.id, rfq.id)))
    const past = new Date(Date.now() - 1000)
    for (const values of [{ openedAt: past, openedBy: world.buyer.personId }, { dueAt: past }, { state: 'opened' as const }, { dueAt: past, openedAt: past, openedBy: world.buyer.personId, openingAskedBy: world.approver.personId, openingAskedAt: past }]) {
      await expect(forge(values)).rejects.toMatchObject({ cause: { code: expect.stringMatching(/DS001|23514/) } })
    }
  })

  it('says nothing of the quotation in the trail or in the mails of the buying side', async () => {
    const { body } = await request(test.app, listAudit, { as: world.buyer.cookie }).expect(200)
    expect(body.filter((entry: { event: { type: string } }) => entry.event.type.startsWith('quote-'))).toEqual([])
    const entries = await asActor(test.ctx, world.approver, (tx) => tx.select().from(auditEntries).where(sql`event ->> 'quoteId' = ${own.submitted[0]!.id}`))
    expect(entries).toEqual([])
    const mails = await asWorker(test.ctx, (tx) => tx.select().from(mailEvents).where(eq(mailEvents.toCompanyId, world.buying.id)))
    expect(mails.filter((mail) => JSON.stringify(mail.props).includes(rfq.id))).toEqual([])
  })

  it('hides the quotation file from the buying side', async () => {
    const params = { rfqId: rfq.id, quoteId: own.submitted[0]!.id }
    await request(test.app, quoteFile, { params, as: world.buyer.cookie }).expect(404)
  })

  it('hides everything from the other vendor, by screen and in the database', async () => {
    const other = await request(test.app, getOwnQuote, { params: { rfqId: rfq.id }, as: second.cookie }).expect(200)
    expect(other.body).toEqual({ draft: null, submitted: [] })
    for (const table of Object.values(tables)) expect(await asActor(test.ctx, second, (tx) => tx.select().from(table))).toEqual([])
    const guess = await request(test.app, withdrawQuote, { params: { rfqId: rfq.id, quoteId: own.submitted[0]!.id }, as: second.cookie }).expect(404)
    expect(guess.body.code).toBe('not-found')
    await request(test.app, ownQuoteFile, { params: { rfqId: rfq.id, fileId: own.submitted[0]!.file!.id }, as: second.cookie }).expect(404)
    const seen = await request(test.app, getVendorRfq, { params: { rfqId: rfq.id }, as: second.cookie }).expect(200)
    expect(JSON.stringify(seen.body)).not.toContain(world.vendors[0]!.company.name)
  })

  it('refuses a quotation written in the name of another vendor', async () => {
    const row = await asActor(test.ctx, first, async (tx) => (await tx.select().from(quotes).where(eq(quotes.id, own.submitted[0]!.id)))[0]!)
    const forge = asActor(test.ctx, second, (tx) => tx.insert(quotes).values({ ...row, id: crypto.randomUUID(), revision: 9 }))
    await expect(forge).rejects.toMatchObject({ cause: { code: '42501' } })
  })

  it('keeps a submitted quotation as it is, from its own vendor too', async () => {
    const change = asActor(test.ctx, first, (tx) => tx.update(quotes).set({ currency: 'USD' }).where(eq(quotes.id, own.submitted[0]!.id)))
    await expect(change).rejects.toMatchObject({ cause: { code: '42501' } })
  })

  it('is broken by the opening, for purchasing only', async () => {
    await openAfterDue(test, world, rfq.id)
    const { body } = await request(test.app, listQuotes, { params: { rfqId: rfq.id }, as: world.approver.cookie }).expect(200)
    expect(body.map((quote: Quote) => quote.vendorName)).toEqual([world.vendors[0]!.company.name])
    await request(test.app, quoteFile, { params: { rfqId: rfq.id, quoteId: own.submitted[0]!.id }, as: world.buyer.cookie }).expect(200)
    await request(test.app, listQuotes, { params: { rfqId: rfq.id }, as: world.engineer.cookie }).expect(403)
    expect(await asActor(test.ctx, world.engineer, (tx) => tx.select().from(quotes))).toEqual([])
    const admin = await buildPerson(test, world.buying, ['admin', 'engineer'])
    expect(await asActor(test.ctx, admin, (tx) => tx.select().from(quotePriceBreaks))).toEqual([])
    const trail = await asActor(test.ctx, world.buyer, (tx) => tx.select().from(auditEntries).where(sql`event ->> 'type' = 'quote-submitted' and event ->> 'rfqId' = ${rfq.id}`))
    expect(trail).toHaveLength(1)
  })

  it('does not tell the buying side who has quoted, not by the invitation either', async () => {
    const later = await buildIssuedRfq(test, world)
    for (const vendor of [first, second]) await request(test.app, acceptConfidentiality, { params: { rfqId: later.id }, body: { accepted: true }, as: vendor.cookie }).expect(200)
    const invitations = () => asActor(test.ctx, world.buyer, (tx) => tx.select().from(rfqInvitations).where(eq(rfqInvitations.rfqId, later.id)).orderBy(rfqInvitations.id))
    const shown = async () => (await request(test.app, getRfq, { params: { rfqId: later.id }, as: world.buyer.cookie }).expect(200)).body.invitations
    await request(test.app, getVendorRfq, { params: { rfqId: later.id }, as: first.cookie }).expect(200)
    const before = [await invitations(), await shown()]
    await submit(later.id, quoteInput(later)).expect(200)
    expect([await invitations(), await shown()]).toEqual(before)
    const own = await request(test.app, getVendorRfq, { params: { rfqId: later.id }, as: first.cookie }).expect(200)
    expect(own.body.invitationState).toBe('intends-to-quote')

    await openAfterDue(test, world, later.id)
    expect((await shown()).map(({ vendorCompanyId, state }: { vendorCompanyId: string; state: string }) => [vendorCompanyId, state])).toEqual(
      expect.arrayContaining([[first.companyId, 'intends-to-quote'], [second.companyId, 'terms-accepted']]),
    )
  })
})
