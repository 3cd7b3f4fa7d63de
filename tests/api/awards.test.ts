import { asActor } from '#server/db/as-actor'
import { awardLines, awards, comparisons } from '#server/db/schema/index'
import { canReadAward, readableAwards } from '#server/policies/awards'
import { approveAward, compareOffers, getAward, listAwards, proposeAward, rejectAward, type Award, type Comparison, type ComparisonBasis } from '#shared/contracts/awards'
import { Decimal } from '#shared/money'
import { eq } from 'drizzle-orm'
import { createHash, randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildApproved, buildOpenedRfq, buildProposal, comparisonBasis, inDays, proposal, type OpenedRfq } from '../support/build-opened'
import { buildIssuedRfq, type World } from '../support/build-rfq'
import { buildCompany, buildPerson, buildWorld, signInAs, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: World
let opened: OpenedRfq
let second: TestPerson
let stranger: TestPerson

/** Dollars per hundred against euro each: prices that rank the other way round once they are landed. */
const QUOTES = [
  { currency: 'USD', deliveryRule: 'FCA' as const, paymentDays: 60 },
  { currency: 'EUR', deliveryRule: 'DDP' as const, paymentDays: 30 },
]

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 2)
  second = await buildPerson(test, world.buying, ['approver', 'buyer'])
  stranger = await buildPerson(test, await buildCompany(test, 'buying'), ['buyer', 'approver'])
  opened = await buildOpenedRfq(test, world, QUOTES)
})
afterAll(() => test.stop())

const compare = (basis: ComparisonBasis, as = world.buyer, rfqId = opened.rfq.id) => request(test.app, compareOffers, { params: { rfqId }, body: { basis }, as: as.cookie })
const propose = (body: unknown, as = world.buyer, rfqId = opened.rfq.id) => request(test.app, proposeAward, { params: { rfqId }, body, as: as.cookie })
const approve = (award: Award, as = world.approver, comparisonSha256 = award.comparisonSha256) =>
  request(test.app, approveAward, { params: { awardId: award.id }, body: { comparisonSha256, remark: '' }, as: as.cookie })
const quoteOf = (vendor: number) => opened.quotes.find(({ vendorCompanyId }) => vendorCompanyId === world.vendors[vendor]!.company.id)!

describe('comparing opened quotations', () => {
  it('shows each at every asked quantity and ranks by landed cost, in one currency with a stated rate', async () => {
    const { body } = await compare(comparisonBasis(opened)).expect(200)
    const comparison = body as Comparison
    expect(comparison.offers).toHaveLength(2)
    expect(comparison.basis.exchange).toMatchObject({ base: 'EUR', date: '2026-03-27', rates: { USD: '0.92' } })
    const [line] = comparison.lines
    const dollars = line!.offers.find(({ quoteId }) => quoteId === quoteOf(0).id)!
    expect(dollars.prices).toEqual([{ quantity: 1000, unitPrice: '1.41' }, { quantity: 5000, unitPrice: '1.29' }, { quantity: 10_000, unitPrice: '1.21' }])
    expect(dollars).toMatchObject({ breakUsed: 5000, oneTimeCost: { kind: 'quoted', amount: '3500.000000' }, leadTimeDays: 42 })
    // 1.29 · 0.92 each; 900 · 0.92 / 5000 freight; 3500 · 0.92 / (20000 · 2) one-time.
    expect(dollars.landed!.lines.slice(0, 2).map(({ amount }) => amount)).toEqual(['1.1868', '0.1656'])
    expect(dollars.landed!.lines.find(({ name }) => name === 'one-time')!.amount).toBe('0.0805')
    expect(new Set(line!.offers.map(({ rank }) => rank))).toEqual(new Set([1, 2]))
  })

  it('leaves out of the ranking what is missing, and never counts it as nothing', async () => {
    const basis = comparisonBasis(opened)
    basis.offers = basis.offers.map((offer) => (offer.quoteId === quoteOf(0).id ? { ...offer, freightPerShipment: null } : offer))
    const { body } = await compare(basis).expect(200)
    const offer = body.lines[0].offers.find(({ quoteId }: { quoteId: string }) => quoteId === quoteOf(0).id)
    expect(offer).toMatchObject({ rank: null, flags: ['incomplete'], landed: { landed: null, missing: ['freight per shipment'] } })
  })

  it('takes another order quantity with the break in force there', async () => {
    const { body } = await compare(comparisonBasis(opened, { lines: [{ lineId: opened.rfq.lines[0]!.id, orderQuantity: 4999, annualQuantity: 4999 }] })).expect(200)
    expect(body.lines[0].offers.map(({ breakUsed }: { breakUsed: number }) => breakUsed)).toEqual([1000, 1000])
  })

  it.each([
    ['a rate of nothing', { rates: { USD: '0' } }, 'basis.exchange.rates.USD'],
    ['a rate with a comma', { rates: { USD: '0,92' } }, 'basis.exchange.rates.USD'],
    ['rates without a source', { source: ' ' }, 'basis.exchange.source'],
    ['rates without a date', { date: 'yesterday' }, 'basis.exchange.date'],
    ['a currency that does not exist', { base: 'XXQ' }, 'basis.exchange.base'],
  ])('refuses %s and says where', async (_, change, field) => {
    const basis = comparisonBasis(opened)
    const { body } = await compare({ ...basis, exchange: { ...basis.exchange, ...change } } as ComparisonBasis).expect(400)
    expect(Object.keys(body.fields)).toContain(field)
  })

  it('refuses a quotation of elsewhere like one that does not exist', async () => {
    const basis = comparisonBasis(opened)
    const { body } = await compare({ ...basis, offers: [{ ...basis.offers[0]!, quoteId: randomUUID() }] }).expect(400)
    expect(body.fields).toHaveProperty(['basis.offers.0.quoteId'])
  })

  it('waits for the opening, and is purchasing’s', async () => {
    const sealed = await buildIssuedRfq(test, world)
    expect((await compare(comparisonBasis({ quotes: [] }), world.buyer, sealed.id).expect(409)).body.code).toBe('rfq-not-opened')
    await compare(comparisonBasis(opened), world.engineer).expect(403)
    await compare(comparisonBasis(opened), stranger).expect(404)
  })
})

