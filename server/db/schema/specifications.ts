import type { KeyFigures, REVISION_STATES } from '#shared/contracts/specifications'
import { sql } from 'drizzle-orm'
import { check, date, foreignKey, index, integer, jsonb, pgTable, text, unique, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { bytea, createdAt, id, timestamptz } from './columns'
import { files } from './files'
import { companies, people } from './people'

/** One part of one buying company; its documents are the revisions. */
export const specifications = pgTable(
  'specifications',
  {
    id: id(),
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id),
    ownerId: uuid('owner_id')
      .notNull()
      .references(() => people.id),
    partNumber: text('part_number').notNull(),
    title: text('title').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    unique('specifications_company_part_number_key').on(t.companyId, t.partNumber),
    unique('specifications_id_company_key').on(t.id, t.companyId),
    index('specifications_owner_id_idx').on(t.ownerId),
  ],
)

/**
 * A revision on its way: drafts are rewritten in place, everything after release stands still.
 * The document holds the requirement sheet too and is read by the buying company alone.
 */
export const specificationRevisions = pgTable(
  'specification_revisions',
  {
    id: id(),
    specificationId: uuid('specification_id').notNull(),
    companyId: uuid('company_id').notNull(),
    /** The release that this draft started from. */
    basedOnId: uuid('based_on_id'),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => people.id),
    checkedBy: uuid('checked_by').references(() => people.id),
    /** Everybody who stored a change; none of them may release it. */
    editorIds: uuid('editor_ids').array().notNull(),
    /** Draft number: P1, P2 … counted through the life of the part. */
    draftNumber: integer('draft_number').notNull(),
    state: text('state').$type<(typeof REVISION_STATES)[number]>().notNull().default('draft'),
    version: integer('version').notNull().default(1),
    /** Canonical JSON (RFC 8785) of the document with its requirement sheet. */
    document: bytea('document').notNull(),
    topology: text('topology'),
    /** What a list shows of the document. */
    figures: jsonb('figures').$type<KeyFigures>().notNull().default({}),
    /** What a search finds it by: each word of the document once, small letters, a blank before each; not the circuit behind it. */
    searchText: text('search_text').notNull().default(''),
    /** Canonical JSON of the evaluation at release. */
    evaluation: bytea('evaluation'),
    returnedReason: text('returned_reason'),
    withdrawnReason: text('withdrawn_reason'),
    submittedAt: timestamptz('submitted_at'),
    updatedAt: timestamptz('updated_at').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'specification_revisions_specification_fk',
      columns: [t.specificationId, t.companyId],
      foreignColumns: [specifications.id, specifications.companyId],
    }),
    unique('specification_revisions_id_company_key').on(t.id, t.companyId),
    unique('specification_revisions_draft_number_key').on(t.specificationId, t.draftNumber),
    // Two open drafts of one part would each claim the next letter.
    uniqueIndex('specification_revisions_one_open_key').on(t.specificationId).where(sql`state in ('draft', 'in-check')`),
    index('specification_revisions_specification_id_idx').on(t.specificationId, t.companyId),
    index('specification_revisions_based_on_id_idx').on(t.basedOnId),
    index('specification_revisions_created_by_idx').on(t.createdBy),
    index('specification_revisions_checked_by_idx').on(t.checkedBy),
    index('specification_revisions_company_updated_idx').on(t.companyId, t.updatedAt),
    check('specification_revisions_state_known', sql`${t.state} in ('draft', 'in-check', 'released', 'superseded', 'withdrawn')`),
    check('specification_revisions_released_by_checker', sql`${t.state} not in ('released', 'superseded') or ${t.checkedBy} is not null`),
    check('specification_revisions_second_person', sql`${t.checkedBy} is null or not (${t.checkedBy} = any (${t.editorIds}))`),
  ],
)

/** A sealed release: what an RFQ, a quotation and a data set point at. Never updated, never deleted. */
export const specificationReleases = pgTable(
  'specification_releases',
  {
    id: id(),
    revisionId: uuid('revision_id').notNull(),
    companyId: uuid('company_id').notNull(),
    specificationId: uuid('specification_id').notNull(),
    pdfFileId: uuid('pdf_file_id')
      .notNull()
      .references(() => files.id),
    /** `A`, `B` … without I, O, Q, S, X, Z. */
    revision: text('revision').notNull(),
    partNumber: text('part_number').notNull(),
    title: text('title').notNull(),
    issuedOn: date('issued_on').notNull(),
    createdByName: text('created_by_name').notNull(),
    checkedByName: text('checked_by_name').notNull(),
    approvedByName: text('approved_by_name').notNull(),
    engine: text('engine').notNull(),
    /** Canonical JSON (RFC 8785) of the released specification with the library rows it used. */
    specification: bytea('specification').notNull(),
    specificationSha256: text('specification_sha256').notNull(),
    /** The drawn sheets as data (JSON), from which a vendor's copy and the screen are made. */
    sheets: bytea('sheets').notNull(),
    pdfSha256: text('pdf_sha256').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'specification_releases_revision_fk',
      columns: [t.revisionId, t.companyId],
      foreignColumns: [specificationRevisions.id, specificationRevisions.companyId],
    }),
    foreignKey({
      name: 'specification_releases_specification_fk',
      columns: [t.specificationId, t.companyId],
      foreignColumns: [specifications.id, specifications.companyId],
    }),
    unique('specification_releases_revision_key').on(t.revisionId, t.companyId),
    unique('specification_releases_id_company_key').on(t.id, t.companyId),
    unique('specification_releases_letter_key').on(t.specificationId, t.revision),
    index('specification_releases_specification_id_idx').on(t.specificationId, t.companyId),
    index('specification_releases_pdf_file_id_idx').on(t.pdfFileId),
  ],
)

/** A stopped check that a second person let pass at one place; kept for good, with the reason. */
export const specificationOverrides = pgTable(
  'specification_overrides',
  {
    id: id(),
    revisionId: uuid('revision_id').notNull(),
    companyId: uuid('company_id').notNull(),
    byId: uuid('by_id')
      .notNull()
      .references(() => people.id),
    code: text('code').notNull(),
    /** Dotted path of the place in the document; empty in rows from before places were told apart. */
    path: text('path').notNull(),
    reason: text('reason').notNull(),
    /** When the revision was handed to this check: what is changed and handed in again is judged again. */
    submittedAt: timestamptz('submitted_at').notNull(),
    at: timestamptz('at').notNull(),
  },
  (t) => [
    foreignKey({
      name: 'specification_overrides_revision_fk',
      columns: [t.revisionId, t.companyId],
      foreignColumns: [specificationRevisions.id, specificationRevisions.companyId],
    }),
    unique('specification_overrides_code_key').on(t.revisionId, t.code, t.path, t.submittedAt),
    index('specification_overrides_revision_idx').on(t.revisionId, t.companyId),
    index('specification_overrides_by_id_idx').on(t.byId),
  ],
)
