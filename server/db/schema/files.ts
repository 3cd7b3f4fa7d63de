import type { FileKind } from '#shared/contracts/endpoint'
import { sql } from 'drizzle-orm'
import { bigint, check, index, pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id } from './columns'
import { companies, people } from './people'

/**
 * One stored file under the name its uploader gave it; equal bytes are stored once.
 * The uploading company reads it; whoever else may is said by the feature that refers to it.
 */
export const files = pgTable(
  'files',
  {
    id: id(),
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id),
    uploadedBy: uuid('uploaded_by').references(() => people.id),
    /** SHA-256 over the bytes, lower-case hex; the store's key. */
    sha256: text('sha256').notNull(),
    sizeBytes: bigint('size_bytes', { mode: 'number' }).notNull(),
    kind: text('kind').$type<FileKind>().notNull(),
    name: text('name').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    index('files_company_id_idx').on(t.companyId),
    index('files_uploaded_by_idx').on(t.uploadedBy),
    index('files_sha256_idx').on(t.sha256),
    check('files_sha256_hex', sql`${t.sha256} ~ '^[0-9a-f]{64}$'`),
    check('files_size_positive', sql`${t.sizeBytes} > 0`),
  ],
)