describe('proposing', () => {
  it('freezes the comparison under its hash, with one-time cost in the total, and tells the approvers without a price', async () => {
    const award = await buildProposal(test, world, opened, opened.quotes.indexOf(quoteOf(0)))
    // (1.29 · 5000 + 3500) USD at 0.92.
    expect(award).toMatchObject({ state: 'proposed', total: { amount: '9154.000000', currency: 'EUR' }, quoteRevision: 1, lines: [{ orderQuantity: 5000 }] })
    const [row] = await test.database.query<{ content: Buffer; sha256: string }>('SELECT content, sha256 FROM comparisons WHERE sha256 = $1', [award.comparisonSha256])
    expect(createHash('sha256').update(row!.content).digest('hex')).toBe(award.comparisonSha256)
    const [mail] = await test.database.query<{ props: object; to_roles: string[] }>("SELECT props, to_roles FROM mail_events WHERE template = 'award-proposed' ORDER BY created_at DESC LIMIT 1")
    expect(mail).toMatchObject({ to_roles: ['approver'], props: { awardId: award.id } })
    expect(JSON.stringify(mail!.props)).not.toMatch(/9154|1\.29/)
  })

  it('adds up again from the stored bytes alone', async () => {
    const award = await buildProposal(test, world, opened)
    const [row] = await test.database.query<{ content: Buffer }>('SELECT content FROM comparisons WHERE sha256 = $1', [award.comparisonSha256])
    const stored = JSON.parse(row!.content.toString('utf8')) as Comparison
    for (const { landed } of stored.lines[0]!.offers) {
      expect(landed!.lines.reduce((sum, { amount }) => sum.plus(amount!), new Decimal(0)).toString()).toBe(landed!.landed)
    }
  })

  it('makes earlier proposals and approvals void', async () => {
    const first = await buildApproved(test, world, opened)
    await buildProposal(test, world, opened)
    const { body } = await request(test.app, getAward, { params: { awardId: first.id }, as: world.approver.cookie }).expect(200)
    expect(body.state).toBe('void')
    expect((await approve(first).expect(409)).body.code).toBe('comparison-changed')
  })

  it.each([
    ['no part', { lineIds: [] }, 400, 'invalid-input'],
    ['no reason', { reason: ' ' }, 400, 'invalid-input'],
    ['a part of elsewhere', { lineIds: [randomUUID()] }, 400, 'invalid-input'],
    ['a quotation of elsewhere', { quoteId: randomUUID() }, 404, 'not-found'],
  ])('refuses %s', async (_, change, status, code) => {
    const { body } = await propose({ ...proposal(opened), ...change }).expect(status)
    expect(body.code).toBe(code)
  })

  it('refuses a quotation whose currency has no rate', async () => {
    const body = { ...proposal(opened, opened.quotes.indexOf(quoteOf(0))) }
    body.basis = { ...body.basis, exchange: { ...body.basis.exchange, rates: {} }, offers: [] }
    expect((await propose(body).expect(400)).body.code).toBe('rate-missing')
  })

  it('refuses an order below the first break and below the minimum', async () => {
    const lines = [{ lineId: opened.rfq.lines[0]!.id, orderQuantity: 500, annualQuantity: 500 }]
    expect((await propose({ ...proposal(opened), basis: comparisonBasis(opened, { lines }) }).expect(409)).body.code).toBe('price-missing')
  })

  it('refuses an expired quotation', async () => {
    const short = await buildOpenedRfq(test, world, [{ validUntil: inDays(2) }, {}])
    const expiring = short.quotes.findIndex(({ validUntil }) => validUntil === inDays(2))
    await test.database.setClock({ days: 4 })
    try {
      const buyer = { ...world.buyer, cookie: await signInAs(test, world.buyer) }
      expect((await propose(proposal(short, expiring), buyer, short.rfq.id).expect(409)).body.code).toBe('offer-expired')
    } finally {
      await test.database.setClock({})
    }
  })

  it('is the buyer’s of this company', async () => {
    await propose(proposal(opened), world.approver).expect(403)
    await propose(proposal(opened), stranger).expect(404)
  })
})

