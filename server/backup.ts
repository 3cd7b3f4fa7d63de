import { copyFile, link, mkdir, mkdtemp, open, rename, rm, writeFile } from 'node:fs/promises'
import { existsSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { Client } from 'pg'
import { ArchiveRefusal, DUMP, MANIFEST, SIGN_INS, describeEntry, filesBelow, type Manifest } from './archive/manifest'
import { asCommand, postgresTool, runTool, toolEnvironment } from './archive/tools'

export interface BackupOptions {
  /** A role that row security does not bind, or the dump would miss rows. */
  databaseUrl: string
  dataDir: string
  archive: string
}

export interface BackupResult {
  manifest: Manifest
  /** Stored files whose bytes no longer have the hash they lie under. */
  damaged: string[]
}

/** Writes database and stored files into one archive. May run beside a running server: files are kept before a row names them, so the dump comes first. */
export async function writeBackup({ databaseUrl, dataDir, archive }: BackupOptions): Promise<BackupResult> {
  if (existsSync(archive)) throw new ArchiveRefusal(`${archive} exists already. Choose another name.`)
  await mkdir(path.dirname(archive), { recursive: true, mode: 0o700 })
  const staging = await mkdtemp(path.join(dataDir, '.backup-'))
  try {
    const origin = await describeDatabase(databaseUrl)
    await runTool(postgresTool('pg_dump'), ['--format=custom', '--no-password', `--file=${path.join(staging, DUMP)}`], toolEnvironment(databaseUrl))
    await gatherFiles(dataDir, staging)
    const paths = await filesBelow(staging)
    const entries = []
    for (const file of paths) entries.push(await describeEntry(staging, file))
    const manifest: Manifest = { format: 'dotside-backup', version: 1, madeAt: new Date().toISOString(), ...origin, entries }
    await writeFile(path.join(staging, MANIFEST), JSON.stringify(manifest, null, 2))
    await pack(staging, [MANIFEST, ...paths], archive)
    const damaged = entries.filter(({ path: file, sha256 }) => file.startsWith('files/') && path.basename(file) !== sha256).map((entry) => entry.path)
    return { manifest, damaged }
  } finally {
    await rm(staging, { recursive: true, force: true })
  }
}

async function describeDatabase(url: string): Promise<Pick<Manifest, 'owner' | 'lastMigration'>> {
  const client = new Client({ connectionString: url })
  await client.connect()
  try {
    const { rows } = await client.query<{ unbound: boolean }>('SELECT rolsuper OR rolbypassrls AS unbound FROM pg_roles WHERE rolname = current_user')
    if (!rows[0]?.unbound) throw new ArchiveRefusal('Row security hides rows from this role. Set DATABASE_BACKUP_URL to a role with SUPERUSER or BYPASSRLS.')
    const journal = 'drizzle.__drizzle_migrations'
    const { rows: tables } = await client.query<{ owner: string | null }>('SELECT pg_get_userbyid(relowner) AS owner FROM pg_class WHERE oid = to_regclass($1)', [journal])
    if (!tables[0]?.owner) throw new ArchiveRefusal('The database was never set up; there is nothing to back up.')
    const { rows: last } = await client.query<{ at: string | null }>(`SELECT max(created_at) AS at FROM ${journal}`)
    return { owner: tables[0].owner, lastMigration: Number(last[0]?.at ?? 0) }
  } finally {
    await client.end()
  }
}

/** Links rather than copies where the disk can: a file removed meanwhile stays whole here. */
async function gatherFiles(dataDir: string, staging: string): Promise<void> {
  const stored = (await filesBelow(path.join(dataDir, 'files'))).filter((file) => /^[0-9a-f]{2}\/[0-9a-f]{64}$/.test(file)).map((file) => path.join('files', file))
  if (existsSync(path.join(dataDir, SIGN_INS))) stored.push(SIGN_INS)
  for (const file of stored) {
    const [from, to] = [path.join(dataDir, file), path.join(staging, file)]
    await mkdir(path.dirname(to), { recursive: true })
    await link(from, to).catch(() => copyFile(from, to))
  }
}

/** The archive appears under its name only when it is whole. It holds everything, so only its owner may read it. */
async function pack(staging: string, paths: string[], archive: string): Promise<void> {
  const partial = `${archive}.partial`
  const list = path.join(path.dirname(staging), `${path.basename(staging)}.list`)
  try {
    await (await open(partial, 'w', 0o600)).close()
    await writeFile(list, paths.join('\0'))
    await runTool('tar', ['--create', '--gzip', `--file=${partial}`, `--directory=${staging}`, '--null', '--no-recursion', '--owner=0', '--group=0', `--files-from=${list}`])
    const handle = await open(partial, 'r')
    await handle.sync().finally(() => handle.close())
    await rename(partial, archive)
  } finally {
    await rm(list, { force: true })
    await rm(partial, { force: true })
  }
}

async function backupCommand(): Promise<void> {
  const { DATABASE_BACKUP_URL: databaseUrl, DATA_DIR: dataDir } = process.env
  const archive = process.argv[2]
  if (!databaseUrl || !dataDir || !archive) throw new ArchiveRefusal('Use: npm run backup [file]')
  const { manifest, damaged } = await writeBackup({ databaseUrl, dataDir, archive })
  const files = manifest.entries.filter((entry) => entry.path.startsWith('files/')).length
  console.log(`Backed up the database and ${files} stored files, each with its SHA-256, to\n${archive}`)
  if (damaged.length > 0) throw new ArchiveRefusal(`These stored files no longer have the hash they were stored under:\n${damaged.join('\n')}`)
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await asCommand(backupCommand)
