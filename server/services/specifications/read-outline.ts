import type { Actor, Transaction } from '#server/db/as-actor'
import { specificationReleases } from '#server/db/schema/index'
import { outlineDxf, type OutlineDxf } from '#server/dxf/outline-dxf'
import type { FileDownload } from '#server/services/files/download'
import { libraryFor } from '#server/services/parts/library-for'
import type { Evaluation } from '#shared/engine/evaluation'
import { evaluate } from '#shared/engine/index'
import type { ReleasedSpecification } from '#shared/engine/released'
import { eq } from 'drizzle-orm'
import { sheetsFileName } from './pdf-parts'
import { bytesDownload } from './read-sheets'
import { findRevision, readDocument, type RevisionRow } from './read-revision'
import type { DraftKey } from './write-draft'

/** Outline and pin-out of a revision: of a release from what was sealed, of a draft from what is stored. */
export async function readOutline(tx: Transaction, actor: Actor, key: DraftKey): Promise<FileDownload> {
  const row = await findRevision(tx, actor, key.specificationId, key.revisionId)
  const input = (await releasedOutline(tx, row)) ?? (await draftOutline(tx, actor, row))
  const name = sheetsFileName(input.specification.title.partNumber.value ?? '', input.revision, 'dxf')
  return bytesDownload(Buffer.from(outlineDxf(input), 'utf8'), name, 'image/vnd.dxf')
}

async function releasedOutline(tx: Transaction, row: RevisionRow): Promise<OutlineDxf | null> {
  const [release] = await tx
    .select({ bytes: specificationReleases.specification, revision: specificationReleases.revision, specificationHash: specificationReleases.specificationSha256 })
    .from(specificationReleases)
    .where(eq(specificationReleases.revisionId, row.id))
  if (!release) return null
  const { specification, library } = JSON.parse(release.bytes.toString('utf8')) as ReleasedSpecification
  const evaluation = row.evaluation === null ? null : (JSON.parse(row.evaluation.toString('utf8')) as Evaluation)
  return { specification, library, layout: evaluation?.layout ?? null, revision: release.revision, specificationHash: release.specificationHash }
}

async function draftOutline(tx: Transaction, actor: Actor, row: RevisionRow): Promise<OutlineDxf> {
  const document = readDocument(row.document)
  const library = await libraryFor(tx, actor)
  return { specification: document.specification, library, layout: evaluate(document, library).layout, revision: `P${row.draftNumber}`, specificationHash: null }
}
