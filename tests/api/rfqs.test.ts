import { closeDueRfqs } from '#server/services/rfqs/close-due'
import { remindVendors } from '#server/services/rfqs/remind-vendors'
import { listWorklist } from '#shared/contracts/worklist'
import { asActor, asWorker } from '#server/db/as-actor'
import { mailEvents, rfqInvitations, rfqIssues, rfqs } from '#server/db/schema/index'
import { acceptConfidentiality, askOpening, cancelRfq, createRfq, declineRfq, extendRfq, getRfq, getVendorRfq, issueRfq, listVendorRfqs, openRfq, updateRfq } from '#shared/contracts/rfqs'
import { eq, sql } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildIssuedRfq, rfqInput, type World } from '../support/build-rfq'
import { buildRelease, type TestRelease } from '../support/build-release'
import { buildCompany, buildPerson, buildWorld, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: World
let release: TestRelease
let stranger: TestPerson

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 2)
  release = await buildRelease(test, world.engineer, world.checker)
  stranger = await buildPerson(test, await buildCompany(test, 'buying'), ['buyer'])
})
afterAll(() => test.stop())

const vendorIds = () => world.vendors.map(({ company }) => company.id)
const create = (body: unknown, as = world.buyer) => request(test.app, createRfq, { body, as: as.cookie })

describe('preparing an enquiry', () => {
  it('keeps what the buyer entered', async () => {
    const { body } = await create(rfqInput(release, vendorIds())).expect(200)
    expect(body).toMatchObject({ state: 'preparing', issueNumber: 0, currency: 'EUR', lines: [{ quantities: [1000, 5000, 10_000], orderQuantity: 5000 }] })
    expect(body.lines[0].release).toMatchObject({ partNumber: release.partNumber, revision: 'A', specificationSha256: release.specificationSha256 })
    expect(body.invitations).toHaveLength(2)
  })

  it.each([
    ['a due time in the past', { dueAt: '2020-01-01T12:00:00+01:00' }, 'dueAt'],
    ['a due time without a zone', { dueAt: '2030-01-01T12:00:00' }, 'dueAt'],
    ['a zone that does not exist', { dueZone: 'Europe/Atlantis' }, 'dueZone'],
    ['a currency that does not exist', { currency: 'XXQ' }, 'currency'],
    ['no part', { lines: [] }, 'lines'],
  ])('refuses %s and says where', async (_, change, field) => {
    const { body } = await create({ ...rfqInput(release, vendorIds()), ...change }).expect(400)
    expect(body.code).toBe('invalid-input')
    expect(Object.keys(body.fields)).toContain(field)
  })

  it('refuses price breaks out of order', async () => {
    const input = rfqInput(release, vendorIds())
    const { body } = await create({ ...input, lines: [{ ...input.lines[0]!, quantities: [5000, 1000] }] }).expect(400)
    expect(body.fields['lines.0.quantities']).toMatch(/rise/)
  })

  it('refuses an order quantity below the smallest break', async () => {
    const input = rfqInput(release, vendorIds())
    const { body } = await create({ ...input, lines: [{ ...input.lines[0]!, orderQuantity: 500 }] }).expect(400)
    expect(body.fields['lines.0.orderQuantity']).toMatch(/1000/)
  })

  it("refuses another company's release and a vendor that is not known like absent ones", async () => {
    const { body } = await create(rfqInput(release, vendorIds()), stranger).expect(400)
    expect(body.fields['lines.0.releaseId']).toBe('There is no such released revision.')
    expect(body.fields['vendorCompanyIds.0']).toBe('There is no such vendor.')
  })

  it('refuses a change made from an older version', async () => {
    const { body } = await create(rfqInput(release, vendorIds())).expect(200)
    const change = (version: number) => request(test.app, updateRfq, { params: { rfqId: body.id }, body: { ...rfqInput(release, []), version }, as: world.buyer.cookie })
    await change(body.version).expect(200)
    const late = await change(body.version).expect(409)
    expect(late.body.code).toBe('stale-version')
  })

  it('is hidden from vendors, who learn nothing of it until it is issued', async () => {
    const { body } = await create(rfqInput(release, vendorIds())).expect(200)
    const vendor = world.vendors[0]!.person
    await request(test.app, getVendorRfq, { params: { rfqId: body.id }, as: vendor.cookie }).expect(404)
    const seen = await asActor(test.ctx, vendor, (tx) => tx.select().from(rfqInvitations).where(eq(rfqInvitations.rfqId, body.id)))
    expect(seen).toEqual([])
  })
})

