import type { Context } from '#server/context'
import { asWorker, type Transaction } from '#server/db/as-actor'
import { mailEvents, memberships, outboxMails, people } from '#server/db/schema/index'
import { and, arrayOverlaps, eq, inArray, isNotNull, isNull, sql } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { MAIL_TEMPLATES, type MailTemplateName } from './templates/index'
import type { MailTemplate } from './templates/template'

type MailEvent = typeof mailEvents.$inferSelect

const BATCH = 50

/** Looks up who gets the waiting mails and gives each recipient a mail of their own. Returns how many were looked at. */
export function expandMail(ctx: Context): Promise<number> {
  return asWorker(ctx, async (tx) => {
    const events = await tx
      .select()
      .from(mailEvents)
      .where(isNull(mailEvents.expandedAt))
      .orderBy(mailEvents.createdAt)
      .limit(BATCH)
      .for('update', { skipLocked: true })
    for (const event of events) await addressMail(tx, ctx, event)
    if (events.length > 0) {
      const ids = events.map(({ id }) => id)
      await tx.update(mailEvents).set({ expandedAt: sql`app_now()` }).where(inArray(mailEvents.id, ids))
    }
    return events.length
  })
}

async function addressMail(tx: Transaction, ctx: Context, event: MailEvent): Promise<void> {
  const recipients = await recipientsOf(tx, event)
  if (recipients.length === 0) return
  const rows = recipients.map(({ id, email }) => ({
    eventId: event.id,
    personId: id,
    companyId: event.companyId,
    template: event.template,
    address: event.toAddress ?? email,
    messageId: messageIdOf(ctx.config.MAIL_FROM, event.id, id),
    nextAttemptAt: sql`app_now()`,
  }))
  await tx.insert(outboxMails).values(rows).onConflictDoNothing()
}

/** A person who has left is told only what concerns that person alone. */
async function recipientsOf(tx: Transaction, event: MailEvent) {
  const person = { id: people.id, email: people.email }
  if (event.toPersonId) return tx.select(person).from(people).where(eq(people.id, event.toPersonId))
  return tx
    .select(person)
    .from(people)
    .innerJoin(memberships, eq(memberships.personId, people.id))
    .where(
      and(
        eq(memberships.companyId, event.toCompanyId!),
        event.toRoles ? arrayOverlaps(memberships.roles, event.toRoles) : undefined,
        isNull(people.leftAt),
        welcomesNewcomers(event) ? undefined : isNotNull(people.acceptedAt),
      ),
    )
}

function welcomesNewcomers(event: MailEvent): boolean {
  const template: MailTemplate<never> | undefined = MAIL_TEMPLATES[event.template as MailTemplateName]
  const link = template?.link(event.props as never)
  return link !== undefined && 'path' in link && link.welcomesNewcomers === true
}

/** Fixed for an event and a recipient (RFC 5322, 3.6.4), so that a mail that comes twice is recognised as one. */
export function messageIdOf(mailFrom: string, eventId: string, personId: string): string {
  const domain = /@([A-Za-z0-9.-]+)/.exec(mailFrom)?.[1] ?? 'localhost'
  return `<${createHash('sha256').update(`${eventId} ${personId}`).digest('hex').slice(0, 40)}@${domain}>`
}
