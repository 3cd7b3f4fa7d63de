import { asActor, asWorker } from '#server/db/as-actor'
import { mailEvents } from '#server/db/schema/index'
import { extendRfq } from '#server/services/rfqs/move-rfq'
import { remindVendors } from '#server/services/rfqs/remind-vendors'
import { cancelRfq, declineRfq, type Rfq } from '#shared/contracts/rfqs'
import { asc, sql } from 'drizzle-orm'
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { buildIssuedRfq, type World } from '../support/build-rfq'
import { buildWorld } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

const DAY_MS = 86_400_000

let test: TestApp
let world: World

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 2)
})
afterEach(() => test.database.setClock({}))
afterAll(() => test.stop())

const vendorIds = () => world.vendors.map(({ company }) => company.id)
const mailsOf = (rfqId: string, template: string) =>
  asWorker(test.ctx, (tx) => tx.select().from(mailEvents).where(sql`template = ${template} and props ->> 'rfqId' = ${rfqId}`).orderBy(asc(mailEvents.createdAt)))
const decline = (rfq: Rfq) => request(test.app, declineRfq, { params: { rfqId: rfq.id }, body: { reason: 'lead-time-impossible', text: '' }, as: world.vendors[1]!.person.cookie }).expect(200)
/** By the service: no session lasts as long as the clock is moved here. */
const extend = (rfq: Rfq, dueAt: string) => asActor(test.ctx, world.buyer, (tx) => extendRfq(tx, world.buyer, rfq.id, new Date(dueAt), 'A holiday lies between.'))

describe('a due time that moves later', () => {
  it('is told to every vendor alike, to one that declined as well', async () => {
    const rfq = await buildIssuedRfq(test, world)
    await decline(rfq)
    await extend(rfq, new Date(Date.parse(rfq.dueAt) + DAY_MS).toISOString())
    expect((await mailsOf(rfq.id, 'rfq-extended')).map(({ toCompanyId }) => toCompanyId).sort()).toEqual(vendorIds().sort())
  })

  it('is reminded of anew, though the earlier one was', async () => {
    const rfq = await buildIssuedRfq(test, world, { dueAt: new Date(Date.now() + 5 * DAY_MS).toISOString() })
    await decline(rfq)
    await test.database.setClock({ hours: 100 })
    await remindVendors(test.ctx)
    const later = new Date(Date.parse(rfq.dueAt) + 5 * DAY_MS).toISOString()
    await extend(rfq, later)
    await remindVendors(test.ctx)
    const before = await mailsOf(rfq.id, 'rfq-reminder')
    for (const hours of [180, 182]) {
      await test.database.setClock({ hours })
      await remindVendors(test.ctx)
    }
    expect(before.map(({ props }) => [props.days, props.dueAt])).toEqual([[1, rfq.dueAt]])
    expect((await mailsOf(rfq.id, 'rfq-reminder')).map(({ props }) => [props.days, props.dueAt])).toEqual([[1, rfq.dueAt], [3, later]])
  })
})

it('tells of a cancelled enquiry only those who have not declined', async () => {
  const rfq = await buildIssuedRfq(test, world)
  await decline(rfq)
  await request(test.app, cancelRfq, { params: { rfqId: rfq.id }, body: { reason: 'The project stopped.' }, as: world.buyer.cookie }).expect(200)
  expect((await mailsOf(rfq.id, 'rfq-cancelled')).map(({ toCompanyId }) => toCompanyId)).toEqual([vendorIds()[0]])
})
