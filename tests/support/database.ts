import pg, { Client, Pool } from 'pg'
import { inject } from 'vitest'
import { refuseOtherDatabases } from './database-guard'
import { databaseUrls } from './template-database'

/** A database of one test file, with the owner's rights for what a test may do and the application may not. */
export interface TestDatabase {
  name: string
  urls: ReturnType<typeof databaseUrls>
  /** As the owner, past every lock. */
  query<R extends pg.QueryResultRow = Record<string, unknown>>(text: string, values?: unknown[]): Promise<R[]>
  /** Moves `app_now()` forward (or back); the offset is measured from the real clock. */
  setClock(offset: { days?: number; hours?: number; minutes?: number; seconds?: number }): Promise<void>
  drop(): Promise<void>
}

/** Clones the migrated template. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const maintenanceUrl = inject('maintenanceUrl')
  const name = `dotside_${process.pid}_${process.env.VITEST_POOL_ID ?? '0'}_test`
  refuseOtherDatabases(name)
  await replaceDatabase(maintenanceUrl, name, inject('templateDatabase'))
  const urls = databaseUrls(maintenanceUrl, name)
  const owner = new Pool({ connectionString: urls.DATABASE_OWNER_URL, max: 2 })
  // A test may end the server's side of an idle connection; the next query opens another.
  owner.on('error', () => {})
  return {
    name,
    urls,
    async query<R extends pg.QueryResultRow>(text: string, values?: unknown[]) {
      return (await owner.query<R>(text, values)).rows
    },
    async setClock({ days = 0, hours = 0, minutes = 0, seconds = 0 }) {
      await owner.query('UPDATE clock_offset SET seconds = $1', [((days * 24 + hours) * 60 + minutes) * 60 + seconds])
    },
    async drop() {
      await owner.end()
      await replaceDatabase(maintenanceUrl, name, null)
    },
  }
}

async function replaceDatabase(maintenanceUrl: string, name: string, template: string | null): Promise<void> {
  const client = new Client({ connectionString: maintenanceUrl })
  await client.connect()
  try {
    const database = pg.escapeIdentifier(name)
    await client.query(`DROP DATABASE IF EXISTS ${database} WITH (FORCE)`)
    if (template === null) return
    await client.query(`CREATE DATABASE ${database} TEMPLATE ${pg.escapeIdentifier(template)}`)
    await client.query(`GRANT CONNECT ON DATABASE ${database} TO dotside_auth, dotside_app, dotside_worker`)
  } finally {
    await client.end()
  }
}
