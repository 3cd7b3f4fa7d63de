import { Decimal } from '#shared/money'
import type { DeliveryTerm } from './delivery-terms'
import { landedCost, type LandedCost, type LandedCostBasis, type LandedCostOffer, type StatedAmount } from './landed-cost'
import { priceOutliers } from './outliers'
import { priceAtQuantity, type PriceBreak } from './price-at-quantity'

/** One opened quotation, as far as a comparison needs it. */
export interface OfferedTerms {
  quoteId: string
  currency: string
  deliveryTerm: DeliveryTerm
  creditDays: number | null
  /** Calendar date, ISO 8601; the last day still counts. */
  validUntil: string
  lines: readonly OfferedLine[]
}

export interface OfferedLine {
  lineId: string
  /** Pieces that a price is for. */
  priceUnit: number
  breaks: readonly PriceBreak[]
  /** Amount text; `0` is included in the price, null is not quoted. */
  oneTimeCost: string | null
  samplesPrice: string | null
  leadTimeDays: number
  minimumOrderQuantity: number
}

export interface AskedLine {
  lineId: string
  quantities: readonly number[]
  orderQuantity: number
  annualQuantity: number
}

/** What the buyer knows about an offer and the vendor does not quote. */
export interface BuyerFigures {
  freightPerShipment: StatedAmount
  inspectionPerShipment: StatedAmount
  yieldLoss: string | null
}

export type LineFlag = 'expired' | 'below-first-break' | 'below-minimum-order' | 'line-not-quoted' | 'outlier-below' | 'outlier-above' | 'incomplete'

export interface ComparedLine {
  quoteId: string
  quoted: boolean
  priceUnit: number | null
  prices: { quantity: number; unitPrice: string | null }[]
  unitPriceAtOrder: string | null
  breakUsed: number | null
  oneTimeCost: { kind: 'quoted' | 'included' | 'missing'; amount: string | null }
  samplesPrice: string | null
  leadTimeDays: number | null
  minimumOrderQuantity: number | null
  landed: LandedCost | null
  rank: number | null
  flags: LineFlag[]
  medianRatio: string | null
}

export type CommonBasis = Omit<LandedCostBasis, 'orderQuantity' | 'annualQuantity'>

const unitPriceAt = (line: OfferedLine, quantity: number): string | null => {
  const found = priceAtQuantity(line.breaks, quantity)
  return found.kind === 'price' ? new Decimal(found.price).div(line.priceUnit).toString() : null
}

const oneTimeOf = ({ oneTimeCost }: OfferedLine): ComparedLine['oneTimeCost'] => {
  if (oneTimeCost === null) return { kind: 'missing', amount: null }
  return { kind: new Decimal(oneTimeCost).isZero() ? 'included' : 'quoted', amount: oneTimeCost }
}

function asLandedOffer(terms: OfferedTerms, line: OfferedLine, figures: BuyerFigures): LandedCostOffer {
  const oneTime = oneTimeOf(line)
  return {
    currency: terms.currency,
    priceBasis: line.priceUnit,
    breaks: line.breaks,
    deliveryTerm: terms.deliveryTerm,
    oneTimeCost: oneTime.kind === 'quoted' ? { kind: 'quoted', amount: oneTime.amount! } : { kind: oneTime.kind },
    freightPerShipment: figures.freightPerShipment,
    inspectionPerShipment: figures.inspectionPerShipment,
    creditDays: terms.creditDays,
    leadTimeDays: line.leadTimeDays,
    yieldLoss: figures.yieldLoss,
  }
}

const NOTHING: BuyerFigures = { freightPerShipment: null, inspectionPerShipment: null, yieldLoss: null }

function notQuoted({ quoteId }: OfferedTerms, asked: AskedLine): ComparedLine {
  return {
    quoteId,
    quoted: false,
    priceUnit: null,
    prices: asked.quantities.map((quantity) => ({ quantity, unitPrice: null })),
    unitPriceAtOrder: null,
    breakUsed: null,
    oneTimeCost: { kind: 'missing', amount: null },
    samplesPrice: null,
    leadTimeDays: null,
    minimumOrderQuantity: null,
    landed: null,
    rank: null,
    flags: ['line-not-quoted'],
    medianRatio: null,
  }
}

