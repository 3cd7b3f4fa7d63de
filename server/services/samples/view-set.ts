import type { Context } from '#server/context'
import { asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { files, sampleDispositions, sampleEvidence } from '#server/db/schema/index'
import { namesOf, personOf } from '#server/services/specifications/read-revision'
import type { SampleReport, SampleSet } from '#shared/contracts/samples'
import { compareTitleBlock } from '#shared/measurement/compare-title-block'
import { judge, type Judgement } from '#shared/measurement/judge'
import type { Answer, ExpectedRow, MeasurementReading } from '#shared/measurement/model'
import { readMeasurements } from '#shared/measurement/read-measurements'
import { asc, eq, inArray } from 'drizzle-orm'
import { buffer } from 'node:stream/consumers'
import { expectedRows } from './expected-rows'
import { findRequest, findSet, releaseBytes, type FoundRequest, type SetRow } from './find-samples'
import { dispositionOf } from './list-samples'
import { unreadableReport } from './refusals'

export interface LoadedSet {
  set: SetRow
  found: FoundRequest
  rows: ExpectedRow[]
  file: SampleSet['file']
  evidence: SampleSet['evidence']
}

/** Everything about a set but the bytes of its file, which are read after the transaction. */
export async function loadSet(tx: Transaction, actor: Actor, setId: string): Promise<LoadedSet> {
  const set = await findSet(tx, actor, setId)
  const found = await findRequest(tx, actor, set.requestId)
  const evidence = await tx.select({ fileId: sampleEvidence.fileId }).from(sampleEvidence).where(eq(sampleEvidence.setId, setId)).orderBy(asc(sampleEvidence.createdAt))
  const ids = [set.fileId, ...evidence.map(({ fileId }) => fileId)]
  const stored = await tx.select({ id: files.id, name: files.name, kind: files.kind, sizeBytes: files.sizeBytes, sha256: files.sha256 }).from(files).where(inArray(files.id, ids))
  const fileOf = (id: string) => stored.find((file) => file.id === id)!
  return { set, found, rows: expectedRows(await releaseBytes(tx, found.request.releaseId)), file: fileOf(set.fileId), evidence: evidence.map(({ fileId }) => fileOf(fileId)) }
}

export const fileBytes = async (ctx: Context, sha256: string): Promise<Buffer> => buffer(await ctx.files.open(sha256))

/** Reads a file of readings for a request; what cannot be read at all is the caller's error. */
export function readReport(bytes: Uint8Array, rows: readonly ExpectedRow[], answers: readonly Answer[], found: FoundRequest): MeasurementReading {
  const reading = readMeasurements(bytes, rows, answers)
  if (reading.kind === 'refused') throw unreadableReport(reading)
  return withTitleNotes(reading, found)
}

export const withTitleNotes = (reading: MeasurementReading, { partNumber, revision }: FoundRequest): MeasurementReading => ({
  ...reading,
  notes: [...reading.notes, ...compareTitleBlock(reading.titleBlock, { drawingNumber: partNumber, revision })],
})

export const judgeReport = (rows: readonly ExpectedRow[], reading: MeasurementReading | null, report: SampleReport | null, found: FoundRequest): Judgement =>
  judge(rows, reading?.accepted ?? [], { sampleKind: report?.sampleKind ?? found.request.sampleKind, measuredAtC: report?.temperatureC ?? null })

/** What was confirmed, as it is kept. */
export interface SampleRecord {
  schema: 'dotside/sample-data-set/1'
  reading: MeasurementReading | null
  judgement: Judgement
  [fact: string]: unknown
}

/** One report as whoever may read it sees it. A confirmed one is shown from its record, never read anew. */
export async function viewSet(ctx: Context, actor: Actor, setId: string): Promise<SampleSet> {
  const { loaded, head } = await asActor(ctx, actor, async (tx) => {
    const loaded = await loadSet(tx, actor, setId)
    return { loaded, head: await headOf(tx, actor, loaded) }
  })
  return { ...head, ...(await contentOf(ctx, loaded)) }
}

async function contentOf(ctx: Context, { set, found, rows, file }: LoadedSet): Promise<Pick<SampleSet, 'reading' | 'judgement'>> {
  if (set.record) {
    const { reading, judgement } = JSON.parse(set.record.toString('utf8')) as SampleRecord
    return { reading, judgement }
  }
  if (set.phase === 'superseded') return { reading: null, judgement: null }
  const reading = set.kind === 'readings' ? readReport(await fileBytes(ctx, file.sha256), rows, set.answers, found) : null
  return { reading, judgement: judgeReport(rows, reading, set.report, found) }
}

async function headOf(tx: Transaction, actor: Actor, { set, found, file, evidence }: LoadedSet): Promise<Omit<SampleSet, 'reading' | 'judgement'>> {
  const [disposition] = await tx.select().from(sampleDispositions).where(eq(sampleDispositions.setId, set.id))
  const names = await namesOf(tx, [set.uploadedBy, set.confirmedBy, disposition?.decidedBy ?? null])
  const decider = disposition && (actor.companyKind === 'vendor' ? (found.customerName ?? '—') : personOf(names, disposition.decidedBy).name)
  return {
    id: set.id,
    requestId: set.requestId,
    number: set.number,
    kind: set.kind,
    phase: disposition ? 'disposed' : set.phase,
    version: set.version,
    fileName: file.name,
    ...{ file, evidence },
    uploadedAt: set.uploadedAt.toISOString(),
    uploadedBy: personOf(names, set.uploadedBy).name,
    confirmedAt: set.confirmedAt?.toISOString() ?? null,
    confirmedBy: set.confirmedBy && personOf(names, set.confirmedBy).name,
    verdict: set.verdict,
    disposition: disposition ? dispositionOf(disposition, decider!) : null,
    report: set.report,
    answers: set.answers,
    recordSha256: set.recordSha256,
  }
}
