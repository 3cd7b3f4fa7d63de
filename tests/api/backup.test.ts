import { verifyUnpacked } from '#server/archive/manifest'
import { runTool } from '#server/archive/tools'
import { writeBackup } from '#server/backup'
import { restoreBackup } from '#server/restore'
import { diskStore } from '#server/storage/disk-store'
import { createHash } from 'node:crypto'
import { mkdir, mkdtemp, readFile, rm, stat, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { createTestDatabase, type TestDatabase } from '../support/database'

const DRAWING = Buffer.from('%PDF-1.7 a drawing')
const QUOTATION = Buffer.from('a quotation that came after the backup')
const sha256 = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex')

let database: TestDatabase
let folder: string
let archive: string

const dataDir = () => path.join(folder, 'data')
const stored = (bytes: Buffer) => path.join(dataDir(), 'files', sha256(bytes).slice(0, 2), sha256(bytes))
const backup = () => writeBackup({ databaseUrl: database.urls.DATABASE_OWNER_URL, dataDir: dataDir(), archive })
const restore = (replace: boolean) => restoreBackup({ archive, dataDir: dataDir(), databaseUrl: database.urls.DATABASE_OWNER_URL, urls: database.urls, replace })
const offset = async () => (await database.query<{ seconds: string }>('SELECT seconds FROM clock_offset'))[0]?.seconds

/** Unpacks the archive, lets a test spoil it, and packs it again. */
async function spoil(change: (unpacked: string) => Promise<void>): Promise<void> {
  const unpacked = await mkdtemp(path.join(folder, 'spoil-'))
  await runTool('tar', ['-xzf', archive, '-C', unpacked])
  await change(unpacked)
  await runTool('tar', ['-czf', archive, '-C', unpacked, '.'])
}

beforeEach(async () => {
  database = await createTestDatabase()
  folder = await mkdtemp(path.join(tmpdir(), 'dotside-backup-'))
  archive = path.join(folder, 'archives', 'one.tar.gz')
  await mkdir(dataDir())
  await diskStore(dataDir()).keepBytes(DRAWING, sha256(DRAWING))
  await database.setClock({ hours: 1 })
})

afterEach(async () => {
  await database.drop()
  await rm(folder, { recursive: true, force: true })
})

describe('backup', () => {
  it('names database and stored files with size and hash, for its owner only to read', async () => {
    const { manifest, damaged } = await backup()
    expect(manifest.entries).toContainEqual({ path: path.relative(dataDir(), stored(DRAWING)), sizeBytes: DRAWING.length, sha256: sha256(DRAWING) })
    expect(manifest.entries.map((entry) => entry.path)).toContain('database.dump')
    expect(damaged).toEqual([])
    expect((await stat(archive)).mode & 0o777).toBe(0o600)
  })

  it('tells which stored file no longer has the hash it was stored under', async () => {
    await writeFile(stored(DRAWING), 'bit rot')
    expect((await backup()).damaged).toEqual([path.relative(dataDir(), stored(DRAWING))])
  })

  it('refuses a role that row security binds', async () => {
    await expect(writeBackup({ databaseUrl: database.urls.DATABASE_APP_URL, dataDir: dataDir(), archive })).rejects.toThrow('Row security hides rows from this role')
  })

  it('overwrites no file', async () => {
    await backup()
    await expect(backup()).rejects.toThrow('exists already')
  })
})

describe('restore', () => {
  it('brings back rows and files as they were, and takes away what came later', async () => {
    await backup()
    await database.setClock({ hours: 5 })
    await rm(stored(DRAWING))
    await diskStore(dataDir()).keepBytes(QUOTATION, sha256(QUOTATION))

    await restore(true)

    expect(Number(await offset())).toBe(3600)
    expect(await readFile(stored(DRAWING))).toEqual(DRAWING)
    await expect(stat(stored(QUOTATION))).rejects.toThrow('ENOENT')
  })

  it('keeps row security forced on every table', async () => {
    await backup()
    await restore(true)
    const open = await database.query("SELECT relname FROM pg_class WHERE relnamespace = 'public'::regnamespace AND relkind = 'r' AND NOT (relrowsecurity AND relforcerowsecurity)")
    expect(open).toEqual([])
  })

  it('refuses a target that holds data, unless told to replace it', async () => {
    await backup()
    await database.setClock({ hours: 5 })
    await expect(restore(false)).rejects.toThrow('There is data here already')
    expect(Number(await offset())).toBe(5 * 3600)
  })

  it.each([
    { name: 'a stored file with one byte changed', change: (unpacked: string) => writeFile(path.join(unpacked, path.relative(dataDir(), stored(DRAWING))), '%PDF-1.7 a drawinG'), says: 'does not have the hash' },
    { name: 'a database dump cut short', change: async (unpacked: string) => writeFile(path.join(unpacked, 'database.dump'), (await readFile(path.join(unpacked, 'database.dump'))).subarray(0, 1000)), says: 'has 1000 bytes instead of' },
    { name: 'a file that is missing', change: (unpacked: string) => rm(path.join(unpacked, 'database.dump')), says: 'is missing' },
    { name: 'a file that the manifest does not name', change: (unpacked: string) => writeFile(path.join(unpacked, 'extra'), ''), says: 'which its manifest does not name' },
    { name: 'a manifest that leads out of the folder', change: async (unpacked: string) => writeFile(path.join(unpacked, 'manifest.json'), (await readFile(path.join(unpacked, 'manifest.json'), 'utf8')).replace('database.dump', '../database.dump')), says: 'manifest.json cannot be read' },
  ])('refuses $name and changes nothing', async ({ change, says }) => {
    await backup()
    await spoil(change)
    await database.setClock({ hours: 5 })
    await expect(restore(true)).rejects.toThrow(says)
    expect(Number(await offset())).toBe(5 * 3600)
  })

  it('refuses a file that is no archive', async () => {
    await mkdir(path.dirname(archive))
    await writeFile(archive, 'not an archive')
    await expect(restore(true)).rejects.toThrow('is no archive')
  })

  it('refuses an archive of a later version', async () => {
    await backup()
    await spoil(async (unpacked) => {
      const manifest = JSON.parse(await readFile(path.join(unpacked, 'manifest.json'), 'utf8'))
      await writeFile(path.join(unpacked, 'manifest.json'), JSON.stringify({ ...manifest, lastMigration: Date.UTC(2100, 0) }))
      await expect(verifyUnpacked(unpacked)).resolves.toBeDefined()
    })
    await expect(restore(true)).rejects.toThrow('later version of Dotside')
  })
})
