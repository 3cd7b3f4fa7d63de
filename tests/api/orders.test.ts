import { asActor } from '#server/db/as-actor'
import { files, orderAcknowledgements, purchaseOrders } from '#server/db/schema/index'
import { canReadOrder, readableOrders } from '#server/policies/orders'
import { getVendorOrder, getOrder, listOrders, listVendorOrders, orderPdf, placeOrder, vendorOrderPdf, type Order } from '#shared/contracts/orders'
import { getRfq } from '#shared/contracts/rfqs'
import { listWorklist, type WorklistItem } from '#shared/contracts/worklist'
import { eq } from 'drizzle-orm'
import { execFile } from 'node:child_process'
import { createHash } from 'node:crypto'
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { promisify } from 'node:util'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { acknowledge, buildApproved, buildConfirmedSet, buildOpenedRfq, buildOrder, buildProposal, buildSampleRequest, inDays, orderInput, type OpenedRfq } from '../support/build-opened'
import type { World } from '../support/build-rfq'
import { buildCompany, buildPerson, buildWorld, signInAs, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

const run = promisify(execFile)

let test: TestApp
let world: World
let stranger: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 2)
  stranger = await buildPerson(test, await buildCompany(test, 'buying'), ['buyer'])
})
afterAll(() => test.stop())

const place = (awardId: string, body: unknown = orderInput(), as = world.buyer) => request(test.app, placeOrder, { params: { awardId }, body, as: as.cookie })
const vendorOf = (opened: OpenedRfq, quote: number) => world.vendors.find(({ company }) => company.id === opened.quotes[quote]!.vendorCompanyId)!

async function placed(): Promise<{ order: Order; opened: OpenedRfq; winner: TestPerson; loser: TestPerson }> {
  const opened = await buildOpenedRfq(test, world)
  const award = await buildApproved(test, world, opened, 0)
  const { body } = await place(award.id).expect(200)
  return { order: body as Order, opened, winner: vendorOf(opened, 0).person, loser: vendorOf(opened, 1).person }
}

async function pdfText(pdf: Buffer): Promise<{ text: string; check: string; fonts: string }> {
  const folder = await mkdtemp(path.join(tmpdir(), 'dotside-order-'))
  const file = path.join(folder, 'order.pdf')
  try {
    await writeFile(file, pdf)
    const [text, check, fonts] = await Promise.all([run('pdftotext', ['-layout', file, '-']), run('qpdf', ['--check', file]), run('pdffonts', [file])])
    return { text: text.stdout, check: check.stdout, fonts: fonts.stdout }
  } finally {
    await rm(folder, { recursive: true })
  }
}

