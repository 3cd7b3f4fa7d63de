import type { LibraryKind } from '#shared/engine/library'
import { sql } from 'drizzle-orm'
import { boolean, check, index, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core'
import { timestamptz } from './columns'
import { companies, people } from './people'

/**
 * What a company says about a row of the library, whatever its version: that it likes to use it, that it lies in its
 * store. Not part of the row, so that it moves without a new version and no document changes with it.
 */
export const partFlags = pgTable(
  'part_flags',
  {
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id),
    kind: text('kind').$type<LibraryKind>().notNull(),
    partId: text('part_id').notNull(),
    preferred: boolean('preferred').notNull(),
    stocked: boolean('stocked').notNull(),
    updatedBy: uuid('updated_by')
      .notNull()
      .references(() => people.id),
    updatedAt: timestamptz('updated_at').notNull(),
  },
  (t) => [
    primaryKey({ name: 'part_flags_pkey', columns: [t.companyId, t.kind, t.partId] }),
    index('part_flags_updated_by_idx').on(t.updatedBy),
    check('part_flags_kind_known', sql`${t.kind} in ('core', 'former', 'material', 'wire', 'tape', 'sleeve')`),
  ],
)
