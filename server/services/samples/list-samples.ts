import type { Actor, Transaction } from '#server/db/as-actor'
import { files } from '#server/db/schema/index'
import { namesOf, personOf } from '#server/services/specifications/read-revision'
import type { SampleRequest, SampleRequestSummary, SampleSet } from '#shared/contracts/samples'
import { inArray } from 'drizzle-orm'
import { expectedRows } from './expected-rows'
import { findRequest, findRequests, findSets, releaseBytes, type DispositionRow, type FoundRequest, type ListedSet } from './find-samples'

type FoundSet = { set: ListedSet; disposition: DispositionRow | null }

export async function listSampleRequests(tx: Transaction, actor: Actor, rfqId?: string): Promise<SampleRequestSummary[]> {
  const requests = await findRequests(tx, actor, { rfqId })
  const sets = await findSets(
    tx,
    actor,
    requests.map(({ request }) => request.id),
  )
  return requests.map((found) => summaryOf(found, sets.filter(({ set }) => set.requestId === found.request.id), actor))
}

export async function readSampleRequest(tx: Transaction, actor: Actor, requestId: string): Promise<SampleRequest> {
  const found = await findRequest(tx, actor, requestId)
  const { request } = found
  const sets = await findSets(tx, actor, [requestId])
  const fileNames = sets.length === 0 ? [] : await tx.select({ id: files.id, name: files.name }).from(files).where(inArray(files.id, sets.map(({ set }) => set.fileId)))
  const names = await namesOf(tx, [request.requestedBy, ...sets.map(({ disposition }) => disposition?.decidedBy ?? null)])
  const deciderFallback = found.customerName ?? '—'
  return {
    ...summaryOf(found, sets, actor),
    lineId: request.lineId,
    releaseId: request.releaseId,
    specificationSha256: found.specificationSha256,
    note: request.note,
    // A vendor does not see the customer's people; the enquiry's contact is whom it knows.
    requestedBy: actor.companyKind === 'vendor' ? found.contactName : personOf(names, request.requestedBy).name,
    cancelledReason: request.cancelledReason,
    rows: expectedRows(await releaseBytes(tx, request.releaseId)),
    sets: sets.map(({ set, disposition }) => ({
      id: set.id,
      number: set.number,
      kind: set.kind,
      phase: disposition ? 'disposed' : set.phase,
      fileName: fileNames.find(({ id }) => id === set.fileId)?.name ?? '—',
      uploadedAt: set.uploadedAt.toISOString(),
      confirmedAt: set.confirmedAt?.toISOString() ?? null,
      verdict: set.verdict,
      disposition: disposition && dispositionOf(disposition, actor.companyKind === 'vendor' ? deciderFallback : personOf(names, disposition.decidedBy).name),
    })),
  }
}

export const dispositionOf = (row: DispositionRow, decidedBy: string): NonNullable<SampleSet['disposition']> => ({
  disposition: row.disposition,
  reason: row.reason,
  decidedBy,
  decidedAt: row.decidedAt.toISOString(),
  concession: row.concessionQuantity === null ? null : { quantity: row.concessionQuantity, expiresOn: row.concessionExpiresOn! },
})

function summaryOf(found: FoundRequest, sets: FoundSet[], actor: Actor): SampleRequestSummary {
  const { request, rfqNumber, partNumber, title, revision } = found
  const counterpart = actor.companyKind === 'vendor' ? found.customerName : (found.vendorName ?? found.relationName)
  return {
    id: request.id,
    number: request.number,
    state: stateOf(request, sets),
    rfqId: request.rfqId,
    ...{ rfqNumber, partNumber, title, revision },
    quantity: request.quantity,
    sampleKind: request.sampleKind,
    dueOn: request.dueOn,
    requestedAt: request.requestedAt.toISOString(),
    counterpart: counterpart ?? '—',
    verdict: sets.findLast(({ set }) => set.confirmedAt !== null && set.phase !== 'superseded')?.set.verdict ?? null,
  }
}

const SETTLED: readonly string[] = ['accepted', 'accepted-with-concession', 'change-drawing']

/** After a rework, a rejection or a hold the vendor is asked again: a new report is awaited. */
export function stateOf(request: { cancelledAt: Date | null }, sets: readonly FoundSet[]): SampleRequestSummary['state'] {
  if (request.cancelledAt) return 'cancelled'
  const last = sets.findLast(({ set }) => set.phase === 'judged')
  if (!last) return 'requested'
  if (!last.disposition) return 'reported'
  return SETTLED.includes(last.disposition.disposition) ? 'disposed' : 'requested'
}
