import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { companies, memberships, outboxMails, people, quoteStates, rfqInvitations, rfqIssues, rfqLines, rfqs, specificationReleases, vendorRelations } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { canReadRfq, readableRfqs } from '#server/policies/rfqs'
import { namesOf, personOf, RELEASE_COLUMNS, releaseSummary } from '#server/services/specifications/read-revision'
import type { Rfq, RfqSummary } from '#shared/contracts/rfqs'
import { and, asc, count, desc, eq, inArray, isNotNull, or } from 'drizzle-orm'
import type { RfqRow } from './lock-rfq'

export async function readRfq(tx: Transaction, actor: Actor, rfqId: string): Promise<Rfq> {
  return presentRfq(tx, actor, await findRfq(tx, actor, rfqId))
}

export async function findRfq(tx: Transaction, actor: Actor, rfqId: string): Promise<RfqRow> {
  const [row] = await tx.select().from(rfqs).where(eq(rfqs.id, rfqId))
  if (!row || !canReadRfq(actor, row)) throw notFound('enquiry')
  return row
}

export async function listRfqs(tx: Transaction, actor: Actor, state?: RfqRow['state']): Promise<RfqSummary[]> {
  const rows = await tx
    .select()
    .from(rfqs)
    .where(and(readableRfqs(actor), state ? eq(rfqs.state, state) : undefined))
    .orderBy(asc(rfqs.dueAt))
    .limit(500)
  const ids = rows.map((row) => row.id)
  if (ids.length === 0) return []
  const names = await namesOf(
    tx,
    rows.map((row) => row.buyerId),
  )
  const lines = await tx.select({ id: rfqLines.rfqId, count: count() }).from(rfqLines).where(inArray(rfqLines.rfqId, ids)).groupBy(rfqLines.rfqId)
  const invitations = await tx
    .select({ id: rfqInvitations.rfqId, count: count() })
    .from(rfqInvitations)
    .where(inArray(rfqInvitations.rfqId, ids))
    .groupBy(rfqInvitations.rfqId)
  const counted = (table: { id: string; count: number }[], id: string) => table.find((row) => row.id === id)?.count ?? 0
  return rows.map((row) => ({ ...summaryOf(row, personOf(names, row.buyerId).name), lineCount: counted(lines, row.id), invitationCount: counted(invitations, row.id) }))
}

const summaryOf = (row: RfqRow, buyerName: string) => ({
  id: row.id,
  number: row.number,
  title: row.title,
  state: row.state,
  dueAt: row.dueAt.toISOString(),
  dueZone: row.dueZone,
  currency: row.currency,
  buyerName,
})

export async function presentRfq(tx: Transaction, actor: Actor, row: RfqRow): Promise<Rfq> {
  const names = await namesOf(tx, [row.buyerId, row.openedBy, row.openingAskedBy])
  const lines = await readLines(tx, row.id)
  const invitations = await readInvitations(tx, actor, row.id)
  const [issue] = await tx.select({ sha256: rfqIssues.sha256 }).from(rfqIssues).where(eq(rfqIssues.rfqId, row.id)).orderBy(desc(rfqIssues.number)).limit(1)
  return {
    ...summaryOf(row, personOf(names, row.buyerId).name),
    now: (await appNow(tx)).toISOString(),
    lineCount: lines.length,
    invitationCount: invitations.length,
    version: row.version,
    issueNumber: row.issueNumber,
    issueSha256: issue?.sha256 ?? null,
    issuedAt: row.issuedAt?.toISOString() ?? null,
    openingAskedAt: row.openingAskedAt?.toISOString() ?? null,
    openingAskedBy: row.openingAskedBy === null ? null : personOf(names, row.openingAskedBy),
    openedAt: row.openedAt?.toISOString() ?? null,
    openedBy: row.openedBy === null ? null : personOf(names, row.openedBy),
    cancelledReason: row.cancelledReason,
    deliveryRule: row.deliveryRule as Rfq['deliveryRule'],
    deliveryPlace: row.deliveryPlace,
    terms: row.terms,
    lines,
    invitations,
  }
}

