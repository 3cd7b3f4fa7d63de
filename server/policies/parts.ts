import type { Actor } from '#server/db/as-actor'
import { partFlags } from '#server/db/schema/part-flags'
import { partRows } from '#server/db/schema/parts'
import { PART_READERS } from '#shared/contracts/parts'
import { eq, isNull, or, sql, type SQL } from 'drizzle-orm'

interface PartRow {
  /** Null for a shared row. */
  companyId: string | null
}

const mayRead = (actor: Actor) => actor.companyKind === 'buying' && PART_READERS.some((role) => actor.roles.includes(role))

/** Shared rows are every buying company's, own rows the own one's. A vendor and who only manages accounts read none. */
export function canReadPart(actor: Actor, row: PartRow): boolean {
  return mayRead(actor) && (row.companyId === null || row.companyId === actor.companyId)
}

/** The same rule as a restriction, for lists. */
export function readableParts(actor: Actor): SQL {
  return mayRead(actor) ? or(isNull(partRows.companyId), eq(partRows.companyId, actor.companyId))! : sql`false`
}

/** What a company says about rows is its own. */
export function readablePartFlags(actor: Actor): SQL {
  return mayRead(actor) ? eq(partFlags.companyId, actor.companyId) : sql`false`
}

/** A change makes the company's own version, so that no shared row and nobody else's is touched. */
export function canWriteParts(actor: Actor): boolean {
  return actor.companyKind === 'buying' && actor.roles.includes('engineer')
}
