import type { Quote } from '#shared/contracts/quotes'
import type { VendorRfq } from '#shared/contracts/rfqs'
import { shiftDecimal } from '#shared/number-format'

export const PRICE_UNITS = [1, 100, 1000] as const
export type PriceUnit = (typeof PRICE_UNITS)[number]

/** Zero and "nothing said" mean different things to the buyer, so the form asks. */
export const COST_CHOICES = ['amount', 'included', 'not-quoted'] as const
export type CostChoice = (typeof COST_CHOICES)[number] | ''

export interface BreakEntry {
  fromQuantity: number | null
  price: string | null
}

/** One asked part as it is typed. */
export interface LineEntry {
  quoted: boolean
  priceUnit: PriceUnit
  breaks: BreakEntry[]
  oneTime: CostChoice
  oneTimeCost: string | null
  oneTimeCostText: string
  samples: CostChoice
  samplesPrice: string | null
  sampleLeadTimeDays: number | null
  firstOrderLeadTimeDays: number | null
  repeatLeadTimeDays: number | null
  minimumOrderQuantity: number | null
  packQuantity: number | null
  countryOfOrigin: string | null
}

/** The quotation as it is typed: anything may be missing. */
export interface QuoteEntry {
  vendorReference: string
  reason: string
  currency: string
  deliveryRule: string
  deliveryPlace: string
  paymentTerms: string
  paymentDays: number | null
  validUntil: string | null
  remarks: string
  /** By the id of the asked part. */
  lines: Record<string, LineEntry>
}

export type AskedEnquiry = Pick<VendorRfq, 'currency' | 'deliveryRule' | 'deliveryPlace' | 'terms' | 'lines'>
type AskedLine = AskedEnquiry['lines'][number]

function blankLine({ quantities, sampleQuantity }: AskedLine): LineEntry {
  return {
    quoted: true,
    priceUnit: 1,
    breaks: quantities.map((fromQuantity) => ({ fromQuantity, price: null })),
    oneTime: '',
    oneTimeCost: null,
    oneTimeCostText: '',
    samples: sampleQuantity === 0 ? 'not-quoted' : '',
    samplesPrice: null,
    sampleLeadTimeDays: null,
    firstOrderLeadTimeDays: null,
    repeatLeadTimeDays: null,
    minimumOrderQuantity: null,
    packQuantity: null,
    countryOfOrigin: null,
  }
}

/** An empty quotation with what the enquiry already says. */
export function blankQuote(asked: AskedEnquiry): QuoteEntry {
  const { currency, deliveryRule, deliveryPlace, terms, lines } = asked
  return {
    ...{ currency, deliveryRule, deliveryPlace },
    vendorReference: '',
    reason: '',
    paymentTerms: terms?.paymentTerms ?? '',
    paymentDays: null,
    validUntil: null,
    remarks: '',
    lines: Object.fromEntries(lines.map((line) => [line.id, blankLine(line)])),
  }
}

const choiceOf = (amount: string | null): CostChoice => (amount === null ? 'not-quoted' : Number(amount) === 0 ? 'included' : 'amount')
const amountOf = (amount: string | null): string | null => (choiceOf(amount) === 'amount' ? shiftDecimal(amount!, 0) : null)

function lineEntryOf(line: Quote['lines'][number]): LineEntry {
  const { oneTimeCost, samplesPrice, priceBreaks, priceUnit, id: _, lineId: __, ...rest } = line
  return {
    ...rest,
    quoted: true,
    priceUnit: priceUnit as PriceUnit,
    breaks: priceBreaks.map(({ fromQuantity, price }) => ({ fromQuantity, price: shiftDecimal(price, 0) })),
    oneTime: choiceOf(oneTimeCost),
    oneTimeCost: amountOf(oneTimeCost),
    samples: choiceOf(samplesPrice),
    samplesPrice: amountOf(samplesPrice),
  }
}

/** A submitted revision as the beginning of the next one; the reason is asked for anew. */
export function quoteEntryOf(quote: Quote, asked: AskedEnquiry): QuoteEntry {
  const { vendorReference, currency, deliveryRule, deliveryPlace, paymentTerms, paymentDays, validUntil, remarks } = quote
  const quoted = new Map(quote.lines.map((line) => [line.lineId, lineEntryOf(line)]))
  return {
    ...{ vendorReference, currency, deliveryRule, deliveryPlace, paymentTerms, paymentDays, validUntil, remarks },
    reason: '',
    lines: Object.fromEntries(asked.lines.map((line) => [line.id, quoted.get(line.id) ?? { ...blankLine(line), quoted: false }])),
  }
}
