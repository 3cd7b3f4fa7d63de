import type { AnyLibraryRow, Confidence, LibraryKind } from '#shared/engine/library'
import { sql } from 'drizzle-orm'
import { check, index, integer, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id } from './columns'
import { companies, people } from './people'

/**
 * One version of one row of the parts library; a change is another row. Without a company it is shipped with the
 * installation and everybody's. A company's own version of a row stands before every shared one of the same name.
 */
export const partRows = pgTable(
  'part_rows',
  {
    id: id(),
    companyId: uuid('company_id').references(() => companies.id),
    createdBy: uuid('created_by').references(() => people.id),
    kind: text('kind').$type<LibraryKind>().notNull(),
    /** What documents refer to, with kind and version. */
    partId: text('part_id').notNull(),
    version: integer('version').notNull(),
    name: text('name').notNull(),
    /** The name with its figures padded, so that E8 stands before E13. */
    sortKey: text('sort_key').notNull(),
    family: text('family').notNull(),
    confidence: text('confidence').$type<Confidence>().notNull(),
    row: jsonb('row').$type<AnyLibraryRow>().notNull(),
    reason: text('reason').notNull().default(''),
    createdAt: createdAt(),
  },
  (t) => [
    unique('part_rows_version_key').on(t.companyId, t.kind, t.partId, t.version).nullsNotDistinct(),
    index('part_rows_kind_part_id_idx').on(t.kind, t.partId),
    index('part_rows_created_by_idx').on(t.createdBy),
    check('part_rows_kind_known', sql`${t.kind} in ('core', 'former', 'material', 'wire', 'tape', 'sleeve')`),
    check('part_rows_confidence_known', sql`${t.confidence} in ('high', 'medium', 'low', 'generic')`),
    check('part_rows_version_positive', sql`${t.version} > 0`),
    check('part_rows_row_matches', sql`${t.row} ->> 'kind' = ${t.kind} and ${t.row} ->> 'id' = ${t.partId} and (${t.row} ->> 'version')::integer = ${t.version}`),
    check('part_rows_made_by_somebody', sql`(${t.companyId} is null) = (${t.createdBy} is null)`),
  ],
)
