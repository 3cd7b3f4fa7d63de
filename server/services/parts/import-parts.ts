import type { Context } from '#server/context'
import { asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { partRows } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { recordAudit } from '#server/services/audit/record-audit'
import type { StagedFile } from '#server/services/files/staged-file'
import type { BodyOf, ResponseOf } from '#shared/contracts/endpoint'
import type { importParts as contract, PartImportPreview } from '#shared/contracts/parts'
import type { LibraryKind } from '#shared/engine/library'
import { readPartTable, type PartTable } from '#shared/parts/read-part-table'
import { eq } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import { currentVersions, visibleVersions, type PartRecord } from './visible-rows'
import { addFirstVersion, addNextVersion } from './write-part'

/** Says what would become of each row of the file; stores neither the rows nor the file. */
export async function previewPartImport(ctx: Context, actor: Actor, kind: LibraryKind, staged: StagedFile): Promise<PartImportPreview> {
  const bytes = await readFile(staged.path)
  const { preview } = await asActor(ctx, actor, (tx) => planImport(tx, actor, kind, bytes, staged.sha256))
  return preview
}

/** Takes in every row of the file in one transaction, exactly as the confirmed preview showed it, or nothing. */
export async function importParts(ctx: Context, actor: Actor, { kind, fingerprint, reason }: BodyOf<typeof contract>, staged: StagedFile): Promise<ResponseOf<typeof contract>> {
  const bytes = await readFile(staged.path)
  return asActor(ctx, actor, async (tx) => {
    const { table, versions, preview } = await planImport(tx, actor, kind, bytes, staged.sha256)
    refuseUnfit(preview)
    if (preview.fingerprint !== fingerprint) throw new AppError('stale-version', 'The file or the library has changed since the preview; look at the preview again and confirm that. Nothing was stored.')
    for (const { draft, state, id } of table.lines) {
      if (state === 'new') await addFirstVersion(tx, actor, draft!, reason)
      if (state === 'changed') await addNextVersion(tx, actor, versions.get(id)!, draft!, reason)
    }
    const counts = { created: countOf(table, 'new'), changed: countOf(table, 'changed') }
    if (counts.created + counts.changed > 0) await recordAudit(tx, actor, { type: 'parts-imported', kind, ...counts, fileSha256: staged.sha256 })
    return { ...counts, unchanged: countOf(table, 'unchanged') }
  })
}

interface Plan {
  table: PartTable
  /** All versions of each row of the kind, the one for new work first. */
  versions: ReadonlyMap<string, readonly PartRecord[]>
  preview: PartImportPreview
}

async function planImport(tx: Transaction, actor: Actor, kind: LibraryKind, bytes: Uint8Array, sha256: string): Promise<Plan> {
  const versions = byPart(await visibleVersions(tx, actor, eq(partRows.kind, kind)))
  const cores = kind === 'former' ? await currentVersions(tx, actor, eq(partRows.kind, 'core')) : []
  const rows = new Map([...versions].map(([id, records]) => [id, records[0]!.row]))
  const table = readPartTable(bytes, kind, { rows, coreIds: new Set(cores.map(({ partId }) => partId)) })
  const lines = table.lines.map(({ draft: _draft, ...line }) => ({ ...line, basedOn: rows.get(line.id)?.version ?? null }))
  const fingerprint = createHash('sha256').update(JSON.stringify([sha256, kind, lines.map(({ id, state, basedOn }) => [id, state, basedOn])])).digest('hex')
  return { table, versions, preview: { fingerprint, problems: table.problems, rows: lines } }
}

function byPart(records: readonly PartRecord[]): Map<string, PartRecord[]> {
  const groups = new Map<string, PartRecord[]>()
  for (const record of records) groups.set(record.partId, [...(groups.get(record.partId) ?? []), record])
  return groups
}

const countOf = ({ lines }: PartTable, state: string) => lines.filter((line) => line.state === state).length

function refuseUnfit({ problems, rows }: PartImportPreview): void {
  const faults = [...problems, ...rows.flatMap((row) => row.problems.map((problem) => ({ ...problem, line: row.line })))]
  if (faults.length === 0) return
  const fields = Object.fromEntries(faults.slice(0, 100).map(({ line, column, message }) => [`file.${line}${column === '' ? '' : `.${column}`}`, message]))
  const { line, column, message } = faults[0]!
  throw new AppError('invalid-input', `The file does not fit, so nothing was stored. Line ${line}${column === '' ? '' : `, ${column}`}: ${message}`, fields)
}
