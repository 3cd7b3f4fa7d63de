import type { Transaction } from '#server/db/as-actor'
import { auditEntries } from '#server/db/schema/index'
import { AUDIT_AREA, type AuditEvent } from '#shared/contracts/audit'
import { sql } from 'drizzle-orm'

/** The acting person with its company; both null for what the worker does at a due time. */
export interface AuditActor {
  personId: string | null
  companyId: string | null
}

export interface AuditPlace {
  /** Whose trail it is; the actor's company unless said. A vendor acting towards a customer names the customer. */
  companyId?: string
  /** Hides the entry from that company until a policy of the feature opens it, e.g. the enquiry of a sealed quotation. */
  sealedBy?: string
}

/** Writes an entry in the transaction of the fact, so that neither exists without the other. */
export async function recordAudit(tx: Transaction, actor: AuditActor, event: AuditEvent, place: AuditPlace = {}): Promise<void> {
  const companyId = place.companyId ?? actor.companyId
  if (!companyId) throw new RangeError('An audit entry belongs to a company.')
  await tx.insert(auditEntries).values({
    companyId,
    actorPersonId: actor.personId,
    actorCompanyId: actor.companyId,
    sealedBy: place.sealedBy,
    at: sql`app_now()`,
    area: AUDIT_AREA[event.type],
    event,
  })
}
