import type { Actor, Transaction } from '#server/db/as-actor'
import { awardLines, awards, comparisons, companies, memberships, purchaseOrders, quotes, rfqLines, rfqs, specificationReleases } from '#server/db/schema/index'
import { AppError, notFound } from '#server/errors'
import { canReadAward, isApprover, readableAwards } from '#server/policies/awards'
import { lockRfq } from '#server/services/rfqs/lock-rfq'
import { companyToday } from '#server/services/samples/request-samples'
import { namesOf, personOf, type Names } from '#server/services/specifications/read-revision'
import type { Award, AwardSummary, Comparison } from '#shared/contracts/awards'
import { Decimal, type Money } from '#shared/money'
import { approvalRefusal, type AwardState } from '#shared/workflow/award-state'
import { and, asc, desc, eq, type SQL } from 'drizzle-orm'

export type AwardRow = typeof awards.$inferSelect

interface FoundAward {
  award: AwardRow
  rfqNumber: string
  rfqTitle: string
  vendorName: string | null
  orderId: string | null
}

const selectAwards = (tx: Transaction, condition: SQL | undefined) =>
  tx
    .select({ award: awards, rfqNumber: rfqs.number, rfqTitle: rfqs.title, vendorName: companies.name, orderId: purchaseOrders.id })
    .from(awards)
    .innerJoin(rfqs, eq(rfqs.id, awards.rfqId))
    .leftJoin(companies, eq(companies.id, awards.vendorCompanyId))
    .leftJoin(purchaseOrders, eq(purchaseOrders.awardId, awards.id))
    .where(condition)
    .orderBy(desc(awards.proposedAt))
    .limit(500)

export async function listAwards(tx: Transaction, actor: Actor, rfqId?: string): Promise<AwardSummary[]> {
  const rows = await selectAwards(tx, and(readableAwards(actor), rfqId ? eq(awards.rfqId, rfqId) : undefined))
  const names = await namesOf(
    tx,
    rows.flatMap(({ award }) => [award.proposedBy, award.decidedBy]),
  )
  return rows.map((row) => summaryOf(row, names))
}

function summaryOf({ award, rfqNumber, rfqTitle, vendorName, orderId }: FoundAward, names: Names): AwardSummary {
  return {
    id: award.id,
    rfqId: award.rfqId,
    rfqNumber,
    rfqTitle,
    state: award.state,
    vendorCompanyId: award.vendorCompanyId,
    vendorName: vendorName ?? '—',
    total: { amount: award.total, currency: award.currency },
    proposedBy: personOf(names, award.proposedBy).name,
    proposedAt: award.proposedAt.toISOString(),
    decidedBy: award.decidedBy && personOf(names, award.decidedBy).name,
    decidedAt: award.decidedAt?.toISOString() ?? null,
    orderId,
  }
}

export async function findAward(tx: Transaction, actor: Actor, awardId: string): Promise<AwardRow> {
  const [row] = await tx.select().from(awards).where(eq(awards.id, awardId))
  if (!row || !canReadAward(actor, row)) throw notFound('award')
  return row
}

/**
 * The award locked until the transaction ends: who decides second finds it decided. Its enquiry is locked before it,
 * as a proposal does, so that nothing is decided of an enquiry that is cancelled at the same moment.
 */
export async function lockAward(tx: Transaction, actor: Actor, awardId: string): Promise<AwardRow> {
  const { rfqId } = await findAward(tx, actor, awardId)
  await lockRfq(tx, actor, rfqId)
  const [row] = await tx.select().from(awards).where(eq(awards.id, awardId)).for('update')
  if (!row || !canReadAward(actor, row)) throw notFound('award')
  return row
}

