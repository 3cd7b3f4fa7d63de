import type { Actor, Transaction } from '#server/db/as-actor'
import { outboxHealth, outboxMails, people } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { canSeeMail, visibleMails } from '#server/policies/mail'
import { recordAudit } from '#server/services/audit/record-audit'
import type { ResponseOf } from '#shared/contracts/endpoint'
import type { listUndeliverable as listContract, readMailHealth as healthContract } from '#shared/contracts/mail'
import { and, desc, eq, sql } from 'drizzle-orm'

/** The address only of people the actor sees: a vendor that has not accepted may have contacts nobody typed. */
export async function listUndeliverable(tx: Transaction, actor: Actor): Promise<ResponseOf<typeof listContract>> {
  const rows = await tx
    .select({ mail: outboxMails, seenPersonId: people.id })
    .from(outboxMails)
    .leftJoin(people, eq(people.id, outboxMails.personId))
    .where(and(visibleMails(actor), eq(outboxMails.state, 'undeliverable')))
    .orderBy(desc(outboxMails.createdAt))
    .limit(200)
  return rows.map(({ mail, seenPersonId }) => ({
    id: mail.id,
    template: mail.template,
    address: seenPersonId ? mail.address : 'a contact of a vendor that has not accepted yet',
    attempts: mail.attempts,
    lastError: seenPersonId ? mail.lastError : 'not delivered',
    createdAt: mail.createdAt.toISOString(),
  }))
}

/** Puts it back at the head of the queue. */
export async function retryMail(tx: Transaction, actor: Actor, mailId: string): Promise<void> {
  const [mail] = await tx.select().from(outboxMails).where(eq(outboxMails.id, mailId))
  if (!mail || mail.state !== 'undeliverable' || !canSeeMail(actor, mail)) throw notFound('undeliverable mail')
  await tx.update(outboxMails).set({ state: 'waiting', attempts: 0, nextAttemptAt: sql`app_now()` }).where(eq(outboxMails.id, mailId))
  await recordAudit(tx, actor, { type: 'mail-retried', mailId })
}

export async function readMailHealth(tx: Transaction): Promise<ResponseOf<typeof healthContract>> {
  const [row] = await tx.select().from(outboxHealth)
  const { waiting = 0, sent = 0, undeliverable = 0, oldestWaitingSince = null } = row ?? {}
  return { waiting, sent, undeliverable, oldestWaitingSince: oldestWaitingSince?.toISOString() ?? null }
}
