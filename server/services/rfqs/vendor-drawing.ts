import type { Context } from '#server/context'
import { asActor, type Actor } from '#server/db/as-actor'
import { companies, files, rfqCopies, rfqLines, specificationReleases } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { renderSpecificationPdf } from '#server/pdf/render-sheets'
import { recordAudit } from '#server/services/audit/record-audit'
import { downloadOf, type FileDownload } from '#server/services/files/download'
import { keepMadeFile, referToFile } from '#server/services/files/store-file'
import { pdfAttachment, pdfInfo, sheetsFileName } from '#server/services/specifications/pdf-parts'
import type { Sheet } from '#shared/drawing/model'
import { and, eq } from 'drizzle-orm'
import { requireAcceptedTerms } from './lock-rfq'
import { findInvited } from './vendor-rfq'

/**
 * The vendor's own copy: the archived sheets with the vendor's name across them, made once and then kept,
 * so that what left the company can be recognised by its hash.
 */
export async function downloadVendorDrawing(ctx: Context, actor: Actor, rfqId: string, lineId: string): Promise<FileDownload> {
  const found = await asActor(ctx, actor, async (tx) => {
    const { invitation, rfq } = await findInvited(tx, actor, rfqId)
    requireAcceptedTerms(invitation)
    const [copy] = await tx
      .select({ name: files.name, kind: files.kind, sizeBytes: files.sizeBytes, sha256: files.sha256 })
      .from(rfqCopies)
      .innerJoin(files, eq(files.id, rfqCopies.fileId))
      .where(and(eq(rfqCopies.invitationId, invitation.id), eq(rfqCopies.lineId, lineId)))
    if (copy) return { copy }

    const [release] = await tx
      .select({
        sheets: specificationReleases.sheets,
        specification: specificationReleases.specification,
        partNumber: specificationReleases.partNumber,
        title: specificationReleases.title,
        revision: specificationReleases.revision,
        issuedOn: specificationReleases.issuedOn,
      })
      .from(rfqLines)
      .innerJoin(specificationReleases, eq(specificationReleases.id, rfqLines.releaseId))
      .where(and(eq(rfqLines.id, lineId), eq(rfqLines.rfqId, rfqId)))
    if (!release) throw notFound('drawing')
    const [vendor] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, actor.companyId))
    const [customer] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, rfq.companyId))
    return { release, invitation, rfq, vendorName: vendor?.name ?? '', customerName: customer?.name ?? '' }
  })
  if (found.copy) return downloadOf(ctx, found.copy)

  const { release, invitation, rfq, vendorName, customerName } = found
  const pdf = await renderSpecificationPdf({
    sheets: JSON.parse(release.sheets.toString('utf8')) as Sheet[],
    info: pdfInfo({ partNumber: release.partNumber, revision: release.revision, title: release.title, company: customerName, issuedOn: release.issuedOn }),
    attachment: pdfAttachment(release.specification),
    watermark: { recipient: `${vendorName} · ${rfq.number}` },
  })
  const kept = await keepMadeFile(ctx, pdf, sheetsFileName(release.partNumber, release.revision), 'pdf')
  await asActor(ctx, actor, async (tx) => {
    const [present] = await tx
      .select({ id: rfqCopies.id })
      .from(rfqCopies)
      .where(and(eq(rfqCopies.invitationId, invitation.id), eq(rfqCopies.lineId, lineId)))
    if (present) return
    const file = await referToFile(tx, actor, kept)
    await tx
      .insert(rfqCopies)
      .values({ invitationId: invitation.id, companyId: rfq.companyId, vendorCompanyId: actor.companyId, lineId, fileId: file.id, sha256: file.sha256 })
      .onConflictDoNothing()
    await recordAudit(tx, actor, { type: 'drawing-copied', rfqId, lineId, sha256: file.sha256 }, { companyId: rfq.companyId })
  })
  return downloadOf(ctx, kept)
}
