import type { Actor, Transaction } from '#server/db/as-actor'
import { files, quoteLines, quotePriceBreaks, quotes, quoteStates, rfqInvitations, rfqIssues, rfqLines } from '#server/db/schema/index'
import { AppError, notFound } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import { lockInvitation, requireAcceptedTerms, requireOpenForAnswers, type RfqRow } from '#server/services/rfqs/lock-rfq'
import { retireSubmitted } from '#server/services/rfqs/vendor-rfq'
import { canonicalJson } from '#shared/canonical-json'
import type { QuoteInput } from '#shared/contracts/quotes'
import { amountText, isCurrency } from '#shared/money'
import { and, desc, eq, max } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { findDraft } from './draft-quote'
import { readOwnQuote } from './read-quotes'

/** The quotation, its audit entry and its receipt exist together or not at all. Each revision is complete. */
export async function submitQuote(tx: Transaction, actor: Actor, rfqId: string, input: QuoteInput) {
  const { row: invitation, rfq, now } = await lockInvitation(tx, actor, rfqId)
  requireAcceptedTerms(invitation)
  requireOpenForAnswers(rfq, now)
  const revision = await nextRevision(tx, invitation.id)
  await requireSoundQuote(tx, rfq, input, { now, revision })

  const draft = await findDraft(tx, invitation)
  const [issue] = await tx.select({ id: rfqIssues.id, sha256: rfqIssues.sha256 }).from(rfqIssues).where(eq(rfqIssues.rfqId, rfqId)).orderBy(desc(rfqIssues.number)).limit(1)
  const sha256 = createHash('sha256')
    .update(canonicalJson({ schema: 'dotside/quotation/1', revision, issueSha256: issue!.sha256, fileSha256: await fileHash(tx, draft?.fileId), ...input }))
    .digest('hex')

  await retireSubmitted(tx, invitation.id, 'superseded', now)
  const parties = { rfqId, companyId: rfq.companyId, vendorCompanyId: actor.companyId }
  const { lines, ...terms } = input
  const [quote] = await tx
    .insert(quotes)
    .values({ ...terms, ...parties, invitationId: invitation.id, issueId: issue!.id, fileId: draft?.fileId ?? null, submittedBy: actor.personId, revision, sha256, submittedAt: now })
    .returning({ id: quotes.id })
  const quoteId = quote!.id
  await tx.insert(quoteStates).values({ ...parties, quoteId, state: 'submitted', changedAt: now })
  for (const line of lines) await insertLine(tx, { ...parties, quoteId }, line)
  if (invitation.state === 'no-bid') {
    await tx.update(rfqInvitations).set({ state: 'terms-accepted', noBidReason: null, noBidText: '', decidedAt: null }).where(eq(rfqInvitations.id, invitation.id))
  }

  // Until the opening the customer must not learn that a quotation is there: the entry is sealed with it, and the
  // invitation, which the customer reads, does not tell it.
  await recordAudit(tx, actor, { type: 'quote-submitted', rfqId, quoteId, revision, sha256 }, { companyId: rfq.companyId, sealedBy: rfqId })
  await queueMail(tx, actor, { template: 'quote-received', props: { rfqId, number: rfq.number, revision, sha256, at: now.toISOString() }, to: { personId: actor.personId } })
  return readOwnQuote(tx, actor, rfqId)
}

async function fileHash(tx: Transaction, fileId: string | null | undefined): Promise<string | null> {
  if (!fileId) return null
  const [file] = await tx.select({ sha256: files.sha256 }).from(files).where(eq(files.id, fileId))
  return file!.sha256
}

async function nextRevision(tx: Transaction, invitationId: string): Promise<number> {
  const [last] = await tx.select({ revision: max(quotes.revision) }).from(quotes).where(eq(quotes.invitationId, invitationId))
  return (last?.revision ?? 0) + 1
}

type Parties = { quoteId: string; rfqId: string; companyId: string; vendorCompanyId: string }

async function insertLine(tx: Transaction, parties: Parties, input: QuoteInput['lines'][number]): Promise<void> {
  const { priceBreaks, oneTimeCost, samplesPrice, ...rest } = input
  const amount = (value: string | null) => (value === null ? null : amountText(value))
  const [line] = await tx
    .insert(quoteLines)
    .values({ ...rest, ...parties, oneTimeCost: amount(oneTimeCost), samplesPrice: amount(samplesPrice) })
    .returning({ id: quoteLines.id })
  const { quoteId: _, ...owners } = parties
  await tx
    .insert(quotePriceBreaks)
    .values(priceBreaks.map(({ fromQuantity, price }) => ({ ...owners, quoteLineId: line!.id, fromQuantity, price: amountText(price) })))
}

async function requireSoundQuote(tx: Transaction, rfq: RfqRow, input: QuoteInput, { now, revision }: { now: Date; revision: number }): Promise<void> {
  const fields: Record<string, string> = {}
  if (!isCurrency(input.currency)) fields.currency = `${input.currency} is no currency of ISO 4217 that is in use.`
  if (input.validUntil <= now.toISOString().slice(0, 10)) fields.validUntil = 'The validity has ended already; give a later date.'
  if (revision > 1 && input.reason === '') fields.reason = 'Say why this revision replaces the one before.'

  const asked = await tx.select({ id: rfqLines.id }).from(rfqLines).where(eq(rfqLines.rfqId, rfq.id))
  const known = new Set(asked.map(({ id }) => id))
  input.lines.forEach((line, index) => {
    if (!known.has(line.lineId)) fields[`lines.${index}.lineId`] = 'The enquiry has no such part.'
    if (input.lines.findIndex((other) => other.lineId === line.lineId) < index) fields[`lines.${index}.lineId`] = 'This part is quoted twice.'
  })
  const [first] = Object.values(fields)
  if (first) throw new AppError('invalid-input', first, fields)
}

/** Takes back the quotation that lies in the box, before the due time. */
export async function withdrawQuote(tx: Transaction, actor: Actor, rfqId: string, quoteId: string) {
  const { row: invitation, rfq, now } = await lockInvitation(tx, actor, rfqId)
  requireOpenForAnswers(rfq, now)
  const [found] = await tx
    .select({ state: quoteStates.state })
    .from(quotes)
    .innerJoin(quoteStates, eq(quoteStates.quoteId, quotes.id))
    .where(and(eq(quotes.id, quoteId), eq(quotes.invitationId, invitation.id)))
  if (!found) throw notFound('quotation')
  if (found.state !== 'submitted') throw new AppError('conflict', `This revision is ${found.state} already.`)
  await tx.update(quoteStates).set({ state: 'withdrawn', changedAt: now }).where(eq(quoteStates.quoteId, quoteId))
  await recordAudit(tx, actor, { type: 'quote-withdrawn', rfqId, quoteId }, { companyId: rfq.companyId, sealedBy: rfqId })
  return readOwnQuote(tx, actor, rfqId)
}