describe('issuing', () => {
  it('refuses an enquiry without vendors', async () => {
    const { body } = await create(rfqInput(release, [])).expect(200)
    const refused = await request(test.app, issueRfq, { params: { rfqId: body.id }, body: { version: body.version }, as: world.buyer.cookie }).expect(400)
    expect(refused.body.fields).toHaveProperty('vendorCompanyIds')
  })

  it('seals the content with the hashes of its drawings and queues one mail per vendor', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const [issue] = await asActor(test.ctx, world.buyer, (tx) => tx.select().from(rfqIssues).where(eq(rfqIssues.rfqId, rfq.id)))
    const content = JSON.parse(issue!.content.toString('utf8'))
    expect(content.lines[0].specificationSha256).toBe(rfq.lines[0]!.release.specificationSha256)
    expect(issue!.sha256).toBe(rfq.issueSha256)

    const mails = await asWorker(test.ctx, (tx) => tx.select().from(mailEvents).where(sql`props ->> 'rfqId' = ${rfq.id}`))
    expect(mails.map((mail) => mail.toCompanyId).sort()).toEqual(vendorIds().sort())
    expect(mails.every((mail) => mail.template === 'rfq-invitation')).toBe(true)
  })

  it('cannot be changed afterwards, by the application or by its database role', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const refused = await request(test.app, updateRfq, { params: { rfqId: rfq.id }, body: { ...rfqInput(release, []), version: rfq.version }, as: world.buyer.cookie }).expect(409)
    expect(refused.body.code).toBe('rfq-issued')
    const change = asActor(test.ctx, world.buyer, (tx) => tx.update(rfqs).set({ currency: 'USD' }).where(eq(rfqs.id, rfq.id)))
    await expect(change).rejects.toMatchObject({ cause: { code: 'DS001' } })
  })
})

describe('the vendor’s side', () => {
  it('shows the enquiry, and its contents only after confidentiality is accepted', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const vendor = world.vendors[0]!.person
    const before = await request(test.app, getVendorRfq, { params: { rfqId: rfq.id }, as: vendor.cookie }).expect(200)
    expect(before.body).toMatchObject({ state: 'open', invitationState: 'seen', lines: [], terms: null })
    const after = await request(test.app, acceptConfidentiality, { params: { rfqId: rfq.id }, body: { accepted: true }, as: vendor.cookie }).expect(200)
    expect(after.body.lines).toHaveLength(1)
    expect(JSON.stringify(after.body)).not.toContain(world.vendors[1]!.company.name)
  })

  it('does not show an enquiry to a vendor that was not invited', async () => {
    const rfq = await buildIssuedRfq(test, world, { vendorCompanyIds: [vendorIds()[0]!] })
    const other = world.vendors[1]!.person
    const hidden = await request(test.app, getVendorRfq, { params: { rfqId: rfq.id }, as: other.cookie }).expect(404)
    const absent = await request(test.app, getVendorRfq, { params: { rfqId: crypto.randomUUID() }, as: other.cookie }).expect(404)
    expect({ ...hidden.body, requestId: '' }).toEqual({ ...absent.body, requestId: '' })
    const list = await request(test.app, listVendorRfqs, { as: other.cookie }).expect(200)
    expect(list.body.map((row: { id: string }) => row.id)).not.toContain(rfq.id)
  })

  it('declines with a reason that the buyer reads', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const vendor = world.vendors[0]!.person
    await request(test.app, declineRfq, { params: { rfqId: rfq.id }, body: { reason: 'no-such-reason', text: '' }, as: vendor.cookie }).expect(400)
    await request(test.app, declineRfq, { params: { rfqId: rfq.id }, body: { reason: 'other', text: ' ' }, as: vendor.cookie }).expect(400)
    await request(test.app, declineRfq, { params: { rfqId: rfq.id }, body: { reason: 'capacity', text: 'Full until March.' }, as: vendor.cookie }).expect(200)
    const { body } = await request(test.app, getRfq, { params: { rfqId: rfq.id }, as: world.buyer.cookie }).expect(200)
    expect(body.invitations.find((row: { state: string }) => row.state === 'no-bid')).toMatchObject({ noBidReason: 'capacity', noBidText: 'Full until March.' })
  })

  it('cannot answer from the due moment on', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await test.database.setClock({ hours: 1, seconds: 5 })
    const late = await request(test.app, declineRfq, { params: { rfqId: rfq.id }, body: { reason: 'capacity', text: '' }, as: world.vendors[0]!.person.cookie }).expect(409)
    await test.database.setClock({})
    expect(late.body.code).toBe('rfq-closed')
  })
})

