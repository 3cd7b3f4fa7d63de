import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { companies, quotes, quoteStates, rfqInvitations, rfqs } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { answerableInvitations } from '#server/policies/rfqs'
import { recordAudit } from '#server/services/audit/record-audit'
import { CONFIDENTIALITY_TEXT, type NO_BID_REASONS, type VendorRfq } from '#shared/contracts/rfqs'
import { and, asc, eq, inArray } from 'drizzle-orm'
import { lockInvitation, requireOpenForAnswers, type InvitationRow, type RfqRow } from './lock-rfq'
import { readLines } from './read-rfq'

interface Invited {
  rfq: RfqRow
  invitation: InvitationRow
  customerName: string
  /** The latest revision of the own quotation. */
  quotation: VendorRfq['quotation']
}

async function invited(tx: Transaction, actor: Actor, rfqId?: string): Promise<Invited[]> {
  const rows = await tx
    .select({ rfq: rfqs, invitation: rfqInvitations, customerName: companies.name })
    .from(rfqInvitations)
    .innerJoin(rfqs, eq(rfqs.id, rfqInvitations.rfqId))
    .leftJoin(companies, eq(companies.id, rfqs.companyId))
    .where(and(answerableInvitations(actor), rfqId ? eq(rfqs.id, rfqId) : undefined))
    .orderBy(asc(rfqs.dueAt))
  const quotations = await latestQuotations(
    tx,
    rows.map(({ invitation }) => invitation.id),
  )
  return rows.map((row) => ({ ...row, customerName: row.customerName ?? '—', quotation: quotations.get(row.invitation.id) ?? null }))
}

async function latestQuotations(tx: Transaction, invitationIds: string[]) {
  const rows = await tx
    .select({ invitationId: quotes.invitationId, revision: quotes.revision, state: quoteStates.state })
    .from(quotes)
    .innerJoin(quoteStates, eq(quoteStates.quoteId, quotes.id))
    .where(inArray(quotes.invitationId, invitationIds))
    .orderBy(asc(quotes.revision))
  return new Map(rows.map(({ invitationId, revision, state }) => [invitationId, { revision, state }]))
}

export async function listVendorRfqs(tx: Transaction, actor: Actor) {
  const now = await appNow(tx)
  return (await invited(tx, actor)).map((found) => headOf(found, now))
}

export async function findInvited(tx: Transaction, actor: Actor, rfqId: string): Promise<Invited> {
  const [found] = await invited(tx, actor, rfqId)
  if (!found) throw notFound('enquiry')
  return found
}

/** One enquiry as its vendor sees it. The first look moves the invitation from invited to seen. */
export async function readVendorRfq(tx: Transaction, actor: Actor, rfqId: string): Promise<VendorRfq> {
  const found = await findInvited(tx, actor, rfqId)
  const now = await appNow(tx)
  if (found.invitation.seenAt) return presentVendorRfq(tx, found, now)

  const state = found.invitation.state === 'invited' ? 'seen' : found.invitation.state
  const [invitation] = await tx.update(rfqInvitations).set({ state, seenAt: now }).where(eq(rfqInvitations.id, found.invitation.id)).returning()
  return presentVendorRfq(tx, { ...found, invitation: invitation! }, now)
}

function headOf({ rfq, invitation, customerName, quotation }: Invited, now: Date) {
  const { id, number, title, dueAt, dueZone } = rfq
  const issuedAt = (rfq.issuedAt ?? now).toISOString()
  const invitationState = quotation?.state === 'submitted' ? 'intends-to-quote' : invitation.state
  return { id, number, title, customerName, state: stateFor(rfq, now), invitationState, issuedAt, dueAt: dueAt.toISOString(), dueZone, now: now.toISOString(), quotation }
}

/** As far as it concerns the vendor; that an enquiry is due is said by the clock, not by the worker. */
function stateFor(rfq: RfqRow, now: Date): VendorRfq['state'] {
  switch (rfq.state) {
    case 'cancelled':
      return 'cancelled'
    case 'awarded':
      return 'decided'
    case 'opened':
      return 'opened'
    default:
      return now < rfq.dueAt ? 'open' : 'closed'
  }
}

async function presentVendorRfq(tx: Transaction, found: Invited, now: Date): Promise<VendorRfq> {
  const { rfq, invitation } = found
  const accepted = invitation.termsAcceptedAt !== null
  return {
    ...headOf(found, now),
    invitationId: invitation.id,
    buyerName: rfq.contactName,
    buyerEmail: rfq.contactEmail,
    issueNumber: rfq.issueNumber,
    currency: rfq.currency,
    deliveryRule: rfq.deliveryRule as VendorRfq['deliveryRule'],
    deliveryPlace: rfq.deliveryPlace,
    terms: accepted ? rfq.terms : null,
    confidentialityText: CONFIDENTIALITY_TEXT,
    termsAcceptedAt: invitation.termsAcceptedAt?.toISOString() ?? null,
    noBidReason: invitation.noBidReason,
    noBidText: invitation.noBidText,
    lines: accepted ? await readLines(tx, rfq.id) : [],
  }
}

export async function acceptConfidentiality(tx: Transaction, actor: Actor, rfqId: string): Promise<VendorRfq> {
  const { row, rfq, now } = await lockInvitation(tx, actor, rfqId)
  if (!row.termsAcceptedAt) {
    requireOpenForAnswers(rfq, now)
    const state = row.state === 'no-bid' ? row.state : 'terms-accepted'
    await tx.update(rfqInvitations).set({ state, termsAcceptedAt: now, termsAcceptedBy: actor.personId, seenAt: row.seenAt ?? now }).where(eq(rfqInvitations.id, row.id))
    await recordAudit(tx, actor, { type: 'confidentiality-accepted', rfqId, invitationId: row.id }, { companyId: row.companyId })
  }
  return readVendorRfq(tx, actor, rfqId)
}

/** Declines with a reason. A quotation that lies in the box is withdrawn with it. */
export async function declineRfq(tx: Transaction, actor: Actor, rfqId: string, reason: (typeof NO_BID_REASONS)[number], text: string): Promise<VendorRfq> {
  const { row, rfq, now } = await lockInvitation(tx, actor, rfqId)
  requireOpenForAnswers(rfq, now)
  await tx
    .update(rfqInvitations)
    .set({ state: 'no-bid', noBidReason: reason, noBidText: text, decidedAt: now, seenAt: row.seenAt ?? now })
    .where(eq(rfqInvitations.id, row.id))
  await retireSubmitted(tx, row.id, 'withdrawn', now)
  await recordAudit(tx, actor, { type: 'no-bid', rfqId, invitationId: row.id, reason }, { companyId: row.companyId })
  return readVendorRfq(tx, actor, rfqId)
}

/** Moves what the vendor submitted before out of the way. */
export async function retireSubmitted(tx: Transaction, invitationId: string, state: 'superseded' | 'withdrawn', now: Date): Promise<void> {
  const rows = await tx
    .select({ id: quotes.id })
    .from(quotes)
    .innerJoin(quoteStates, eq(quoteStates.quoteId, quotes.id))
    .where(and(eq(quotes.invitationId, invitationId), eq(quoteStates.state, 'submitted')))
  for (const { id } of rows) await tx.update(quoteStates).set({ state, changedAt: now }).where(eq(quoteStates.quoteId, id))
}
