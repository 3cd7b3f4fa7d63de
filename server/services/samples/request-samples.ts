import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { companies, rfqInvitations, rfqLines, rfqs, sampleRequests } from '#server/db/schema/index'
import { AppError, notFound } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { canReadRfq } from '#server/policies/rfqs'
import { canRequestSamples } from '#server/policies/samples'
import { recordAudit } from '#server/services/audit/record-audit'
import { withDrawnNumber } from '#server/services/draw-number'
import { vendorsQuoting } from '#server/services/rfqs/read-rfq'
import type { SampleRequest, SampleRequestInput } from '#shared/contracts/samples'
import { and, eq, sql } from 'drizzle-orm'
import { findRequest, meetAtRequest } from './find-samples'
import { readSampleRequest } from './list-samples'

/** Asks a vendor whose quotation was opened; the request, its audit entry and its mail exist together. */
export async function requestSamples(tx: Transaction, actor: Actor, input: SampleRequestInput): Promise<SampleRequest> {
  const { line, invitation } = await requireOpenedVendor(tx, actor, input)
  const { quantity, sampleKind, dueOn, note } = input
  if (dueOn < (await companyToday(tx, actor.companyId))) {
    throw new AppError('invalid-input', 'The date by which the samples are needed has passed; give a later one.', { dueOn: 'This date has passed.' })
  }

  const now = await appNow(tx)
  const { id, rfqId, companyId, vendorCompanyId } = invitation
  const values = { rfqId, companyId, vendorCompanyId, invitationId: id, lineId: line.id, releaseId: line.releaseId, requestedBy: actor.personId, quantity, sampleKind, dueOn, note, requestedAt: now }
  const [row] = await withDrawnNumber(tx, 'SR', now, 'sample_requests_company_number_key', (number) => tx.insert(sampleRequests).values({ ...values, number }).returning())

  await recordAudit(tx, actor, { type: 'samples-requested', requestId: row!.id, rfqId, lineId: line.id, vendorCompanyId })
  const [customer] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, actor.companyId))
  await queueMail(tx, actor, { template: 'samples-requested', props: { requestId: row!.id, number: row!.number, customerName: customer!.name, dueOn }, to: { companyId: vendorCompanyId } })
  return readSampleRequest(tx, actor, row!.id)
}

async function requireOpenedVendor(tx: Transaction, actor: Actor, { rfqId, lineId, vendorCompanyId }: SampleRequestInput) {
  const [rfq] = await tx.select().from(rfqs).where(eq(rfqs.id, rfqId))
  if (!rfq || !canReadRfq(actor, rfq) || !canRequestSamples(actor, rfq)) throw notFound('enquiry')
  if (!rfq.openedAt) throw new AppError('rfq-not-opened', 'The quotations of this enquiry have not been opened; samples are asked for after that.')
  const [line] = await tx
    .select()
    .from(rfqLines)
    .where(and(eq(rfqLines.id, lineId), eq(rfqLines.rfqId, rfqId)))
  const [invitation] = await tx
    .select()
    .from(rfqInvitations)
    .where(and(eq(rfqInvitations.rfqId, rfqId), eq(rfqInvitations.vendorCompanyId, vendorCompanyId)))
  if (!line) throw notFound('part in this enquiry')
  if (!invitation) throw notFound('vendor in this enquiry')
  if (!(await vendorsQuoting(tx, rfqId)).has(vendorCompanyId)) throw new AppError('conflict', 'This vendor has not quoted; samples are asked of vendors whose quotation was opened.')
  return { line, invitation }
}

export async function cancelSampleRequest(tx: Transaction, actor: Actor, requestId: string, reason: string): Promise<SampleRequest> {
  await meetAtRequest(tx, requestId)
  const { request } = await findRequest(tx, actor, requestId)
  if (!canRequestSamples(actor, request)) throw new AppError('not-allowed', 'Your role does not take back requests for samples.')
  if (request.cancelledAt) throw new AppError('request-cancelled', 'This request was taken back already.')
  const now = await appNow(tx)
  await tx.update(sampleRequests).set({ cancelledAt: now, cancelledBy: actor.personId, cancelledReason: reason }).where(eq(sampleRequests.id, requestId))
  await recordAudit(tx, actor, { type: 'samples-cancelled', requestId })
  await queueMail(tx, actor, { template: 'samples-cancelled', props: { requestId, number: request.number }, to: { companyId: request.vendorCompanyId } })
  return readSampleRequest(tx, actor, requestId)
}

/** Calendar date in the company's zone, by the one clock. */
export async function companyToday(tx: Transaction, companyId: string): Promise<string> {
  const { rows } = await tx.execute<{ today: string }>(sql`select company_today(${companyId})::text as today`)
  return rows[0]!.today
}
