import type { Actor, Transaction } from '#server/db/as-actor'
import { companies, rfqInvitations, rfqIssues, rfqs } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import { canonicalJson } from '#shared/canonical-json'
import type { Rfq } from '#shared/contracts/rfqs'
import { nextRfqState } from '#shared/workflow/rfq-state'
import { eq } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { lockRfq, type RfqRow } from './lock-rfq'
import { presentRfq, readLines } from './read-rfq'
import { requirePreparing } from './write-rfq'

/** Seals the content as issue 1 and tells every person of every invited vendor, each in a mail of their own. */
export async function issueRfq(tx: Transaction, actor: Actor, rfqId: string, version: number): Promise<Rfq> {
  const { row, now } = await lockRfq(tx, actor, rfqId)
  requirePreparing(actor, row, version)
  const lines = await readLines(tx, rfqId)
  const invitations = await tx.select().from(rfqInvitations).where(eq(rfqInvitations.rfqId, rfqId))
  const event = { type: 'issued', at: now.toISOString(), dueAt: row.dueAt.toISOString(), lineCount: lines.length, invitationCount: invitations.length } as const
  if (!nextRfqState({ phase: 'preparing' }, event)) throw notReady(row, now, lines.length, invitations.length)

  await tx.update(rfqInvitations).set({ issuedAt: now }).where(eq(rfqInvitations.rfqId, rfqId))
  const [saved] = await tx
    .update(rfqs)
    .set({ state: 'issued', issuedAt: now, issueNumber: 1, version: row.version + 1 })
    .where(eq(rfqs.id, rfqId))
    .returning()
  await writeIssue(tx, actor, saved!, lines, now)
  await recordAudit(tx, actor, { type: 'rfq-issued', rfqId, issueNumber: 1 })
  for (const { vendorCompanyId } of invitations) await mailVendor(tx, actor, saved!, vendorCompanyId, 'rfq-invitation')
  return presentRfq(tx, actor, saved!)
}

function notReady(row: RfqRow, now: Date, lineCount: number, invitationCount: number): AppError {
  if (row.dueAt <= now) return new AppError('invalid-input', 'The due time has passed; choose a later one before issuing.', { dueAt: 'This moment has passed.' })
  if (lineCount === 0) return new AppError('invalid-input', 'Add at least one released part before issuing.', { lines: 'No part yet.' })
  return new AppError('invalid-input', invitationCount === 0 ? 'Invite at least one vendor before issuing.' : 'The enquiry cannot be issued.', {
    vendorCompanyIds: 'No vendor yet.',
  })
}

/** The content of one issue as canonical bytes: what every quotation is an answer to. */
export async function writeIssue(tx: Transaction, actor: Actor, row: RfqRow, lines: Rfq['lines'], now: Date): Promise<void> {
  const content = {
    schema: 'dotside/rfq-issue/1',
    number: row.number,
    issue: row.issueNumber,
    title: row.title,
    issuedAt: now.toISOString(),
    dueAt: row.dueAt.toISOString(),
    dueZone: row.dueZone,
    currency: row.currency,
    delivery: { rule: row.deliveryRule, place: row.deliveryPlace },
    contact: { name: row.contactName, email: row.contactEmail },
    terms: row.terms,
    lines: lines.map(({ position, release, quantities, orderQuantity, annualQuantity, sampleQuantity }) => ({
      position,
      partNumber: release.partNumber,
      revision: release.revision,
      specificationSha256: release.specificationSha256,
      pdfSha256: release.pdfSha256,
      quantities,
      orderQuantity,
      annualQuantity,
      sampleQuantity,
    })),
  }
  const bytes = Buffer.from(canonicalJson(content), 'utf8')
  await tx.insert(rfqIssues).values({
    rfqId: row.id,
    companyId: row.companyId,
    issuedBy: actor.personId,
    number: row.issueNumber,
    content: bytes,
    sha256: createHash('sha256').update(bytes).digest('hex'),
    issuedAt: now,
  })
}

export type VendorMail = 'rfq-invitation' | 'rfq-extended' | 'rfq-cancelled' | 'rfq-opened'

export async function mailVendor(tx: Transaction, actor: Actor, row: RfqRow, vendorCompanyId: string, template: VendorMail): Promise<void> {
  const [company] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, actor.companyId))
  await queueMail(tx, actor, {
    template,
    props: { rfqId: row.id, number: row.number, customerName: company?.name ?? '', dueAt: row.dueAt.toISOString() },
    to: { companyId: vendorCompanyId },
  })
}