describe('placing an order', () => {
  it('keeps content and PDF under their hashes, and every figure of the PDF is the record’s', async () => {
    const { order } = await placed()
    expect(order).toMatchObject({ number: expect.stringMatching(/^PO-\d\d-[2-9A-Z]{5}$/), total: { amount: '9950.000000', currency: 'EUR' }, answer: null })
    expect(order.content).toMatchObject({
      lines: [{ quantity: 5000, price: '1.290000', priceUnit: 1, lineTotal: '6450.000000', drawingRevision: 'A', countryOfOrigin: 'DE' }],
      oneTimeCosts: [{ text: 'Former mould and fixtures', amount: '3500.000000' }],
      quotation: { reference: 'Q-100', revision: 1 },
      deliveryRule: 'DAP',
    })
    const { body: pdf } = await request(test.app, orderPdf, { params: { orderId: order.id }, as: world.buyer.cookie }).buffer(true).parse((res, done) => {
      const chunks: Buffer[] = []
      res.on('data', (chunk: Buffer) => chunks.push(chunk))
      res.on('end', () => done(null, Buffer.concat(chunks)))
    }).expect(200)
    expect(createHash('sha256').update(pdf).digest('hex')).toBe(order.pdfSha256)

    const { text, check, fonts } = await pdfText(pdf)
    const { content } = order
    for (const part of [order.number, content.lines[0]!.partNumber, '5000 pcs', '1.29', '6450.00', '3500.00', '9950.00', content.quotation.reference, content.lines[0]!.specificationSha256, content.acknowledgeBy, content.deliveryOn, 'DAP Brightmoor']) {
      expect(text).toContain(part)
    }
    expect(text).toContain(order.sha256)
    expect(check).toMatch(/No syntax or stream encoding errors/)
    for (const line of fonts.trim().split('\n').slice(2)) expect(line).toMatch(/\s(yes)\s+(yes|no)\s+(yes|no)\s/)
  })

  it('ends the enquiry, tells the winner to acknowledge and the other that it was decided, with no price or name', async () => {
    const { order, opened, winner, loser } = await placed()
    const { body } = await request(test.app, getRfq, { params: { rfqId: opened.rfq.id }, as: world.buyer.cookie }).expect(200)
    expect(body.state).toBe('awarded')
    const mails = await test.database.query<{ template: string; to_company_id: string; props: object }>("SELECT template, to_company_id, props FROM mail_events WHERE template IN ('order-placed', 'rfq-decided') ORDER BY created_at DESC LIMIT 2")
    expect(mails.find(({ template }) => template === 'order-placed')).toMatchObject({ to_company_id: winner.companyId, props: { orderId: order.id } })
    const regret = mails.find(({ template }) => template === 'rfq-decided')!
    expect(regret).toMatchObject({ to_company_id: loser.companyId, props: { rfqId: opened.rfq.id } })
    const winnerName = world.vendors.find(({ company }) => company.id === winner.companyId)!.company.name
    expect(JSON.stringify(mails.map(({ props }) => props))).not.toMatch(new RegExp(`9950|1\\.29|${winnerName}`))
  })

  it('needs an approved award, and is done once', async () => {
    const opened = await buildOpenedRfq(test, world)
    const proposed = await buildProposal(test, world, opened)
    expect((await place(proposed.id).expect(409)).body.code).toBe('not-approved')
    const award = await buildApproved(test, world, opened)
    const answers = await Promise.all([place(award.id), place(award.id)])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect((await place(award.id).expect(409)).body.code).toBe('already-ordered')
  })

  it.each([
    ['a delivery in the past', { deliveryOn: '2020-01-01' }, 400, 'deliveryOn'],
    ['an acknowledgement after the delivery', { deliveryOn: inDays(5), acknowledgeBy: inDays(9) }, 400, 'acknowledgeBy'],
    ['no delivery address', { shipTo: ' ' }, 400, 'shipTo'],
    ['an over-delivery of half as much again', { overUnderPercent: 50 }, 400, 'overUnderPercent'],
    ['a glyph that no font has', { legalEntity: 'Brightmoor 港' }, 409, 'buyer.legalEntity'],
  ])('refuses %s before anything is made', async (_, change, status, field) => {
    const award = await buildApproved(test, world, await buildOpenedRfq(test, world))
    const { body } = await place(award.id, orderInput(change)).expect(status)
    expect(Object.keys(body.fields)).toContain(field)
    expect((await place(award.id).expect(200)).body.number).toMatch(/^PO-/)
  })

  it('is refused when the quotation has expired since the approval', async () => {
    const short = await buildOpenedRfq(test, world, [{ validUntil: inDays(2) }, { validUntil: inDays(2) }])
    const award = await buildApproved(test, world, short)
    await test.database.setClock({ days: 4 })
    try {
      const buyer = { ...world.buyer, cookie: await signInAs(test, world.buyer) }
      expect((await place(award.id, orderInput({ deliveryOn: inDays(90), acknowledgeBy: inDays(10) }), buyer).expect(409)).body.code).toBe('offer-expired')
    } finally {
      await test.database.setClock({})
    }
  })

  it('is the buyer’s of this company', async () => {
    const award = await buildApproved(test, world, await buildOpenedRfq(test, world))
    await place(award.id, orderInput(), world.approver).expect(403)
    await place(award.id, orderInput(), stranger).expect(404)
  })
})

