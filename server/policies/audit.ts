import type { Actor } from '#server/db/as-actor'
import { auditEntries } from '#server/db/schema/index'
import { AUDIT_AREAS, type AuditArea } from '#shared/contracts/audit'
import { and, eq, inArray, or, sql, type SQL } from 'drizzle-orm'

interface Entry {
  companyId: string
  actorPersonId: string | null
  actorCompanyId: string | null
  area: AuditArea
  /** Whether it is sealed from the company whose trail it is. */
  isSealed: boolean
}

/** Areas of the own company's trail that the roles read. */
export function readableAreas(actor: Actor): readonly AuditArea[] {
  if (actor.companyKind !== 'buying') return []
  const has = (...roles: string[]) => actor.roles.some((role) => roles.includes(role))
  if (has('buyer', 'approver')) return AUDIT_AREAS
  return AUDIT_AREAS.filter((area) => (area === 'engineering' && has('engineer', 'checker', 'quality')) || (area === 'account' && has('admin')))
}

export function canReadAuditEntry(actor: Actor, entry: Entry): boolean {
  if (entry.actorPersonId === actor.personId) return true
  switch (actor.companyKind) {
    case 'buying':
      return entry.companyId === actor.companyId && !entry.isSealed && readableAreas(actor).includes(entry.area)
    case 'vendor':
      return entry.companyId === actor.companyId || entry.actorCompanyId === actor.companyId
    case 'operator':
      return entry.area === 'account'
  }
}

/**
 * The same rule for lists. Sealed entries are left to row security, which knows when their enquiry was opened:
 * here they are not shut out, there they are.
 */
export function readableAuditEntries(actor: Actor): SQL {
  const own = eq(auditEntries.actorPersonId, actor.personId)
  switch (actor.companyKind) {
    case 'buying': {
      const areas = readableAreas(actor)
      return areas.length === 0 ? own : or(own, and(eq(auditEntries.companyId, actor.companyId), inArray(auditEntries.area, [...areas])))!
    }
    case 'vendor':
      return or(own, eq(auditEntries.companyId, actor.companyId), eq(auditEntries.actorCompanyId, actor.companyId))!
    case 'operator':
      return or(own, sql`${auditEntries.area} = 'account'`)!
  }
}
