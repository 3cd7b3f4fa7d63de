import { customType, timestamp, uuid } from 'drizzle-orm/pg-core'

/** Random (version 4), so that an identifier tells neither age nor order. */
export const id = () => uuid('id').primaryKey().defaultRandom()

export const timestamptz = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' })

export const createdAt = () => timestamptz('created_at').notNull().defaultNow()

export const bytea = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => 'bytea' })
