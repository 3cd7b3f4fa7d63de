import { asActor, type Transaction } from '#server/db/as-actor'
import { auditEntries, awardLines, awards, quoteLines, quotePriceBreaks, quotes, rfqInvitations, rfqIssues, rfqs } from '#server/db/schema/index'
import { approveAward } from '#shared/contracts/awards'
import { placeOrder } from '#shared/contracts/orders'
import { cancelRfq, type Rfq } from '#shared/contracts/rfqs'
import { eq } from 'drizzle-orm'
import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildApproved, buildOpenedRfq, buildProposal, orderInput } from '../support/build-opened'
import { buildIssuedRfq, buildQuote, type World } from '../support/build-rfq'
import { buildWorld, linkVendor, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: World
let vendor: TestPerson
let issued: Rfq

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 2)
  vendor = world.vendors[0]!.person
  issued = await buildIssuedRfq(test, world)
  await buildQuote(test, vendor, issued.id)
})
afterAll(() => test.stop())

const refused = (who: TestPerson, attack: (tx: Transaction) => Promise<unknown>) =>
  expect(asActor(test.ctx, who, attack)).rejects.toMatchObject({ cause: { code: expect.stringMatching(/DS001|42501/) } })

const ownQuote = (who: TestPerson) => asActor(test.ctx, who, async (tx) => (await tx.select().from(quotes).where(eq(quotes.rfqId, issued.id)))[0]!)

describe('an enquiry, straight at the database', () => {
  it.each(['closed', 'awarded', 'preparing'] as const)('is not made %s before its time', (state) => refused(world.buyer, (tx) => tx.update(rfqs).set({ state }).where(eq(rfqs.id, issued.id))))

  it('stays opened, and is not awarded without an order', async () => {
    const { rfq } = await buildOpenedRfq(test, world)
    for (const state of ['issued', 'closed', 'awarded'] as const) await refused(world.buyer, (tx) => tx.update(rfqs).set({ state }).where(eq(rfqs.id, rfq.id)))
  })

  it('stays cancelled', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await request(test.app, cancelRfq, { params: { rfqId: rfq.id }, body: { reason: 'No longer needed' }, as: world.buyer.cookie }).expect(200)
    await refused(world.buyer, (tx) => tx.update(rfqs).set({ state: 'issued' }).where(eq(rfqs.id, rfq.id)))
  })

  it('lets nobody in after it was issued', async () => {
    const late = (await buildWorld(test, 1)).vendors[0]!
    await linkVendor(test, world.buying, late.company, { accepted: true })
    const invitation = { rfqId: issued.id, companyId: world.buying.id, vendorCompanyId: late.company.id }
    await refused(world.buyer, (tx) => tx.insert(rfqInvitations).values(invitation))
    await refused(world.buyer, (tx) => tx.insert(rfqInvitations).values({ ...invitation, issuedAt: new Date() }))
  })

  it('has no issue beside the ones it counts', () =>
    refused(world.buyer, (tx) => tx.insert(rfqIssues).values({ rfqId: issued.id, companyId: world.buying.id, issuedBy: world.buyer.personId, number: 2, content: Buffer.from('x'), sha256: 'x', issuedAt: new Date() })))
})

describe('a quotation, straight at the database', () => {
  it('gets no line and no price after it was submitted', async () => {
    const quote = await ownQuote(vendor)
    const [line] = await asActor(test.ctx, vendor, (tx) => tx.select().from(quoteLines).where(eq(quoteLines.quoteId, quote.id)))
    const { rfqId, companyId, vendorCompanyId } = quote
    await refused(vendor, (tx) => tx.insert(quotePriceBreaks).values({ quoteLineId: line!.id, rfqId, companyId, vendorCompanyId, fromQuantity: 7, price: '0.01' }))
    await refused(vendor, (tx) => tx.insert(quoteLines).values({ ...line!, id: randomUUID() }))
  })

  it('is not dated back, and answers an issue of its own enquiry', async () => {
    const quote = await ownQuote(vendor)
    const other = await buildIssuedRfq(test, world)
    await buildQuote(test, vendor, other.id)
    const [issue] = await asActor(test.ctx, vendor, (tx) => tx.select().from(rfqIssues).where(eq(rfqIssues.rfqId, other.id)))
    const next = { ...quote, id: randomUUID(), revision: 2, submittedAt: new Date() }
    await refused(vendor, (tx) => tx.insert(quotes).values({ ...next, submittedAt: new Date(Date.now() - 3_600_000) }))
    await refused(vendor, (tx) => tx.insert(quotes).values({ ...next, issueId: issue!.id }))
  })
})

describe('an award', () => {
  it('gets no part after it was proposed', async () => {
    const opened = await buildOpenedRfq(test, world)
    const { id } = await buildProposal(test, world, opened)
    const [line] = await asActor(test.ctx, world.buyer, (tx) => tx.select().from(awardLines).where(eq(awardLines.awardId, id)))
    await refused(world.buyer, (tx) => tx.insert(awardLines).values({ ...line!, id: randomUUID() }))
  })

  it('of a cancelled enquiry is neither approved nor ordered', async () => {
    const cancelled = async (rfqId: string) => request(test.app, cancelRfq, { params: { rfqId }, body: { reason: 'The product was stopped' }, as: world.buyer.cookie }).expect(200)
    const first = await buildOpenedRfq(test, world)
    const proposal = await buildProposal(test, world, first)
    await cancelled(first.rfq.id)
    const approval = await request(test.app, approveAward, { params: { awardId: proposal.id }, body: { comparisonSha256: proposal.comparisonSha256, remark: '' }, as: world.approver.cookie }).expect(409)
    expect(approval.body.code).toBe('rfq-cancelled')
    await refused(world.approver, (tx) => tx.update(awards).set({ state: 'approved', decidedBy: world.approver.personId, decidedAt: new Date() }).where(eq(awards.id, proposal.id)))

    const second = await buildOpenedRfq(test, world)
    const approved = await buildApproved(test, world, second)
    await cancelled(second.rfq.id)
    const order = await request(test.app, placeOrder, { params: { awardId: approved.id }, body: orderInput(), as: world.buyer.cookie }).expect(409)
    expect(order.body.code).toBe('rfq-cancelled')
  })
})

describe('the audit trail', () => {
  it('takes no entry that is dated back', () =>
    refused(world.buyer, (tx) =>
      tx.insert(auditEntries).values({
        ...{ companyId: world.buying.id, actorCompanyId: world.buying.id, actorPersonId: world.buyer.personId, area: 'purchasing' },
        at: new Date(Date.now() - 86_400_000),
        event: { type: 'rfq-created', rfqId: issued.id },
      }),
    ))
})
