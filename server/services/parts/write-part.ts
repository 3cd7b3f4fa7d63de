import type { Actor, Transaction } from '#server/db/as-actor'
import { partRows } from '#server/db/schema/index'
import { AppError, notFound, violates } from '#server/errors'
import { recordAudit } from '#server/services/audit/record-audit'
import type { Part } from '#shared/contracts/parts'
import type { PartDraft } from '#shared/contracts/part-rows'
import type { AnyLibraryRow, CoreShape } from '#shared/engine/library'
import { isDeepStrictEqual } from 'node:util'
import { partColumns } from './part-columns'
import { findVersions, readPart, type PartKey } from './read-part'

/** Adds a row of the company's own. An identifier that is taken, shared or own, is refused: a change makes a version. */
export async function createPart(tx: Transaction, actor: Actor, draft: PartDraft, reason: string): Promise<Part> {
  const existing = await findVersions(tx, actor, draft)
  if (existing.length > 0) throw identifierTaken(draft)
  await addFirstVersion(tx, actor, draft, reason)
  return readPart(tx, actor, draft)
}

/** Writes version 1 with its audit entry; the caller has seen that the identifier is free. */
export async function addFirstVersion(tx: Transaction, actor: Actor, draft: PartDraft, reason: string): Promise<void> {
  await insertVersion(tx, actor, { ...draft, version: 1 }, reason)
  await recordAudit(tx, actor, { type: 'part-created', kind: draft.kind, partId: draft.id, version: 1 })
}

/** The next version, the company's own: shared rows and earlier versions stay as they are. */
export async function changePart(tx: Transaction, actor: Actor, key: PartKey, change: { row: PartDraft; basedOn: number; reason: string }): Promise<Part> {
  const versions = await findVersions(tx, actor, key)
  const current = versions[0]
  if (!current) throw notFound('row')
  refuseOtherRow(key, change.row)
  if (current.version !== change.basedOn) throw changedMeanwhile(current.version)
  if (isDeepStrictEqual({ ...current.row, version: 0 }, { ...change.row, version: 0 })) {
    throw new AppError('invalid-input', 'Nothing was changed; change a field first.', { row: 'The row is as it was.' })
  }

  await addNextVersion(tx, actor, versions, change.row, change.reason)
  return readPart(tx, actor, key)
}

/** Writes the version behind the greatest of all that the company sees, with its audit entry. */
export async function addNextVersion(tx: Transaction, actor: Actor, versions: readonly { version: number }[], draft: PartDraft, reason: string): Promise<void> {
  const version = Math.max(...versions.map((record) => record.version)) + 1
  await insertVersion(tx, actor, { ...draft, version }, reason)
  await recordAudit(tx, actor, { type: 'part-changed', kind: draft.kind, partId: draft.id, version })
}

/** Documents refer to a row by kind and identifier, so that neither can change with a version. */
function refuseOtherRow(key: PartKey, row: PartDraft): void {
  const fields: Record<string, string> = {}
  if (row.kind !== key.kind) fields['row.kind'] = 'The kind of a row stays.'
  if (row.id !== key.id) fields['row.id'] = 'The identifier of a row stays; add a new row for another one.'
  if (Object.keys(fields).length > 0) throw new AppError('invalid-input', 'A version keeps the kind and the identifier of its row.', fields)
}

async function insertVersion(tx: Transaction, actor: Actor, row: AnyLibraryRow, reason: string): Promise<void> {
  const shape = row.kind === 'former' ? await shapeOfCore(tx, actor, row.coreId) : 'other'
  try {
    await tx.insert(partRows).values({ ...partColumns(row, () => shape), companyId: actor.companyId, createdBy: actor.personId, reason })
  } catch (error) {
    if (!violates(error, 'part_rows_version_key')) throw error
    throw row.version === 1 ? identifierTaken(row) : changedMeanwhile(row.version)
  }
}

async function shapeOfCore(tx: Transaction, actor: Actor, coreId: string): Promise<CoreShape> {
  const [core] = await findVersions(tx, actor, { kind: 'core', id: coreId })
  if (core?.row.kind !== 'core') {
    throw new AppError('invalid-input', `There is no core “${coreId}” in the library; add the core first or name another.`, { 'row.coreId': 'No such core.' })
  }
  return core.row.shape
}

const identifierTaken = ({ kind, id }: PartKey) =>
  new AppError('part-id-in-use', `There is a ${kind} “${id}” already; change that row or choose another identifier.`, { 'row.id': 'This identifier is taken.' })

const changedMeanwhile = (version: number) =>
  new AppError('stale-version', `Somebody made version ${version} meanwhile; load the row again and make the change there.`)
