import type { Quote } from '#shared/contracts/quotes'
import type { RfqTerms } from '#shared/contracts/rfqs'
import { Decimal } from '#shared/money'

export interface AskedLine {
  id: string
  quantities: readonly number[]
}

interface AskedTerms {
  currency: string
  deliveryRule: string
  terms: Pick<RfqTerms, 'validityDays'>
}

type Hint = Quote['hints'][number]
type Offer = Omit<Quote, 'hints'>

const MS_PER_DAY = 86_400_000

/** What is unusual about an offer without being wrong: shown to its vendor and, once opened, to the buyer. */
export function quoteHints(offer: Offer, rfq: AskedTerms, asked: readonly AskedLine[]): Hint[] {
  return [...termHints(offer, rfq), ...offer.lines.flatMap((line, index) => lineHints(line, index, asked)), ...missingHints(offer, asked)]
}

function termHints(offer: Offer, rfq: AskedTerms): Hint[] {
  const hints: Hint[] = []
  if (offer.currency !== rfq.currency) hints.push({ code: 'other-currency', path: 'currency', message: `Quoted in ${offer.currency}; the enquiry asks for ${rfq.currency}.` })
  if (offer.deliveryRule !== rfq.deliveryRule) hints.push({ code: 'other-delivery', path: 'deliveryRule', message: `Quoted ${offer.deliveryRule}; the enquiry asks for ${rfq.deliveryRule}.` })
  const days = Math.floor((Date.parse(offer.validUntil) - Date.parse(offer.submittedAt)) / MS_PER_DAY)
  if (days < rfq.terms.validityDays) hints.push({ code: 'short-validity', path: 'validUntil', message: `Valid for ${days} days; the enquiry asks for ${rfq.terms.validityDays}.` })
  return hints
}

function lineHints(line: Offer['lines'][number], index: number, asked: readonly AskedLine[]): Hint[] {
  const path = (field: string) => `lines.${index}.${field}`
  const hints: Hint[] = []
  line.priceBreaks.forEach((row, place) => {
    const before = line.priceBreaks[place - 1]
    if (before && new Decimal(row.price).gt(before.price)) {
      hints.push({ code: 'dearer-break', path: path(`priceBreaks.${place}.price`), message: `From ${row.fromQuantity} pieces the price is higher than from ${before.fromQuantity}.` })
    }
  })
  const smallest = line.priceBreaks[0]?.fromQuantity
  if (smallest !== undefined && line.minimumOrderQuantity > smallest) {
    hints.push({ code: 'minimum-above-break', path: path('minimumOrderQuantity'), message: `The minimum order of ${line.minimumOrderQuantity} lies above the break at ${smallest}.` })
  }
  if (line.packQuantity && line.minimumOrderQuantity % line.packQuantity !== 0) {
    hints.push({ code: 'minimum-not-packs', path: path('minimumOrderQuantity'), message: `The minimum order is not a multiple of the pack of ${line.packQuantity}.` })
  }
  const uncovered = asked.find(({ id }) => id === line.lineId)?.quantities.filter((quantity) => smallest !== undefined && quantity < smallest) ?? []
  if (uncovered.length > 0) hints.push({ code: 'quantity-not-quoted', path: path('priceBreaks'), message: `No price for the asked ${uncovered.join(' and ')} pieces.` })
  return hints
}

function missingHints(offer: Offer, asked: readonly AskedLine[]): Hint[] {
  const quoted = new Set(offer.lines.map(({ lineId }) => lineId))
  const missing = asked.filter(({ id }) => !quoted.has(id)).length
  return missing === 0 ? [] : [{ code: 'parts-not-quoted', path: 'lines', message: `${missing} of ${asked.length} asked parts ${missing === 1 ? 'is' : 'are'} not quoted.` }]
}
