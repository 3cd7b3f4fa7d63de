import type { Context } from '#server/context'
import { readdir, rm, stat } from 'node:fs/promises'
import path from 'node:path'

const DAY_MS = 24 * 60 * 60 * 1000

/** Removes uploads that broke off when a server process was killed. */
export async function purgeStaging({ files }: Context): Promise<void> {
  const names = await readdir(files.stagingFolder).catch(() => [])
  for (const name of names) {
    const file = path.join(files.stagingFolder, name)
    const found = await stat(file).catch(() => null)
    // Age of a file on this machine's disk; no rule of the product hangs on it.
    if (found && Date.now() - found.mtimeMs > DAY_MS) await rm(file, { force: true })
  }
}
