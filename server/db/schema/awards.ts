import { sql } from 'drizzle-orm'
import { check, foreignKey, index, integer, jsonb, numeric, pgTable, text, unique, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { bytea, createdAt, id, timestamptz } from './columns'
import { people } from './people'
import { quotes } from './quotes'
import { rfqLines, rfqs } from './rfqs'

/** The opened quotations side by side as they stood when somebody proposed, to the byte. */
export const comparisons = pgTable(
  'comparisons',
  {
    id: id(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => people.id),
    /** 1, 2 … within the enquiry. */
    number: integer('number').notNull(),
    /** Canonical JSON (RFC 8785): offers, rates with source and date, assumptions, landed cost with its working. */
    content: bytea('content').notNull(),
    sha256: text('sha256').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({ name: 'comparisons_rfq_fk', columns: [t.rfqId, t.companyId], foreignColumns: [rfqs.id, rfqs.companyId] }),
    unique('comparisons_number_key').on(t.rfqId, t.number),
    unique('comparisons_id_rfq_key').on(t.id, t.rfqId, t.companyId),
    index('comparisons_rfq_idx').on(t.rfqId, t.companyId),
    index('comparisons_created_by_idx').on(t.createdBy),
  ],
)

/** A proposal to buy from one quotation, and what became of it. */
export const awards = pgTable(
  'awards',
  {
    id: id(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    comparisonId: uuid('comparison_id').notNull(),
    quoteId: uuid('quote_id').notNull(),
    proposedBy: uuid('proposed_by')
      .notNull()
      .references(() => people.id),
    decidedBy: uuid('decided_by').references(() => people.id),
    state: text('state').$type<'proposed' | 'approved' | 'rejected' | 'void' | 'ordered'>().notNull().default('proposed'),
    /** Pieces and one-time cost of all awarded lines, in the comparison's currency. */
    total: numeric('total', { precision: 18, scale: 6 }).notNull(),
    currency: text('currency').notNull(),
    /** What one unit of each other currency is worth in `currency`, decimal text by ISO 4217 code. */
    rates: jsonb('rates').$type<Record<string, string>>().notNull(),
    reason: text('reason').notNull(),
    decisionReason: text('decision_reason'),
    proposedAt: timestamptz('proposed_at').notNull(),
    decidedAt: timestamptz('decided_at'),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'awards_comparison_fk',
      columns: [t.comparisonId, t.rfqId, t.companyId],
      foreignColumns: [comparisons.id, comparisons.rfqId, comparisons.companyId],
    }),
    foreignKey({
      name: 'awards_quote_fk',
      columns: [t.quoteId, t.rfqId, t.companyId, t.vendorCompanyId],
      foreignColumns: [quotes.id, quotes.rfqId, quotes.companyId, quotes.vendorCompanyId],
    }),
    unique('awards_id_parties_key').on(t.id, t.rfqId, t.companyId, t.vendorCompanyId),
    index('awards_rfq_idx').on(t.rfqId, t.companyId),
    index('awards_comparison_idx').on(t.comparisonId, t.rfqId, t.companyId),
    index('awards_quote_idx').on(t.quoteId, t.rfqId, t.companyId, t.vendorCompanyId),
    index('awards_vendor_company_id_idx').on(t.vendorCompanyId),
    index('awards_proposed_by_idx').on(t.proposedBy),
    index('awards_decided_by_idx').on(t.decidedBy),
    check('awards_state_known', sql`${t.state} in ('proposed', 'approved', 'rejected', 'void', 'ordered')`),
    check('awards_second_person', sql`${t.state} not in ('approved', 'rejected', 'ordered') or (${t.decidedBy} is not null and ${t.decidedBy} <> ${t.proposedBy})`),
    check('awards_decided_together', sql`(${t.decidedAt} is null) = (${t.decidedBy} is null)`),
    check('awards_total_not_negative', sql`${t.total} >= 0`),
  ],
)

/** The lines that an award covers, with the quantity to order. */
export const awardLines = pgTable(
  'award_lines',
  {
    id: id(),
    awardId: uuid('award_id').notNull(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    lineId: uuid('line_id').notNull(),
    orderQuantity: integer('order_quantity').notNull(),
  },
  (t) => [
    foreignKey({
      name: 'award_lines_award_fk',
      columns: [t.awardId, t.rfqId, t.companyId, t.vendorCompanyId],
      foreignColumns: [awards.id, awards.rfqId, awards.companyId, awards.vendorCompanyId],
    }),
    foreignKey({ name: 'award_lines_line_fk', columns: [t.lineId, t.rfqId], foreignColumns: [rfqLines.id, rfqLines.rfqId] }),
    uniqueIndex('award_lines_line_key').on(t.awardId, t.lineId),
    index('award_lines_award_idx').on(t.awardId, t.rfqId, t.companyId, t.vendorCompanyId),
    index('award_lines_line_idx').on(t.lineId, t.rfqId),
    check('award_lines_quantity_positive', sql`${t.orderQuantity} > 0`),
  ],
)
