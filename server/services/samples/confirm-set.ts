import type { Context } from '#server/context'
import { appNow, asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { companies, people, sampleReadings, sampleSets } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import { canonicalJson } from '#shared/canonical-json'
import type { SampleSet } from '#shared/contracts/samples'
import type { JudgedCell, Judgement } from '#shared/measurement/judge'
import type { MeasurementReading } from '#shared/measurement/model'
import { and, eq, ne, notExists, sql } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { requireChangeable } from './answer-questions'
import { findRequest, lockSet, meetAtRequest } from './find-samples'
import { fileBytes, judgeReport, loadSet, readReport, viewSet, type LoadedSet, type SampleRecord } from './view-set'

/**
 * Confirms a report: what was read is judged by the limits of exactly the release it was asked for, written down
 * whole, and shown to the customer. Readings, record, audit entry and mail exist together or not at all.
 */
export async function confirmSet(ctx: Context, actor: Actor, setId: string, version: number): Promise<SampleSet> {
  const loaded = await asActor(ctx, actor, (tx) => loadSet(tx, actor, setId))
  const { set, rows, found, file } = loaded
  requireChangeable(actor, set, version)
  if (!set.report) throw new AppError('report-missing', 'Fill in the declaration first: date, instruments, who measured, and whether the parts are built as drawn.')

  const reading = set.kind === 'readings' ? readReport(await fileBytes(ctx, file.sha256), rows, set.answers, found) : null
  if (reading && reading.questions.length > 0) {
    const cells = reading.questions.map(({ address }) => address).slice(0, 20)
    throw new AppError('questions-open', `There are open questions about ${cells.join(', ')}; answer them first.`)
  }
  const judgement = judgeReport(rows, reading, set.report, found)
  await asActor(ctx, actor, (tx) => writeConfirmed(tx, actor, loaded, version, reading, judgement))
  return viewSet(ctx, actor, setId)
}

async function writeConfirmed(tx: Transaction, actor: Actor, loaded: LoadedSet, version: number, reading: MeasurementReading | null, judgement: Judgement): Promise<void> {
  const { set } = loaded
  await meetAtRequest(tx, set.requestId)
  requireChangeable(actor, await lockSet(tx, actor, set.id), version)
  const { request } = await findRequest(tx, actor, set.requestId)
  if (request.cancelledAt) throw new AppError('request-cancelled', 'The customer has taken this request back; no report is taken any more.')

  const now = await appNow(tx)
  const [person] = await tx.select({ name: people.name }).from(people).where(eq(people.id, actor.personId))
  const record = Buffer.from(canonicalJson(recordOf(loaded, reading, judgement, person!.name, now)), 'utf8')
  const recordSha256 = createHash('sha256').update(record).digest('hex')

  await insertReadings(tx, loaded, judgement)
  await supersedeEarlier(tx, set.requestId, set.id)
  await tx
    .update(sampleSets)
    .set({ phase: 'judged', verdict: judgement.verdict, record, recordSha256, confirmedAt: now, confirmedBy: actor.personId, version: version + 1 })
    .where(eq(sampleSets.id, set.id))
  await recordAudit(tx, actor, { type: 'sample-report-confirmed', requestId: request.id, setId: set.id, fileSha256: set.fileSha256, recordSha256, verdict: judgement.verdict }, { companyId: set.companyId })
  const [vendor] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, actor.companyId))
  await queueMail(tx, actor, { template: 'sample-report', props: { requestId: request.id, number: request.number, vendorName: vendor!.name }, to: { companyId: set.companyId, roles: ['quality', 'engineer'] } })
}

function recordOf({ set, found, file, evidence }: LoadedSet, reading: MeasurementReading | null, judgement: Judgement, confirmedBy: string, now: Date): SampleRecord {
  const { request, rfqNumber, partNumber, revision, specificationSha256 } = found
  return {
    schema: 'dotside/sample-data-set/1',
    request: { number: request.number, rfqNumber, partNumber, revision, specificationSha256, quantity: request.quantity, sampleKind: request.sampleKind },
    number: set.number,
    kind: set.kind,
    file: { name: file.name, sha256: file.sha256, sizeBytes: file.sizeBytes },
    evidence: evidence.map(({ name, sha256, sizeBytes }) => ({ name, sha256, sizeBytes })),
    report: set.report,
    answers: set.answers.map(({ questionId, option, text }) => (text === undefined ? { questionId, option } : { questionId, option, text })),
    reading,
    judgement,
    confirmedBy,
    confirmedAt: now.toISOString(),
  }
}

/** Rows per statement, below the protocol's limit of parameters. */
const CHUNK = 1000

async function insertReadings(tx: Transaction, { set, rows }: LoadedSet, judgement: Judgement): Promise<void> {
  const owners = { setId: set.id, companyId: set.companyId, vendorCompanyId: set.vendorCompanyId }
  const symbols = new Map(rows.map(({ id, symbol }) => [id, symbol]))
  const values = judgement.rows
    .flatMap(({ cells }) => cells)
    .filter((cell): cell is JudgedCell & { reading: NonNullable<JudgedCell['reading']> } => cell.reading !== null)
    .map(({ rowId, serial, run, address, text, reading, judged, verdict, reason }) => ({
      ...owners,
      testRowId: rowId,
      symbol: symbols.get(rowId)!,
      serial,
      run,
      address: address!,
      text: text!,
      kind: reading.kind,
      value: judged,
      verdict,
      reason,
    }))
  for (let at = 0; at < values.length; at += CHUNK) await tx.insert(sampleReadings).values(values.slice(at, at + CHUNK))
}

/** An earlier report without a disposition gives way; one that was decided about stays as it is. */
async function supersedeEarlier(tx: Transaction, requestId: string, setId: string): Promise<void> {
  const decided = tx.select({ one: sql`1` }).from(sql`sample_dispositions d`).where(sql`d.set_id = ${sampleSets.id}`)
  await tx
    .update(sampleSets)
    .set({ phase: 'superseded' })
    .where(and(eq(sampleSets.requestId, requestId), eq(sampleSets.phase, 'judged'), ne(sampleSets.id, setId), notExists(decided)))
}
