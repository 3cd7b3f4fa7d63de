import { Decimal } from '#shared/money'

/** An asked part with the quantities asked for, in pieces, rising. */
export interface AskedPart {
  id: string
  quantities: readonly number[]
}

/** What the enquiry asks for, as far as an offer is held against it. */
export interface AskedTerms {
  /** ISO 4217 code. */
  currency: string
  /** Incoterms® 2020 rule. */
  deliveryRule: string
  terms: { validityDays: number }
}

/** An offer, or one that is still being typed: what is not there yet is null and hints at nothing. */
export interface HintedOffer {
  currency: string
  deliveryRule: string
  /** Calendar date. */
  validUntil: string | null
  /** Moment from which the validity counts (ISO 8601). */
  submittedAt: string
  lines: readonly HintedLine[]
}

export interface HintedLine {
  lineId: string
  /** Prices of one line are for the same number of pieces. */
  priceBreaks: readonly { fromQuantity: number | null; price: string | null }[]
  minimumOrderQuantity: number | null
  packQuantity: number | null
}

/** `path` leads into the offer: `lines.0.priceBreaks.1.price`. */
export interface QuoteHint {
  code: string
  path: string
  message: string
}

const MS_PER_DAY = 86_400_000

/** What is unusual about an offer without being wrong: shown to its vendor and, once opened, to the buyer. */
export function quoteHints(offer: HintedOffer, rfq: AskedTerms, asked: readonly AskedPart[]): QuoteHint[] {
  return [...termHints(offer, rfq), ...offer.lines.flatMap((line, index) => lineHints(line, `lines.${index}`, asked)), ...missingHints(offer, asked)]
}

function termHints(offer: HintedOffer, rfq: AskedTerms): QuoteHint[] {
  const hints: QuoteHint[] = []
  if (offer.currency !== rfq.currency) hints.push({ code: 'other-currency', path: 'currency', message: `Quoted in ${offer.currency}; the enquiry asks for ${rfq.currency}.` })
  if (offer.deliveryRule !== rfq.deliveryRule) hints.push({ code: 'other-delivery', path: 'deliveryRule', message: `Quoted ${offer.deliveryRule}; the enquiry asks for ${rfq.deliveryRule}.` })
  if (offer.validUntil === null) return hints
  const days = Math.floor((Date.parse(offer.validUntil) - Date.parse(offer.submittedAt)) / MS_PER_DAY)
  if (days < rfq.terms.validityDays) hints.push({ code: 'short-validity', path: 'validUntil', message: `Valid for ${Math.max(days, 0)} days; the enquiry asks for ${rfq.terms.validityDays}.` })
  return hints
}

function lineHints(line: HintedLine, path: string, asked: readonly AskedPart[]): QuoteHint[] {
  return [...breakHints(line, path), ...minimumHints(line, path), ...coverHints(line, path, asked)]
}

function breakHints({ priceBreaks }: HintedLine, path: string): QuoteHint[] {
  const hints: QuoteHint[] = []
  let before: { fromQuantity: number; price: string } | null = null
  priceBreaks.forEach(({ fromQuantity, price }, place) => {
    if (fromQuantity === null || price === null) return
    if (before && new Decimal(price).gt(before.price)) {
      hints.push({ code: 'dearer-break', path: `${path}.priceBreaks.${place}.price`, message: `From ${fromQuantity} pieces the price is higher than from ${before.fromQuantity}.` })
    }
    before = { fromQuantity, price }
  })
  return hints
}

const smallestOf = ({ priceBreaks }: HintedLine): number | null => priceBreaks.find(({ fromQuantity }) => fromQuantity !== null)?.fromQuantity ?? null

function minimumHints(line: HintedLine, path: string): QuoteHint[] {
  const { minimumOrderQuantity: minimum, packQuantity: pack } = line
  if (minimum === null) return []
  const hints: QuoteHint[] = []
  const smallest = smallestOf(line)
  const place = `${path}.minimumOrderQuantity`
  if (smallest !== null && minimum > smallest) hints.push({ code: 'minimum-above-break', path: place, message: `The minimum order of ${minimum} lies above the break at ${smallest}.` })
  if (pack && minimum % pack !== 0) hints.push({ code: 'minimum-not-packs', path: place, message: `The minimum order is not a multiple of the pack of ${pack}.` })
  return hints
}

function coverHints(line: HintedLine, path: string, asked: readonly AskedPart[]): QuoteHint[] {
  const smallest = smallestOf(line)
  const quantities = asked.find(({ id }) => id === line.lineId)?.quantities ?? []
  const uncovered = quantities.filter((quantity) => smallest !== null && quantity < smallest)
  if (uncovered.length === 0) return []
  return [{ code: 'quantity-not-quoted', path: `${path}.priceBreaks`, message: `No price for the asked ${uncovered.join(' and ')} pieces.` }]
}

function missingHints(offer: HintedOffer, asked: readonly AskedPart[]): QuoteHint[] {
  const quoted = new Set(offer.lines.map(({ lineId }) => lineId))
  const missing = asked.filter(({ id }) => !quoted.has(id)).length
  return missing === 0 ? [] : [{ code: 'parts-not-quoted', path: 'lines', message: `${missing} of ${asked.length} asked parts ${missing === 1 ? 'is' : 'are'} not quoted.` }]
}
