import type { Context } from '#server/context'
import { appNow, asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { companies, sampleDispositions, sampleSets } from '#server/db/schema/index'
import { AppError, notFound } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { canDisposeSamples, canReadSampleSet } from '#server/policies/samples'
import { recordAudit } from '#server/services/audit/record-audit'
import type { disposeSet as contract, SampleSet } from '#shared/contracts/samples'
import type { BodyOf } from '#shared/contracts/endpoint'
import { dispositionsFor } from '#shared/workflow/sample-state'
import { eq } from 'drizzle-orm'
import { findRequest, meetAtRequest } from './find-samples'
import { companyToday } from './request-samples'
import { viewSet } from './view-set'

type DispositionInput = BodyOf<typeof contract>

/** Decides about a judged report, once. Who decides second is told who was first. */
export async function disposeSet(ctx: Context, actor: Actor, setId: string, input: DispositionInput): Promise<SampleSet> {
  await asActor(ctx, actor, (tx) => decide(tx, actor, setId, input))
  return viewSet(ctx, actor, setId)
}

async function decide(tx: Transaction, actor: Actor, setId: string, { disposition, reason, concession }: DispositionInput): Promise<void> {
  const [set] = await tx.select().from(sampleSets).where(eq(sampleSets.id, setId))
  if (!set || !canReadSampleSet(actor, set)) throw notFound('sample report')
  if (!canDisposeSamples(actor, set)) throw new AppError('not-allowed', 'Quality or engineering decides about samples.')
  await meetAtRequest(tx, set.requestId)

  const [earlier] = await tx.select().from(sampleDispositions).where(eq(sampleDispositions.setId, setId))
  if (earlier) throw new AppError('already-decided', `Somebody decided about this report already: ${earlier.disposition}, on ${earlier.decidedAt.toISOString()}.`)
  const [now] = await tx.select({ phase: sampleSets.phase }).from(sampleSets).where(eq(sampleSets.id, setId))
  if (now!.phase !== 'judged') throw new AppError('conflict', 'The vendor has handed in a newer report meanwhile; decide about that one.')
  if (!dispositionsFor(set.verdict!).includes(disposition)) throw notPossible(set.verdict!)
  if (concession && concession.expiresOn < (await companyToday(tx, actor.companyId))) {
    throw new AppError('invalid-input', 'The concession has ended already; give a later date.', { 'concession.expiresOn': 'This date has passed.' })
  }

  await tx.insert(sampleDispositions).values({
    setId,
    companyId: set.companyId,
    vendorCompanyId: set.vendorCompanyId,
    decidedBy: actor.personId,
    disposition,
    reason,
    concessionQuantity: concession?.quantity ?? null,
    concessionExpiresOn: concession?.expiresOn ?? null,
    decidedAt: await appNow(tx),
  })
  await recordAudit(tx, actor, { type: 'sample-report-disposed', requestId: set.requestId, setId, disposition })
  const { request } = await findRequest(tx, actor, set.requestId)
  const [customer] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, actor.companyId))
  await queueMail(tx, actor, { template: 'sample-disposed', props: { requestId: request.id, number: request.number, customerName: customer!.name }, to: { companyId: set.vendorCompanyId } })
}

function notPossible(verdict: 'met' | 'not-met' | 'not-evidenced'): AppError {
  const why = {
    met: 'What meets its limits needs neither a concession nor rework.',
    'not-met': 'A report with readings outside the limits is not plainly accepted; grant a concession, change the drawing, or send it back.',
    'not-evidenced': 'Evidence is missing, and missing evidence is no pass; hold the report, or send it back.',
  }[verdict]
  return new AppError('disposition-not-possible', why, { disposition: why })
}