describe('acknowledging', () => {
  it('is done once by the vendor, and told to the buyers', async () => {
    const { order, winner } = await placed()
    expect((await acknowledge(test, winner, order.id, { answer: 'accepted-with-changes', text: ' ' }).expect(400)).body.fields).toHaveProperty('text')
    const { body } = await acknowledge(test, winner, order.id, { answer: 'accepted-with-changes', text: 'Delivery two weeks later' }).expect(200)
    expect(body).toMatchObject({ answer: 'accepted-with-changes', acknowledgement: { text: 'Delivery two weeks later', answeredBy: winner.name } })
    expect((await acknowledge(test, winner, order.id, { answer: 'accepted', text: '' }).expect(409)).body.code).toBe('already-acknowledged')
    const [mail] = await test.database.query("SELECT to_company_id, to_roles FROM mail_events WHERE template = 'order-answered' ORDER BY created_at DESC LIMIT 1")
    expect(mail).toEqual({ to_company_id: world.buying.id, to_roles: ['buyer'] })
    expect((await request(test.app, getOrder, { params: { orderId: order.id }, as: world.buyer.cookie }).expect(200)).body.acknowledgement.answer).toBe('accepted-with-changes')
  })

  it('gives one answer when two answer in the same moment', async () => {
    const { order, winner } = await placed()
    const answers = await Promise.all([acknowledge(test, winner, order.id, { answer: 'accepted', text: '' }), acknowledge(test, winner, order.id, { answer: 'refused', text: 'No capacity' })])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
  })
})

describe('who reads it', () => {
  it('shows an order to its vendor and to no other', async () => {
    const { order, winner, loser } = await placed()
    const params = { orderId: order.id }
    const { body } = await request(test.app, getVendorOrder, { params, as: winner.cookie }).expect(200)
    expect(body.content).toEqual(order.content)
    await request(test.app, vendorOrderPdf, { params, as: winner.cookie }).expect(200)
    await request(test.app, getVendorOrder, { params, as: loser.cookie }).expect(404)
    await request(test.app, vendorOrderPdf, { params, as: loser.cookie }).expect(404)
    await acknowledge(test, loser, order.id, { answer: 'accepted', text: '' }).expect(404)
    const others = await request(test.app, listVendorOrders, { as: loser.cookie }).expect(200)
    expect(others.body.map(({ id }: Order) => id)).not.toContain(order.id)
  })

  it('shows it to the company that placed it', async () => {
    const { order } = await placed()
    await request(test.app, getOrder, { params: { orderId: order.id }, as: stranger.cookie }).expect(404)
    const { body } = await request(test.app, listOrders, { as: world.engineer.cookie }).expect(200)
    expect(body.map(({ id }: Order) => id)).toContain(order.id)
  })
})

describe('the worklist', () => {
  const items = async (person: TestPerson) => {
    const { body } = await request(test.app, listWorklist, { as: person.cookie }).expect(200)
    return body.items as WorklistItem[]
  }
  const has = async (person: TestPerson, id: string) => (await items(person)).some((item) => item.id === id && item.state === 'open')

  it('hands the award from buyer to approver to buyer to vendor, and to nobody else', async () => {
    const opened = await buildOpenedRfq(test, world)
    expect(await has(world.buyer, `award-comparison-${opened.rfq.id}`)).toBe(true)
    const proposed = await buildProposal(test, world, opened, 0)
    expect(await has(world.buyer, `award-comparison-${opened.rfq.id}`)).toBe(false)
    expect(await has(world.approver, `award-approval-${proposed.id}`)).toBe(true)
    expect(await has(world.engineer, `award-approval-${proposed.id}`)).toBe(false)

    const award = await buildApproved(test, world, opened, 0)
    expect(await has(world.approver, `award-approval-${award.id}`)).toBe(false)
    expect(await has(world.buyer, `award-order-${award.id}`)).toBe(true)

    const { body } = await place(award.id).expect(200)
    const [winner, loser] = [vendorOf(opened, 0).person, vendorOf(opened, 1).person]
    expect(await has(winner, `order-acknowledgement-${body.id}`)).toBe(true)
    expect(await has(loser, `order-acknowledgement-${body.id}`)).toBe(false)
    await acknowledge(test, winner, body.id, { answer: 'accepted', text: '' }).expect(200)
    expect(await has(winner, `order-acknowledgement-${body.id}`)).toBe(false)
    expect((await items(world.buyer)).find(({ id }) => id === `order-answer-${body.id}`)).toMatchObject({ state: 'done', detail: 'Accepted' })
  })

  it('asks the vendor for the report and quality for the disposition', async () => {
    const { rfq } = await buildOpenedRfq(test, world)
    const asked = await buildSampleRequest(test, world, rfq)
    const vendor = world.vendors[0]!.person
    expect(await has(vendor, `sample-report-${asked.id}`)).toBe(true)
    expect(await has(world.vendors[1]!.person, `sample-report-${asked.id}`)).toBe(false)
    await buildConfirmedSet(test, vendor, asked.id)
    expect(await has(vendor, `sample-report-${asked.id}`)).toBe(false)
    expect(await has(world.quality, `sample-disposition-${asked.id}`)).toBe(true)
    expect(await has(world.buyer, `sample-disposition-${asked.id}`)).toBe(false)
  })
})

