import type { Context } from '#server/context'
import { appNow, asActor, type Actor } from '#server/db/as-actor'
import { saveQuoteDraft } from '#server/services/quotes/draft-quote'
import { readOwnQuote } from '#server/services/quotes/read-quotes'
import { submitQuote } from '#server/services/quotes/submit-quote'
import { issueRfq } from '#server/services/rfqs/issue-rfq'
import { askOpening, openRfq } from '#server/services/rfqs/move-rfq'
import { listRfqs, readRfq } from '#server/services/rfqs/read-rfq'
import { acceptConfidentiality, readVendorRfq } from '#server/services/rfqs/vendor-rfq'
import { createRfq, updateRfq } from '#server/services/rfqs/write-rfq'
import { listReleases } from '#server/services/specifications/list-specifications'
import type { QuoteInput } from '#shared/contracts/quotes'
import type { Rfq, RfqInput } from '#shared/contracts/rfqs'
import { readZonedTime } from '#shared/zoned-time'
import { setTimeout as sleep } from 'node:timers/promises'
import { demoActor } from './people'
import { DEMO_PARTS } from './specifications/index'

const DAY_MS = 86_400_000
/** Time in which the demo's vendors quote before their enquiries close. */
const QUOTING_MS = 6_000

const MAREK = 'marek.dusek@quillon.example'
const GRETA = 'greta.tamsen@tamsen.example'
const DALE = 'dale.hobart@oakhollow.example'
const RUTH = 'ruth.zeller@zellmark.example'

interface DemoRfq {
  title: string
  partNumber: string
  vendors: string[]
  dueAt: Date
  dueZone: string
  deliveryPlace: string
  quantities: number[]
  orderQuantity: number
}

export const DEMO_RFQS = {
  open: 'Harbour supply transformers, series 2027',
  closed: 'Coupled inductors for the probe carrier',
  opened: 'Buoy supply transformers, pilot and series',
  saltern: 'Probe supply inductors, first lot',
} as const

/** One enquiry open, one closed and unopened, one opened with two quotations, and one of the other buying company. */
export async function seedRfqs(ctx: Context): Promise<void> {
  const joris = await demoActor(ctx, 'joris.pell@brightmoor.example')
  const lotte = await demoActor(ctx, 'lotte.brink@saltern.example')
  const now = await asActor(ctx, joris, (tx) => appNow(tx))
  const soon = new Date(now.getTime() + QUOTING_MS)
  const brightmoor = { dueZone: 'Europe/London', deliveryPlace: 'Brightmoor BM1 4QW' }

  const open = await ensureIssued(ctx, joris, { ...brightmoor, title: DEMO_RFQS.open, partNumber: DEMO_PARTS.harbour, vendors: [MAREK, GRETA, DALE], dueAt: afternoonIn(9, now, 'Europe/London'), quantities: [1000, 5000, 10_000, 25_000], orderQuantity: 5000 })
  const closed = await ensureIssued(ctx, joris, { ...brightmoor, title: DEMO_RFQS.closed, partNumber: DEMO_PARTS.coupledInductor, vendors: [GRETA, RUTH], dueAt: soon, quantities: [500, 2000], orderQuantity: 2000 })
  const opened = await ensureIssued(ctx, joris, { ...brightmoor, title: DEMO_RFQS.opened, partNumber: DEMO_PARTS.buoy, vendors: [MAREK, GRETA, RUTH], dueAt: soon, quantities: [250, 1000, 5000], orderQuantity: 1000 })
  await ensureIssued(ctx, lotte, { title: DEMO_RFQS.saltern, partNumber: DEMO_PARTS.saltern, vendors: [GRETA], dueAt: afternoonIn(12, now, 'Europe/Amsterdam'), dueZone: 'Europe/Amsterdam', deliveryPlace: 'Saltern', quantities: [200, 1000], orderQuantity: 200 })

  await typeDraft(ctx, await demoActor(ctx, MAREK), open)
  await look(ctx, DALE, open)
  await quote(ctx, GRETA, closed, tamsenOffer(['2.95', '2.38'], '850'))
  await quote(ctx, RUTH, closed, zellmarkOffer(['3.05', '2.21'], '1200'))
  await quote(ctx, MAREK, opened, quillonOffer(['7.90', '6.35', '5.42'], '2600'))
  await quote(ctx, GRETA, opened, tamsenOffer(['8.45', '6.80', '5.95'], '1900'))
  await openAfterDue(ctx, joris, opened)
}

