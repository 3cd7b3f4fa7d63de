import type { PersonChange, VENDOR_APPROVALS } from '#shared/contracts/people'
import type { CompanyKind, Role } from '#shared/contracts/endpoint'
import type { LINK_PURPOSES } from '#shared/contracts/people'
import { sql } from 'drizzle-orm'
import { boolean, check, date, foreignKey, index, jsonb, numeric, pgTable, primaryKey, text, unique, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { bytea, createdAt, id, timestamptz } from './columns'
import { files } from './files'

export const companies = pgTable(
  'companies',
  {
    id: id(),
    kind: text('kind').$type<CompanyKind>().notNull(),
    name: text('name').notNull(),
    country: text('country').notNull().default('DE'),
    timeZone: text('time_zone').notNull().default('UTC'),
    currency: text('currency').notNull().default('EUR'),
    address: text('address').notNull().default(''),
    createdAt: createdAt(),
  },
  (t) => [unique('companies_id_kind_key').on(t.id, t.kind), check('companies_kind_known', sql`${t.kind} in ('buying', 'vendor', 'operator')`)],
)

/**
 * A person is never deleted, so that records keep their authors; who leaves gets `leftAt`.
 * An address is unique among those who can sign in: several companies may invite the same address,
 * and none learns of the other.
 */
export const people = pgTable(
  'people',
  {
    id: id(),
    name: text('name').notNull(),
    /** Lower case. */
    email: text('email').notNull(),
    invitedBy: uuid('invited_by'),
    acceptedAt: timestamptz('accepted_at'),
    leftAt: timestamptz('left_at'),
    /** Sessions begun before this moment have ended. */
    sessionsValidAfter: timestamptz('sessions_valid_after').notNull().defaultNow(),
    createdAt: createdAt(),
  },
  (t) => [
    uniqueIndex('people_sign_in_address_key').on(t.email).where(sql`accepted_at is not null and left_at is null`),
    index('people_email_idx').on(t.email),
    index('people_invited_by_idx').on(t.invitedBy),
    foreignKey({ name: 'people_invited_by_fk', columns: [t.invitedBy], foreignColumns: [t.id] }),
    check('people_email_lower', sql`${t.email} = lower(${t.email})`),
  ],
)

/** One person belongs to one company and holds its roles there. */
export const memberships = pgTable(
  'memberships',
  {
    personId: uuid('person_id')
      .primaryKey()
      .references(() => people.id),
    companyId: uuid('company_id').notNull(),
    companyKind: text('company_kind').$type<CompanyKind>().notNull(),
    roles: text('roles').array().$type<Role[]>().notNull(),
    approvalLimit: numeric('approval_limit', { precision: 18, scale: 6 }),
    approvalCurrency: text('approval_currency'),
    /** Added by another company together with its own company: once and never again. */
    isFirstContact: boolean('is_first_contact').notNull().default(false),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({ name: 'memberships_company_fk', columns: [t.companyId, t.companyKind], foreignColumns: [companies.id, companies.kind] }),
    index('memberships_company_id_idx').on(t.companyId, t.companyKind),
    uniqueIndex('memberships_first_contact_key').on(t.companyId).where(sql`is_first_contact`),
    check(
      'memberships_roles_of_kind',
      sql`cardinality(${t.roles}) > 0 and case ${t.companyKind}
        when 'buying' then ${t.roles} <@ array['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin']
        when 'vendor' then ${t.roles} <@ array['vendor']
        when 'operator' then ${t.roles} <@ array['operator']
        else false end`,
    ),
    check('memberships_admin_excludes', sql`not (${t.roles} @> array['admin'] and ${t.roles} && array['buyer', 'approver', 'vendor'])`),
    check('memberships_approver_has_limit', sql`(${t.roles} @> array['approver']) = (${t.approvalLimit} is not null)`),
    check('memberships_limit_has_currency', sql`(${t.approvalLimit} is null) = (${t.approvalCurrency} is null)`),
    check('memberships_limit_not_negative', sql`${t.approvalLimit} >= 0`),
  ],
)

export const credentials = pgTable('credentials', {
  personId: uuid('person_id')
    .primaryKey()
    .references(() => people.id),
  /** argon2id, as the encoded string with its parameters. */
  passwordHash: text('password_hash').notNull(),
  updatedAt: timestamptz('updated_at').notNull(),
})

/** `id` is SHA-256 of what the cookie holds. */
export const sessions = pgTable(
  'sessions',
  {
    id: text('id').primaryKey(),
    userId: uuid('user_id')
      .notNull()
      .references(() => people.id),
    expiresAt: timestamptz('expires_at').notNull(),
    startedAt: timestamptz('started_at').notNull(),
  },
  (t) => [index('sessions_user_id_idx').on(t.userId), index('sessions_expires_at_idx').on(t.expiresAt)],
)

/** Single-use links; only the hash of the token is kept, the token itself stands only in the mail. */
export const signInTokens = pgTable(
  'sign_in_tokens',
  {
    id: id(),
    personId: uuid('person_id').references(() => people.id),
    changeId: uuid('change_id').references(() => changeRequests.id),
    purpose: text('purpose').$type<(typeof LINK_PURPOSES)[number]>().notNull(),
    tokenHash: bytea('token_hash').notNull(),
    expiresAt: timestamptz('expires_at').notNull(),
    usedAt: timestamptz('used_at'),
    createdAt: createdAt(),
  },
  (t) => [
    unique('sign_in_tokens_token_hash_key').on(t.tokenHash),
    index('sign_in_tokens_person_id_idx').on(t.personId),
    index('sign_in_tokens_change_id_idx').on(t.changeId),
  ],
)

/** What was tried lately and by whom (hashed), to refuse too many tries. */
export const attempts = pgTable(
  'attempts',
  {
    id: id(),
    bucket: text('bucket').notNull(),
    keyHash: bytea('key_hash').notNull(),
    at: timestamptz('at').notNull(),
  },
  (t) => [index('attempts_bucket_key_at_idx').on(t.bucket, t.keyHash, t.at), index('attempts_at_idx').on(t.at)],
)

/** A change of roles or address, or a removal, that a second person has to confirm. */
export const changeRequests = pgTable(
  'change_requests',
  {
    id: id(),
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id),
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id),
    change: jsonb('change').$type<PersonChange>().notNull(),
    state: text('state').$type<'requested' | 'confirmed' | 'refused' | 'done'>().notNull().default('requested'),
    requestedBy: uuid('requested_by')
      .notNull()
      .references(() => people.id),
    requestedAt: timestamptz('requested_at').notNull(),
    decidedBy: uuid('decided_by').references(() => people.id),
    decidedAt: timestamptz('decided_at'),
  },
  (t) => [
    index('change_requests_company_id_idx').on(t.companyId),
    index('change_requests_person_id_idx').on(t.personId),
    index('change_requests_requested_by_idx').on(t.requestedBy),
    index('change_requests_decided_by_idx').on(t.decidedBy),
    uniqueIndex('change_requests_one_open_key')
      .on(t.personId, sql`(change ->> 'kind')`)
      .where(sql`state = 'requested'`),
    check('change_requests_state_known', sql`${t.state} in ('requested', 'confirmed', 'refused', 'done')`),
    check('change_requests_decided_together', sql`(${t.state} = 'requested') = (${t.decidedBy} is null)`),
    check(
      'change_requests_second_person',
      sql`${t.state} in ('requested', 'refused') or (${t.decidedBy} <> ${t.requestedBy} and ${t.decidedBy} <> ${t.personId})`,
    ),
  ],
)

