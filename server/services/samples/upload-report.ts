import type { Context } from '#server/context'
import { appNow, asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { sampleEvidence, sampleSets } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { canReportSamples } from '#server/policies/samples'
import type { StagedFile } from '#server/services/files/staged-file'
import { keepFile, referToFile } from '#server/services/files/store-file'
import type { SampleSet } from '#shared/contracts/samples'
import { and, asc, eq, max } from 'drizzle-orm'
import { readFile } from 'node:fs/promises'
import { expectedRows } from './expected-rows'
import { findRequest, findSets, lockSet, meetAtRequest, releaseBytes, type FoundRequest } from './find-samples'
import { stateOf } from './list-samples'
import { readReport, viewSet } from './view-set'

/** A table of readings is read whole into memory. */
const LARGEST_TABLE_BYTES = 2 * 1024 * 1024

/**
 * Takes in a report. The file is read before anything is stored; the same file again gives the report that is
 * there; another one takes the place of a report that was not confirmed, which stays in the history.
 */
export async function uploadReport(ctx: Context, actor: Actor, requestId: string, staged: StagedFile): Promise<SampleSet> {
  const kind = staged.kind === 'csv' || staged.kind === 'txt' ? 'readings' : 'evidence'
  const { found, specification } = await asActor(ctx, actor, async (tx) => {
    const found = await findRequest(tx, actor, requestId)
    return { found, specification: await releaseBytes(tx, found.request.releaseId) }
  })
  if (kind === 'readings') {
    if (staged.sizeBytes > LARGEST_TABLE_BYTES) throw new AppError('file-too-large', 'A table of readings has at most 2 MB; nothing was stored.')
    readReport(await readFile(staged.path), expectedRows(specification), [], found)
  }
  await keepFile(ctx, staged)
  const setId = await asActor(ctx, actor, (tx) => addSet(tx, actor, requestId, staged, kind))
  return viewSet(ctx, actor, setId)
}

async function addSet(tx: Transaction, actor: Actor, requestId: string, staged: StagedFile, kind: 'readings' | 'evidence'): Promise<string> {
  await meetAtRequest(tx, requestId)
  const found = await findRequest(tx, actor, requestId)
  await requireReportable(tx, actor, found)

  const own = await tx
    .select({ id: sampleSets.id, phase: sampleSets.phase, confirmedAt: sampleSets.confirmedAt, fileSha256: sampleSets.fileSha256 })
    .from(sampleSets)
    .where(eq(sampleSets.requestId, requestId))
    .orderBy(asc(sampleSets.number))
  const same = own.find((set) => set.fileSha256 === staged.sha256 && (set.phase !== 'superseded' || set.confirmedAt !== null))
  if (same) return same.id

  await tx
    .update(sampleSets)
    .set({ phase: 'superseded' })
    .where(and(eq(sampleSets.requestId, requestId), eq(sampleSets.phase, 'read')))
  const file = await referToFile(tx, actor, staged)
  const [last] = await tx.select({ number: max(sampleSets.number) }).from(sampleSets).where(eq(sampleSets.requestId, requestId))
  const { companyId, vendorCompanyId } = found.request
  const [row] = await tx
    .insert(sampleSets)
    .values({ requestId, companyId, vendorCompanyId, fileId: file.id, uploadedBy: actor.personId, number: (last?.number ?? 0) + 1, kind, fileSha256: staged.sha256, answers: [], uploadedAt: await appNow(tx) })
    .returning({ id: sampleSets.id })
  return row!.id
}

async function requireReportable(tx: Transaction, actor: Actor, { request }: FoundRequest): Promise<void> {
  if (!canReportSamples(actor, request)) throw new AppError('not-allowed', 'A report is handed in by the vendor.')
  const state = stateOf(request, await findSets(tx, actor, [request.id]))
  if (state === 'cancelled') throw new AppError('request-cancelled', 'The customer has taken this request back; no report is taken any more.')
  if (state === 'disposed') throw new AppError('already-decided', 'The customer has decided about these samples; no further report is taken.')
}

/** Lays a scan, a picture or a certificate beside a report that is not confirmed yet. */
export async function uploadEvidence(ctx: Context, actor: Actor, setId: string, staged: StagedFile): Promise<SampleSet> {
  await keepFile(ctx, staged)
  await asActor(ctx, actor, async (tx) => {
    const set = await lockSet(tx, actor, setId)
    if (!canReportSamples(actor, set)) throw new AppError('not-allowed', 'A report is handed in by the vendor.')
    if (set.phase !== 'read') throw new AppError('already-confirmed', 'This report was confirmed or replaced; hand in a new one.')
    const file = await referToFile(tx, actor, staged)
    await tx.insert(sampleEvidence).values({ setId, companyId: set.companyId, vendorCompanyId: set.vendorCompanyId, fileId: file.id })
  })
  return viewSet(ctx, actor, setId)
}
