import { spawnSync } from 'node:child_process'
import { existsSync, readdirSync } from 'node:fs'
import path from 'node:path'
import { Refusal, lastLines, say, timed } from './report'
import { run } from './run'
import { IS_ROOT } from './settings'

/** Views that keep the reader's row security (`security_invoker`) came with this version. */
const OLDEST_POSTGRESQL = 15

const searchPath = () => (process.env.PATH ?? '').split(':').filter(Boolean)

function findProgram(...programs: string[]): string | undefined {
  const folders = [...searchPath(), '/usr/bin', '/usr/local/bin']
  const found = programs.map((program) => folders.map((folder) => path.join(folder, program)).find((file) => existsSync(file)))
  return found.includes(undefined) ? undefined : found[0]
}

/** Folder with the newest usable PostgreSQL server, or with the one of a given major version. */
export function findPostgresql(version?: number): string | undefined {
  const debian = '/usr/lib/postgresql'
  const versions = existsSync(debian) ? readdirSync(debian).sort((a, b) => Number(b) - Number(a)) : []
  const folders = [process.env.POSTGRES_BIN ?? '', ...versions.map((name) => path.join(debian, name, 'bin')), ...searchPath()]
  return folders.find((folder) => {
    if (!folder || !['postgres', 'initdb', 'pg_ctl', 'psql'].every((program) => existsSync(path.join(folder, program)))) return false
    const major = Number(/ (\d+)/.exec(spawnSync(path.join(folder, 'postgres'), ['--version'], { encoding: 'utf8' }).stdout)?.[1])
    return version === undefined ? major >= OLDEST_POSTGRESQL : major === version
  })
}

export function findChromium(): string | undefined {
  const own = process.env.CHROMIUM
  return own && existsSync(own) ? own : findProgram('chromium')
}

/** What a Debian package brings, in words, and what shows that it is there. */
const PACKAGES = {
  postgresql: { name: `PostgreSQL ${OLDEST_POSTGRESQL} or later`, find: () => findPostgresql() },
  'postgresql-client': { name: 'pg_dump and pg_restore', find: () => findProgram('pg_dump', 'pg_restore') },
  chromium: { name: 'Chromium', find: findChromium },
  librecad: { name: 'LibreCAD', find: () => findProgram('librecad') },
  qpdf: { name: 'qpdf', find: () => findProgram('qpdf') },
  'poppler-utils': { name: 'poppler-utils (pdftotext, pdffonts, pdftoppm)', find: () => findProgram('pdftotext', 'pdffonts', 'pdftoppm') },
}

type PackageName = keyof typeof PACKAGES

/** @throws Refusal naming what is missing and how to install it, when this user or machine cannot */
export async function ensureDebian(...packages: PackageName[]): Promise<void> {
  const missing = () => packages.filter((name) => !PACKAGES[name].find())
  const wanted = missing()
  if (wanted.length === 0) return
  const administrator = await administratorPrefix()
  if (!administrator) throw notInstalled(wanted, 'this user may not install packages (neither root nor sudo without a password)')
  if (!findProgram('apt-get')) throw notInstalled(wanted, 'this machine has no apt-get to install it with')
  say(`Installing ${wanted.join(', ')} from Debian's packages ...`)
  await timed(`Installed ${wanted.join(', ')}`, async () => {
    const reason = await aptInstall(administrator, wanted)
    if (missing().length > 0) throw notInstalled(missing(), `apt-get could not install it${reason && `:\n${reason}\n`}`)
  })
}

function notInstalled(packages: PackageName[], why: string): Refusal {
  const what = packages.map((name) => PACKAGES[name].name).join(', ')
  return new Refusal(`${what} not found, and ${why}. Install as administrator: apt-get install ${packages.join(' ')}`)
}

async function administratorPrefix(): Promise<string[] | undefined> {
  if (IS_ROOT) return []
  return (await run('sudo', ['-n', 'true'])).code === 0 ? ['sudo', '-n'] : undefined
}

/** Answers why it failed, or nothing. */
async function aptInstall(administrator: string[], packages: PackageName[]): Promise<string> {
  const execute = (...command: string[]) => {
    const [program, ...args] = [...administrator, 'env', 'DEBIAN_FRONTEND=noninteractive', ...command]
    return run(program!, args)
  }
  // Debian would make and start a cluster of its own on installing the server.
  const folder = '/etc/postgresql-common/createcluster.d'
  if (packages.includes('postgresql')) await execute('sh', '-c', `mkdir -p ${folder} && echo 'create_main_cluster = false' > ${folder}/dotside.conf`)
  const apt = ['apt-get', '-o', 'DPkg::Lock::Timeout=300', '-q', '-y']
  await execute(...apt, 'update')
  const { code, stderr, stdout } = await execute(...apt, 'install', '--no-install-recommends', ...packages)
  return code === 0 ? '' : lastLines(stderr || stdout, 6)
}