describe('approving', () => {
  it('is done within the limit by another person than proposed, on the comparison that was looked at', async () => {
    const award = await buildProposal(test, world, opened)
    expect((await approve(award, world.approver, 'a'.repeat(64)).expect(409)).body.code).toBe('comparison-changed')
    const { body } = await approve(award).expect(200)
    expect(body).toMatchObject({ state: 'approved', decidedBy: world.approver.name, approval: { refusal: 'not-proposed' } })
    expect((await approve(award, second).expect(409)).body).toMatchObject({ code: 'already-decided', message: expect.stringContaining(world.approver.name) })
  })

  it('is refused to the proposer, whatever roles they hold', async () => {
    const { body } = await propose(proposal(opened), second).expect(200)
    expect(body.approval).toEqual({ refusal: 'own-proposal' })
    expect((await approve(body, second).expect(403)).body.code).toBe('second-person-needed')
    expect((await request(test.app, rejectAward, { params: { awardId: body.id }, body: { reason: 'x' }, as: second.cookie }).expect(403)).body.code).toBe('second-person-needed')
  })

  it.each([
    { limit: '9154', currency: 'EUR', status: 200, code: undefined },
    { limit: '9153.999999', currency: 'EUR', status: 403, code: 'over-limit' },
    // 9950 USD are 9154 EUR at 0.92.
    { limit: '9950', currency: 'USD', status: 200, code: undefined },
    { limit: '9949.99', currency: 'USD', status: 403, code: 'over-limit' },
    { limit: '99999999', currency: 'JPY', status: 403, code: 'limit-currency' },
  ])('with a limit of $limit $currency answers $status', async ({ limit, currency, status, code }) => {
    const approver = await buildPerson(test, world.buying, ['approver'], { approvalLimit: limit, approvalCurrency: currency })
    const award = await buildProposal(test, world, opened, opened.quotes.indexOf(quoteOf(0)))
    const { body } = await approve(award, approver).expect(status)
    expect(body.code).toBe(code)
  })

  it('gives one result and one clear refusal when two approve in the same moment', async () => {
    const other = await buildPerson(test, world.buying, ['approver'])
    const award = await buildProposal(test, world, opened)
    const answers = await Promise.all([approve(award), approve(award, other)])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(answers.find(({ status }) => status === 409)!.body.code).toBe('already-decided')
  })

  it('is refused when the quotation has expired meanwhile', async () => {
    const short = await buildOpenedRfq(test, world, [{ validUntil: inDays(2) }, {}])
    const award = await buildProposal(test, world, short, short.quotes.findIndex(({ validUntil }) => validUntil === inDays(2)))
    await test.database.setClock({ days: 4 })
    try {
      const cookie = await signInAs(test, world.approver)
      const { body } = await request(test.app, approveAward, { params: { awardId: award.id }, body: { comparisonSha256: award.comparisonSha256, remark: '' }, as: cookie }).expect(409)
      expect(body.code).toBe('offer-expired')
    } finally {
      await test.database.setClock({})
    }
  })

  it('can be answered with a rejection that says why, told to the proposer', async () => {
    const award = await buildProposal(test, world, opened)
    const { body } = await request(test.app, rejectAward, { params: { awardId: award.id }, body: { reason: 'Ask for samples first' }, as: world.approver.cookie }).expect(200)
    expect(body).toMatchObject({ state: 'rejected', decisionReason: 'Ask for samples first' })
    const [mail] = await test.database.query("SELECT to_person_id, props FROM mail_events WHERE template = 'award-decided' ORDER BY created_at DESC LIMIT 1")
    expect(mail).toMatchObject({ to_person_id: world.buyer.personId, props: { approved: false } })
  })
})

