import type { Transaction } from '#server/db/as-actor'
import { companies, people, rfqs } from '#server/db/schema/index'
import type { AwardRow } from '#server/services/awards/read-awards'
import { ORDER_SCHEMA, type OrderContent, type OrderInput } from '#shared/contracts/orders'
import type { Award } from '#shared/contracts/awards'
import type { Quote } from '#shared/contracts/quotes'
import { priceAtQuantity } from '#shared/costing/price-at-quantity'
import { Decimal, roundedAmountText } from '#shared/money'
import { eq } from 'drizzle-orm'

interface OrderSources {
  award: AwardRow
  lines: Award['lines']
  titles: ReadonlyMap<string, { title: string; specificationSha256: string }>
  quote: Quote
  input: OrderInput
  number: string
  today: string
  buyerId: string
}

/** The order as it is kept and printed: prices as quoted, totals from unrounded products. */
export async function orderContent(tx: Transaction, sources: OrderSources): Promise<OrderContent> {
  const { award, quote, input, number, today, buyerId } = sources
  const [rfq] = await tx.select({ number: rfqs.number }).from(rfqs).where(eq(rfqs.id, award.rfqId))
  const [buyer] = await tx.select({ name: people.name, email: people.email }).from(people).where(eq(people.id, buyerId))
  const [vendor] = await tx.select({ name: companies.name, address: companies.address }).from(companies).where(eq(companies.id, award.vendorCompanyId))
  const priced = sources.lines.map((line) => pricedLine(line, sources))
  const oneTimeCosts = sources.lines.flatMap((line) => oneTimeCost(line, quote))
  const total = [...priced.map(({ exact }) => exact), ...oneTimeCosts.map(({ amount }) => new Decimal(amount))].reduce((sum, amount) => sum.plus(amount), new Decimal(0))

  const { legalEntity, vatNumber, billTo, shipTo, vendorNumber, ...rest } = input
  return {
    schema: ORDER_SCHEMA,
    number,
    revision: 1,
    date: today,
    buyer: { legalEntity, vatNumber, billTo, shipTo, contactName: buyer!.name, contactEmail: buyer!.email },
    vendor: { name: vendor?.name ?? quote.vendorName, number: vendorNumber, address: vendor?.address ?? '' },
    rfqNumber: rfq!.number,
    quotation: { reference: quote.vendorReference, revision: quote.revision, sha256: quote.sha256, validUntil: quote.validUntil },
    currency: quote.currency,
    lines: priced.map(({ line }) => line),
    oneTimeCosts,
    total: roundedAmountText(total),
    deliveryRule: quote.deliveryRule,
    deliveryPlace: quote.deliveryPlace,
    paymentTerms: quote.paymentTerms,
    ...rest,
  }
}

function pricedLine({ lineId, position, partNumber, revision, orderQuantity }: Award['lines'][number], { quote, titles }: OrderSources) {
  const offered = quote.lines.find((line) => line.lineId === lineId)!
  const breaks = offered.priceBreaks.map(({ fromQuantity, price }) => ({ minimumQuantity: fromQuantity, price }))
  const found = priceAtQuantity(breaks, orderQuantity)
  // The proposal was refused without a price, and a quotation never changes.
  if (found.kind !== 'price') throw new RangeError(`no price for line ${lineId} at ${orderQuantity}`)
  const exact = new Decimal(found.price).times(orderQuantity).div(offered.priceUnit)
  const { title, specificationSha256 } = titles.get(lineId)!
  const line: OrderContent['lines'][number] = {
    position,
    partNumber,
    description: title,
    drawingRevision: revision,
    specificationSha256,
    quantity: orderQuantity,
    unit: 'pcs',
    price: found.price,
    priceUnit: offered.priceUnit,
    lineTotal: roundedAmountText(exact),
    countryOfOrigin: offered.countryOfOrigin,
  }
  return { line, exact }
}

function oneTimeCost({ lineId, position }: Award['lines'][number], quote: Quote): OrderContent['oneTimeCosts'] {
  const { oneTimeCost: amount, oneTimeCostText } = quote.lines.find((line) => line.lineId === lineId)!
  return amount === null || new Decimal(amount).isZero() ? [] : [{ position, text: oneTimeCostText || 'One-time cost', amount }]
}
