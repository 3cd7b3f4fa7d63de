import type { Role } from '#shared/contracts/endpoint'
import { sql } from 'drizzle-orm'
import { boolean, check, index, integer, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id, timestamptz } from './columns'
import { companies, people } from './people'

/** A mail to be sent, as the fact's transaction wrote it: to one person, or to those of a company who hold a role. */
export const mailEvents = pgTable(
  'mail_events',
  {
    id: id(),
    /** The company that caused it and is told when it cannot be delivered. */
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id),
    toPersonId: uuid('to_person_id').references(() => people.id),
    toCompanyId: uuid('to_company_id').references(() => companies.id),
    toRoles: text('to_roles').array().$type<Role[]>(),
    /** Only for proving a new address; otherwise the person's own. */
    toAddress: text('to_address'),
    template: text('template').notNull(),
    props: jsonb('props').$type<Record<string, unknown>>().notNull(),
    createdAt: createdAt(),
    /** When the recipients were looked up. */
    expandedAt: timestamptz('expanded_at'),
  },
  (t) => [
    index('mail_events_company_id_idx').on(t.companyId),
    index('mail_events_to_person_id_idx').on(t.toPersonId),
    index('mail_events_to_company_id_idx').on(t.toCompanyId),
    index('mail_events_waiting_idx').on(t.createdAt).where(sql`expanded_at is null`),
    check('mail_events_one_recipient', sql`(${t.toPersonId} is null) <> (${t.toCompanyId} is null)`),
  ],
)

/** One mail to one person. The Message-ID is fixed when the row is made, so that a repeated mail is recognised. */
export const outboxMails = pgTable(
  'outbox_mails',
  {
    id: id(),
    eventId: uuid('event_id')
      .notNull()
      .references(() => mailEvents.id),
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id),
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id),
    template: text('template').notNull(),
    address: text('address').notNull(),
    messageId: text('message_id').notNull(),
    state: text('state').$type<'waiting' | 'sent' | 'undeliverable'>().notNull().default('waiting'),
    attempts: integer('attempts').notNull().default(0),
    nextAttemptAt: timestamptz('next_attempt_at').notNull(),
    lastError: text('last_error').notNull().default(''),
    sentAt: timestamptz('sent_at'),
    createdAt: createdAt(),
  },
  (t) => [
    unique('outbox_mails_event_person_key').on(t.eventId, t.personId),
    unique('outbox_mails_message_id_key').on(t.messageId),
    index('outbox_mails_person_id_idx').on(t.personId),
    index('outbox_mails_company_id_idx').on(t.companyId),
    index('outbox_mails_waiting_idx').on(t.nextAttemptAt).where(sql`state = 'waiting'`),
    check('outbox_mails_state_known', sql`${t.state} in ('waiting', 'sent', 'undeliverable')`),
  ],
)

/** One row: what the worker last saw of the outbox, so that health can be asked without reading mails. */
export const outboxHealth = pgTable(
  'outbox_health',
  {
    only: boolean('only').primaryKey().default(true),
    waiting: integer('waiting').notNull().default(0),
    sent: integer('sent').notNull().default(0),
    undeliverable: integer('undeliverable').notNull().default(0),
    oldestWaitingSince: timestamptz('oldest_waiting_since'),
    /** When the worker last looked. */
    seenAt: timestamptz('seen_at'),
  },
  (t) => [check('outbox_health_one_row', sql`${t.only}`)],
)