describe('who reads it', () => {
  it('shows engineering nothing before it is decided', async () => {
    const award = await buildProposal(test, world, opened)
    const read = (as: TestPerson) => request(test.app, getAward, { params: { awardId: award.id }, as: as.cookie })
    await read(world.engineer).expect(404)
    await read(stranger).expect(404)
    await approve(award).expect(200)
    await read(world.engineer).expect(200)
    const { body } = await request(test.app, listAwards, { query: { rfqId: opened.rfq.id }, as: world.quality.cookie }).expect(200)
    expect(body.map(({ state }: Award) => state)).toEqual(['approved'])
  })
})

describe('straight at the database', () => {
  const setState = (who: TestPerson, awardId: string, state: 'approved' | 'ordered' | 'proposed') =>
    asActor(test.ctx, who, (tx) => tx.update(awards).set({ state, decidedBy: who.personId, decidedAt: new Date() }).where(eq(awards.id, awardId)).returning({ id: awards.id }))

  it('approves for nobody over the limit, and for no proposer', async () => {
    const award = await buildProposal(test, world, opened)
    const small = await buildPerson(test, world.buying, ['approver'], { approvalLimit: '10', approvalCurrency: 'EUR' })
    await expect(setState(small, award.id, 'approved')).rejects.toMatchObject({ cause: { code: 'DS001' } })
    await expect(setState(world.buyer, award.id, 'approved')).rejects.toMatchObject({ cause: { code: 'DS001' } })
    const { body } = await propose(proposal(opened), second).expect(200)
    await expect(setState(second, body.id, 'approved')).rejects.toMatchObject({ cause: { code: expect.stringMatching(/DS001|23514/) } })
  })

  it('orders nothing without its purchase order, and turns nothing back', async () => {
    const award = await buildApproved(test, world, opened)
    await expect(asActor(test.ctx, world.buyer, (tx) => tx.update(awards).set({ state: 'ordered' }).where(eq(awards.id, award.id)))).rejects.toMatchObject({ cause: { code: 'DS001' } })
    await expect(setState(world.approver, award.id, 'proposed')).rejects.toMatchObject({ cause: { code: 'DS001' } })
  })

  it.each([
    ['a vendor', () => world.vendors[0]!.person],
    ['an administrator', () => world.admin],
    ['another company', () => stranger],
  ])('shows %s no award, line or comparison', async (_, who) => {
    await buildApproved(test, world, opened)
    await asActor(test.ctx, who(), async (tx) => {
      expect(await tx.select().from(awards)).toEqual([])
      expect(await tx.select().from(awardLines)).toEqual([])
      expect(await tx.select().from(comparisons)).toEqual([])
    })
  })

  it.each([
    ['a comparison', `UPDATE comparisons SET content = '\\x00'`],
    ['the total of an award', 'UPDATE awards SET total = 1'],
    ['an award away', 'DELETE FROM awards'],
    ['an awarded line', 'UPDATE award_lines SET order_quantity = 1'],
  ])('changes not even for the owner: %s', async (_, attack) => {
    await buildProposal(test, world, opened)
    await expect(test.database.query(attack)).rejects.toMatchObject({ code: 'DS001' })
  })

  it('says the same as the policy in code', async () => {
    await buildProposal(test, world, opened)
    const all = await test.database.query<{ id: string; company_id: string; state: string }>('SELECT id, company_id, state FROM awards')
    for (const who of [world.buyer, world.approver, world.engineer, world.quality, world.checker, world.admin, stranger, world.vendors[0]!.person]) {
      const [byRule, bySql] = await asActor(test.ctx, who, async (tx) => [await tx.select({ id: awards.id }).from(awards), await tx.select({ id: awards.id }).from(awards).where(readableAwards(who))])
      const wanted = all.filter((row) => canReadAward(who, { companyId: row.company_id, state: row.state })).map(({ id }) => id).sort()
      expect(byRule.map(({ id }) => id).sort(), who.roles[0]).toEqual(wanted)
      expect(bySql.map(({ id }) => id).sort(), who.roles[0]).toEqual(wanted)
    }
  })
})
