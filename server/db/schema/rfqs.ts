import type { INVITATION_STATES, NO_BID_REASONS, RFQ_STATES, RfqTerms } from '#shared/contracts/rfqs'
import { sql } from 'drizzle-orm'
import { check, foreignKey, index, integer, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core'
import { bytea, createdAt, id, timestamptz } from './columns'
import { files } from './files'
import { companies, people } from './people'
import { specificationReleases } from './specifications'

/** An enquiry. Its contents are rewritten while it is prepared; what was issued stands in `rfq_issues`. */
export const rfqs = pgTable(
  'rfqs',
  {
    id: id(),
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id),
    buyerId: uuid('buyer_id')
      .notNull()
      .references(() => people.id),
    openedBy: uuid('opened_by').references(() => people.id),
    openingAskedBy: uuid('opening_asked_by').references(() => people.id),
    /** Given by the buying company, unique within it. */
    number: text('number').notNull(),
    title: text('title').notNull(),
    state: text('state').$type<(typeof RFQ_STATES)[number]>().notNull().default('preparing'),
    /** Number of the issue in force; 0 while nothing was issued. */
    issueNumber: integer('issue_number').notNull().default(0),
    version: integer('version').notNull().default(1),
    dueAt: timestamptz('due_at').notNull(),
    /** IANA zone in which the due time was set. */
    dueZone: text('due_zone').notNull(),
    /** ISO 4217. */
    currency: text('currency').notNull(),
    /** Incoterms® 2020 rule and named place. */
    deliveryRule: text('delivery_rule').notNull(),
    deliveryPlace: text('delivery_place').notNull(),
    /** The buyer as vendors are told, kept as it was: they do not see the company's people. */
    contactName: text('contact_name').notNull(),
    contactEmail: text('contact_email').notNull(),
    terms: jsonb('terms').$type<RfqTerms>().notNull(),
    issuedAt: timestamptz('issued_at'),
    openingAskedAt: timestamptz('opening_asked_at'),
    openedAt: timestamptz('opened_at'),
    cancelledReason: text('cancelled_reason'),
    createdAt: createdAt(),
  },
  (t) => [
    unique('rfqs_company_number_key').on(t.companyId, t.number),
    unique('rfqs_id_company_key').on(t.id, t.companyId),
    index('rfqs_buyer_id_idx').on(t.buyerId),
    index('rfqs_opened_by_idx').on(t.openedBy),
    index('rfqs_opening_asked_by_idx').on(t.openingAskedBy),
    index('rfqs_due_at_idx').on(t.dueAt),
    check('rfqs_state_known', sql`${t.state} in ('preparing', 'issued', 'closed', 'opened', 'awarded', 'cancelled')`),
    check('rfqs_opened_by_two', sql`${t.openedBy} is null or ${t.openedBy} <> ${t.openingAskedBy}`),
    check('rfqs_opened_after_due', sql`${t.openedAt} is null or ${t.openedAt} >= ${t.dueAt}`),
    check('rfqs_opened_together', sql`(${t.openedAt} is null) = (${t.openedBy} is null)`),
  ],
)

