import { Decimal } from '#shared/money'
import { coveredBy, type DeliveryTerm } from './delivery-terms'
import { rateOf, type ExchangeRates } from './exchange-rates'
import { priceAtQuantity, type PriceBreak } from './price-at-quantity'

/** What is the same for every offer of one comparison. Rates are decimal text: `0.08` for 8 %. */
export interface LandedCostBasis {
  orderQuantity: number
  /** Expected annual quantity, pieces. */
  annualQuantity: number
  /** Years over which one-time cost is spread. */
  years: number
  exchange: ExchangeRates
  capitalRatePerYear: string
  dutyRate: string
  insuranceRate: string
  /** Whether duty is taken on cost, insurance and freight, or on the goods alone. */
  customsValue: 'CIF' | 'FOB'
  /** Mean share of the lead time that stock is financed for, `0.5`. */
  stockShare: string
}

/** An amount in its own currency; `null` is "not stated", which is not zero. */
export type StatedAmount = { amount: string; currency: string } | null

export interface LandedCostOffer {
  currency: string
  /** Pieces that a price in the table is for: 1, 100 or 1000. */
  priceBasis: number
  breaks: readonly PriceBreak[]
  deliveryTerm: DeliveryTerm
  oneTimeCost: { kind: 'quoted'; amount: string } | { kind: 'included' } | { kind: 'missing' }
  /** Of one shipment of the order quantity; asked for only when the term leaves carriage to the buyer. */
  freightPerShipment: StatedAmount
  /** Receiving and incoming inspection of one shipment. */
  inspectionPerShipment: StatedAmount
  creditDays: number | null
  leadTimeDays: number | null
  /** Expected share of pieces lost, decimal text. */
  yieldLoss: string | null
}

export const COST_LINES = ['unit', 'freight', 'insurance', 'duty', 'one-time', 'terms', 'stock', 'inspection', 'yield'] as const
export type CostLineName = (typeof COST_LINES)[number]

/** One line per piece in the base currency, unrounded decimal text, with what it was made from. */
export interface CostLine {
  name: CostLineName
  /** Null when an input is missing. */
  amount: string | null
  /** The formula with the names of `inputs`. */
  formula: string
  inputs: Record<string, string | null>
  /** Names of the inputs that nobody has stated. */
  missing: string[]
  /** Set when the term already covers the line. */
  coveredByTerm: boolean
}

export interface LandedCost {
  currency: string
  lines: CostLine[]
  /** Sum of all lines, unrounded; null while anything is missing, since missing is not zero. */
  landed: string | null
  perYear: string | null
  /** Sum of the lines that could be worked out: for reading only, never for ranking. */
  partial: string
  missing: string[]
}

type Inputs = Record<string, Decimal | null>

function line(name: CostLineName, formula: string, inputs: Inputs, work: (known: Record<string, Decimal>) => Decimal): CostLine {
  const missing = Object.keys(inputs).filter((key) => inputs[key] === null)
  const amount = missing.length === 0 ? work(inputs as Record<string, Decimal>).toString() : null
  const shown = Object.fromEntries(Object.entries(inputs).map(([key, value]) => [key, value === null ? null : value.toString()]))
  return { name, amount, formula, inputs: shown, missing, coveredByTerm: false }
}

const covered = (name: CostLineName): CostLine => ({ name, amount: '0', formula: '0', inputs: {}, missing: [], coveredByTerm: true })

const text = (value: string | number | null): Decimal | null => (value === null ? null : new Decimal(value))
const amountOf = ({ amount }: CostLine): Decimal | null => text(amount)

/** The stated amount and its rate; both null when it is not stated, so that both are named as missing once. */
function stated(name: string, value: StatedAmount, exchange: ExchangeRates): Inputs {
  if (value === null) return { [name]: null }
  return { [name]: new Decimal(value.amount), [`rate ${value.currency}`]: rateOf(exchange, value.currency) }
}

const product = (known: Record<string, Decimal>) => Object.values(known).reduce((total, factor) => total.times(factor), new Decimal(1))

function unitLine(offer: LandedCostOffer, basis: LandedCostBasis): CostLine {
  const found = priceAtQuantity(offer.breaks, basis.orderQuantity)
  const rateName = `rate ${offer.currency}`
  const inputs: Inputs = {
    price: found.kind === 'price' ? new Decimal(found.price) : null,
    'price basis': new Decimal(offer.priceBasis),
    [rateName]: rateOf(basis.exchange, offer.currency),
  }
  return line('unit', `price / price basis × ${rateName}`, inputs, (known) => known.price!.div(known['price basis']!).times(known[rateName]!))
}

function perShipmentLine(name: 'freight' | 'inspection', value: StatedAmount, basis: LandedCostBasis): CostLine {
  const cost = stated(`${name} per shipment`, value, basis.exchange)
  const formula = `${Object.keys(cost).join(' × ')} / order quantity`
  return line(name, formula, { ...cost, 'order quantity': new Decimal(basis.orderQuantity) }, (known) => {
    const { 'order quantity': quantity, ...factors } = known
    return product(factors).div(quantity!)
  })
}

