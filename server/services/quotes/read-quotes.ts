import type { Actor, Transaction } from '#server/db/as-actor'
import { companies, files, people, quoteDrafts, quoteLines, quotePriceBreaks, quotes, quoteStates, rfqIssues, rfqLines, rfqs } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { canReadQuotes } from '#server/policies/rfqs'
import { findRfq } from '#server/services/rfqs/read-rfq'
import { findInvited } from '#server/services/rfqs/vendor-rfq'
import type { ownQuoteSchema, Quote } from '#shared/contracts/quotes'
import { quoteHints, type AskedPart } from '#shared/costing/quote-hints'
import { Decimal } from '#shared/money'
import { and, asc, desc, eq, inArray, type SQL } from 'drizzle-orm'
import type { z } from 'zod'

const FILE = { id: files.id, name: files.name, sizeBytes: files.sizeBytes, sha256: files.sha256 }

/** The vendor's own quotation: the draft and every submitted revision. */
export async function readOwnQuote(tx: Transaction, actor: Actor, rfqId: string): Promise<z.input<typeof ownQuoteSchema>> {
  const { invitation } = await findInvited(tx, actor, rfqId)
  const [draft] = await tx
    .select({ version: quoteDrafts.version, content: quoteDrafts.content, updatedAt: quoteDrafts.updatedAt, file: FILE })
    .from(quoteDrafts)
    .leftJoin(files, eq(files.id, quoteDrafts.fileId))
    .where(eq(quoteDrafts.invitationId, invitation.id))
  return {
    draft: draft ? { version: draft.version, form: draft.content.form, file: draft.file, updatedAt: draft.updatedAt.toISOString() } : null,
    submitted: await presentQuotes(tx, eq(quotes.invitationId, invitation.id)),
  }
}

/** All revisions of the opened quotations. Before the opening there is none to be read, by whichever lock. */
export async function listQuotes(tx: Transaction, actor: Actor, rfqId: string): Promise<Quote[]> {
  const rfq = await findRfq(tx, actor, rfqId)
  if (!canReadQuotes(actor, rfq)) return []
  return presentQuotes(tx, eq(quotes.rfqId, rfqId))
}

export async function findOpenedQuoteFile(tx: Transaction, actor: Actor, rfqId: string, quoteId: string) {
  const rfq = await findRfq(tx, actor, rfqId)
  if (!canReadQuotes(actor, rfq)) throw notFound('quotation file')
  return requireFile(tx, and(eq(quotes.id, quoteId), eq(quotes.rfqId, rfqId))!)
}

async function requireFile(tx: Transaction, condition: SQL) {
  const [file] = await tx
    .select({ name: files.name, kind: files.kind, sizeBytes: files.sizeBytes, sha256: files.sha256 })
    .from(quotes)
    .innerJoin(files, eq(files.id, quotes.fileId))
    .where(condition)
  if (!file) throw notFound('quotation file')
  return file
}

/** A file of the own quotation, submitted or still beside the draft. */
export async function findOwnQuoteFile(tx: Transaction, actor: Actor, rfqId: string, fileId: string) {
  const { invitation } = await findInvited(tx, actor, rfqId)
  const drafted = await tx
    .select({ name: files.name, kind: files.kind, sizeBytes: files.sizeBytes, sha256: files.sha256 })
    .from(quoteDrafts)
    .innerJoin(files, eq(files.id, quoteDrafts.fileId))
    .where(and(eq(quoteDrafts.invitationId, invitation.id), eq(files.id, fileId)))
  return drafted[0] ?? requireFile(tx, and(eq(quotes.invitationId, invitation.id), eq(quotes.fileId, fileId))!)
}

async function presentQuotes(tx: Transaction, condition: SQL): Promise<Quote[]> {
  const rows = await tx
    .select({ quote: quotes, state: quoteStates.state, issueNumber: rfqIssues.number, vendorName: companies.name, submittedBy: people.name, file: FILE, rfq: { currency: rfqs.currency, deliveryRule: rfqs.deliveryRule, terms: rfqs.terms } })
    .from(quotes)
    .innerJoin(quoteStates, eq(quoteStates.quoteId, quotes.id))
    .innerJoin(rfqs, eq(rfqs.id, quotes.rfqId))
    .innerJoin(rfqIssues, eq(rfqIssues.id, quotes.issueId))
    .leftJoin(companies, eq(companies.id, quotes.vendorCompanyId))
    .leftJoin(people, eq(people.id, quotes.submittedBy))
    .leftJoin(files, eq(files.id, quotes.fileId))
    .where(condition)
    .orderBy(asc(companies.name), desc(quotes.revision))
  if (rows.length === 0) return []

  const lines = await readQuoteLines(
    tx,
    rows.map(({ quote }) => quote.id),
  )
  const asked = await tx
    .select({ id: rfqLines.id, quantities: rfqLines.quantities })
    .from(rfqLines)
    .where(eq(rfqLines.rfqId, rows[0]!.quote.rfqId))
  return rows.map((row) => presentQuote(row, lines.get(row.quote.id) ?? [], asked))
}

interface QuoteRow {
  quote: typeof quotes.$inferSelect
  state: Quote['state']
  issueNumber: number
  vendorName: string | null
  submittedBy: string | null
  file: Quote['file']
  rfq: Pick<typeof rfqs.$inferSelect, 'currency' | 'deliveryRule' | 'terms'>
}

function presentQuote({ quote, state, issueNumber, vendorName, submittedBy, file, rfq }: QuoteRow, lines: Quote['lines'], asked: AskedPart[]): Quote {
  const { id, rfqId, invitationId, vendorCompanyId, revision, vendorReference, reason, currency, deliveryPlace, paymentTerms, paymentDays, validUntil, remarks, sha256 } = quote
  const presented = {
    ...{ id, rfqId, invitationId, vendorCompanyId, revision, vendorReference, reason, currency, deliveryPlace, paymentTerms, paymentDays, validUntil, remarks, sha256 },
    deliveryRule: quote.deliveryRule as Quote['deliveryRule'],
    state,
    issueNumber,
    vendorName: vendorName ?? '—',
    submittedBy: submittedBy ?? '—',
    submittedAt: quote.submittedAt.toISOString(),
    file,
    lines,
  }
  return { ...presented, hints: quoteHints(presented, rfq, asked) }
}

async function readQuoteLines(tx: Transaction, quoteIds: string[]): Promise<Map<string, Quote['lines']>> {
  const rows = await tx
    .select({ line: quoteLines })
    .from(quoteLines)
    .innerJoin(rfqLines, eq(rfqLines.id, quoteLines.lineId))
    .where(inArray(quoteLines.quoteId, quoteIds))
    .orderBy(asc(rfqLines.position))
  const breaks = await tx
    .select()
    .from(quotePriceBreaks)
    .where(
      inArray(
        quotePriceBreaks.quoteLineId,
        rows.map(({ line }) => line.id),
      ),
    )
    .orderBy(asc(quotePriceBreaks.fromQuantity))
  const byQuote = new Map<string, Quote['lines']>()
  for (const { line } of rows) {
    const { quoteId, rfqId: _, companyId: __, vendorCompanyId: ___, ...own } = line
    const priceBreaks = breaks
      .filter((row) => row.quoteLineId === line.id)
      .map(({ fromQuantity, price }) => ({ fromQuantity, price, unitPrice: new Decimal(price).div(line.priceUnit).toString() }))
    byQuote.set(quoteId, [...(byQuote.get(quoteId) ?? []), { ...own, priceBreaks }])
  }
  return byQuote
}
