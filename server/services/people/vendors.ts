import type { Actor, Transaction } from '#server/db/as-actor'
import { files, memberships, people, vendorLinks, vendorRelations } from '#server/db/schema/index'
import { readableVendorRelations } from '#server/policies/people'
import type { Vendor } from '#shared/contracts/people'
import { and, eq, inArray, isNull, type SQL } from 'drizzle-orm'

export type VendorRelationRow = typeof vendorRelations.$inferSelect

export const listVendors = (tx: Transaction, actor: Actor): Promise<Vendor[]> => selectVendors(tx, actor)

export async function findVendor(tx: Transaction, actor: Actor, vendorId: string): Promise<Vendor | null> {
  const [vendor] = await selectVendors(tx, actor, eq(vendorRelations.vendorCompanyId, vendorId))
  return vendor ?? null
}

/** The row that policies decide about; null also when it is another company's. */
export async function findVendorRelation(tx: Transaction, actor: Actor, vendorId: string): Promise<VendorRelationRow | null> {
  const [row] = await tx.select().from(vendorRelations).where(and(readableVendorRelations(actor), eq(vendorRelations.vendorCompanyId, vendorId)))
  return row ?? null
}

async function selectVendors(tx: Transaction, actor: Actor, which?: SQL): Promise<Vendor[]> {
  const rows = await tx
    .select({ relation: vendorRelations, link: vendorLinks, agreementFileName: files.name })
    .from(vendorRelations)
    .innerJoin(vendorLinks, and(eq(vendorLinks.buyingCompanyId, vendorRelations.buyingCompanyId), eq(vendorLinks.vendorCompanyId, vendorRelations.vendorCompanyId)))
    .leftJoin(files, eq(files.id, vendorRelations.agreementFileId))
    .where(and(readableVendorRelations(actor), which))
    .orderBy(vendorRelations.name, vendorRelations.vendorCompanyId)
  const accepted = rows.filter(({ link }) => link.acceptedAt).map(({ link }) => link.vendorCompanyId)
  const contacts = await peopleOf(tx, accepted)
  return rows.map(({ relation, link, agreementFileName }) => ({
    id: relation.vendorCompanyId,
    name: relation.name,
    contactName: relation.contactName,
    contactEmail: relation.contactEmail,
    state: link.acceptedAt ? 'accepted' : 'invited',
    approval: relation.approval,
    confidentialityAgreedOn: relation.confidentialityAgreedOn,
    confidentialityExpiresOn: relation.confidentialityExpiresOn,
    agreementFileName,
    notes: relation.notes,
    people: contacts.filter(({ companyId }) => companyId === relation.vendorCompanyId).map(({ id, name, email }) => ({ id, name, email })),
    invitedAt: link.invitedAt.toISOString(),
  }))
}

async function peopleOf(tx: Transaction, companyIds: string[]) {
  if (companyIds.length === 0) return []
  return tx
    .select({ id: people.id, name: people.name, email: people.email, companyId: memberships.companyId })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(and(inArray(memberships.companyId, companyIds), isNull(people.leftAt)))
    .orderBy(people.name)
}