function compareLine(terms: OfferedTerms, asked: AskedLine, basis: CommonBasis, figures: BuyerFigures, today: string): ComparedLine {
  const line = terms.lines.find(({ lineId }) => lineId === asked.lineId)
  if (!line) return notQuoted(terms, asked)

  const { orderQuantity, annualQuantity } = asked
  const atOrder = priceAtQuantity(line.breaks, orderQuantity)
  const landed = landedCost(asLandedOffer(terms, line, figures), { ...basis, orderQuantity, annualQuantity })
  const flags: LineFlag[] = []
  if (terms.validUntil < today) flags.push('expired')
  if (atOrder.kind === 'below-first-break') flags.push('below-first-break')
  if (orderQuantity < line.minimumOrderQuantity) flags.push('below-minimum-order')
  if (landed.landed === null) flags.push('incomplete')
  return {
    quoteId: terms.quoteId,
    quoted: true,
    priceUnit: line.priceUnit,
    prices: asked.quantities.map((quantity) => ({ quantity, unitPrice: unitPriceAt(line, quantity) })),
    unitPriceAtOrder: unitPriceAt(line, orderQuantity),
    breakUsed: atOrder.kind === 'price' ? atOrder.minimumQuantity : null,
    oneTimeCost: oneTimeOf(line),
    samplesPrice: line.samplesPrice,
    leadTimeDays: line.leadTimeDays,
    minimumOrderQuantity: line.minimumOrderQuantity,
    landed,
    rank: null,
    flags,
    medianRatio: null,
  }
}

/** Offers that could be ordered as they stand. */
const isRankable = ({ landed, flags }: ComparedLine) => landed?.landed != null && !flags.includes('expired') && !flags.includes('below-minimum-order')

function ranked(lines: ComparedLine[]): ComparedLine[] {
  const costs = lines.filter(isRankable).map(({ landed }) => new Decimal(landed!.landed!))
  // The unit price in the base currency shows a wrong currency or price unit even where cost is incomplete.
  const outliers = priceOutliers(lines.map(({ landed }) => landed?.lines[0]!.amount ?? null))
  return lines.map((line, index) => {
    const outlier = outliers[index] ?? null
    const rank = isRankable(line) ? 1 + costs.filter((cost) => cost.lt(line.landed!.landed!)).length : null
    const flags = outlier === null ? line.flags : [...line.flags, `outlier-${outlier.side}` as const]
    return { ...line, rank, flags, medianRatio: outlier?.ratio ?? null }
  })
}

/**
 * Puts the offers for one line side by side: price at every quantity that was asked, landed cost at the order
 * quantity with its working, rank by landed cost, and what a careful reader would ask about. Offers that have
 * expired, cannot be ordered at this quantity or lack a figure are shown and not ranked.
 *
 * @param today calendar date that validity is judged by, ISO 8601
 */
export function compareOffersForLine(asked: AskedLine, offers: readonly OfferedTerms[], basis: CommonBasis, figures: ReadonlyMap<string, BuyerFigures>, today: string): ComparedLine[] {
  return ranked(offers.map((terms) => compareLine(terms, asked, basis, figures.get(terms.quoteId) ?? NOTHING, today)))
}

export interface AwardedTotal {
  /** Exact sums in the offer's currency, decimal text. */
  pieces: string
  oneTime: string
  total: string
  /** Lines of the award that have no price at their quantity. */
  unpriced: string[]
}

/** What an award of some lines of an offer commits to: pieces at the break in force, and all quoted one-time cost. */
export function awardedTotal(terms: OfferedTerms, lines: readonly AskedLine[]): AwardedTotal {
  const unpriced: string[] = []
  let pieces = new Decimal(0)
  let oneTime = new Decimal(0)
  for (const { lineId, orderQuantity } of lines) {
    const line = terms.lines.find((each) => each.lineId === lineId)
    const price = line ? priceAtQuantity(line.breaks, orderQuantity) : null
    if (!line || price?.kind !== 'price') {
      unpriced.push(lineId)
      continue
    }
    pieces = pieces.plus(new Decimal(price.price).times(orderQuantity).div(line.priceUnit))
    oneTime = oneTime.plus(line.oneTimeCost ?? 0)
  }
  return { pieces: pieces.toString(), oneTime: oneTime.toString(), total: pieces.plus(oneTime).toString(), unpriced }
}
