import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, readFileSync, readdirSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'

const ROOT = path.dirname(path.dirname(fileURLToPath(import.meta.url)))
const BUILT = path.join(ROOT, 'dist/client')
const STAMP = 'source-hash.txt'

/** Builds the client unless what stands was built from the same sources. Prints one line when it builds. */
function buildClient(): void {
  const hash = sourceHash()
  if (builtFrom(BUILT) === hash) return
  removeLeftovers()
  const start = Date.now()
  const fresh = `${BUILT}.${process.pid}`
  try {
    runVite(fresh)
    writeFileSync(path.join(fresh, STAMP), hash)
    putInPlace(fresh)
  } finally {
    rmSync(fresh, { recursive: true, force: true })
  }
  console.log(`Client built (${((Date.now() - start) / 1000).toFixed(1)} s).`)
}

/** Folders that a build which was killed left behind; one that still runs keeps its own. */
function removeLeftovers(): void {
  const dist = path.dirname(BUILT)
  for (const name of existsSync(dist) ? readdirSync(dist) : []) {
    const pid = /^client\.(?:old-)?(\d+)$/.exec(name)?.[1]
    if (pid && !existsSync(`/proc/${pid}`)) rmSync(path.join(dist, name), { recursive: true, force: true })
  }
}

function builtFrom(folder: string): string | undefined {
  const stamp = path.join(folder, STAMP)
  return existsSync(stamp) ? readFileSync(stamp, 'utf8') : undefined
}

function sourceHash(): string {
  const hash = createHash('sha256')
  const files = ['package-lock.json', 'vite.config.ts', ...filesBelow('client'), ...filesBelow('shared')]
  for (const file of files.filter((name) => !name.endsWith('.test.ts'))) {
    hash.update(file).update('\0').update(readFileSync(path.join(ROOT, file))).update('\0')
  }
  return hash.digest('hex')
}

function filesBelow(folder: string): string[] {
  const entries = readdirSync(path.join(ROOT, folder), { recursive: true, withFileTypes: true })
  return entries.filter((entry) => entry.isFile()).map((entry) => path.relative(ROOT, path.join(entry.parentPath, entry.name))).sort()
}

/** Two starts of one clone may build at once: each builds into a folder of its own, so vite's lock would only stop one. */
function runVite(outDir: string): void {
  const vite = path.join(ROOT, 'node_modules/vite/bin/vite.js')
  const { status, stdout, stderr } = spawnSync(process.execPath, [vite, 'build', '--outDir', outDir, '--emptyOutDir', '--bypass-lock', '--logLevel', 'warn'], {
    cwd: ROOT,
    encoding: 'utf8',
    env: { ...process.env, NODE_ENV: 'production' },
  })
  if (status !== 0) throw new Error(`vite build failed:\n${stderr || stdout}`)
}

/** A server that runs meanwhile serves the old client whole, then the new one whole. */
function putInPlace(fresh: string): void {
  const old = `${BUILT}.old-${process.pid}`
  if (existsSync(BUILT)) renameSync(BUILT, old)
  renameSync(fresh, BUILT)
  rmSync(old, { recursive: true, force: true })
}

buildClient()
