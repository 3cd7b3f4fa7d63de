import type { AuditArea, AuditEvent } from '#shared/contracts/audit'
import { sql } from 'drizzle-orm'
import { bigint, boolean, check, index, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core'
import { bytea, id, timestamptz } from './columns'
import { companies, people } from './people'

/** Append-only; written in the transaction of the fact it tells. */
export const auditEntries = pgTable(
  'audit_entries',
  {
    id: id(),
    /** The company whose trail this is: for a vendor's act towards a customer, the customer. */
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id),
    actorPersonId: uuid('actor_person_id').references(() => people.id),
    actorCompanyId: uuid('actor_company_id').references(() => companies.id),
    /** While set, no role of `company_id` reads the entry unless a policy of that feature opens it. */
    sealedBy: uuid('sealed_by'),
    at: timestamptz('at').notNull(),
    area: text('area').$type<AuditArea>().notNull(),
    event: jsonb('event').$type<AuditEvent>().notNull(),
  },
  (t) => [
    index('audit_entries_company_id_at_idx').on(t.companyId, t.at),
    index('audit_entries_actor_person_id_idx').on(t.actorPersonId),
    index('audit_entries_actor_company_id_at_idx').on(t.actorCompanyId, t.at),
    index('audit_entries_at_idx').on(t.at),
  ],
)

/** Place of each committed entry in the chain: hash = SHA-256(previous hash ‖ canonical entry). */
export const auditChain = pgTable(
  'audit_chain',
  {
    position: bigint('position', { mode: 'number' }).primaryKey(),
    entryId: uuid('entry_id')
      .notNull()
      .references(() => auditEntries.id),
    hash: bytea('hash').notNull(),
    chainedAt: timestamptz('chained_at').notNull(),
  },
  (t) => [unique('audit_chain_entry_id_key').on(t.entryId)],
)

/** One row: the last link, for records of decision to print. */
export const auditChainHead = pgTable(
  'audit_chain_head',
  {
    only: boolean('only').primaryKey().default(true),
    position: bigint('position', { mode: 'number' }).notNull(),
    hash: bytea('hash').notNull(),
  },
  (t) => [check('audit_chain_head_one_row', sql`${t.only}`)],
)
