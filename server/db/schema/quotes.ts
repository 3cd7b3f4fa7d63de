import type { QuoteDraft } from '#shared/contracts/quotes'
import type { QUOTE_STATES } from '#shared/contracts/rfqs'
import { sql } from 'drizzle-orm'
import { check, date, foreignKey, index, integer, jsonb, numeric, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id, timestamptz } from './columns'
import { files } from './files'
import { people } from './people'
import { rfqInvitations, rfqIssues, rfqLines } from './rfqs'

const amount = (name: string) => numeric(name, { precision: 18, scale: 6 })

/** What a vendor has typed and not submitted. Nobody of the buying side reads it, ever. */
export const quoteDrafts = pgTable(
  'quote_drafts',
  {
    invitationId: uuid('invitation_id')
      .primaryKey()
      .references(() => rfqInvitations.id),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    fileId: uuid('file_id').references(() => files.id),
    updatedBy: uuid('updated_by')
      .notNull()
      .references(() => people.id),
    version: integer('version').notNull().default(1),
    content: jsonb('content').$type<QuoteDraft>().notNull(),
    updatedAt: timestamptz('updated_at').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    index('quote_drafts_vendor_company_id_idx').on(t.vendorCompanyId),
    index('quote_drafts_file_id_idx').on(t.fileId),
    index('quote_drafts_updated_by_idx').on(t.updatedBy),
  ],
)

/** One submitted revision of a vendor's quotation: complete, immutable, sealed until the opening. */
export const quotes = pgTable(
  'quotes',
  {
    id: id(),
    invitationId: uuid('invitation_id').notNull(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    issueId: uuid('issue_id')
      .notNull()
      .references(() => rfqIssues.id),
    fileId: uuid('file_id').references(() => files.id),
    submittedBy: uuid('submitted_by')
      .notNull()
      .references(() => people.id),
    /** 1, 2 … within the invitation. */
    revision: integer('revision').notNull(),
    /** The vendor's own number for it. */
    vendorReference: text('vendor_reference').notNull(),
    reason: text('reason').notNull().default(''),
    currency: text('currency').notNull(),
    deliveryRule: text('delivery_rule').notNull(),
    deliveryPlace: text('delivery_place').notNull(),
    paymentTerms: text('payment_terms').notNull(),
    paymentDays: integer('payment_days'),
    validUntil: date('valid_until').notNull(),
    remarks: text('remarks').notNull().default(''),
    /** SHA-256 over the canonical JSON of the submitted content, as the receipt says. */
    sha256: text('sha256').notNull(),
    submittedAt: timestamptz('submitted_at').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'quotes_invitation_fk',
      columns: [t.invitationId, t.rfqId, t.companyId, t.vendorCompanyId],
      foreignColumns: [rfqInvitations.id, rfqInvitations.rfqId, rfqInvitations.companyId, rfqInvitations.vendorCompanyId],
    }),
    unique('quotes_revision_key').on(t.invitationId, t.revision),
    unique('quotes_id_parties_key').on(t.id, t.rfqId, t.companyId, t.vendorCompanyId),
    index('quotes_invitation_idx').on(t.invitationId, t.rfqId, t.companyId, t.vendorCompanyId),
    index('quotes_rfq_id_idx').on(t.rfqId),
    index('quotes_vendor_company_id_idx').on(t.vendorCompanyId),
    index('quotes_issue_id_idx').on(t.issueId),
    index('quotes_file_id_idx').on(t.fileId),
    index('quotes_submitted_by_idx').on(t.submittedBy),
    check('quotes_revision_positive', sql`${t.revision} > 0`),
  ],
)

