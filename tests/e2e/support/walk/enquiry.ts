import { askOpening, acceptConfidentiality, createRfq, getVendorRfq, issueRfq, openRfq, type Rfq } from '#shared/contracts/rfqs'
import { submitQuote } from '#shared/contracts/quotes'
import { listReleases } from '#shared/contracts/specifications'
import { quoteInput, rfqInput } from '../../../support/build-rfq'
import { request } from '../../../support/test-app'
import type { Stage } from './stage'

export type { Rfq }

export async function enquire({ test, cast, origin }: Stage): Promise<Rfq> {
  const as = cast.buyer.cookie
  const releases = await request(test.app, listReleases, { as, origin }).expect(200)
  const tamsen = (await test.database.query<{ id: string }>(`SELECT id FROM companies WHERE name = 'Tamsen Coilwork'`)).map(({ id }) => id)
  const created = await request(test.app, createRfq, { as, origin, body: rfqInput(releases.body[0], [cast.quillon.id, cast.oakhollow.id, ...tamsen]) }).expect(200)
  return (await request(test.app, issueRfq, { as, origin, params: { rfqId: created.body.id }, body: { version: created.body.version } }).expect(200)).body
}

export async function quoteAll({ test, cast, origin }: Stage, rfq: Rfq): Promise<void> {
  const params = { rfqId: rfq.id }
  for (const [person, input] of [[cast.quillonSales, {}], [cast.oakhollowSales, { currency: 'USD' as const, deliveryRule: 'FCA' as const }]] as const) {
    await request(test.app, acceptConfidentiality, { params, origin, body: { accepted: true }, as: person.cookie }).expect(200)
    const seen = await request(test.app, getVendorRfq, { params, origin, as: person.cookie }).expect(200)
    await request(test.app, submitQuote, { params, origin, body: quoteInput(seen.body, input), as: person.cookie }).expect(200)
  }
}

export async function open({ test, cast, origin }: Stage, rfq: Rfq): Promise<void> {
  await test.database.setClock({ hours: 2 })
  await request(test.app, askOpening, { params: { rfqId: rfq.id }, origin, as: cast.buyer.cookie }).expect(200)
  await request(test.app, openRfq, { params: { rfqId: rfq.id }, origin, as: cast.approver.cookie }).expect(200)
}
