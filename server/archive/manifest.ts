import { createHash } from 'node:crypto'
import { createReadStream } from 'node:fs'
import { readFile, readdir, lstat } from 'node:fs/promises'
import path from 'node:path'
import { pipeline } from 'node:stream/promises'
import { z } from 'zod'

export const MANIFEST = 'manifest.json'
export const DUMP = 'database.dump'
export const SIGN_INS = 'sign-ins.json'

/** A reason not to go on that the person at the command line can act on. */
export class ArchiveRefusal extends Error {}

const entrySchema = z.strictObject({
  /** A stored file lies under its own hash. */
  path: z.string().regex(/^(database\.dump|sign-ins\.json|files\/([0-9a-f]{2})\/\2[0-9a-f]{62})$/),
  sizeBytes: z.int().nonnegative(),
  sha256: z.string().regex(/^[0-9a-f]{64}$/),
})

const manifestSchema = z.strictObject({
  format: z.literal('dotside-backup'),
  version: z.literal(1),
  madeAt: z.iso.datetime(),
  /** Role that owns the tables. */
  owner: z.string().min(1),
  /** Time of the last migration, as the migration journal counts it (milliseconds). */
  lastMigration: z.int().nonnegative(),
  entries: z.array(entrySchema).min(1),
})

export type Manifest = z.infer<typeof manifestSchema>
export type ManifestEntry = Manifest['entries'][number]

export async function sha256OfFile(file: string): Promise<string> {
  const hash = createHash('sha256')
  await pipeline(createReadStream(file), hash)
  return hash.digest('hex')
}

export async function describeEntry(folder: string, relative: string): Promise<ManifestEntry> {
  const file = path.join(folder, relative)
  return { path: relative, sizeBytes: (await lstat(file)).size, sha256: await sha256OfFile(file) }
}

/** Every file below a folder, by its path from there; empty if there is no such folder. */
export async function filesBelow(folder: string): Promise<string[]> {
  const entries = await readdir(folder, { recursive: true, withFileTypes: true }).catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT') return []
    throw error
  })
  return entries
    .filter((entry) => !entry.isDirectory())
    .map((entry) => path.relative(folder, path.join(entry.parentPath, entry.name)))
    .sort()
}

/**
 * Reads the manifest of an unpacked archive and compares every file with it.
 *
 * @throws ArchiveRefusal naming the first file that is missing, damaged or not of the archive
 */
export async function verifyUnpacked(folder: string): Promise<Manifest> {
  const manifest = await readManifest(folder)
  const listed = new Set(manifest.entries.map((entry) => entry.path))
  if (!listed.has(DUMP)) throw new ArchiveRefusal(`The archive's manifest names no ${DUMP}.`)
  for (const file of await filesBelow(folder)) {
    if (file !== MANIFEST && !listed.has(file)) throw new ArchiveRefusal(`The archive holds ${file}, which its manifest does not name. Nothing was changed.`)
  }
  for (const entry of manifest.entries) await verifyEntry(folder, entry)
  return manifest
}

async function readManifest(folder: string): Promise<Manifest> {
  const text = await readFile(path.join(folder, MANIFEST), 'utf8').catch(() => '')
  if (!text) throw new ArchiveRefusal(`This is not a backup of Dotside: it has no ${MANIFEST}.`)
  const parsed = manifestSchema.safeParse(parseJson(text))
  if (!parsed.success) throw new ArchiveRefusal(`The archive's ${MANIFEST} cannot be read: ${z.prettifyError(parsed.error)}`)
  return parsed.data
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return undefined
  }
}

async function verifyEntry(folder: string, entry: ManifestEntry): Promise<void> {
  const file = path.join(folder, entry.path)
  const found = await lstat(file).catch(() => undefined)
  const damage = (what: string) => new ArchiveRefusal(`The archive is damaged: ${entry.path} ${what}. Nothing was changed.`)
  if (!found?.isFile()) throw damage('is missing')
  if (found.size !== entry.sizeBytes) throw damage(`has ${found.size} bytes instead of ${entry.sizeBytes}`)
  if ((await sha256OfFile(file)) !== entry.sha256) throw damage('does not have the hash of the manifest')
}
