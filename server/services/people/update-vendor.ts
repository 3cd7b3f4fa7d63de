import type { Context } from '#server/context'
import { asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { files, vendorRelations } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { canReadAgreement, canUpdateVendorRelation } from '#server/policies/people'
import { recordAudit } from '#server/services/audit/record-audit'
import { downloadOf, type FileDownload } from '#server/services/files/download'
import type { StagedFile } from '#server/services/files/staged-file'
import { keepFile, referToFile } from '#server/services/files/store-file'
import type { UpdateVendor, Vendor } from '#shared/contracts/people'
import { and, eq } from 'drizzle-orm'
import { findVendor, findVendorRelation, type VendorRelationRow } from './vendors'

const rowOf = ({ buyingCompanyId, vendorCompanyId }: VendorRelationRow) =>
  and(eq(vendorRelations.buyingCompanyId, buyingCompanyId), eq(vendorRelations.vendorCompanyId, vendorCompanyId))

export async function updateVendor(tx: Transaction, actor: Actor, relation: VendorRelationRow, change: UpdateVendor): Promise<Vendor> {
  await tx.update(vendorRelations).set(change).where(rowOf(relation))
  await recordAudit(tx, actor, { type: 'vendor-updated', vendorCompanyId: relation.vendorCompanyId, approval: change.approval })
  return (await findVendor(tx, actor, relation.vendorCompanyId))!
}

/** Keeps the bytes first, outside the transaction that refers to them. An earlier agreement stays stored. */
export async function storeAgreement(ctx: Context, actor: Actor, vendorId: string, staged: StagedFile): Promise<Vendor> {
  await keepFile(ctx, staged)
  return asActor(ctx, actor, async (tx) => {
    const relation = await findVendorRelation(tx, actor, vendorId)
    if (!relation || !canUpdateVendorRelation(actor, relation)) throw notFound('vendor')
    const file = await referToFile(tx, actor, staged)
    await tx.update(vendorRelations).set({ agreementFileId: file.id }).where(rowOf(relation))
    await recordAudit(tx, actor, { type: 'vendor-agreement-stored', vendorCompanyId: vendorId, fileId: file.id, sha256: file.sha256 })
    return (await findVendor(tx, actor, vendorId))!
  })
}

/** The right is asked for each time; the bytes are opened when the transaction has ended. */
export async function openAgreement(ctx: Context, actor: Actor, vendorId: string): Promise<FileDownload> {
  const file = await asActor(ctx, actor, async (tx) => {
    const relation = await findVendorRelation(tx, actor, vendorId)
    if (!relation?.agreementFileId || !canReadAgreement(actor, relation)) return null
    const [row] = await tx.select().from(files).where(eq(files.id, relation.agreementFileId))
    return row ?? null
  })
  if (!file) throw notFound('agreement')
  return downloadOf(ctx, file)
}
