import { acknowledgeOrder, placeOrder, type Order, type OrderInput } from '#shared/contracts/orders'
import { approveAward, proposeAward, type Award, type ComparisonBasis } from '#shared/contracts/awards'
import { listQuotes, type Quote, type QuoteInput } from '#shared/contracts/quotes'
import { createRfq, issueRfq, type Rfq } from '#shared/contracts/rfqs'
import { confirmSet, requestSamples, saveReport, uploadReport, type SampleReport, type SampleRequest, type SampleSet } from '#shared/contracts/samples'
import type { TestRow } from '#shared/engine/specification'
import { buildRelease } from './build-release'
import { buildQuote, openAfterDue, rfqInput, type World } from './build-rfq'
import type { TestPerson } from './factories'
import { request, type TestApp } from './test-app'

type RowValues = Partial<TestRow> & Pick<TestRow, 'symbol' | 'characteristic' | 'unit'>

const testRow = (number: number, values: RowValues): TestRow => ({
  id: `t${number}`,
  number,
  status: 'mandatory',
  origin: { kind: 'entered' },
  windingId: null,
  boundaryId: null,
  drivenTerminals: [],
  shortedTerminals: [],
  openTerminals: [],
  method: '',
  instrumentClass: '',
  frequencyHz: null,
  levelV: null,
  biasA: null,
  temperatureC: 20,
  minimum: null,
  nominal: null,
  maximum: null,
  extent: 'every-part',
  acceptableQualityLimit: null,
  criticalToQuality: false,
  reaction: '',
  record: 'reading',
  ...values,
})

export const TEST_ROWS: TestRow[] = [
  testRow(1, { symbol: 'Lp', characteristic: 'inductance', unit: 'H', minimum: 540e-6, nominal: 600e-6, maximum: 660e-6 }),
  testRow(2, { symbol: 'Llk', characteristic: 'leakage', unit: 'H', maximum: 10e-6 }),
  testRow(3, { symbol: 'Rdc P', characteristic: 'dc-resistance', unit: 'Ω', maximum: 0.95 }),
  testRow(4, { symbol: 'HV P–S', characteristic: 'hipot', unit: 'V', levelV: 3000, record: 'pass-fail' }),
]

/** Five parts that meet every row. */
export const GOOD_REPORT = ['Serial;Lp (µH);Llk (µH);Rdc P (Ω);HV P–S', ...[1, 2, 3, 4, 5].map((n) => `${n};60${n},2;9,${n};0,9${n % 4};PASS`), ''].join('\r\n')
/** Leakage above its limit on every part. */
export const BAD_REPORT = GOOD_REPORT.replace(/;9,(\d);/g, ';13,$1;')

export interface OpenedRfq {
  rfq: Rfq
  quotes: Quote[]
}

/** An enquiry that both vendors of the world quoted and that was opened. */
export async function buildOpenedRfq(test: TestApp, world: World, overrides: Partial<QuoteInput>[] = []): Promise<OpenedRfq> {
  const release = await buildRelease(test, world.engineer, world.checker, undefined, (specification) => {
    specification.tests = structuredClone(TEST_ROWS)
  })
  const input = rfqInput(release, world.vendors.map(({ company }) => company.id))
  const created = await request(test.app, createRfq, { body: input, as: world.buyer.cookie }).expect(200)
  await request(test.app, issueRfq, { params: { rfqId: created.body.id }, body: { version: created.body.version }, as: world.buyer.cookie }).expect(200)
  for (const [index, { person }] of world.vendors.entries()) await buildQuote(test, person, created.body.id, overrides[index])
  const rfq = await openAfterDue(test, world, created.body.id)
  const { body } = await request(test.app, listQuotes, { params: { rfqId: rfq.id }, as: world.buyer.cookie }).expect(200)
  return { rfq, quotes: body as Quote[] }
}

export const inDays = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10)

export const sampleInput = (world: World, rfq: Pick<Rfq, 'id' | 'lines'>, vendor = 0) => ({
  rfqId: rfq.id,
  lineId: rfq.lines[0]!.id,
  vendorCompanyId: world.vendors[vendor]!.company.id,
  quantity: 5,
  sampleKind: 'hand-made' as const,
  dueOn: inDays(21),
  note: '',
})

export async function buildSampleRequest(test: TestApp, world: World, rfq: Pick<Rfq, 'id' | 'lines'>, vendor = 0): Promise<SampleRequest> {
  const { body } = await request(test.app, requestSamples, { body: sampleInput(world, rfq, vendor), as: world.quality.cookie }).expect(200)
  return body as SampleRequest
}