/** The state of a submitted quotation beside it, so that the quotation itself never changes. */
export const quoteStates = pgTable(
  'quote_states',
  {
    quoteId: uuid('quote_id').primaryKey(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    state: text('state').$type<(typeof QUOTE_STATES)[number]>().notNull(),
    changedAt: timestamptz('changed_at').notNull(),
  },
  (t) => [
    foreignKey({
      name: 'quote_states_quote_fk',
      columns: [t.quoteId, t.rfqId, t.companyId, t.vendorCompanyId],
      foreignColumns: [quotes.id, quotes.rfqId, quotes.companyId, quotes.vendorCompanyId],
    }),
    index('quote_states_quote_idx').on(t.quoteId, t.rfqId, t.companyId, t.vendorCompanyId),
    check('quote_states_known', sql`${t.state} in ('submitted', 'superseded', 'withdrawn')`),
  ],
)

/** The offer for one line of the enquiry. Empty cells are null: not quoted, never zero. */
export const quoteLines = pgTable(
  'quote_lines',
  {
    id: id(),
    quoteId: uuid('quote_id').notNull(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    lineId: uuid('line_id').notNull(),
    /** Pieces that a price stands for: 1, 100 or 1000. */
    priceUnit: integer('price_unit').notNull(),
    /** One-time cost; null: not quoted, zero: included. */
    oneTimeCost: amount('one_time_cost'),
    oneTimeCostText: text('one_time_cost_text').notNull().default(''),
    samplesPrice: amount('samples_price'),
    sampleLeadTimeDays: integer('sample_lead_time_days'),
    firstOrderLeadTimeDays: integer('first_order_lead_time_days').notNull(),
    repeatLeadTimeDays: integer('repeat_lead_time_days'),
    minimumOrderQuantity: integer('minimum_order_quantity').notNull(),
    packQuantity: integer('pack_quantity'),
    countryOfOrigin: text('country_of_origin'),
  },
  (t) => [
    foreignKey({
      name: 'quote_lines_quote_fk',
      columns: [t.quoteId, t.rfqId, t.companyId, t.vendorCompanyId],
      foreignColumns: [quotes.id, quotes.rfqId, quotes.companyId, quotes.vendorCompanyId],
    }),
    foreignKey({ name: 'quote_lines_line_fk', columns: [t.lineId, t.rfqId], foreignColumns: [rfqLines.id, rfqLines.rfqId] }),
    unique('quote_lines_line_key').on(t.quoteId, t.lineId),
    unique('quote_lines_id_parties_key').on(t.id, t.rfqId, t.companyId, t.vendorCompanyId),
    index('quote_lines_quote_idx').on(t.quoteId, t.rfqId, t.companyId, t.vendorCompanyId),
    index('quote_lines_line_idx').on(t.lineId, t.rfqId),
    check('quote_lines_price_unit_known', sql`${t.priceUnit} in (1, 100, 1000)`),
    check('quote_lines_one_time_cost_not_negative', sql`${t.oneTimeCost} >= 0`),
    check('quote_lines_samples_price_not_negative', sql`${t.samplesPrice} >= 0`),
    check('quote_lines_lead_time_positive', sql`${t.firstOrderLeadTimeDays} > 0`),
    check('quote_lines_minimum_positive', sql`${t.minimumOrderQuantity} > 0`),
  ],
)

export const quotePriceBreaks = pgTable(
  'quote_price_breaks',
  {
    id: id(),
    quoteLineId: uuid('quote_line_id').notNull(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    fromQuantity: integer('from_quantity').notNull(),
    /** Per `price_unit` pieces, in the quotation's currency, as the vendor wrote it. */
    price: amount('price').notNull(),
  },
  (t) => [
    foreignKey({
      name: 'quote_price_breaks_line_fk',
      columns: [t.quoteLineId, t.rfqId, t.companyId, t.vendorCompanyId],
      foreignColumns: [quoteLines.id, quoteLines.rfqId, quoteLines.companyId, quoteLines.vendorCompanyId],
    }),
    unique('quote_price_breaks_quantity_key').on(t.quoteLineId, t.fromQuantity),
    index('quote_price_breaks_line_idx').on(t.quoteLineId, t.rfqId, t.companyId, t.vendorCompanyId),
    check('quote_price_breaks_quantity_positive', sql`${t.fromQuantity} > 0`),
    check('quote_price_breaks_price_positive', sql`${t.price} > 0`),
  ],
)