/** That a buying company and a vendor company know each other; both may read it. */
export const vendorLinks = pgTable(
  'vendor_links',
  {
    buyingCompanyId: uuid('buying_company_id')
      .notNull()
      .references(() => companies.id),
    vendorCompanyId: uuid('vendor_company_id')
      .notNull()
      .references(() => companies.id),
    invitedAt: timestamptz('invited_at').notNull(),
    /** Set when a person of the vendor accepts; before that the buying company sees only what it typed. */
    acceptedAt: timestamptz('accepted_at'),
  },
  (t) => [
    primaryKey({ name: 'vendor_links_pkey', columns: [t.buyingCompanyId, t.vendorCompanyId] }),
    index('vendor_links_vendor_company_id_idx').on(t.vendorCompanyId),
  ],
)

/** What one buying company keeps about a vendor; the vendor never reads it, nor does another buying company. */
export const vendorRelations = pgTable(
  'vendor_relations',
  {
    buyingCompanyId: uuid('buying_company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    agreementFileId: uuid('agreement_file_id').references(() => files.id),
    name: text('name').notNull(),
    contactName: text('contact_name').notNull(),
    contactEmail: text('contact_email').notNull(),
    approval: text('approval').$type<(typeof VENDOR_APPROVALS)[number]>().notNull().default('not-assessed'),
    confidentialityAgreedOn: date('confidentiality_agreed_on'),
    confidentialityExpiresOn: date('confidentiality_expires_on'),
    notes: text('notes').notNull().default(''),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ name: 'vendor_relations_pkey', columns: [t.buyingCompanyId, t.vendorCompanyId] }),
    foreignKey({
      name: 'vendor_relations_link_fk',
      columns: [t.buyingCompanyId, t.vendorCompanyId],
      foreignColumns: [vendorLinks.buyingCompanyId, vendorLinks.vendorCompanyId],
    }),
    unique('vendor_relations_contact_key').on(t.buyingCompanyId, t.contactEmail),
    index('vendor_relations_agreement_file_id_idx').on(t.agreementFileId),
    check('vendor_relations_approval_known', sql`${t.approval} in ('not-assessed', 'approved', 'conditional', 'blocked')`),
  ],
)
