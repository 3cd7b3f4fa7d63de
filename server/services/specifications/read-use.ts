import type { Actor, Transaction } from '#server/db/as-actor'
import { companies, orderAcknowledgements, purchaseOrders, quotes, quoteStates, rfqLines, rfqs, sampleRequests, specificationReleases } from '#server/db/schema/index'
import { readableOrders } from '#server/policies/orders'
import { readableQuotes, readableRfqs } from '#server/policies/rfqs'
import { readableSampleRequests } from '#server/policies/samples'
import type { SpecificationUse } from '#shared/contracts/specifications'
import { and, asc, eq } from 'drizzle-orm'
import { readSpecification } from './list-specifications'

/**
 * Everything that rests on a release of one part: what a new revision touches. What the actor may not read is not listed,
 * quotations before their opening least of all.
 */
export async function readSpecificationUse(tx: Transaction, actor: Actor, specificationId: string): Promise<SpecificationUse> {
  await readSpecification(tx, actor, specificationId)
  return {
    enquiries: await enquiriesOf(tx, actor, specificationId),
    quotes: await quotesOf(tx, actor, specificationId),
    samples: await samplesOf(tx, actor, specificationId),
    orders: await ordersOf(tx, actor, specificationId),
  }
}

const ofPart = (specificationId: string) => eq(specificationReleases.specificationId, specificationId)

async function enquiriesOf(tx: Transaction, actor: Actor, specificationId: string) {
  const rows = await tx
    .select({ id: rfqs.id, number: rfqs.number, title: rfqs.title, state: rfqs.state, dueAt: rfqs.dueAt, revision: specificationReleases.revision })
    .from(rfqLines)
    .innerJoin(rfqs, eq(rfqs.id, rfqLines.rfqId))
    .innerJoin(specificationReleases, eq(specificationReleases.id, rfqLines.releaseId))
    .where(and(ofPart(specificationId), readableRfqs(actor)))
    .orderBy(asc(rfqs.dueAt))
  return rows.map(({ dueAt, ...row }) => ({ ...row, dueAt: dueAt.toISOString() }))
}

function quotesOf(tx: Transaction, actor: Actor, specificationId: string) {
  return tx
    .select({ rfqId: rfqs.id, rfqNumber: rfqs.number, vendorName: companies.name, revision: specificationReleases.revision })
    .from(quoteStates)
    .innerJoin(quotes, eq(quotes.id, quoteStates.quoteId))
    .innerJoin(rfqs, eq(rfqs.id, quotes.rfqId))
    .innerJoin(rfqLines, eq(rfqLines.rfqId, rfqs.id))
    .innerJoin(specificationReleases, eq(specificationReleases.id, rfqLines.releaseId))
    .innerJoin(companies, eq(companies.id, quotes.vendorCompanyId))
    .where(and(ofPart(specificationId), eq(quoteStates.state, 'submitted'), readableQuotes(actor)))
    .orderBy(asc(rfqs.number), asc(companies.name))
}

async function samplesOf(tx: Transaction, actor: Actor, specificationId: string) {
  const rows = await tx
    .select({ id: sampleRequests.id, number: sampleRequests.number, vendorName: companies.name, dueOn: sampleRequests.dueOn, cancelledAt: sampleRequests.cancelledAt, revision: specificationReleases.revision })
    .from(sampleRequests)
    .innerJoin(specificationReleases, eq(specificationReleases.id, sampleRequests.releaseId))
    .innerJoin(companies, eq(companies.id, sampleRequests.vendorCompanyId))
    .where(and(ofPart(specificationId), readableSampleRequests(actor)))
    .orderBy(asc(sampleRequests.requestedAt))
  return rows.map(({ cancelledAt, ...row }) => ({ ...row, cancelled: cancelledAt !== null }))
}

/** An order is of every line of its enquiry. */
function ordersOf(tx: Transaction, actor: Actor, specificationId: string) {
  return tx
    .select({ id: purchaseOrders.id, number: purchaseOrders.number, vendorName: companies.name, answer: orderAcknowledgements.answer, revision: specificationReleases.revision })
    .from(purchaseOrders)
    .innerJoin(rfqLines, eq(rfqLines.rfqId, purchaseOrders.rfqId))
    .innerJoin(specificationReleases, eq(specificationReleases.id, rfqLines.releaseId))
    .innerJoin(companies, eq(companies.id, purchaseOrders.vendorCompanyId))
    .leftJoin(orderAcknowledgements, eq(orderAcknowledgements.orderId, purchaseOrders.id))
    .where(and(ofPart(specificationId), readableOrders(actor)))
    .orderBy(asc(purchaseOrders.placedAt))
}
