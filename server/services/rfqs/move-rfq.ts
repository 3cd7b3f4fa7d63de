import type { Actor, Transaction } from '#server/db/as-actor'
import { rfqInvitations, rfqs } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { canOpen, canWriteRfq } from '#server/policies/rfqs'
import { recordAudit } from '#server/services/audit/record-audit'
import type { Rfq } from '#shared/contracts/rfqs'
import { and, eq, ne } from 'drizzle-orm'
import { mailVendor, writeIssue, type VendorMail } from './issue-rfq'
import { lockRfq, type RfqRow } from './lock-rfq'
import { presentRfq, readLines } from './read-rfq'

/** A later due time for everybody, as a new issue; what was submitted stays valid. */
export async function extendRfq(tx: Transaction, actor: Actor, rfqId: string, dueAt: Date, reason: string): Promise<Rfq> {
  const { row, now } = await lockRfq(tx, actor, rfqId)
  requireBuyer(actor, row)
  if (row.state !== 'issued' || now >= row.dueAt) throw new AppError('rfq-closed', 'The due time has passed; it cannot be moved any more.')
  if (dueAt <= row.dueAt) throw new AppError('invalid-input', 'A due time only moves later, for all vendors alike.', { dueAt: 'Choose a later moment than the present due time.' })

  const saved = await change(tx, row, { dueAt, issueNumber: row.issueNumber + 1 })
  await writeIssue(tx, actor, saved, await readLines(tx, rfqId), now)
  await recordAudit(tx, actor, { type: 'rfq-extended', rfqId, dueAt: dueAt.toISOString(), reason })
  // Who declined for want of time may come back, so the later time is told to all alike.
  await mailInvited(tx, actor, saved, 'rfq-extended', 'all')
  return presentRfq(tx, actor, saved)
}

export async function cancelRfq(tx: Transaction, actor: Actor, rfqId: string, reason: string): Promise<Rfq> {
  const { row } = await lockRfq(tx, actor, rfqId)
  requireBuyer(actor, row)
  if (row.state === 'awarded' || row.state === 'cancelled') throw new AppError('conflict', `The enquiry is ${row.state} already.`)
  const saved = await change(tx, row, { state: 'cancelled', cancelledReason: reason })
  await recordAudit(tx, actor, { type: 'rfq-cancelled', rfqId })
  if (row.issuedAt) await mailInvited(tx, actor, saved, 'rfq-cancelled')
  return presentRfq(tx, actor, saved)
}

/** The first half of the opening: the buyer asks, after the due time. */
export async function askOpening(tx: Transaction, actor: Actor, rfqId: string): Promise<Rfq> {
  const { row, now } = await lockRfq(tx, actor, rfqId)
  requireBuyer(actor, row)
  requireDue(row, now)
  if (row.openingAskedAt) throw new AppError('already-decided', 'The opening has been asked for already; a second person with another role opens.')
  const saved = await change(tx, row, { openingAskedAt: now, openingAskedBy: actor.personId })
  await recordAudit(tx, actor, { type: 'rfq-opening-asked', rfqId })
  await queueMail(tx, actor, { template: 'opening-requested', props: { rfqId, number: row.number }, to: { companyId: row.companyId, roles: ['approver', 'quality', 'engineer'] } })
  return presentRfq(tx, actor, saved)
}

/** The second half: another person with another role opens, and the seal is broken for purchasing. */
export async function openRfq(tx: Transaction, actor: Actor, rfqId: string): Promise<Rfq> {
  const { row, now } = await lockRfq(tx, actor, rfqId)
  requireDue(row, now)
  if (!row.openingAskedBy) throw new AppError('conflict', 'The buyer has to ask for the opening first.')
  if (!canOpen(actor, row)) throw new AppError('second-person-needed', 'You asked for this opening yourself; somebody with another role opens.')
  const saved = await change(tx, row, { state: 'opened', openedAt: now, openedBy: actor.personId })
  await recordAudit(tx, actor, { type: 'rfq-opened', rfqId })
  await mailInvited(tx, actor, saved, 'rfq-opened')
  await queueMail(tx, actor, { template: 'quotes-opened', props: { rfqId, number: row.number }, to: { companyId: row.companyId, roles: ['buyer', 'approver'] } })
  return presentRfq(tx, actor, saved)
}

function requireBuyer(actor: Actor, row: RfqRow): void {
  if (!canWriteRfq(actor, row)) throw new AppError('not-allowed', 'This is a buyer’s to do.')
}

function requireDue(row: RfqRow, now: Date): void {
  if (row.openedAt) throw new AppError('already-decided', 'The quotations are open already.')
  if (row.state === 'preparing' || row.state === 'cancelled') throw new AppError('conflict', `Nothing can be opened: the enquiry is ${row.state === 'preparing' ? 'not issued' : 'cancelled'}.`)
  if (now < row.dueAt) throw new AppError('too-early', `Quotations stay sealed until the due time, ${row.dueAt.toISOString()}.`)
}

async function change(tx: Transaction, row: RfqRow, values: Partial<RfqRow>): Promise<RfqRow> {
  const [saved] = await tx
    .update(rfqs)
    .set({ ...values, version: row.version + 1 })
    .where(eq(rfqs.id, row.id))
    .returning()
  return saved!
}

/** Everybody who has not declined, or all who were invited. */
async function mailInvited(tx: Transaction, actor: Actor, row: RfqRow, template: VendorMail, whom: 'not-declined' | 'all' = 'not-declined'): Promise<void> {
  const invitations = await tx
    .select({ vendorCompanyId: rfqInvitations.vendorCompanyId })
    .from(rfqInvitations)
    .where(and(eq(rfqInvitations.rfqId, row.id), whom === 'all' ? undefined : ne(rfqInvitations.state, 'no-bid')))
  for (const { vendorCompanyId } of invitations) await mailVendor(tx, actor, row, vendorCompanyId, template)
}
