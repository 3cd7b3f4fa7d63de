import { pgTable, text } from 'drizzle-orm/pg-core'
import { timestamptz } from './columns'

/** Steps of the seed that were done, so that a second start does none of them again. */
export const seedSteps = pgTable('seed_steps', {
  name: text('name').primaryKey(),
  doneAt: timestamptz('done_at').notNull(),
})
