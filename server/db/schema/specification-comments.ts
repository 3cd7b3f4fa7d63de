import { sql } from 'drizzle-orm'
import { check, foreignKey, index, pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id, timestamptz } from './columns'
import { people } from './people'
import { specificationRevisions } from './specifications'

/** What somebody of the company says about one place of a revision. Its words stand; it is settled, and may be opened again. */
export const specificationComments = pgTable(
  'specification_comments',
  {
    id: id(),
    revisionId: uuid('revision_id').notNull(),
    companyId: uuid('company_id').notNull(),
    byId: uuid('by_id')
      .notNull()
      .references(() => people.id),
    /** Place by the identity of its rows, such as `windings.[w1].turns`, so that it stays through reordering. */
    place: text('place').notNull(),
    text: text('text').notNull(),
    at: timestamptz('at').notNull(),
    settledBy: uuid('settled_by').references(() => people.id),
    settledAt: timestamptz('settled_at'),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'specification_comments_revision_fk',
      columns: [t.revisionId, t.companyId],
      foreignColumns: [specificationRevisions.id, specificationRevisions.companyId],
    }),
    index('specification_comments_revision_idx').on(t.revisionId, t.companyId),
    index('specification_comments_by_id_idx').on(t.byId),
    index('specification_comments_settled_by_idx').on(t.settledBy),
    check('specification_comments_settled_together', sql`(${t.settledAt} is null) = (${t.settledBy} is null)`),
    check('specification_comments_says_something', sql`length(trim(${t.text})) > 0`),
  ],
)
