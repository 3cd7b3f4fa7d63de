import { ensureRoles, migrate, type MigrationUrls } from '#server/db/migrate'
import { createHash } from 'node:crypto'
import { readdirSync, readFileSync } from 'node:fs'
import pg, { Client } from 'pg'
import type { TestProject } from 'vitest/node'
import { refuseOtherDatabases } from './database-guard'

declare module 'vitest' {
  interface ProvidedContext {
    maintenanceUrl: string
    templateDatabase: string
  }
}

const MIGRATIONS = new URL('../../migrations/', import.meta.url)
const SHIPPED_PARTS = new URL('../../server/db/seed/parts/', import.meta.url)
const TEMPLATE_LOCK = 7_426_902

/** Any password will do: the roles of a test server guard nothing but tests. */
export const TEST_PASSWORD = 'only-for-tests'

/** The four addresses of one database on the test server. */
export function databaseUrls(maintenanceUrl: string, database: string): MigrationUrls {
  refuseOtherDatabases(database)
  const as = (role: string | null) => {
    const url = new URL(maintenanceUrl)
    url.pathname = `/${database}`
    if (role) Object.assign(url, { username: role, password: TEST_PASSWORD })
    return url.href
  }
  return {
    DATABASE_OWNER_URL: as(null),
    DATABASE_AUTH_URL: as('dotside_auth'),
    DATABASE_APP_URL: as('dotside_app'),
    DATABASE_WORKER_URL: as('dotside_worker'),
  }
}

/** Builds one migrated database that every test worker clones; kept as long as the migrations and the shipped parts stay the same. */
export default async function setup(project: TestProject): Promise<void> {
  const maintenanceUrl = process.env.TEST_DATABASE_URL
  if (!maintenanceUrl) throw new Error('TEST_DATABASE_URL is not set. Run the tests with `npm test`, or name a throw-away PostgreSQL server.')
  const templateDatabase = `dotside_template_${templateHash()}_test`
  await withMaintenance(maintenanceUrl, (client) => ensureTemplate(client, maintenanceUrl, templateDatabase))
  project.provide('maintenanceUrl', maintenanceUrl)
  project.provide('templateDatabase', templateDatabase)
}

function templateHash(): string {
  const hash = createHash('sha256')
  const files = [MIGRATIONS, SHIPPED_PARTS].flatMap((folder) => readdirSync(folder).sort().map((name) => new URL(name, folder)))
  for (const file of files.filter((url) => /\.(sql|ts)$/.test(url.pathname))) hash.update(readFileSync(file))
  return hash.digest('hex').slice(0, 12)
}

async function withMaintenance(url: string, work: (client: Client) => Promise<void>): Promise<void> {
  const client = new Client({ connectionString: url })
  await client.connect()
  try {
    await client.query('SELECT pg_advisory_lock($1)', [TEMPLATE_LOCK])
    await work(client)
  } finally {
    await client.end()
  }
}

/** Built under another name first, so that a template that exists is complete. */
async function ensureTemplate(client: Client, maintenanceUrl: string, name: string): Promise<void> {
  const { rows } = await client.query('SELECT FROM pg_database WHERE datname = $1', [name])
  if (rows.length > 0) return
  const unfinished = name.replace(/_test$/, '_unfinished_test')
  await client.query(`DROP DATABASE IF EXISTS ${pg.escapeIdentifier(unfinished)} WITH (FORCE)`)
  await client.query(`CREATE DATABASE ${pg.escapeIdentifier(unfinished)} TEMPLATE template0 ENCODING 'UTF8' LC_COLLATE 'C.UTF-8' LC_CTYPE 'C.UTF-8'`)
  const urls = databaseUrls(maintenanceUrl, unfinished)
  await ensureRoles(client, urls)
  await migrate(urls)
  await client.query(`ALTER DATABASE ${pg.escapeIdentifier(unfinished)} RENAME TO ${pg.escapeIdentifier(name)}`)
}
