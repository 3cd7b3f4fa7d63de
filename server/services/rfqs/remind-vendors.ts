import type { Context } from '#server/context'
import { asWorker, type Transaction } from '#server/db/as-actor'
import { companies, mailEvents, quoteStates, rfqInvitations, rfqs } from '#server/db/schema/index'
import { queueMail } from '#server/mail/queue-mail'
import { and, eq, isNotNull, ne, notExists, sql } from 'drizzle-orm'

/**
 * Days before the due time at which a vendor that has not answered is reminded. The nearest first: when both
 * moments have passed unseen, the later reminder says it all and the earlier one is left out.
 */
const REMINDER_DAYS = [1, 3] as const

/** Any number will do; two workers must not remind at once. */
const REMINDER_LOCK = 7_426_902

/** One reminder per invitation, due time and day, to vendors that neither quoted nor declined. */
export function remindVendors(ctx: Context): Promise<void> {
  return asWorker(ctx, async (tx) => {
    await tx.execute(sql`select pg_advisory_xact_lock(${REMINDER_LOCK})`)
    for (const days of REMINDER_DAYS) await remind(tx, days)
  })
}

async function remind(tx: Transaction, days: (typeof REMINDER_DAYS)[number]): Promise<void> {
  const from = sql`${rfqs.dueAt} - make_interval(days => ${days})`
  const sent = tx
    .select({ id: mailEvents.id })
    .from(mailEvents)
    .where(
      and(
        eq(mailEvents.template, 'rfq-reminder'),
        sql`${mailEvents.props} ->> 'invitationId' = ${rfqInvitations.id}::text`,
        sql`(${mailEvents.props} ->> 'days')::int <= ${days}`,
        // A due time that moved later is reminded of anew; the mail names it to the millisecond.
        sql`(${mailEvents.props} ->> 'dueAt')::timestamptz = date_trunc('milliseconds', ${rfqs.dueAt})`,
      ),
    )
  const quoted = tx
    .select({ id: quoteStates.quoteId })
    .from(quoteStates)
    .where(and(eq(quoteStates.rfqId, rfqInvitations.rfqId), eq(quoteStates.vendorCompanyId, rfqInvitations.vendorCompanyId), eq(quoteStates.state, 'submitted')))
  const waiting = await tx
    .select({ invitationId: rfqInvitations.id, vendorCompanyId: rfqInvitations.vendorCompanyId, rfq: rfqs, customerName: companies.name })
    .from(rfqInvitations)
    .innerJoin(rfqs, eq(rfqs.id, rfqInvitations.rfqId))
    .innerJoin(companies, eq(companies.id, rfqs.companyId))
    .where(
      and(
        eq(rfqs.state, 'issued'),
        isNotNull(rfqInvitations.issuedAt),
        ne(rfqInvitations.state, 'no-bid'),
        notExists(quoted),
        // An enquiry with less time than that needs no reminder on the day it arrives.
        sql`${rfqInvitations.issuedAt} < ${from} and ${from} <= app_now() and app_now() < ${rfqs.dueAt}`,
        notExists(sent),
      ),
    )
  for (const { invitationId, vendorCompanyId, rfq, customerName } of waiting) {
    await queueMail(tx, { companyId: rfq.companyId }, {
      template: 'rfq-reminder',
      props: { rfqId: rfq.id, invitationId, days, number: rfq.number, customerName, dueAt: rfq.dueAt.toISOString() },
      to: { companyId: vendorCompanyId },
    })
  }
}