function oneTimeLine(offer: LandedCostOffer, basis: LandedCostBasis): CostLine {
  if (offer.oneTimeCost.kind === 'included') return line('one-time', '0, included in the price', {}, () => new Decimal(0))
  const value = offer.oneTimeCost.kind === 'quoted' ? { amount: offer.oneTimeCost.amount, currency: offer.currency } : null
  const cost = stated('one-time cost', value, basis.exchange)
  const formula = `${Object.keys(cost).join(' × ')} / (annual quantity × years)`
  return line('one-time', formula, { ...cost, 'annual quantity': new Decimal(basis.annualQuantity), years: new Decimal(basis.years) }, (known) => {
    const { 'annual quantity': annual, years, ...factors } = known
    return product(factors).div(annual!.times(years!))
  })
}

function goodsLines(offer: LandedCostOffer, basis: LandedCostBasis): [CostLine, CostLine, CostLine, CostLine] {
  const terms = coveredBy(offer.deliveryTerm)
  const unit = unitLine(offer, basis)
  const freight = terms.carriage ? covered('freight') : perShipmentLine('freight', offer.freightPerShipment, basis)
  const insurance = terms.insurance
    ? covered('insurance')
    : line('insurance', 'unit × insurance rate', { unit: amountOf(unit), 'insurance rate': text(basis.insuranceRate) }, product)
  const base: Inputs = basis.customsValue === 'FOB' ? { unit: amountOf(unit) } : { unit: amountOf(unit), freight: amountOf(freight), insurance: amountOf(insurance) }
  const duty = terms.importDuty ? covered('duty') : rateOnSum('duty', base, 'duty rate', basis.dutyRate)
  return [unit, freight, insurance, duty]
}

function rateOnSum(name: CostLineName, addends: Inputs, rateName: string, rate: string | null): CostLine {
  return line(name, `(${Object.keys(addends).join(' + ')}) × ${rateName}`, { ...addends, [rateName]: text(rate) }, (known) => {
    const { [rateName]: factor, ...parts } = known
    return Object.values(parts).reduce((sum, part) => sum.plus(part), new Decimal(0)).times(factor!)
  })
}

const sum = (lines: readonly CostLine[]) => lines.reduce((total, { amount }) => (amount === null ? total : total.plus(amount)), new Decimal(0))

/** Lines that other lines rest on: their gaps are named where they arise. */
const DERIVED: ReadonlySet<string> = new Set<CostLineName>(['unit', 'freight', 'insurance', 'duty'])

/**
 * Landed cost of one piece in the base currency at the order quantity, line by line with its working.
 * Nothing is rounded and nothing missing counts as zero.
 *
 *     landed = unit + freight + insurance + duty + one-time + terms + stock + inspection + yield
 *
 * `terms` is an advantage and negative; `stock` finances a share of the lead time.
 *
 * @throws RangeError when a quantity or the number of years is not positive
 */
export function landedCost(offer: LandedCostOffer, basis: LandedCostBasis): LandedCost {
  if (!(basis.annualQuantity > 0) || !(basis.years > 0)) throw new RangeError('annualQuantity and years must be positive')
  if (!(offer.priceBasis > 0)) throw new RangeError(`priceBasis must be positive: ${offer.priceBasis}`)

  const goods = goodsLines(offer, basis)
  const [unit, freight, insurance, duty] = goods
  const capital = { unit: amountOf(unit), 'capital rate': text(basis.capitalRatePerYear) }
  const delivered = { unit: amountOf(unit), freight: amountOf(freight), insurance: amountOf(insurance), duty: amountOf(duty) }
  const lines = [
    ...goods,
    oneTimeLine(offer, basis),
    line('terms', '−unit × capital rate × credit days / 365', { ...capital, 'credit days': text(offer.creditDays) }, (known) => product(known).div(365).neg()),
    line('stock', 'unit × capital rate × lead time days / 365 × stock share', { ...capital, 'lead time days': text(offer.leadTimeDays), 'stock share': text(basis.stockShare) }, (known) => product(known).div(365)),
    perShipmentLine('inspection', offer.inspectionPerShipment, basis),
    rateOnSum('yield', delivered, 'yield loss', offer.yieldLoss),
  ]

  const missing = [...new Set(lines.flatMap((row) => row.missing))].filter((name) => !DERIVED.has(name))
  const total = lines.every(({ amount }) => amount !== null) ? sum(lines) : null
  return {
    currency: basis.exchange.base,
    lines,
    landed: total?.toString() ?? null,
    perYear: total?.times(basis.annualQuantity).toString() ?? null,
    partial: sum(lines).toString(),
    missing,
  }
}
