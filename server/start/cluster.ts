import { createHash, randomBytes } from 'node:crypto'
import { appendFileSync, chownSync, existsSync, mkdirSync, readFileSync, realpathSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { findPostgresql } from './debian'
import { Refusal, lastLines, say, timed } from './report'
import { run, type Ended } from './run'
import { IS_ROOT, type Settings } from './settings'

/** Who runs the server: PostgreSQL refuses root. Empty for the user who starts. */
interface SystemUser {
  uid?: number
  gid?: number
}

export interface Secrets {
  /** Tells the cluster of this data folder from that of an earlier one in the same place. */
  cluster: string
  passwords: Record<'superuser' | 'owner' | 'auth' | 'app' | 'worker', string>
}

export interface Cluster {
  /** Folder of everything that belongs to it. */
  home: string
  /** PostgreSQL's own data folder. */
  data: string
  bin: string
  user: SystemUser
  secrets: Secrets
  throwAway: boolean
  port: number
}

/** Passwords are made once and kept in the data folder. */
export function loadSecrets(dataDir: string): Secrets {
  const file = path.join(dataDir, 'database.json')
  if (existsSync(file)) return JSON.parse(readFileSync(file, 'utf8')) as Secrets
  const password = () => randomBytes(24).toString('base64url')
  const passwords = { superuser: password(), owner: password(), auth: password(), app: password(), worker: password() }
  const secrets = { cluster: randomBytes(8).toString('hex'), passwords }
  writeFileSync(`${file}.new`, JSON.stringify(secrets, null, 2), { mode: 0o600, flush: true })
  renameSync(`${file}.new`, file)
  return secrets
}

/** Where the cluster of a data folder is and who runs it. PostgreSQL's user cannot enter a closed data folder of root's. */
export function describeCluster({ dataDir, throwAway }: Settings): Cluster {
  const hash = createHash('sha256').update(realpathSync(dataDir)).digest('hex').slice(0, 16)
  const home = IS_ROOT ? `/var/lib/dotside/${hash}` : path.join(dataDir, 'postgresql')
  const data = path.join(home, 'cluster')
  const versionFile = path.join(data, 'PG_VERSION')
  const version = !throwAway && existsSync(versionFile) ? Number(readFileSync(versionFile, 'utf8')) : undefined
  const bin = findPostgresql(version)
  if (!bin) throw new Refusal(`The database in ${data} was made by PostgreSQL ${version}, which is not installed. Install as administrator: apt-get install postgresql-${version}`)
  return { home, data, bin, user: IS_ROOT ? postgresUser() : {}, secrets: loadSecrets(dataDir), throwAway, port: 0 }
}

function postgresUser(): SystemUser {
  const line = readFileSync('/etc/passwd', 'utf8').split('\n').find((entry) => entry.startsWith('postgres:'))
  const [, , uid, gid] = line?.split(':') ?? []
  if (!uid || !gid) throw new Refusal('PostgreSQL does not run as root, and this machine has no user named postgres. Make one (adduser --system --group postgres), or start as an ordinary user.')
  return { uid: Number(uid), gid: Number(gid) }
}

/** Runs one of PostgreSQL's programs as the cluster's user. */
export function runPostgresql({ bin, home, user }: Cluster, program: string, args: string[]): Promise<Ended> {
  const env = { PATH: process.env.PATH, HOME: home, LANG: 'C.UTF-8', LC_ALL: 'C.UTF-8', TZ: 'UTC' }
  return run(path.join(bin, program), args, { ...user, cwd: home, env })
}

/** Runs SQL as the cluster's superuser. */
export function psql({ bin, port, secrets }: Cluster, sql: string): Promise<Ended> {
  const args = ['-X', '-q', '-v', 'ON_ERROR_STOP=1', '-h', '127.0.0.1', '-p', String(port), '-U', 'postgres', '-d', 'postgres', '-f', '-']
  const env = { ...process.env, PGPASSWORD: secrets.passwords.superuser, PGCONNECT_TIMEOUT: '10' }
  return run(path.join(bin, 'psql'), args, { env, input: sql })
}

function giveTo({ uid, gid }: SystemUser, file: string): void {
  if (uid !== undefined && gid !== undefined) chownSync(file, uid, gid)
}

function writeClusterFile({ home, user }: Cluster, name: string, text: string): string {
  const file = path.join(home, name)
  writeFileSync(file, text, { mode: 0o600 })
  giveTo(user, file)
  return file
}

/** The home belongs to another data folder: one that was deleted and made again, or to an earlier test run. */
export function isForeign({ home, secrets, throwAway }: Cluster): boolean {
  const idFile = path.join(home, 'id')
  return existsSync(home) && (throwAway || !existsSync(idFile) || readFileSync(idFile, 'utf8') !== secrets.cluster)
}

/** The passwords of a deleted data folder are gone, but what its database held may still be wanted. */
export function putAside({ home, throwAway }: Cluster): void {
  const aside = `${home}.left-${Date.now()}`
  renameSync(home, aside)
  if (throwAway || !existsSync(path.join(aside, 'cluster'))) rmSync(aside, { recursive: true, force: true })
  else say(`A database of an earlier data folder in this place was put aside: ${aside}`)
}

export async function ensureCluster(cluster: Cluster): Promise<void> {
  const { home, data, user, secrets } = cluster
  if (!existsSync(home)) {
    mkdirSync(path.dirname(home), { recursive: true, mode: 0o755 })
    mkdirSync(home, { mode: 0o700 })
    giveTo(user, home)
    writeClusterFile(cluster, 'id', secrets.cluster)
  }
  if (!existsSync(data)) await timed('Database cluster made', () => createCluster(cluster))
}

/** Made in a folder aside and renamed, so that there is never half a cluster. */
async function createCluster(cluster: Cluster): Promise<void> {
  const fresh = path.join(cluster.home, 'cluster.new')
  rmSync(fresh, { recursive: true, force: true })
  const passwordFile = writeClusterFile(cluster, 'superuser', cluster.secrets.passwords.superuser)
  const quick = cluster.throwAway ? ['--no-sync'] : []
  const args = ['-D', fresh, '-U', 'postgres', '-E', 'UTF8', '--locale=C.UTF-8', '--auth=scram-sha-256', `--pwfile=${passwordFile}`, ...quick]
  const { code, stderr } = await runPostgresql(cluster, 'initdb', args)
  rmSync(passwordFile)
  if (code !== 0) throw new Refusal(`The database cluster could not be made:\n${lastLines(stderr)}`)
  appendFileSync(path.join(fresh, 'postgresql.conf'), "\ninclude = 'dotside.conf'\n")
  renameSync(fresh, cluster.data)
}

/** Loopback only, no socket file; what makes a crash safe is left out where nothing is to be kept. */
export function writeClusterSettings(cluster: Cluster): void {
  const lines = [
    "listen_addresses = '127.0.0.1'",
    `port = ${cluster.port}`,
    "unix_socket_directories = ''",
    'max_connections = 200',
    "timezone = 'UTC'",
    "log_timezone = 'UTC'",
    ...(cluster.throwAway ? ['fsync = off', 'synchronous_commit = off', 'full_page_writes = off'] : []),
  ]
  writeClusterFile(cluster, 'cluster/dotside.conf', `${lines.join('\n')}\n`)
}
