import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { partFlags, partRows } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { readablePartFlags } from '#server/policies/parts'
import { recordAudit } from '#server/services/audit/record-audit'
import type { PartFlags } from '#shared/contracts/parts'
import type { LibraryKind } from '#shared/engine/library'
import { and, eq, or, type SQL } from 'drizzle-orm'
import type { PartKey } from './read-part'
import { visibleVersions } from './visible-rows'

export const NO_FLAGS: PartFlags = { preferred: false, stocked: false }

/** The company's flags by `kind/id`; a row without an entry has none. */
export async function findFlags(tx: Transaction, actor: Actor, only?: SQL): Promise<Map<string, PartFlags>> {
  const rows = await tx.select().from(partFlags).where(and(readablePartFlags(actor), only))
  return new Map(rows.map(({ kind, partId, preferred, stocked }) => [`${kind}/${partId}`, { preferred, stocked }]))
}

export const flagsOfKind = (tx: Transaction, actor: Actor, kind: LibraryKind) => findFlags(tx, actor, eq(partFlags.kind, kind))

export async function flagsOf(tx: Transaction, actor: Actor, { kind, id }: PartKey): Promise<PartFlags> {
  const found = await findFlags(tx, actor, and(eq(partFlags.kind, kind), eq(partFlags.partId, id)))
  return found.get(`${kind}/${id}`) ?? NO_FLAGS
}

/** The rows that a search is steered by, as `core/etd34-17-11`. */
export async function flaggedRows(tx: Transaction, actor: Actor): Promise<{ preferredRows: string[]; stockedRows: string[] }> {
  const flags = [...(await findFlags(tx, actor, or(partFlags.preferred, partFlags.stocked)))].sort(([one], [other]) => (one < other ? -1 : 1))
  const named = (flag: keyof PartFlags) => flags.filter(([, found]) => found[flag]).map(([name]) => name)
  return { preferredRows: named('preferred'), stockedRows: named('stocked') }
}

/** Sets both flags of a row that the company sees; what is so already leaves no trace. */
export async function setFlags(tx: Transaction, actor: Actor, key: PartKey, flags: PartFlags): Promise<PartFlags> {
  const versions = await visibleVersions(tx, actor, and(eq(partRows.kind, key.kind), eq(partRows.partId, key.id)))
  if (versions.length === 0) throw notFound('row')
  const before = await flagsOf(tx, actor, key)
  if (before.preferred === flags.preferred && before.stocked === flags.stocked) return before
  const set = { ...flags, updatedBy: actor.personId, updatedAt: await appNow(tx) }
  await tx
    .insert(partFlags)
    .values({ companyId: actor.companyId, kind: key.kind, partId: key.id, ...set })
    .onConflictDoUpdate({ target: [partFlags.companyId, partFlags.kind, partFlags.partId], set })
  await recordAudit(tx, actor, { type: 'part-flagged', kind: key.kind, partId: key.id, ...flags })
  return flags
}
