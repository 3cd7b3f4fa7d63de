import { randomUUID } from 'node:crypto'
import { access, mkdir, open, rename, rm, writeFile } from 'node:fs/promises'
import path from 'node:path'
import type { FileStore } from './file-store'

const HEX_SHA256 = /^[0-9a-f]{64}$/

/** Files under `<dataDir>/files/ab/abcdef…`, staged on the same disk so that a move is one step. */
export function diskStore(dataDir: string): FileStore {
  const root = path.resolve(dataDir, 'files')
  const stagingFolder = path.join(root, 'staging')

  function placeOf(sha256: string): string {
    if (!HEX_SHA256.test(sha256)) throw new RangeError(`Not a SHA-256: ${sha256}`)
    return path.join(root, sha256.slice(0, 2), sha256)
  }

  async function has(sha256: string): Promise<boolean> {
    return access(placeOf(sha256)).then(
      () => true,
      () => false,
    )
  }

  async function keep(stagedPath: string, sha256: string): Promise<void> {
    const place = placeOf(sha256)
    if (await has(sha256)) return rm(stagedPath, { force: true })
    await mkdir(path.dirname(place), { recursive: true })
    await flush(stagedPath)
    await rename(stagedPath, place)
    await flush(path.dirname(place))
  }

  return {
    stagingFolder,
    keep,
    has,
    async keepBytes(bytes, sha256) {
      await mkdir(stagingFolder, { recursive: true })
      const staged = path.join(stagingFolder, randomUUID())
      await writeFile(staged, bytes)
      await keep(staged, sha256)
    },
    async open(sha256) {
      const file = await open(placeOf(sha256), 'r')
      return file.createReadStream()
    },
    async check() {
      await mkdir(stagingFolder, { recursive: true })
      const probe = path.join(stagingFolder, `probe-${randomUUID()}`)
      await writeFile(probe, '')
      await rm(probe)
    },
  }
}

/** A row must not outlive its bytes when the machine loses power. */
async function flush(target: string): Promise<void> {
  const handle = await open(target, 'r')
  try {
    await handle.sync()
  } finally {
    await handle.close()
  }
}