describe('straight at the database', () => {
  it.each([
    ['the content of an order', `UPDATE purchase_orders SET content = '\\x00'`],
    ['an order away', 'DELETE FROM purchase_orders'],
    ['an answer', "UPDATE order_acknowledgements SET answer = 'accepted'"],
  ])('changes not even for the owner: %s', async (_, attack) => {
    const { order, winner } = await placed()
    await acknowledge(test, winner, order.id, { answer: 'refused', text: 'No capacity' }).expect(200)
    await expect(test.database.query(attack)).rejects.toMatchObject({ code: 'DS001' })
  })

  it('shows the other vendor no order, no answer and no PDF, and lets it answer none', async () => {
    const { order, loser } = await placed()
    const [{ pdf_file_id: pdfFileId }] = (await test.database.query<{ pdf_file_id: string }>('SELECT pdf_file_id FROM purchase_orders WHERE id = $1', [order.id])) as [{ pdf_file_id: string }]
    await asActor(test.ctx, loser, async (tx) => {
      expect(await tx.select().from(purchaseOrders).where(eq(purchaseOrders.id, order.id))).toEqual([])
      expect(await tx.select().from(orderAcknowledgements).where(eq(orderAcknowledgements.orderId, order.id))).toEqual([])
      expect(await tx.select().from(files).where(eq(files.id, pdfFileId))).toEqual([])
    })
    const forged = { orderId: order.id, companyId: world.buying.id, vendorCompanyId: loser.companyId, answeredBy: loser.personId, answer: 'accepted' as const, answeredAt: new Date() }
    await expect(asActor(test.ctx, loser, (tx) => tx.insert(orderAcknowledgements).values(forged))).rejects.toMatchObject({ cause: { code: expect.stringMatching(/42501|23503/) } })
  })

  it('says the same as the policy in code', async () => {
    await buildOrder(test, world)
    const all = await test.database.query<{ id: string; company_id: string; vendor_company_id: string }>('SELECT id, company_id, vendor_company_id FROM purchase_orders')
    for (const who of [world.buyer, world.approver, world.engineer, world.admin, stranger, ...world.vendors.map(({ person }) => person)]) {
      const [byRule, bySql] = await asActor(test.ctx, who, async (tx) => [
        await tx.select({ id: purchaseOrders.id }).from(purchaseOrders),
        await tx.select({ id: purchaseOrders.id }).from(purchaseOrders).where(readableOrders(who)),
      ])
      const wanted = all.filter((row) => canReadOrder(who, { companyId: row.company_id, vendorCompanyId: row.vendor_company_id })).map(({ id }) => id).sort()
      expect(byRule.map(({ id }) => id).sort(), who.roles[0]).toEqual(wanted)
      expect(bySql.map(({ id }) => id).sort(), who.roles[0]).toEqual(wanted)
    }
  })
})