/** Five in the afternoon, so many days from now, where the buyer is. */
function afternoonIn(days: number, now: Date, zone: string): Date {
  const date = new Intl.DateTimeFormat('en-CA', { timeZone: zone }).format(new Date(now.getTime() + days * DAY_MS))
  const reading = readZonedTime({ date, time: '17:00', zone })
  if (reading.kind !== 'moment') throw new RangeError(`No such time in ${zone}: ${date} 17:00`)
  return new Date(reading.at)
}

async function ensureIssued(ctx: Context, buyer: Actor, wanted: DemoRfq): Promise<Rfq> {
  const input = await inputOf(ctx, buyer, wanted)
  return asActor(ctx, buyer, async (tx) => {
    const found = (await listRfqs(tx, buyer)).find(({ title }) => title === wanted.title)
    if (found && found.state !== 'preparing') return readRfq(tx, buyer, found.id)
    const prepared = found ? await updateRfq(tx, buyer, found.id, (await readRfq(tx, buyer, found.id)).version, input) : await createRfq(tx, buyer, input)
    return issueRfq(tx, buyer, prepared.id, prepared.version)
  })
}

async function inputOf(ctx: Context, buyer: Actor, { title, partNumber, vendors, dueAt, dueZone, deliveryPlace, quantities, orderQuantity }: DemoRfq): Promise<RfqInput> {
  const releases = await asActor(ctx, buyer, (tx) => listReleases(tx, buyer))
  const companies = await Promise.all(vendors.map((email) => demoActor(ctx, email)))
  return {
    title,
    dueAt: dueAt.toISOString(),
    dueZone,
    currency: 'EUR',
    deliveryRule: 'DAP',
    deliveryPlace,
    terms: {
      paymentTerms: '30 days net from receipt of invoice',
      packing: 'Trays, pins protected; carton label with part number, revision, lot and quantity',
      quality: 'Every part tested to the drawing; readings of critical rows kept ten years; change notice 90 days ahead',
      compliance: 'RoHS, REACH and conflict-minerals declarations with the samples',
      awardBasis: 'Lowest landed cost among technically compliant offers',
      general: '',
      validityDays: 60,
      samplesNeededOn: null,
      questionsUntil: null,
    },
    lines: [{ releaseId: releases.find((release) => release.partNumber === partNumber && release.current)!.id, quantities, orderQuantity, annualQuantity: orderQuantity * 4, sampleQuantity: 5 }],
    vendorCompanyIds: companies.map(({ companyId }) => companyId),
  }
}

type Offer = Omit<QuoteInput, 'lines' | 'validUntil'> & { prices: string[]; line: Omit<QuoteInput['lines'][number], 'lineId' | 'priceBreaks'> }

const tamsenOffer = (prices: string[], oneTimeCost: string): Offer => ({
  vendorReference: 'TC-2214',
  reason: '',
  currency: 'EUR',
  deliveryRule: 'DAP',
  deliveryPlace: 'Brightmoor BM1 4QW',
  paymentTerms: '30 days net',
  paymentDays: 30,
  remarks: 'Coil former as drawn; core from either listed maker.',
  prices,
  line: { priceUnit: 1, oneTimeCost, oneTimeCostText: 'Winding fixture and test adapter', samplesPrice: '0', sampleLeadTimeDays: 18, firstOrderLeadTimeDays: 35, repeatLeadTimeDays: 28, minimumOrderQuantity: 250, packQuantity: 50, countryOfOrigin: 'DE' },
})

