// @ts-check
/**
 * The start command, on a clone that may have nothing installed yet:
 *
 *     node server/start.mjs [start | dev | test | test-office | bench | backup [file] | restore file [--replace] | verify-audit]
 *
 * Plain JavaScript with Node's own modules only, since Node 20 reads no TypeScript: it installs the packages
 * when they are missing or the lockfile changed, and hands over to `server/start/main.ts`.
 */
import { spawnSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

const ROOT = fileURLToPath(new URL('..', import.meta.url))
const parent = process.ppid

/** @param {string} sentence @returns {never} */
function refuse(sentence) {
  console.error(sentence)
  if (process.argv[2] === 'test') console.log('0 passed, 1 failed, 0 skipped')
  process.exit(1)
}

/** npm keeps a list of what it installed, written when an installation is complete. */
function packagesMatchLockfile() {
  /** @param {string} file @returns {Record<string, { integrity?: string, optional?: boolean }>} */
  const packagesIn = (file) => JSON.parse(readFileSync(ROOT + file, 'utf8')).packages
  try {
    const installed = packagesIn('node_modules/.package-lock.json')
    return Object.entries(packagesIn('package-lock.json')).every(
      ([name, wanted]) => name === '' || (wanted.optional && !installed[name]) || (installed[name] && installed[name].integrity === wanted.integrity),
    )
  } catch {
    return false
  }
}

function installPackages() {
  console.log('Installing the packages of package-lock.json ...')
  const begin = Date.now()
  const { status, signal, stdout, stderr, error } = spawnSync('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], { cwd: ROOT, encoding: 'utf8' })
  if (signal || (process.env.npm_lifecycle_event && process.ppid !== parent)) process.exit(130)
  if (status !== 0) refuse(`The packages could not be installed (npm ci):\n${error?.message ?? (stderr || stdout).trim()}`)
  console.log(`Packages installed (${((Date.now() - begin) / 1000).toFixed(1)} s).`)
}

const [major = 0, minor = 0] = process.versions.node.split('.').map(Number)
if (major < 20 || (major === 20 && minor < 19)) refuse(`Node.js 20.19 or later is needed; this is ${process.version}.`)
if (!packagesMatchLockfile()) installPackages()

const { tsImport } = await import('tsx/esm/api')
const { main } = await tsImport('./start/main.ts', import.meta.url)
await main(process.argv[2] ?? 'start', process.argv.slice(3), parent)
