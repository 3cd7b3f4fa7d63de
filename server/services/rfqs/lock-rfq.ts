import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { rfqInvitations, rfqs } from '#server/db/schema/index'
import { AppError, notFound } from '#server/errors'
import { answerableInvitations, canReadRfq } from '#server/policies/rfqs'
import { and, eq, sql } from 'drizzle-orm'

export type RfqRow = typeof rfqs.$inferSelect
export type InvitationRow = typeof rfqInvitations.$inferSelect

/**
 * Vendors cannot lock the row of an enquiry, which is the buyer's. All who decide by its state or due time
 * meet on this lock instead: submissions share it, an opening or a change of the due time waits for them.
 */
async function meet(tx: Transaction, rfqId: string, kind: 'shared' | 'alone'): Promise<void> {
  const key = sql`hashtextextended(${rfqId}, 0)`
  await tx.execute(kind === 'alone' ? sql`select pg_advisory_xact_lock(${key})` : sql`select pg_advisory_xact_lock_shared(${key})`)
}

export interface Locked<T> {
  row: T
  /** Read after the lock. */
  now: Date
}

/** The enquiry for a change by the buying side. */
export async function lockRfq(tx: Transaction, actor: Actor, rfqId: string): Promise<Locked<RfqRow>> {
  await meet(tx, rfqId, 'alone')
  const [row] = await tx.select().from(rfqs).where(eq(rfqs.id, rfqId)).for('update')
  if (!row || !canReadRfq(actor, row)) throw notFound('enquiry')
  return { row, now: await appNow(tx) }
}

/** The enquiry and the vendor's own invitation, for an answer to it. */
export async function lockInvitation(tx: Transaction, actor: Actor, rfqId: string): Promise<Locked<InvitationRow> & { rfq: RfqRow }> {
  await meet(tx, rfqId, 'shared')
  const [row] = await tx
    .select()
    .from(rfqInvitations)
    .where(and(eq(rfqInvitations.rfqId, rfqId), answerableInvitations(actor)))
    .for('update')
  const [rfq] = row ? await tx.select().from(rfqs).where(eq(rfqs.id, rfqId)) : []
  if (!row || !rfq) throw notFound('enquiry')
  return { row, rfq, now: await appNow(tx) }
}

/** Refuses answers at and after the due moment: the database's clock decides, not the browser's. */
export function requireOpenForAnswers(rfq: RfqRow, now: Date): void {
  if (rfq.state === 'cancelled') throw new AppError('rfq-cancelled', 'This enquiry was cancelled; it takes no answers any more.')
  if (rfq.state !== 'issued' || now >= rfq.dueAt) {
    throw new AppError('rfq-closed', `The enquiry closed on ${rfq.dueAt.toISOString()}; it takes no answers any more.`)
  }
}

export function requireAcceptedTerms(invitation: InvitationRow): void {
  if (!invitation.termsAcceptedAt) throw new AppError('terms-not-accepted', 'Accept confidentiality first; the drawings and the quotation open then.')
}