describe('the due time', () => {
  const extend = (rfqId: string, dueAt: Date) => request(test.app, extendRfq, { params: { rfqId }, body: { dueAt: dueAt.toISOString(), reason: 'One more week for all.' }, as: world.buyer.cookie })

  it('moves later as a new issue', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const { body } = await extend(rfq.id, new Date(Date.parse(rfq.dueAt) + 86_400_000)).expect(200)
    expect(body.issueNumber).toBe(2)
  })

  it('does not move earlier, through the application or past it', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await extend(rfq.id, new Date(Date.now() + 60_000)).expect(400)
    const change = asActor(test.ctx, world.buyer, (tx) => tx.update(rfqs).set({ dueAt: new Date(Date.now() + 60_000) }).where(eq(rfqs.id, rfq.id)))
    await expect(change).rejects.toMatchObject({ cause: { code: 'DS001' } })
  })

  it('does not move once it has passed', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await test.database.setClock({ hours: 2 })
    const { body } = await extend(rfq.id, new Date(Date.now() + 86_400_000)).expect(409)
    await test.database.setClock({})
    expect(body.code).toBe('rfq-closed')
  })
})

describe('the opening', () => {
  const ask = (rfqId: string, as = world.buyer) => request(test.app, askOpening, { params: { rfqId }, as: as.cookie })
  const open = (rfqId: string, as = world.approver) => request(test.app, openRfq, { params: { rfqId }, as: as.cookie })

  it('waits for the due time', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const { body } = await ask(rfq.id).expect(409)
    expect(body.code).toBe('too-early')
    const change = asActor(test.ctx, world.buyer, (tx) => tx.update(rfqs).set({ openingAskedAt: new Date(), openingAskedBy: world.buyer.personId }).where(eq(rfqs.id, rfq.id)))
    await expect(change).rejects.toMatchObject({ cause: { code: 'DS001' } })
  })

  it('needs a buyer who asks and a second person with another role who opens', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await test.database.setClock({ hours: 2 })
    expect((await open(rfq.id).expect(409)).body.code).toBe('conflict')
    await ask(rfq.id).expect(200)
    await open(rfq.id, world.buyer).expect(403)
    const { body } = await open(rfq.id).expect(200)
    await test.database.setClock({})
    expect(body).toMatchObject({ state: 'opened', openingAskedBy: { id: world.buyer.personId }, openedBy: { id: world.approver.personId } })
  })

  it('is refused to the asker even when that person holds both roles', async () => {
    const both = await buildPerson(test, world.buying, ['buyer', 'approver'])
    const rfq = await buildIssuedRfq(test, world)
    await test.database.setClock({ hours: 2 })
    await ask(rfq.id, both).expect(200)
    const { body } = await open(rfq.id, both).expect(403)
    const change = asActor(test.ctx, both, (tx) => tx.update(rfqs).set({ state: 'opened', openedAt: new Date(Date.now() + 7_200_000), openedBy: both.personId }).where(eq(rfqs.id, rfq.id)))
    await expect(change).rejects.toMatchObject({ cause: { code: 'DS001' } })
    await test.database.setClock({})
    expect(body.code).toBe('second-person-needed')
  })

  it('gives one result when two persons open at the same moment', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await test.database.setClock({ hours: 2 })
    await ask(rfq.id).expect(200)
    const answers = await Promise.all([open(rfq.id, world.approver), open(rfq.id, world.quality)])
    await test.database.setClock({})
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
  })
})

