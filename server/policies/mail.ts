import type { Actor } from '#server/db/as-actor'
import { outboxMails } from '#server/db/schema/index'
import { eq, sql, type SQL } from 'drizzle-orm'

/** A company sees what became of the mails it caused: its buyers and administrators, a vendor's people; the operator all. */
export function canSeeMail(actor: Actor, mail: { companyId: string }): boolean {
  if (actor.companyKind === 'operator') return true
  return mail.companyId === actor.companyId && actor.roles.some((role) => role === 'buyer' || role === 'admin' || role === 'vendor')
}

export function visibleMails(actor: Actor): SQL {
  if (actor.companyKind === 'operator') return sql`true`
  return canSeeMail(actor, actor) ? eq(outboxMails.companyId, actor.companyId) : sql`false`
}