export const DECLARATION: SampleReport = {
  measuredOn: '2026-01-20',
  temperatureC: 20,
  humidityPercent: 45,
  instruments: 'LCR meter 4711, calibrated until 2026-09; withstand tester 12, until 2026-11',
  operator: 'T. Technician',
  lotCode: '2604',
  sampleKind: 'hand-made',
  asBuilt: { kind: 'as-drawing' },
  materials: '',
}

export async function uploadTo(test: TestApp, vendor: TestPerson, requestId: string, content: string | Buffer = GOOD_REPORT, name = 'report.csv'): Promise<SampleSet> {
  const { body } = await request(test.app, uploadReport, { params: { requestId }, file: { name, content }, as: vendor.cookie }).expect(200)
  return body as SampleSet
}

/** A report with its declaration, sent. */
export async function buildConfirmedSet(test: TestApp, vendor: TestPerson, requestId: string, content?: string): Promise<SampleSet> {
  const set = await uploadTo(test, vendor, requestId, content)
  const params = { setId: set.id }
  const saved = await request(test.app, saveReport, { params, body: { version: set.version, report: DECLARATION }, as: vendor.cookie }).expect(200)
  const { body } = await request(test.app, confirmSet, { params, body: { version: saved.body.version }, as: vendor.cookie }).expect(200)
  return body as SampleSet
}

export function comparisonBasis({ quotes }: Pick<OpenedRfq, 'quotes'>, overrides: Partial<ComparisonBasis> = {}): ComparisonBasis {
  return {
    exchange: { base: 'EUR', date: '2026-03-27', source: 'Reference rates of the central bank', rates: { USD: '0.92', GBP: '1.15' } },
    lines: [],
    years: 2,
    capitalRatePerYear: '0.08',
    dutyRate: '0.037',
    insuranceRate: '0.002',
    customsValue: 'CIF',
    stockShare: '0.5',
    offers: quotes.map(({ id }) => ({ quoteId: id, freightPerShipment: { amount: '900', currency: 'USD' }, inspectionPerShipment: { amount: '400', currency: 'EUR' }, yieldLoss: '0.003' })),
    ...overrides,
  }
}

export const proposal = (opened: OpenedRfq, quote = 0) => ({
  basis: comparisonBasis(opened),
  quoteId: opened.quotes[quote]!.id,
  lineIds: opened.rfq.lines.map(({ id }) => id),
  reason: 'Lowest landed cost among the compliant offers',
})

export async function buildProposal(test: TestApp, world: World, opened: OpenedRfq, quote = 0): Promise<Award> {
  const { body } = await request(test.app, proposeAward, { params: { rfqId: opened.rfq.id }, body: proposal(opened, quote), as: world.buyer.cookie }).expect(200)
  return body as Award
}

export async function buildApproved(test: TestApp, world: World, opened: OpenedRfq, quote = 0): Promise<Award> {
  const award = await buildProposal(test, world, opened, quote)
  const body = { comparisonSha256: award.comparisonSha256, remark: '' }
  const approved = await request(test.app, approveAward, { params: { awardId: award.id }, body, as: world.approver.cookie }).expect(200)
  return approved.body as Award
}

export const orderInput = (overrides: Partial<OrderInput> = {}): OrderInput => ({
  legalEntity: 'Brightmoor Power Works Ltd',
  vatNumber: '',
  billTo: 'Harbour Road 1\n12345 Brightmoor',
  shipTo: 'Goods in, Harbour Road 3\n12345 Brightmoor',
  vendorNumber: '',
  deliveryOn: inDays(60),
  acknowledgeBy: inDays(7),
  carrier: '',
  overUnderPercent: 0,
  packing: '',
  documents: 'Certificate of conformity, test data',
  quality: '',
  tooling: '',
  termsVersion: '',
  remarks: '',
  ...overrides,
})

/** An order placed with one of the world's vendors. */
export async function buildOrder(test: TestApp, world: World, vendor = 0): Promise<Order> {
  const opened = await buildOpenedRfq(test, world)
  const quote = opened.quotes.findIndex(({ vendorCompanyId }) => vendorCompanyId === world.vendors[vendor]!.company.id)
  const award = await buildApproved(test, world, opened, quote)
  const { body } = await request(test.app, placeOrder, { params: { awardId: award.id }, body: orderInput(), as: world.buyer.cookie }).expect(200)
  return body as Order
}

export const acknowledge = (test: TestApp, vendor: TestPerson, orderId: string, body: { answer: string; text: string }) =>
  request(test.app, acknowledgeOrder, { params: { orderId }, body, as: vendor.cookie })
