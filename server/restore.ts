import { existsSync, readFileSync } from 'node:fs'
import { copyFile, mkdir, mkdtemp, rename, rm } from 'node:fs/promises'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import pg, { Client } from 'pg'
import { ensureRoles, type MigrationUrls } from './db/migrate'
import { ArchiveRefusal, DUMP, SIGN_INS, filesBelow, verifyUnpacked, type Manifest } from './archive/manifest'
import { asCommand, databaseName, postgresTool, runTool, toolEnvironment, withDatabase } from './archive/tools'

export interface RestoreOptions {
  archive: string
  dataDir: string
  /** A role that may make databases and pass over row security. */
  databaseUrl: string
  urls: MigrationUrls
  /** Overwrites what is there. */
  replace: boolean
}

/** Puts database and stored files back. Everything is verified before anything is changed, and the old database stands until the new one is whole. */
export async function restoreBackup(options: RestoreOptions): Promise<Manifest> {
  const { archive, dataDir, databaseUrl, urls } = options
  const unpacked = await mkdtemp(path.join(dataDir, '.restore-'))
  try {
    await runTool('tar', ['--extract', '--gzip', `--file=${archive}`, `--directory=${unpacked}`, '--no-same-owner', '--no-same-permissions']).catch((error: Error) => {
      throw new ArchiveRefusal(`The archive is damaged or is no archive: ${error.message}. Nothing was changed.`)
    })
    const manifest = await verifyUnpacked(unpacked)
    refuseOtherVersion(manifest, urls)
    if (!options.replace) await refuseFilledTarget(databaseUrl, dataDir)
    const fresh = `${databaseName(databaseUrl)}_restoring`
    await loadDump(path.join(unpacked, DUMP), fresh, options)
    await putFiles(unpacked, dataDir, manifest)
    await swapDatabases(databaseUrl, fresh)
    await removeSurplusFiles(dataDir, manifest)
    return manifest
  } finally {
    await rm(unpacked, { recursive: true, force: true })
  }
}

function refuseOtherVersion(manifest: Manifest, urls: MigrationUrls): void {
  const journal = JSON.parse(readFileSync(new URL('../migrations/meta/_journal.json', import.meta.url), 'utf8')) as { entries: { when: number }[] }
  const newest = Math.max(0, ...journal.entries.map((entry) => entry.when))
  if (manifest.lastMigration > newest) throw new ArchiveRefusal('The archive was made by a later version of Dotside. Restore it with that version. Nothing was changed.')
  const owner = decodeURIComponent(new URL(urls.DATABASE_OWNER_URL).username)
  if (manifest.owner !== owner) throw new ArchiveRefusal(`The archive's tables belong to the role ${manifest.owner}, those of this server to ${owner}. Name that role in DATABASE_OWNER_URL.`)
}

async function refuseFilledTarget(databaseUrl: string, dataDir: string): Promise<void> {
  const tables = await query(databaseUrl, "SELECT FROM pg_tables WHERE schemaname NOT IN ('pg_catalog', 'information_schema') LIMIT 1")
  const files = (await filesBelow(path.join(dataDir, 'files'))).length
  if (tables.length === 0 && files === 0) return
  throw new ArchiveRefusal('There is data here already, which restoring would overwrite. Back it up, then add --replace (npm run restore -- FILE --replace).')
}

async function query(url: string, ...statements: string[]): Promise<unknown[]> {
  const client = new Client({ connectionString: url })
  await client.connect()
  try {
    let rows: unknown[] = []
    for (const statement of statements) rows = (await client.query(statement)).rows
    return rows
  } finally {
    await client.end()
  }
}

const maintenance = (url: string) => withDatabase(url, 'postgres')

async function loadDump(dump: string, fresh: string, { databaseUrl, urls }: RestoreOptions): Promise<void> {
  const client = new Client({ connectionString: maintenance(databaseUrl) })
  await client.connect()
  try {
    await ensureRoles(client, urls)
  } finally {
    await client.end()
  }
  const [name, owner] = [pg.escapeIdentifier(fresh), pg.escapeIdentifier(decodeURIComponent(new URL(urls.DATABASE_OWNER_URL).username))]
  await query(
    maintenance(databaseUrl),
    `DROP DATABASE IF EXISTS ${name} WITH (FORCE)`,
    `CREATE DATABASE ${name} OWNER ${owner} TEMPLATE template0 ENCODING 'UTF8' LC_COLLATE 'C.UTF-8' LC_CTYPE 'C.UTF-8'`,
  )
  const args = ['--exit-on-error', '--single-transaction', '--no-password', `--dbname=${fresh}`, dump]
  await runTool(postgresTool('pg_restore'), args, toolEnvironment(databaseUrl))
}

/** Files lie under their hashes, so that adding them disturbs nothing that the old database names. */
async function putFiles(unpacked: string, dataDir: string, { entries }: Manifest): Promise<void> {
  for (const entry of entries.filter(({ path: file }) => file.startsWith('files/') || file === SIGN_INS)) {
    const [from, to] = [path.join(unpacked, entry.path), path.join(dataDir, entry.path)]
    await mkdir(path.dirname(to), { recursive: true, mode: 0o700 })
    await copyFile(from, `${to}.restoring`)
    await rename(`${to}.restoring`, to)
  }
}

async function swapDatabases(databaseUrl: string, fresh: string): Promise<void> {
  const name = databaseName(databaseUrl)
  const old = `${name}_replaced`
  const quoted = pg.escapeIdentifier
  const exists = (await query(maintenance(databaseUrl), `SELECT FROM pg_database WHERE datname = ${pg.escapeLiteral(name)}`)).length > 0
  await query(
    maintenance(databaseUrl),
    `DROP DATABASE IF EXISTS ${quoted(old)} WITH (FORCE)`,
    'BEGIN',
    `SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE datname = ${pg.escapeLiteral(name)}`,
    ...(exists ? [`ALTER DATABASE ${quoted(name)} RENAME TO ${quoted(old)}`] : []),
    `ALTER DATABASE ${quoted(fresh)} RENAME TO ${quoted(name)}`,
    'COMMIT',
    `DROP DATABASE IF EXISTS ${quoted(old)} WITH (FORCE)`,
  )
}

/** The restored database names no others. */
async function removeSurplusFiles(dataDir: string, { entries }: Manifest): Promise<void> {
  const kept = new Set(entries.map((entry) => entry.path))
  for (const file of await filesBelow(path.join(dataDir, 'files'))) {
    if (!kept.has(path.join('files', file))) await rm(path.join(dataDir, 'files', file), { force: true })
  }
  if (!kept.has(SIGN_INS)) await rm(path.join(dataDir, SIGN_INS), { force: true })
}

async function restoreCommand(): Promise<void> {
  const env = process.env as NodeJS.ProcessEnv & MigrationUrls & { DATABASE_BACKUP_URL: string; DATA_DIR: string }
  const [archive, ...options] = process.argv.slice(2)
  const unknown = options.find((option) => option !== '--replace')
  if (!archive || unknown) throw new ArchiveRefusal('Use: npm run restore -- FILE [--replace]')
  if (!existsSync(archive)) throw new ArchiveRefusal(`There is no file ${archive}.`)
  const manifest = await restoreBackup({ archive, dataDir: env.DATA_DIR, databaseUrl: env.DATABASE_BACKUP_URL, urls: env, replace: options.includes('--replace') })
  const files = manifest.entries.filter((entry) => entry.path.startsWith('files/')).length
  console.log(`Restored the database and ${files} stored files of ${manifest.madeAt}. Start with npm start.`)
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await asCommand(restoreCommand)
