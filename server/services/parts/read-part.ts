import type { Actor, Transaction } from '#server/db/as-actor'
import { partRows, people } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import type { Part, PartVersion } from '#shared/contracts/parts'
import { partRowSchema } from '#shared/contracts/part-rows'
import type { LibraryKind } from '#shared/engine/library'
import { and, eq, inArray } from 'drizzle-orm'
import { flagsOf } from './part-flags'
import { visibleVersions, type PartRecord } from './visible-rows'

export interface PartKey {
  kind: LibraryKind
  id: string
}

/** All versions of one row that the actor may read, the one for new work first. */
export async function findVersions(tx: Transaction, actor: Actor, { kind, id }: PartKey): Promise<PartRecord[]> {
  return visibleVersions(tx, actor, and(eq(partRows.kind, kind), eq(partRows.partId, id)))
}

export async function readPart(tx: Transaction, actor: Actor, key: PartKey): Promise<Part> {
  const records = await findVersions(tx, actor, key)
  if (records.length === 0) throw notFound('row')
  const names = await namesOf(tx, records)
  return { versions: records.map((record, index) => presentVersion(record, index === 0, names)), flags: await flagsOf(tx, actor, key) }
}

function presentVersion(record: PartRecord, current: boolean, names: ReadonlyMap<string, string>): PartVersion {
  const { createdBy, companyId } = record
  return {
    row: partRowSchema.parse(record.row),
    origin: companyId === null ? 'shared' : 'company',
    current,
    createdAt: record.createdAt.toISOString(),
    createdBy: createdBy === null ? null : { id: createdBy, name: names.get(createdBy) ?? '' },
    reason: record.reason,
  }
}

async function namesOf(tx: Transaction, records: readonly PartRecord[]): Promise<Map<string, string>> {
  const ids = [...new Set(records.flatMap((record) => record.createdBy ?? []))]
  if (ids.length === 0) return new Map()
  const rows = await tx.select({ id: people.id, name: people.name }).from(people).where(inArray(people.id, ids))
  return new Map(rows.map((row) => [row.id, row.name]))
}
