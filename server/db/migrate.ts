import { drizzle } from 'drizzle-orm/node-postgres'
import { migrate as runMigrations } from 'drizzle-orm/node-postgres/migrator'
import { fileURLToPath } from 'node:url'
import pg, { Client } from 'pg'
import { shipParts } from './seed/parts/ship-parts'

const MIGRATIONS_FOLDER = fileURLToPath(new URL('../../migrations', import.meta.url))

/** Any number will do, as long as all starts use the same. */
const MIGRATION_LOCK = 7_426_901

export interface MigrationUrls {
  DATABASE_OWNER_URL: string
  DATABASE_AUTH_URL: string
  DATABASE_APP_URL: string
  DATABASE_WORKER_URL: string
}

/** Makes or updates the three login roles, brings the tables up to date and ships the parts library. May be run again at any time. */
export async function migrate(urls: MigrationUrls): Promise<void> {
  await withLock(urls.DATABASE_OWNER_URL, async (client) => {
    await ensureRoles(client, urls)
    // PostgreSQL notices such as "relation already exists, skipping" say nothing here.
    await runMigrations(drizzle(client), { migrationsFolder: MIGRATIONS_FOLDER })
    await grantConnect(client)
    await shipParts(client)
  })
}

async function withLock(url: string, work: (client: Client) => Promise<void>): Promise<void> {
  const client = new Client({ connectionString: url })
  await client.connect()
  try {
    await client.query('SELECT pg_advisory_lock($1)', [MIGRATION_LOCK])
    await work(client)
  } finally {
    await client.end()
  }
}

/** Roles belong to the whole server, so that a test's lock on its maintenance database covers them. */
export async function ensureRoles(client: Client, urls: Omit<MigrationUrls, 'DATABASE_OWNER_URL'>): Promise<void> {
  for (const url of [urls.DATABASE_AUTH_URL, urls.DATABASE_APP_URL, urls.DATABASE_WORKER_URL]) {
    const { username, password } = new URL(url)
    const name = decodeURIComponent(username)
    if (!/^dotside_(auth|app|worker)$/.test(name)) throw new Error(`The role in a database address is one of dotside_auth, dotside_app and dotside_worker, not “${name}”.`)
    await ensureRole(client, name, decodeURIComponent(password), url)
  }
}

export async function canSignIn(url: string): Promise<boolean> {
  const client = new Client({ connectionString: url })
  try {
    await client.connect()
    return true
  } catch {
    return false
  } finally {
    await client.end().catch(() => {})
  }
}

async function ensureRole(client: Client, name: string, password: string, url: string): Promise<void> {
  const { rows } = await client.query<{ strong: boolean }>('SELECT rolsuper OR rolbypassrls AS strong FROM pg_roles WHERE rolname = $1', [name])
  if (rows[0]?.strong) throw new Error(`The role ${name} may pass over row security (SUPERUSER or BYPASSRLS); take that right from it first.`)
  // An owner without the right to change roles gets by with those an administrator made.
  if (rows.length > 0 && (await canSignIn(url))) return
  const verb = rows.length > 0 ? 'ALTER' : 'CREATE'
  await client.query(`${verb} ROLE ${name} LOGIN NOINHERIT NOCREATEDB NOCREATEROLE PASSWORD ${pg.escapeLiteral(password)}`)
}

async function grantConnect(client: Client): Promise<void> {
  const { rows } = await client.query<{ name: string }>('SELECT current_database() AS name')
  const database = pg.escapeIdentifier(rows[0]!.name)
  await client.query(`REVOKE CONNECT, TEMPORARY ON DATABASE ${database} FROM PUBLIC`)
  await client.query(`GRANT CONNECT ON DATABASE ${database} TO dotside_auth, dotside_app, dotside_worker`)
  await client.query('REVOKE CREATE ON SCHEMA public FROM PUBLIC')
}

function urlsFrom(env: NodeJS.ProcessEnv): MigrationUrls {
  const read = (name: keyof MigrationUrls) => {
    const value = env[name]
    if (!value) throw new Error(`${name} is not set.`)
    return value
  }
  return {
    DATABASE_OWNER_URL: read('DATABASE_OWNER_URL'),
    DATABASE_AUTH_URL: read('DATABASE_AUTH_URL'),
    DATABASE_APP_URL: read('DATABASE_APP_URL'),
    DATABASE_WORKER_URL: read('DATABASE_WORKER_URL'),
  }
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  await migrate(urlsFrom(process.env))
}