export async function readLines(tx: Transaction, rfqId: string): Promise<Rfq['lines']> {
  const rows = await tx
    .select({ line: rfqLines, release: RELEASE_COLUMNS })
    .from(rfqLines)
    .innerJoin(specificationReleases, eq(specificationReleases.id, rfqLines.releaseId))
    .where(eq(rfqLines.rfqId, rfqId))
    .orderBy(asc(rfqLines.position))
  return rows.map(({ line, release }) => {
    const { id, position, quantities, orderQuantity, annualQuantity, sampleQuantity } = line
    return { id, position, quantities, orderQuantity, annualQuantity, sampleQuantity, release: releaseSummary(release) }
  })
}

async function readInvitations(tx: Transaction, actor: Actor, rfqId: string): Promise<Rfq['invitations']> {
  const rows = await tx
    .select({ invitation: rfqInvitations, relationName: vendorRelations.name, companyName: companies.name })
    .from(rfqInvitations)
    .leftJoin(companies, eq(companies.id, rfqInvitations.vendorCompanyId))
    .leftJoin(
      vendorRelations,
      and(eq(vendorRelations.vendorCompanyId, rfqInvitations.vendorCompanyId), eq(vendorRelations.buyingCompanyId, rfqInvitations.companyId)),
    )
    .where(eq(rfqInvitations.rfqId, rfqId))
    .orderBy(asc(vendorRelations.name))
  const bounced = await undeliverableByVendor(
    tx,
    actor,
    rows.map((row) => row.invitation.vendorCompanyId),
  )
  const quoting = await vendorsQuoting(tx, rfqId)
  return rows.map(({ invitation, relationName, companyName }) => ({
    id: invitation.id,
    vendorCompanyId: invitation.vendorCompanyId,
    vendorName: companyName ?? relationName ?? '—',
    state: quoting.has(invitation.vendorCompanyId) ? 'intends-to-quote' : invitation.state,
    noBidReason: invitation.noBidReason,
    noBidText: invitation.noBidText,
    seenAt: invitation.seenAt?.toISOString() ?? null,
    termsAcceptedAt: invitation.termsAcceptedAt?.toISOString() ?? null,
    undeliverable: bounced.get(invitation.vendorCompanyId) ?? 0,
  }))
}

/** Vendors whose quotation lies in the box; nobody before the opening, since the rows are sealed until then. */
export async function vendorsQuoting(tx: Transaction, rfqId: string): Promise<Set<string>> {
  const rows = await tx
    .select({ vendorCompanyId: quoteStates.vendorCompanyId })
    .from(quoteStates)
    .innerJoin(rfqs, and(eq(rfqs.id, quoteStates.rfqId), isNotNull(rfqs.openedAt)))
    .where(and(eq(quoteStates.rfqId, rfqId), eq(quoteStates.state, 'submitted')))
  return new Set(rows.map(({ vendorCompanyId }) => vendorCompanyId))
}

/** Mails of ours that did not reach the people of a vendor, or its contact as we typed it. */
async function undeliverableByVendor(tx: Transaction, actor: Actor, vendorIds: string[]): Promise<Map<string, number>> {
  if (vendorIds.length === 0) return new Map()
  const rows = await tx
    .select({ personVendor: memberships.companyId, contactVendor: vendorRelations.vendorCompanyId })
    .from(outboxMails)
    .leftJoin(people, eq(people.id, outboxMails.personId))
    .leftJoin(memberships, eq(memberships.personId, people.id))
    .leftJoin(vendorRelations, and(eq(vendorRelations.contactEmail, outboxMails.address), eq(vendorRelations.buyingCompanyId, actor.companyId)))
    .where(
      and(
        eq(outboxMails.companyId, actor.companyId),
        eq(outboxMails.state, 'undeliverable'),
        or(inArray(memberships.companyId, vendorIds), inArray(vendorRelations.vendorCompanyId, vendorIds)),
      ),
    )
  const counts = new Map<string, number>()
  for (const row of rows) {
    const vendor = row.personVendor ?? row.contactVendor
    if (vendor) counts.set(vendor, (counts.get(vendor) ?? 0) + 1)
  }
  return counts
}
