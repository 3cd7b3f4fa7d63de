import type { Actor, Transaction } from '#server/db/as-actor'
import { partRows } from '#server/db/schema/index'
import type { AnyLibraryRow, Library } from '#shared/engine/library'
import type { LibraryReference } from '#shared/engine/specification'
import { inArray } from 'drizzle-orm'
import { currentVersions, visibleVersions } from './visible-rows'

/** Every version of every row that a document of this company may name; of each row the one for new work first. */
export async function libraryFor(tx: Transaction, actor: Actor): Promise<Library> {
  return grouped(await visibleVersions(tx, actor))
}

/** Of every row only the version that new work takes: what a proposal chooses from. */
export async function currentLibrary(tx: Transaction, actor: Actor): Promise<Library> {
  return grouped(await currentVersions(tx, actor))
}

/** Exactly the versions named, in the order asked for; what is absent or not the company's is left out. */
export async function findRows(tx: Transaction, actor: Actor, references: readonly LibraryReference[]): Promise<AnyLibraryRow[]> {
  if (references.length === 0) return []
  const ids = [...new Set(references.map((reference) => reference.id))]
  const records = await visibleVersions(tx, actor, inArray(partRows.partId, ids))
  return references.flatMap(({ kind, id, version }) => {
    const found = records.find((record) => record.kind === kind && record.partId === id && record.version === version)
    return found ? [found.row] : []
  })
}

function grouped(records: readonly { row: AnyLibraryRow }[]): Library {
  const rows = records.map((record) => record.row)
  const of = <K extends AnyLibraryRow['kind']>(kind: K) => rows.filter((row): row is Extract<AnyLibraryRow, { kind: K }> => row.kind === kind)
  return { cores: of('core'), formers: of('former'), materials: of('material'), wires: of('wire'), tapes: of('tape'), sleeves: of('sleeve') }
}
