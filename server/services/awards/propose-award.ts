import type { Actor, Transaction } from '#server/db/as-actor'
import { awardLines, awards, comparisons } from '#server/db/schema/index'
import { AppError, notFound } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { canProposeAward } from '#server/policies/awards'
import { recordAudit } from '#server/services/audit/record-audit'
import { lockRfq, type RfqRow } from '#server/services/rfqs/lock-rfq'
import { listQuotes } from '#server/services/quotes/read-quotes'
import { canonicalJson } from '#shared/canonical-json'
import type { Award, Comparison, proposeAward as contract } from '#shared/contracts/awards'
import type { BodyOf } from '#shared/contracts/endpoint'
import { awardedTotal } from '#shared/costing/compare-offers'
import { rateOf } from '#shared/costing/exchange-rates'
import { Decimal, roundedAmountText } from '#shared/money'
import { and, eq, inArray, max } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { buildComparison, offeredTerms } from './build-comparison'
import { readAward } from './read-awards'

type Proposal = BodyOf<typeof contract>

/**
 * Freezes the comparison and proposes one of its quotations. Proposals of the same parts that were not ordered
 * become void: an approval belongs to the comparison it was given on.
 */
export async function proposeAward(tx: Transaction, actor: Actor, rfqId: string, proposal: Proposal): Promise<Award> {
  const { row: rfq, now } = await lockRfq(tx, actor, rfqId)
  if (!canProposeAward(actor, rfq)) throw new AppError('not-allowed', 'A buyer proposes an award.')
  if (!rfq.openedAt) throw new AppError('rfq-not-opened', 'The quotations of this enquiry have not been opened.')
  if (rfq.state !== 'opened') throw new AppError('conflict', `The enquiry is ${rfq.state} already.`)

  const comparison = await buildComparison(tx, actor, rfq, proposal.basis)
  const value = await valueOf(tx, actor, comparison, proposal)
  await voidEarlier(tx, actor, rfq, proposal.lineIds)
  const frozen = await freeze(tx, actor, rfq, comparison)

  const { quoteId, reason } = proposal
  const { base, rates } = proposal.basis.exchange
  const owners = { rfqId, companyId: rfq.companyId, vendorCompanyId: value.vendorCompanyId }
  const [award] = await tx
    .insert(awards)
    .values({ ...owners, comparisonId: frozen.id, quoteId, proposedBy: actor.personId, total: value.total, currency: base, rates, reason, proposedAt: now })
    .returning({ id: awards.id })
  const awardId = award!.id
  await tx.insert(awardLines).values(value.lines.map(({ lineId, orderQuantity }) => ({ ...owners, awardId, lineId, orderQuantity })))

  await recordAudit(tx, actor, { type: 'award-proposed', rfqId, awardId, quoteId, comparisonSha256: frozen.sha256 })
  await queueMail(tx, actor, { template: 'award-proposed', props: { awardId, rfqNumber: rfq.number }, to: { companyId: rfq.companyId, roles: ['approver'] } })
  return readAward(tx, actor, awardId)
}

/** What the proposal commits to, in the comparison's currency, at the comparison's rate. */
async function valueOf(tx: Transaction, actor: Actor, comparison: Comparison, { quoteId, lineIds, basis }: Proposal) {
  const offer = comparison.offers.find((each) => each.quoteId === quoteId)
  const quote = (await listQuotes(tx, actor, comparison.rfqId)).find(({ id }) => id === quoteId)
  if (!offer || !quote) throw notFound('quotation in force')
  if (offer.flags.includes('expired')) throw new AppError('offer-expired', `This quotation was valid until ${offer.validUntil}; it cannot be awarded without an extension.`)

  const lines = comparison.lines.filter(({ lineId }) => lineIds.includes(lineId))
  if (lines.length !== new Set(lineIds).size) throw new AppError('invalid-input', 'The enquiry has no such part.', { lineIds: 'The enquiry has no such part.' })
  const belowMinimum = lines.find((line) => line.offers.find((each) => each.quoteId === quoteId)!.flags.includes('below-minimum-order'))
  if (belowMinimum) throw new AppError('price-missing', `The vendor delivers ${belowMinimum.partNumber} only in larger quantities; raise the order quantity.`)

  const { total, unpriced } = awardedTotal(offeredTerms(quote), lines)
  if (unpriced.length > 0) {
    const parts = lines.filter(({ lineId }) => unpriced.includes(lineId)).map(({ partNumber }) => partNumber)
    throw new AppError('price-missing', `The quotation has no price for ${parts.join(', ')} at the order quantity.`)
  }
  const rate = rateOf(basis.exchange, quote.currency)
  if (!rate) throw new AppError('rate-missing', `Enter the rate of ${quote.currency} to ${basis.exchange.base}.`, { [`basis.exchange.rates.${quote.currency}`]: 'This rate is missing.' })
  return { vendorCompanyId: quote.vendorCompanyId, lines, total: roundedAmountText(new Decimal(total).times(rate)) }
}

async function voidEarlier(tx: Transaction, actor: Actor, rfq: RfqRow, lineIds: string[]): Promise<void> {
  const earlier = await tx
    .selectDistinct({ id: awards.id, state: awards.state })
    .from(awards)
    .innerJoin(awardLines, eq(awardLines.awardId, awards.id))
    .where(and(eq(awards.rfqId, rfq.id), inArray(awardLines.lineId, lineIds), inArray(awards.state, ['proposed', 'approved', 'ordered'])))
  if (earlier.some(({ state }) => state === 'ordered')) throw new AppError('line-awarded', 'A part of this proposal was ordered already.')
  for (const { id } of earlier) {
    await tx.update(awards).set({ state: 'void' }).where(eq(awards.id, id))
    await recordAudit(tx, actor, { type: 'award-void', rfqId: rfq.id, awardId: id })
  }
}

async function freeze(tx: Transaction, actor: Actor, rfq: RfqRow, comparison: Comparison): Promise<{ id: string; sha256: string }> {
  const content = Buffer.from(canonicalJson({ schema: 'dotside/comparison/1', ...comparison }), 'utf8')
  const sha256 = createHash('sha256').update(content).digest('hex')
  const [last] = await tx.select({ number: max(comparisons.number) }).from(comparisons).where(eq(comparisons.rfqId, rfq.id))
  const [row] = await tx
    .insert(comparisons)
    .values({ rfqId: rfq.id, companyId: rfq.companyId, createdBy: actor.personId, number: (last?.number ?? 0) + 1, content, sha256 })
    .returning({ id: comparisons.id })
  return { id: row!.id, sha256 }
}
