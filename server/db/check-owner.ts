import { fileURLToPath } from 'node:url'
import pg, { Client } from 'pg'
import { canSignIn } from './migrate'

/**
 * What an administrator has to run on an existing server before the owner named in DATABASE_OWNER_URL can set up;
 * null when nothing is missing.
 */
export async function missingPreparation(ownerUrl: string, roleUrls: string[]): Promise<string | null> {
  const client = new Client({ connectionString: ownerUrl })
  await client.connect()
  try {
    const { rows } = await client.query<{ database: string; owns: boolean; makes_roles: boolean }>(
      `SELECT d.datname AS database, pg_has_role(current_user, d.datdba, 'USAGE') AS owns, r.rolcreaterole OR r.rolsuper AS makes_roles
         FROM pg_database d, pg_roles r WHERE d.datname = current_database() AND r.rolname = current_user`,
    )
    const { database, owns, makes_roles: makesRoles } = rows[0]!
    const missing = []
    if (!owns) missing.push(`ALTER DATABASE ${pg.escapeIdentifier(database)} OWNER TO ${pg.escapeIdentifier(decodeURIComponent(new URL(ownerUrl).username))};`)
    for (const url of makesRoles ? [] : roleUrls) if (!(await canSignIn(url))) missing.push(...(await roleStatements(client, url, database)))
    return missing.length > 0 ? missing.join('\n') : null
  } finally {
    await client.end()
  }
}

async function roleStatements(client: Client, url: string, database: string): Promise<string[]> {
  const { username, password } = new URL(url)
  const name = decodeURIComponent(username)
  const { rows } = await client.query('SELECT FROM pg_roles WHERE rolname = $1', [name])
  const verb = rows.length > 0 ? 'ALTER' : 'CREATE'
  return [
    `${verb} ROLE ${pg.escapeIdentifier(name)} LOGIN NOSUPERUSER NOBYPASSRLS NOINHERIT NOCREATEDB NOCREATEROLE PASSWORD ${pg.escapeLiteral(decodeURIComponent(password))};`,
    `GRANT CONNECT ON DATABASE ${pg.escapeIdentifier(database)} TO ${pg.escapeIdentifier(name)};`,
  ]
}

/** Prints the statements, or why the server cannot be reached; prints nothing when all is well. */
async function checkOwner(): Promise<void> {
  const { DATABASE_OWNER_URL = '', DATABASE_AUTH_URL = '', DATABASE_APP_URL = '', DATABASE_WORKER_URL = '' } = process.env
  try {
    const sql = await missingPreparation(DATABASE_OWNER_URL, [DATABASE_AUTH_URL, DATABASE_APP_URL, DATABASE_WORKER_URL])
    if (sql) console.log(`The owner named in DATABASE_OWNER_URL may not do all that is needed. Run this on the server as an administrator, then start again:\n\n${sql}\n`)
  } catch (error) {
    const { message, code } = error as { message: string; code?: string }
    console.log(`The server named in DATABASE_OWNER_URL cannot be used: ${message || code}.`)
  }
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await checkOwner()
