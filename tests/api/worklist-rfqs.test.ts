import { acceptConfidentiality, askOpening, declineRfq, getVendorRfq, openRfq, type Rfq } from '#shared/contracts/rfqs'
import { getOwnQuote, saveQuoteDraft, withdrawQuote } from '#shared/contracts/quotes'
import { listWorklist, type WorklistItem } from '#shared/contracts/worklist'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildIssuedRfq, buildQuote, type World } from '../support/build-rfq'
import { buildWorld, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: World
let vendor: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 2)
  vendor = world.vendors[0]!.person
})
afterAll(() => test.stop())

/** What a person's worklist says about one enquiry. */
async function itemsOf(person: TestPerson, { id }: Pick<Rfq, 'id'>): Promise<Pick<WorklistItem, 'kind' | 'state' | 'title'>[]> {
  const { body } = await request(test.app, listWorklist, { as: person.cookie }).expect(200)
  const items = body.items.filter((item: WorklistItem) => item.link.params.rfqId === id)
  return items.map(({ kind, state, title }: WorklistItem) => ({ kind, state, title }))
}

const accept = (rfq: Rfq) => request(test.app, acceptConfidentiality, { params: { rfqId: rfq.id }, body: { accepted: true }, as: vendor.cookie }).expect(200)

describe('the vendor’s worklist', () => {
  it('says what the next step of an enquiry is', async () => {
    const rfq = await buildIssuedRfq(test, world)
    expect(await itemsOf(vendor, rfq)).toEqual([{ kind: 'enquiry', state: 'open', title: `New enquiry: ${rfq.number}` }])
    await request(test.app, getVendorRfq, { params: { rfqId: rfq.id }, as: vendor.cookie }).expect(200)
    expect(await itemsOf(vendor, rfq)).toMatchObject([{ title: `Accept confidentiality or decline: ${rfq.number}` }])
    await accept(rfq)
    expect(await itemsOf(vendor, rfq)).toMatchObject([{ title: `Quote or decline: ${rfq.number}` }])
  })

  it('names a quotation that was begun and not submitted', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await accept(rfq)
    await request(test.app, saveQuoteDraft, { params: { rfqId: rfq.id }, body: { version: 0, form: { remarks: 'typed' } }, as: vendor.cookie }).expect(200)
    expect(await itemsOf(vendor, rfq)).toMatchObject([{ kind: 'quote-draft', state: 'open' }])
    const params = { rfqId: rfq.id }
    const seen = await request(test.app, getOwnQuote, { params, as: vendor.cookie }).expect(200)
    expect(seen.body.draft.form).toEqual({ remarks: 'typed' })
  })

  it('shows what was submitted as done, and asks again when it was withdrawn', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const { submitted } = await buildQuote(test, vendor, rfq.id)
    expect(await itemsOf(vendor, rfq)).toEqual([{ kind: 'quote-submitted', state: 'done', title: `You quoted ${rfq.number}, revision 1` }])
    expect(await itemsOf(world.vendors[1]!.person, rfq)).toMatchObject([{ kind: 'enquiry', state: 'open' }])
    await request(test.app, withdrawQuote, { params: { rfqId: rfq.id, quoteId: submitted[0].id }, as: vendor.cookie }).expect(200)
    expect(await itemsOf(vendor, rfq)).toEqual([{ kind: 'enquiry', state: 'open', title: `Quote or decline: ${rfq.number}` }])
  })

  it('shows a refusal as done', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await request(test.app, declineRfq, { params: { rfqId: rfq.id }, body: { reason: 'capacity', text: '' }, as: vendor.cookie }).expect(200)
    expect(await itemsOf(vendor, rfq)).toEqual([{ kind: 'enquiry-declined', state: 'done', title: `You declined ${rfq.number}` }])
  })

  it('asks for nothing once the due time has passed', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await test.database.setClock({ hours: 2 })
    const items = await itemsOf(vendor, rfq)
    await test.database.setClock({})
    expect(items).toEqual([])
  })
})

describe('the buying side’s worklist', () => {
  it('tells the two who opened that it is done, and purchasing what comes next', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await buildQuote(test, vendor, rfq.id)
    await test.database.setClock({ hours: 2 })
    const params = { rfqId: rfq.id }
    await request(test.app, askOpening, { params, as: world.buyer.cookie }).expect(200)
    await request(test.app, openRfq, { params, as: world.quality.cookie }).expect(200)
    const [buyer, opener, other] = [await itemsOf(world.buyer, rfq), await itemsOf(world.quality, rfq), await itemsOf(world.engineer, rfq)]
    await test.database.setClock({})
    expect(buyer.map(({ kind, state }) => [kind, state])).toEqual([['rfq-opened', 'done'], ['award-comparison', 'open']])
    expect(opener).toEqual([{ kind: 'rfq-opened', state: 'done', title: `${rfq.number} was opened` }])
    expect(other).toEqual([])
  })
})
