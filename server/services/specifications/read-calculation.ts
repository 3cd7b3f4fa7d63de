import type { Context } from '#server/context'
import { asActor, type Actor } from '#server/db/as-actor'
import { specificationReleases } from '#server/db/schema/index'
import { renderCalculationRecordPdf } from '#server/pdf/render-calculation-record'
import type { FileDownload } from '#server/services/files/download'
import { libraryFor } from '#server/services/parts/library-for'
import { canonicalJson } from '#shared/canonical-json'
import { evaluate } from '#shared/engine/index'
import { eq } from 'drizzle-orm'
import { sheetsFileName } from './pdf-parts'
import { findRevision, readDocument } from './read-revision'
import { bytesDownload } from './read-sheets'
import type { DraftKey } from './write-draft'

/** The whole calculation of one revision with its working. It is made outside of the transaction, which holds nothing meanwhile. */
export async function downloadCalculation(ctx: Context, actor: Actor, key: DraftKey): Promise<FileDownload> {
  const { row, release, library } = await asActor(ctx, actor, async (tx) => {
    const found = await findRevision(tx, actor, key.specificationId, key.revisionId)
    const [sealed] = await tx
      .select({ revision: specificationReleases.revision, engine: specificationReleases.engine, issuedOn: specificationReleases.issuedOn })
      .from(specificationReleases)
      .where(eq(specificationReleases.revisionId, found.id))
    return { row: found, release: sealed ?? null, library: await libraryFor(tx, actor) }
  })
  const document = readDocument(row.document)
  const evaluation = evaluate(document, library, { working: true })
  const { title } = document.specification
  const partNumber = title.partNumber.value ?? ''
  const revision = release?.revision ?? `P${row.draftNumber}`
  const pdf = await renderCalculationRecordPdf({
    partNumber,
    title: title.title.value ?? '',
    revision,
    company: title.legalOwner.value ?? '',
    date: release?.issuedOn ?? row.updatedAt.toISOString().slice(0, 10),
    document,
    evaluation,
    sealedEngine: release?.engine ?? null,
    bytes: Buffer.from(canonicalJson(evaluation), 'utf8'),
  })
  return bytesDownload(pdf, sheetsFileName(`${partNumber}-calculation`, revision), 'application/pdf')
}
