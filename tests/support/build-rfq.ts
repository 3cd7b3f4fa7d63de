import { acceptConfidentiality, askOpening, createRfq, getVendorRfq, issueRfq, openRfq, type Rfq, type RfqInput } from '#shared/contracts/rfqs'
import { submitQuote, type QuoteInput } from '#shared/contracts/quotes'
import { buildRelease, type TestRelease } from './build-release'
import type { buildWorld, TestPerson } from './factories'
import { request, type TestApp } from './test-app'

export type World = Awaited<ReturnType<typeof buildWorld>>

export function rfqInput(release: TestRelease, vendorCompanyIds: string[], overrides: Partial<RfqInput> = {}): RfqInput {
  return {
    title: 'Transformers for the harbour supply',
    dueAt: new Date(Date.now() + 3_600_000).toISOString(),
    dueZone: 'Europe/Berlin',
    currency: 'EUR',
    deliveryRule: 'DAP',
    deliveryPlace: 'Brightmoor',
    terms: {
      paymentTerms: '30 days net',
      packing: '',
      quality: '',
      compliance: '',
      awardBasis: 'Lowest landed cost among technically compliant offers',
      general: '',
      validityDays: 60,
      samplesNeededOn: null,
      questionsUntil: null,
    },
    lines: [{ releaseId: release.id, quantities: [1000, 5000, 10_000], orderQuantity: 5000, annualQuantity: 20_000, sampleQuantity: 5 }],
    vendorCompanyIds,
    ...overrides,
  }
}

export function quoteInput(rfq: Pick<Rfq, 'lines'>, overrides: Partial<QuoteInput> = {}): QuoteInput {
  return {
    vendorReference: 'Q-100',
    reason: '',
    currency: 'EUR',
    deliveryRule: 'DAP',
    deliveryPlace: 'Brightmoor',
    paymentTerms: '30 days net',
    paymentDays: 30,
    validUntil: new Date(Date.now() + 90 * 86_400_000).toISOString().slice(0, 10),
    remarks: '',
    lines: rfq.lines.map(({ id }) => ({
      lineId: id,
      priceUnit: 1 as const,
      priceBreaks: [
        { fromQuantity: 1000, price: '1.41' },
        { fromQuantity: 5000, price: '1.29' },
        { fromQuantity: 10_000, price: '1.21' },
      ],
      oneTimeCost: '3500',
      oneTimeCostText: 'Former mould and fixtures',
      samplesPrice: '0',
      sampleLeadTimeDays: 21,
      firstOrderLeadTimeDays: 42,
      repeatLeadTimeDays: 28,
      minimumOrderQuantity: 1000,
      packQuantity: 100,
      countryOfOrigin: 'DE',
    })),
    ...overrides,
  }
}

/** An issued enquiry for one released part, all vendors of the world invited. */
export async function buildIssuedRfq(test: TestApp, world: World, overrides: Partial<RfqInput> = {}): Promise<Rfq> {
  const release = await buildRelease(test, world.engineer, world.checker)
  const vendorIds = world.vendors.map(({ company }) => company.id)
  const { body } = await request(test.app, createRfq, { body: rfqInput(release, vendorIds, overrides), as: world.buyer.cookie }).expect(200)
  const issued = await request(test.app, issueRfq, { params: { rfqId: body.id }, body: { version: body.version }, as: world.buyer.cookie }).expect(200)
  return issued.body as Rfq
}

/** The vendor looks, accepts confidentiality and submits; returns its own quotation. */
export async function buildQuote(test: TestApp, vendor: TestPerson, rfqId: string, overrides: Partial<QuoteInput> = {}) {
  await request(test.app, acceptConfidentiality, { params: { rfqId }, body: { accepted: true }, as: vendor.cookie }).expect(200)
  const seen = await request(test.app, getVendorRfq, { params: { rfqId }, as: vendor.cookie }).expect(200)
  const { body } = await request(test.app, submitQuote, { params: { rfqId }, body: quoteInput(seen.body, overrides), as: vendor.cookie }).expect(200)
  return body
}

/** Moves the clock past the due time and opens: the buyer asks, the approver opens. */
export async function openAfterDue(test: TestApp, world: World, rfqId: string): Promise<Rfq> {
  await test.database.setClock({ hours: 2 })
  await request(test.app, askOpening, { params: { rfqId }, as: world.buyer.cookie }).expect(200)
  const { body } = await request(test.app, openRfq, { params: { rfqId }, as: world.approver.cookie }).expect(200)
  await test.database.setClock({})
  return body as Rfq
}
