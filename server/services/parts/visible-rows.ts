import type { Actor, Transaction } from '#server/db/as-actor'
import { partRows } from '#server/db/schema/index'
import { readableParts } from '#server/policies/parts'
import type { LibraryKind } from '#shared/engine/library'
import { and, asc, desc, sql, type SQL } from 'drizzle-orm'

export type PartRecord = typeof partRows.$inferSelect

/** The company's own versions first, the newest first: the first of a row is the one that new work takes. */
const PRECEDENCE = [asc(partRows.kind), asc(partRows.partId), sql`${partRows.companyId} is null`, desc(partRows.version)] as const

/** Every version the actor may read, own before shared, newest first. A shared version that an own one of the same number hides is left out. */
export async function visibleVersions(tx: Transaction, actor: Actor, only?: SQL): Promise<PartRecord[]> {
  const rows = await tx
    .select()
    .from(partRows)
    .where(and(readableParts(actor), only))
    .orderBy(...PRECEDENCE)
  const seen = new Set<string>()
  return rows.filter((row) => {
    const key = keyOf(row)
    return !seen.has(key) && seen.add(key)
  })
}

/** The version of each row that new work takes. */
export async function currentVersions(tx: Transaction, actor: Actor, only?: SQL): Promise<PartRecord[]> {
  return tx
    .selectDistinctOn([partRows.kind, partRows.partId])
    .from(partRows)
    .where(and(readableParts(actor), only))
    .orderBy(...PRECEDENCE)
}

const keyOf = ({ kind, partId, version }: { kind: LibraryKind; partId: string; version: number }) => `${kind}/${partId}/${version}`
