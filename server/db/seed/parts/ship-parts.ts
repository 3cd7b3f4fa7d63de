import type { AnyLibraryRow } from '#shared/engine/library'
import { isDeepStrictEqual } from 'node:util'
import type { Client } from 'pg'
import { partColumns } from '#server/services/parts/part-columns'
import { shippedLibrary } from './library'

/**
 * Brings the shared rows of the installation up to what is shipped: a new row as version 1, a row whose figures
 * changed as its next version. Nothing is changed or taken away, so it may run at every start.
 */
export async function shipParts(client: Client): Promise<number> {
  const library = shippedLibrary()
  const current = await currentShared(client)
  const families = new Map(library.cores.map((core) => [core.id, core.shape]))
  const fresh = Object.values(library)
    .flat()
    .flatMap((row: AnyLibraryRow) => {
      const last = current.get(`${row.kind}/${row.id}`)
      if (last && isDeepStrictEqual({ ...last, version: 0 }, { ...row, version: 0 })) return []
      return [{ ...row, version: (last?.version ?? 0) + 1 }]
    })
  if (fresh.length > 0) await insertRows(client, fresh.map((row) => partColumns(row, (coreId) => families.get(coreId) ?? 'other')))
  return fresh.length
}

async function currentShared(client: Client): Promise<Map<string, AnyLibraryRow>> {
  const { rows } = await client.query<{ row: AnyLibraryRow }>(
    'SELECT DISTINCT ON (kind, part_id) "row" FROM part_rows WHERE company_id IS NULL ORDER BY kind, part_id, version DESC',
  )
  return new Map(rows.map(({ row }) => [`${row.kind}/${row.id}`, row]))
}

/** All rows in one statement, so that a start that is broken off ships either all or none. */
async function insertRows(client: Client, rows: readonly ReturnType<typeof partColumns>[]): Promise<void> {
  const named = rows.map(({ partId, sortKey, ...row }) => ({ ...row, part_id: partId, sort_key: sortKey }))
  await client.query(
    `INSERT INTO part_rows (kind, part_id, version, name, sort_key, family, confidence, "row")
     SELECT kind, part_id, version, name, sort_key, family, confidence, "row"
     FROM jsonb_to_recordset($1::jsonb)
       AS shipped (kind text, part_id text, version integer, name text, sort_key text, family text, confidence text, "row" jsonb)`,
    [JSON.stringify(named)],
  )
}
