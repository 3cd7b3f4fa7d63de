import type { Actor, Transaction } from '#server/db/as-actor'
import { AppError } from '#server/errors'
import { canReadQuotes } from '#server/policies/rfqs'
import { listQuotes } from '#server/services/quotes/read-quotes'
import type { RfqRow } from '#server/services/rfqs/lock-rfq'
import { findRfq, readLines } from '#server/services/rfqs/read-rfq'
import { companyToday } from '#server/services/samples/request-samples'
import type { Comparison, ComparisonBasis } from '#shared/contracts/awards'
import type { Quote } from '#shared/contracts/quotes'
import { compareOffersForLine, type OfferedTerms } from '#shared/costing/compare-offers'

export async function compareRfq(tx: Transaction, actor: Actor, rfqId: string, basis: ComparisonBasis): Promise<Comparison> {
  return buildComparison(tx, actor, await findRfq(tx, actor, rfqId), basis)
}

/** The quotations in force of an opened enquiry, side by side on the given terms. */
export async function buildComparison(tx: Transaction, actor: Actor, rfq: RfqRow, basis: ComparisonBasis): Promise<Comparison> {
  if (!canReadQuotes(actor, rfq)) throw new AppError('rfq-not-opened', 'The quotations of this enquiry have not been opened.')
  const quotes = (await listQuotes(tx, actor, rfq.id)).filter(({ state }) => state === 'submitted')
  const lines = await readLines(tx, rfq.id)
  requireKnown(basis, quotes, lines)
  const comparedOn = await companyToday(tx, rfq.companyId)
  const terms = quotes.map(offeredTerms)
  const figures = new Map(basis.offers.map(({ quoteId, ...known }) => [quoteId, known]))

  return {
    rfqId: rfq.id,
    rfqNumber: rfq.number,
    issueNumber: rfq.issueNumber,
    basis,
    comparedOn,
    offers: quotes.map((quote) => presentOffer(quote, rfq, comparedOn)),
    lines: lines.map((line) => {
      const chosen = basis.lines.find(({ lineId }) => lineId === line.id)
      const orderQuantity = chosen?.orderQuantity ?? line.orderQuantity
      const annualQuantity = chosen?.annualQuantity ?? line.annualQuantity ?? orderQuantity
      const asked = { lineId: line.id, quantities: line.quantities, orderQuantity, annualQuantity }
      const { position, release } = line
      return {
        ...asked,
        position,
        partNumber: release.partNumber,
        title: release.title,
        revision: release.revision,
        specificationSha256: release.specificationSha256,
        offers: compareOffersForLine(asked, terms, basis, figures, comparedOn),
      }
    }),
  }
}

/** What the basis names must be of this enquiry: another's identifier answers as one that does not exist. */
function requireKnown(basis: ComparisonBasis, quotes: Quote[], lines: { id: string }[]): void {
  const fields: Record<string, string> = {}
  basis.lines.forEach(({ lineId }, index) => {
    if (!lines.some(({ id }) => id === lineId)) fields[`basis.lines.${index}.lineId`] = 'The enquiry has no such part.'
  })
  basis.offers.forEach(({ quoteId }, index) => {
    if (!quotes.some(({ id }) => id === quoteId)) fields[`basis.offers.${index}.quoteId`] = 'The enquiry has no such quotation in force.'
  })
  const [first] = Object.values(fields)
  if (first) throw new AppError('invalid-input', first, fields)
}

export function offeredTerms(quote: Quote): OfferedTerms {
  return {
    quoteId: quote.id,
    currency: quote.currency,
    deliveryTerm: quote.deliveryRule,
    creditDays: quote.paymentDays,
    validUntil: quote.validUntil,
    lines: quote.lines.map((line) => ({
      lineId: line.lineId,
      priceUnit: line.priceUnit,
      breaks: line.priceBreaks.map(({ fromQuantity, price }) => ({ minimumQuantity: fromQuantity, price })),
      oneTimeCost: line.oneTimeCost,
      samplesPrice: line.samplesPrice,
      leadTimeDays: line.firstOrderLeadTimeDays,
      minimumOrderQuantity: line.minimumOrderQuantity,
    })),
  }
}

function presentOffer(quote: Quote, rfq: RfqRow, comparedOn: string): Comparison['offers'][number] {
  const { id, vendorCompanyId, vendorName, revision, vendorReference, issueNumber, sha256, submittedAt, currency, deliveryRule, deliveryPlace, paymentTerms, paymentDays, validUntil, remarks } = quote
  const flags: Comparison['offers'][number]['flags'] = []
  if (validUntil < comparedOn) flags.push('expired')
  if (issueNumber !== rfq.issueNumber) flags.push('other-issue')
  return { quoteId: id, vendorCompanyId, vendorName, revision, vendorReference, issueNumber, sha256, submittedAt, currency, deliveryRule, deliveryPlace, paymentTerms, paymentDays, validUntil, remarks, flags }
}