const zellmarkOffer = (prices: string[], oneTimeCost: string): Offer => ({
  ...tamsenOffer(prices, oneTimeCost),
  vendorReference: 'Z-26-0871',
  remarks: '',
  line: { ...tamsenOffer(prices, oneTimeCost).line, firstOrderLeadTimeDays: 49, minimumOrderQuantity: 500, packQuantity: 100, countryOfOrigin: 'AT' },
})

const quillonOffer = (prices: string[], oneTimeCost: string): Offer => ({
  ...tamsenOffer(prices, oneTimeCost),
  vendorReference: 'QW/4471',
  currency: 'USD',
  deliveryRule: 'FCA',
  deliveryPlace: 'Kvilov',
  paymentTerms: '60 days net',
  paymentDays: 60,
  remarks: 'Litz construction from our stock list.',
  line: { ...tamsenOffer(prices, oneTimeCost).line, sampleLeadTimeDays: 28, firstOrderLeadTimeDays: 56, minimumOrderQuantity: 250, countryOfOrigin: 'CZ' },
})

/** Accepts confidentiality and submits, unless the vendor has or the enquiry is closed to it. */
async function quote(ctx: Context, email: string, rfq: Rfq, { prices, line, ...terms }: Offer): Promise<void> {
  const vendor = await demoActor(ctx, email)
  await asActor(ctx, vendor, async (tx) => {
    const seen = await readVendorRfq(tx, vendor, rfq.id)
    if (seen.state !== 'open' || (await readOwnQuote(tx, vendor, rfq.id)).submitted.length > 0) return
    const { lines, now } = await acceptConfidentiality(tx, vendor, rfq.id)
    const validUntil = new Date(Date.parse(now) + 90 * DAY_MS).toISOString().slice(0, 10)
    await submitQuote(tx, vendor, rfq.id, {
      ...terms,
      validUntil,
      lines: lines.map(({ id, quantities }) => ({ ...line, lineId: id, priceBreaks: quantities.map((fromQuantity, index) => ({ fromQuantity, price: prices[index]! })) })),
    })
  })
}

/** A vendor in the middle of it: confidentiality accepted, the first fields typed. */
async function typeDraft(ctx: Context, vendor: Actor, rfq: Rfq): Promise<void> {
  await asActor(ctx, vendor, async (tx) => {
    if ((await readOwnQuote(tx, vendor, rfq.id)).draft) return
    const { lines } = await acceptConfidentiality(tx, vendor, rfq.id)
    const line = `lines.${lines[0]!.id}`
    const breaks = lines[0]!.quantities.flatMap((fromQuantity, index): [string, number | string | null][] => [
      [`${line}.breaks.${index}.fromQuantity`, fromQuantity],
      [`${line}.breaks.${index}.price`, index === 0 ? '3.42' : null],
    ])
    const form = { vendorReference: 'QW/4502', remarks: 'Insulated wire in stock for the first 5 000.', ...Object.fromEntries(breaks), [`${line}.firstOrderLeadTimeDays`]: 49 }
    await saveQuoteDraft(tx, vendor, rfq.id, 0, { form })
  })
}

/** A vendor that has looked and not answered. */
async function look(ctx: Context, email: string, rfq: Rfq): Promise<void> {
  const vendor = await demoActor(ctx, email)
  await asActor(ctx, vendor, (tx) => readVendorRfq(tx, vendor, rfq.id))
}

async function openAfterDue(ctx: Context, buyer: Actor, rfq: Rfq): Promise<void> {
  if (rfq.openedAt) return
  const now = await asActor(ctx, buyer, (tx) => appNow(tx))
  await sleep(Math.max(0, Date.parse(rfq.dueAt) - now.getTime() + 50))
  const ines = await demoActor(ctx, 'ines.vance@brightmoor.example')
  if (!rfq.openingAskedAt) await asActor(ctx, buyer, (tx) => askOpening(tx, buyer, rfq.id))
  await asActor(ctx, ines, (tx) => openRfq(tx, ines, rfq.id))
}
