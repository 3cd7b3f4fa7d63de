import type { Context } from '#server/context'
import { asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { files, specificationReleases } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { renderSpecificationPdf } from '#server/pdf/render-sheets'
import { downloadOf, type FileDownload } from '#server/services/files/download'
import { libraryFor } from '#server/services/parts/library-for'
import { canonicalJson } from '#shared/canonical-json'
import type { ResponseOf } from '#shared/contracts/endpoint'
import type { releasedResults } from '#shared/contracts/specifications'
import { drawSheets } from '#shared/drawing/sheets/index'
import { evaluate } from '#shared/engine/index'
import { eq } from 'drizzle-orm'
import { Readable } from 'node:stream'
import { pdfAttachment, pdfInfo, sheetsFileName } from './pdf-parts'
import { findRevision, readDocument } from './read-revision'
import type { DraftKey } from './write-draft'

/** The archived bytes of a release; of a draft a print that is marked as one and kept nowhere. */
export async function downloadSheets(ctx: Context, actor: Actor, key: DraftKey): Promise<FileDownload> {
  const found = await asActor(ctx, actor, async (tx) => {
    const row = await findRevision(tx, actor, key.specificationId, key.revisionId)
    const [archived] = await tx
      .select({ name: files.name, kind: files.kind, sizeBytes: files.sizeBytes, sha256: files.sha256 })
      .from(specificationReleases)
      .innerJoin(files, eq(files.id, specificationReleases.pdfFileId))
      .where(eq(specificationReleases.revisionId, row.id))
    return { row, archived, library: archived ? null : await libraryFor(tx, actor) }
  })
  if (found.archived) return downloadOf(ctx, found.archived)

  const { row } = found
  const document = readDocument(row.document)
  const sheets = drawSheets({
    specification: document.specification,
    evaluation: evaluate(document, found.library!),
    library: found.library!,
    revision: `P${row.draftNumber}`,
    release: null,
    specificationHash: null,
    status: row.state === 'in-check' ? 'in-check' : 'draft',
  })
  const { title } = document.specification
  const partNumber = title.partNumber.value ?? ''
  const revision = `P${row.draftNumber}`
  const pdf = await renderSpecificationPdf({
    sheets,
    info: pdfInfo({ partNumber, revision, title: title.title.value ?? '', company: title.legalOwner.value ?? '', issuedOn: row.updatedAt.toISOString().slice(0, 10) }),
    attachment: pdfAttachment(Buffer.from(canonicalJson(document.specification), 'utf8')),
  })
  return bytesDownload(pdf, sheetsFileName(partNumber, revision), 'application/pdf')
}

/** What was calculated and drawn at release, as it is archived. */
export async function readReleasedResults(tx: Transaction, actor: Actor, key: DraftKey): Promise<ResponseOf<typeof releasedResults>> {
  const row = await findRevision(tx, actor, key.specificationId, key.revisionId)
  const [release] = await tx.select({ sheets: specificationReleases.sheets }).from(specificationReleases).where(eq(specificationReleases.revisionId, row.id))
  if (!release || row.evaluation === null) throw notFound('released specification')
  return { evaluation: JSON.parse(row.evaluation.toString('utf8')), sheets: JSON.parse(release.sheets.toString('utf8')) }
}

/** The sealed bytes that the hash in the title block is over. */
export async function downloadReleasedDocument(ctx: Context, actor: Actor, key: DraftKey): Promise<FileDownload> {
  return asActor(ctx, actor, async (tx) => {
    const row = await findRevision(tx, actor, key.specificationId, key.revisionId)
    const [release] = await tx
      .select({ specification: specificationReleases.specification, partNumber: specificationReleases.partNumber, revision: specificationReleases.revision })
      .from(specificationReleases)
      .where(eq(specificationReleases.revisionId, row.id))
    if (!release) throw notFound('released specification')
    return bytesDownload(release.specification, sheetsFileName(release.partNumber, release.revision, 'json'), 'application/json')
  })
}

export function bytesDownload(bytes: Uint8Array, name: string, mediaType: string): FileDownload {
  return { name, mediaType, sizeBytes: bytes.length, open: async () => Readable.from([bytes]) }
}
