import type { Context } from '#server/context'
import { asWorker } from '#server/db/as-actor'
import { rfqs } from '#server/db/schema/index'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import { and, eq, sql } from 'drizzle-orm'

const AT_ONCE = 50

/**
 * Marks enquiries as closed once their due time has passed and tells the buyer, once. That quotations are
 * refused from the due moment on does not wait for this: the clock decides it.
 */
export function closeDueRfqs(ctx: Context): Promise<number> {
  return asWorker(ctx, async (tx) => {
    const due = await tx
      .select({ id: rfqs.id, number: rfqs.number, companyId: rfqs.companyId, buyerId: rfqs.buyerId })
      .from(rfqs)
      .where(and(eq(rfqs.state, 'issued'), sql`${rfqs.dueAt} <= app_now()`))
      .limit(AT_ONCE)
      .for('update', { skipLocked: true })
    for (const { id, number, companyId, buyerId } of due) {
      await tx.update(rfqs).set({ state: 'closed' }).where(eq(rfqs.id, id))
      await recordAudit(tx, { personId: null, companyId: null }, { type: 'rfq-closed', rfqId: id }, { companyId })
      await queueMail(tx, { companyId }, { template: 'rfq-due', props: { rfqId: id, number }, to: { personId: buyerId } })
    }
    return due.length
  })
}