/** One part asked for: exactly one released revision, with its quantities. */
export const rfqLines = pgTable(
  'rfq_lines',
  {
    id: id(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    releaseId: uuid('release_id').notNull(),
    position: integer('position').notNull(),
    /** Price breaks, per order, rising. */
    quantities: integer('quantities').array().notNull(),
    /** The quantity that offers are compared at. */
    orderQuantity: integer('order_quantity').notNull(),
    annualQuantity: integer('annual_quantity'),
    sampleQuantity: integer('sample_quantity').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({ name: 'rfq_lines_rfq_fk', columns: [t.rfqId, t.companyId], foreignColumns: [rfqs.id, rfqs.companyId] }),
    foreignKey({
      name: 'rfq_lines_release_fk',
      columns: [t.releaseId, t.companyId],
      foreignColumns: [specificationReleases.id, specificationReleases.companyId],
    }),
    unique('rfq_lines_position_key').on(t.rfqId, t.position),
    unique('rfq_lines_release_key').on(t.rfqId, t.releaseId),
    unique('rfq_lines_id_rfq_key').on(t.id, t.rfqId),
    index('rfq_lines_rfq_idx').on(t.rfqId, t.companyId),
    index('rfq_lines_release_idx').on(t.releaseId, t.companyId),
    check('rfq_lines_quantities_some', sql`cardinality(${t.quantities}) > 0`),
  ],
)

/** What went out: canonical bytes of the whole enquiry at one issue, with the hashes of its drawings. */
export const rfqIssues = pgTable(
  'rfq_issues',
  {
    id: id(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    issuedBy: uuid('issued_by')
      .notNull()
      .references(() => people.id),
    number: integer('number').notNull(),
    content: bytea('content').notNull(),
    sha256: text('sha256').notNull(),
    issuedAt: timestamptz('issued_at').notNull(),
  },
  (t) => [
    foreignKey({ name: 'rfq_issues_rfq_fk', columns: [t.rfqId, t.companyId], foreignColumns: [rfqs.id, rfqs.companyId] }),
    unique('rfq_issues_number_key').on(t.rfqId, t.number),
    index('rfq_issues_rfq_idx').on(t.rfqId, t.companyId),
    index('rfq_issues_issued_by_idx').on(t.issuedBy),
  ],
)

/** One vendor asked. No vendor can tell from it how many others there are. */
export const rfqInvitations = pgTable(
  'rfq_invitations',
  {
    id: id(),
    rfqId: uuid('rfq_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id')
      .notNull()
      .references(() => companies.id),
    termsAcceptedBy: uuid('terms_accepted_by').references(() => people.id),
    state: text('state').$type<(typeof INVITATION_STATES)[number]>().notNull().default('invited'),
    noBidReason: text('no_bid_reason').$type<(typeof NO_BID_REASONS)[number]>(),
    noBidText: text('no_bid_text').notNull().default(''),
    /** Copied from the enquiry when it is issued: until then the vendor does not see its invitation. */
    issuedAt: timestamptz('issued_at'),
    seenAt: timestamptz('seen_at'),
    termsAcceptedAt: timestamptz('terms_accepted_at'),
    decidedAt: timestamptz('decided_at'),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({ name: 'rfq_invitations_rfq_fk', columns: [t.rfqId, t.companyId], foreignColumns: [rfqs.id, rfqs.companyId] }),
    unique('rfq_invitations_vendor_key').on(t.rfqId, t.vendorCompanyId),
    unique('rfq_invitations_id_vendor_key').on(t.id, t.rfqId, t.companyId, t.vendorCompanyId),
    index('rfq_invitations_rfq_idx').on(t.rfqId, t.companyId),
    index('rfq_invitations_vendor_company_id_idx').on(t.vendorCompanyId),
    index('rfq_invitations_terms_accepted_by_idx').on(t.termsAcceptedBy),
    check('rfq_invitations_state_known', sql`${t.state} in ('invited', 'seen', 'terms-accepted', 'intends-to-quote', 'no-bid')`),
    check('rfq_invitations_terms_together', sql`(${t.termsAcceptedAt} is null) = (${t.termsAcceptedBy} is null)`),
  ],
)

/** Watermarked copies handed to a vendor: the record of which bytes left the company, and to whom. */
export const rfqCopies = pgTable(
  'rfq_copies',
  {
    id: id(),
    invitationId: uuid('invitation_id')
      .notNull()
      .references(() => rfqInvitations.id),
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id),
    vendorCompanyId: uuid('vendor_company_id')
      .notNull()
      .references(() => companies.id),
    lineId: uuid('line_id')
      .notNull()
      .references(() => rfqLines.id),
    fileId: uuid('file_id')
      .notNull()
      .references(() => files.id),
    sha256: text('sha256').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    unique('rfq_copies_line_key').on(t.invitationId, t.lineId),
    index('rfq_copies_company_id_idx').on(t.companyId),
    index('rfq_copies_vendor_company_id_idx').on(t.vendorCompanyId),
    index('rfq_copies_line_id_idx').on(t.lineId),
    index('rfq_copies_file_id_idx').on(t.fileId),
  ],
)

