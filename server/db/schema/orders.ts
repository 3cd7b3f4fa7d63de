import { sql } from 'drizzle-orm'
import { check, date, foreignKey, index, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core'
import { awards } from './awards'
import { bytea, createdAt, id, timestamptz } from './columns'
import { files } from './files'
import { people } from './people'

/** A purchase order as it was placed: its content, and the PDF made from it. Never changed, never deleted. */
export const purchaseOrders = pgTable(
  'purchase_orders',
  {
    id: id(),
    awardId: uuid('award_id').notNull(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    pdfFileId: uuid('pdf_file_id')
      .notNull()
      .references(() => files.id),
    placedBy: uuid('placed_by')
      .notNull()
      .references(() => people.id),
    /** Unique within the buying company; drawn at random, since a vendor sees it. */
    number: text('number').notNull(),
    acknowledgeBy: date('acknowledge_by').notNull(),
    /** Canonical JSON (RFC 8785). */
    content: bytea('content').notNull(),
    sha256: text('sha256').notNull(),
    pdfSha256: text('pdf_sha256').notNull(),
    placedAt: timestamptz('placed_at').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'purchase_orders_award_fk',
      columns: [t.awardId, t.rfqId, t.companyId, t.vendorCompanyId],
      foreignColumns: [awards.id, awards.rfqId, awards.companyId, awards.vendorCompanyId],
    }),
    unique('purchase_orders_award_key').on(t.awardId),
    unique('purchase_orders_company_number_key').on(t.companyId, t.number),
    unique('purchase_orders_id_parties_key').on(t.id, t.companyId, t.vendorCompanyId),
    index('purchase_orders_award_idx').on(t.awardId, t.rfqId, t.companyId, t.vendorCompanyId),
    index('purchase_orders_vendor_company_id_idx').on(t.vendorCompanyId),
    index('purchase_orders_pdf_file_id_idx').on(t.pdfFileId),
    index('purchase_orders_placed_by_idx').on(t.placedBy),
  ],
)

/** The vendor's one answer to an order. */
export const orderAcknowledgements = pgTable(
  'order_acknowledgements',
  {
    id: id(),
    orderId: uuid('order_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    answeredBy: uuid('answered_by')
      .notNull()
      .references(() => people.id),
    answer: text('answer').$type<'accepted' | 'accepted-with-changes' | 'refused'>().notNull(),
    text: text('text').notNull().default(''),
    answeredAt: timestamptz('answered_at').notNull(),
  },
  (t) => [
    foreignKey({
      name: 'order_acknowledgements_order_fk',
      columns: [t.orderId, t.companyId, t.vendorCompanyId],
      foreignColumns: [purchaseOrders.id, purchaseOrders.companyId, purchaseOrders.vendorCompanyId],
    }),
    unique('order_acknowledgements_order_key').on(t.orderId),
    index('order_acknowledgements_order_idx').on(t.orderId, t.companyId, t.vendorCompanyId),
    index('order_acknowledgements_answered_by_idx').on(t.answeredBy),
    check('order_acknowledgements_known', sql`${t.answer} in ('accepted', 'accepted-with-changes', 'refused')`),
    check('order_acknowledgements_says_why', sql`${t.answer} = 'accepted' or length(trim(${t.text})) > 0`),
  ],
)