export async function readAward(tx: Transaction, actor: Actor, awardId: string): Promise<Award> {
  const [found] = await selectAwards(tx, eq(awards.id, awardId))
  if (!found || !canReadAward(actor, found.award)) throw notFound('award')
  const { award } = found
  const names = await namesOf(tx, [award.proposedBy, award.decidedBy])
  const [comparison] = await tx.select().from(comparisons).where(eq(comparisons.id, award.comparisonId))
  const content = JSON.parse(comparison!.content.toString('utf8')) as Comparison & { schema: string }
  const offer = content.offers.find(({ quoteId }) => quoteId === award.quoteId)!
  return {
    ...summaryOf(found, names),
    quoteId: award.quoteId,
    quoteRevision: offer.revision,
    lines: await readAwardLines(tx, awardId),
    reason: award.reason,
    decisionReason: award.decisionReason,
    comparisonNumber: comparison!.number,
    comparisonSha256: comparison!.sha256,
    comparison: content,
    approval: isApprover(actor, award) ? { refusal: await refusalFor(tx, actor, award, comparison!.sha256) } : null,
  }
}

export async function readAwardLines(tx: Transaction, awardId: string): Promise<Award['lines']> {
  return tx
    .select({ lineId: awardLines.lineId, position: rfqLines.position, partNumber: specificationReleases.partNumber, revision: specificationReleases.revision, orderQuantity: awardLines.orderQuantity })
    .from(awardLines)
    .innerJoin(rfqLines, eq(rfqLines.id, awardLines.lineId))
    .innerJoin(specificationReleases, eq(specificationReleases.id, rfqLines.releaseId))
    .where(eq(awardLines.awardId, awardId))
    .orderBy(asc(rfqLines.position))
}

/** A cancelled enquiry takes its proposals and approvals with it. */
export async function requireEnquiryOpen(tx: Transaction, { rfqId }: Pick<AwardRow, 'rfqId'>): Promise<void> {
  const [rfq] = await tx.select({ state: rfqs.state }).from(rfqs).where(eq(rfqs.id, rfqId))
  if (rfq?.state === 'cancelled') throw new AppError('rfq-cancelled', 'This enquiry was cancelled; nothing of it is awarded or ordered any more.')
}

/** Why this person could not approve now; null when they could. */
export async function refusalFor(tx: Transaction, actor: Actor, award: AwardRow, comparisonSha256: string) {
  const total: Money = { amount: award.total, currency: award.currency }
  const state: AwardState =
    award.state === 'proposed' ? { phase: 'proposed', proposedBy: award.proposedBy, comparisonHash: await hashOf(tx, award), total } : { phase: 'void', reason: award.state }
  return approvalRefusal(state, {
    type: 'approved',
    by: actor.personId,
    comparisonHash: comparisonSha256,
    limit: await limitOf(tx, actor, award),
    total,
    offerValid: await isOfferValid(tx, award),
    conflictOfInterest: false,
  })
}

async function hashOf(tx: Transaction, award: AwardRow): Promise<string> {
  const [row] = await tx.select({ sha256: comparisons.sha256 }).from(comparisons).where(eq(comparisons.id, award.comparisonId))
  return row!.sha256
}

/** The person's limit in the award's currency by the comparison's own rate; in its own where there is no rate. */
async function limitOf(tx: Transaction, actor: Actor, award: AwardRow): Promise<Money | null> {
  const [row] = await tx.select({ limit: memberships.approvalLimit, currency: memberships.approvalCurrency }).from(memberships).where(eq(memberships.personId, actor.personId))
  if (!row?.limit || !row.currency) return null
  const rate = row.currency === award.currency ? '1' : award.rates[row.currency]
  if (rate === undefined) return { amount: row.limit, currency: row.currency }
  return { amount: new Decimal(row.limit).times(rate).toFixed(), currency: award.currency }
}

export async function isOfferValid(tx: Transaction, award: Pick<AwardRow, 'quoteId' | 'companyId'>): Promise<boolean> {
  const [quote] = await tx.select({ validUntil: quotes.validUntil }).from(quotes).where(eq(quotes.id, award.quoteId))
  return quote !== undefined && quote.validUntil >= (await companyToday(tx, award.companyId))
}
