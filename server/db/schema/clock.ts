import { sql } from 'drizzle-orm'
import { bigint, boolean, check, pgTable } from 'drizzle-orm/pg-core'

/** One row that `app_now()` adds to the clock, in databases named `*_test` only. */
export const clockOffset = pgTable(
  'clock_offset',
  { only: boolean('only').primaryKey().default(true), seconds: bigint('seconds', { mode: 'number' }).notNull().default(0) },
  (t) => [check('clock_offset_one_row', sql`${t.only}`)],
)
