import type { Actor, Transaction } from '#server/db/as-actor'
import { companies, rfqs, sampleDispositions, sampleRequests, sampleSets, specificationReleases, vendorRelations } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { canReadSampleSet, readableSampleRequests, readableSampleSets } from '#server/policies/samples'
import { and, asc, eq, inArray, sql } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'

export type RequestRow = typeof sampleRequests.$inferSelect
export type SetRow = typeof sampleSets.$inferSelect
export type DispositionRow = typeof sampleDispositions.$inferSelect

const vendors = alias(companies, 'vendors')
const customers = alias(companies, 'customers')

/** A request with what both sides call it. */
export interface FoundRequest {
  request: RequestRow
  rfqNumber: string
  contactName: string
  partNumber: string
  title: string
  revision: string
  specificationSha256: string
  vendorName: string | null
  relationName: string | null
  customerName: string | null
}

export async function findRequests(tx: Transaction, actor: Actor, filter: { requestId?: string; rfqId?: string } = {}): Promise<FoundRequest[]> {
  return tx
    .select({
      request: sampleRequests,
      rfqNumber: rfqs.number,
      contactName: rfqs.contactName,
      partNumber: specificationReleases.partNumber,
      title: specificationReleases.title,
      revision: specificationReleases.revision,
      specificationSha256: specificationReleases.specificationSha256,
      vendorName: vendors.name,
      relationName: vendorRelations.name,
      customerName: customers.name,
    })
    .from(sampleRequests)
    .innerJoin(rfqs, eq(rfqs.id, sampleRequests.rfqId))
    .innerJoin(specificationReleases, eq(specificationReleases.id, sampleRequests.releaseId))
    .leftJoin(vendors, eq(vendors.id, sampleRequests.vendorCompanyId))
    .leftJoin(customers, eq(customers.id, sampleRequests.companyId))
    .leftJoin(
      vendorRelations,
      and(eq(vendorRelations.vendorCompanyId, sampleRequests.vendorCompanyId), eq(vendorRelations.buyingCompanyId, sampleRequests.companyId)),
    )
    .where(
      and(
        readableSampleRequests(actor),
        filter.requestId ? eq(sampleRequests.id, filter.requestId) : undefined,
        filter.rfqId ? eq(sampleRequests.rfqId, filter.rfqId) : undefined,
      ),
    )
    .orderBy(asc(sampleRequests.dueOn))
    .limit(500)
}

export async function findRequest(tx: Transaction, actor: Actor, requestId: string): Promise<FoundRequest> {
  const [found] = await findRequests(tx, actor, { requestId })
  if (!found) throw notFound('request for samples')
  return found
}

/** The columns of a set that lists show: not its record, which is large. */
const SET_COLUMNS = {
  id: sampleSets.id,
  requestId: sampleSets.requestId,
  number: sampleSets.number,
  kind: sampleSets.kind,
  phase: sampleSets.phase,
  fileId: sampleSets.fileId,
  uploadedAt: sampleSets.uploadedAt,
  confirmedAt: sampleSets.confirmedAt,
  verdict: sampleSets.verdict,
}
export type ListedSet = Pick<SetRow, keyof typeof SET_COLUMNS>

/** The readable sets of some requests with their dispositions, in the order they came. */
export async function findSets(tx: Transaction, actor: Actor, requestIds: string[]): Promise<{ set: ListedSet; disposition: DispositionRow | null }[]> {
  if (requestIds.length === 0) return []
  return tx
    .select({ set: SET_COLUMNS, disposition: sampleDispositions })
    .from(sampleSets)
    .leftJoin(sampleDispositions, eq(sampleDispositions.setId, sampleSets.id))
    .where(and(readableSampleSets(actor), inArray(sampleSets.requestId, requestIds)))
    .orderBy(asc(sampleSets.number))
}

export async function findSet(tx: Transaction, actor: Actor, setId: string): Promise<SetRow> {
  const [row] = await tx.select().from(sampleSets).where(eq(sampleSets.id, setId))
  if (!row || !canReadSampleSet(actor, row)) throw notFound('sample report')
  return row
}

/** The set locked for a change by its vendor. */
export async function lockSet(tx: Transaction, actor: Actor, setId: string): Promise<SetRow> {
  const [row] = await tx.select().from(sampleSets).where(eq(sampleSets.id, setId)).for('update')
  if (!row || !canReadSampleSet(actor, row)) throw notFound('sample report')
  return row
}

/** All who add a report to a request, or decide about one, meet here: neither side can lock the other's rows. */
export async function meetAtRequest(tx: Transaction, requestId: string): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${requestId}, 0))`)
}

export async function releaseBytes(tx: Transaction, releaseId: string): Promise<Buffer> {
  const [release] = await tx.select({ specification: specificationReleases.specification }).from(specificationReleases).where(eq(specificationReleases.id, releaseId))
  if (!release) throw notFound('drawing')
  return release.specification
}