describe('cancelling', () => {
  it('tells the vendors and takes no more answers', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await request(test.app, cancelRfq, { params: { rfqId: rfq.id }, body: { reason: 'The project stopped.' }, as: world.buyer.cookie }).expect(200)
    const { body } = await request(test.app, declineRfq, { params: { rfqId: rfq.id }, body: { reason: 'capacity', text: '' }, as: world.vendors[0]!.person.cookie }).expect(409)
    expect(body.code).toBe('rfq-cancelled')
  })
})

describe('what happens without a person', () => {
  const mailsOf = (rfqId: string, template: string) =>
    asWorker(test.ctx, (tx) => tx.select().from(mailEvents).where(sql`template = ${template} and props ->> 'rfqId' = ${rfqId}`))

  it('marks a due enquiry as closed and tells its buyer once', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await closeDueRfqs(test.ctx)
    expect((await mailsOf(rfq.id, 'rfq-due')).length).toBe(0)
    await test.database.setClock({ hours: 2 })
    await closeDueRfqs(test.ctx)
    await closeDueRfqs(test.ctx)
    await test.database.setClock({})
    const mails = await mailsOf(rfq.id, 'rfq-due')
    expect(mails.map(({ toPersonId }) => toPersonId)).toEqual([world.buyer.personId])
    const { body } = await request(test.app, getRfq, { params: { rfqId: rfq.id }, as: world.buyer.cookie }).expect(200)
    expect(body.state).toBe('closed')
  })

  it('reminds a vendor without an answer three days and one day before the due time, once each, and no other', async () => {
    const rfq = await buildIssuedRfq(test, world, { dueAt: new Date(Date.now() + 5 * 86_400_000).toISOString() })
    await request(test.app, declineRfq, { params: { rfqId: rfq.id }, body: { reason: 'capacity', text: '' }, as: world.vendors[1]!.person.cookie }).expect(200)
    await remindVendors(test.ctx)
    expect(await mailsOf(rfq.id, 'rfq-reminder')).toEqual([])
    for (const hours of [60, 62, 108, 110]) {
      await test.database.setClock({ hours })
      await remindVendors(test.ctx)
    }
    await test.database.setClock({})
    const mails = await mailsOf(rfq.id, 'rfq-reminder')
    expect(mails.map(({ props, toCompanyId }) => [props.days, toCompanyId]).sort()).toEqual([[1, vendorIds()[0]], [3, vendorIds()[0]]])
  })

  it('shows each role what waits for it', async () => {
    const rfq = await buildIssuedRfq(test, world)
    const titles = async (person: TestPerson) => {
      const { body } = await request(test.app, listWorklist, { as: person.cookie }).expect(200)
      return body.items.filter((item: { link: { params: { rfqId?: string } } }) => item.link.params.rfqId === rfq.id).map((item: { kind: string }) => item.kind)
    }
    expect(await titles(world.vendors[0]!.person)).toEqual(['enquiry'])
    expect(await titles(world.buyer)).toEqual([])
    await test.database.setClock({ hours: 2 })
    expect(await titles(world.buyer)).toEqual(['rfq-opening'])
    await request(test.app, askOpening, { params: { rfqId: rfq.id }, as: world.buyer.cookie }).expect(200)
    expect(await titles(world.approver)).toEqual(['rfq-second-opener'])
    expect(await titles(world.buyer)).toEqual([])
    await test.database.setClock({})
  })
})
