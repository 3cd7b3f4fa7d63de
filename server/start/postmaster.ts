import { readFileSync, readdirSync, readlinkSync, realpathSync, rmSync } from 'node:fs'
import path from 'node:path'
import { setTimeout as sleep } from 'node:timers/promises'
import { describeCluster, ensureCluster, isForeign, psql, putAside, runPostgresql, writeClusterSettings, type Cluster } from './cluster'
import { freePort } from './ports'
import { Refusal, lastLines, say } from './report'
import type { Settings } from './settings'

let started: Cluster | undefined

/** Every process of a PostgreSQL server works in the cluster's folder. */
function worksIn(pid: string | number, folder: string): boolean {
  try {
    return readlinkSync(`/proc/${pid}/cwd`) === realpathSync(folder)
  } catch {
    return false
  }
}

/** The running server of this cluster, whoever started it; a pid file alone proves nothing. */
export function runningPostmaster(data: string): { pid: number; port: number } | undefined {
  try {
    const lines = readFileSync(path.join(data, 'postmaster.pid'), 'utf8').split('\n')
    const [pid, port] = [Number(lines[0]), Number(lines[3])]
    return worksIn(pid, data) ? { pid, port } : undefined
  } catch {
    return undefined
  }
}

/** Adopts the running server of the data folder, or starts it; answers once it takes connections. */
export async function startCluster(settings: Settings): Promise<Cluster> {
  const cluster = describeCluster(settings)
  if (isForeign(cluster)) {
    await stopPostmaster(cluster)
    putAside(cluster)
  }
  await ensureCluster(cluster)
  started = cluster
  for (const deadline = Date.now() + 60_000; ; await sleep(250)) {
    const postmaster = runningPostmaster(cluster.data)
    if (postmaster) cluster.port = postmaster.port
    else await launchPostmaster(cluster, settings.ports.database)
    const { code, stderr } = await psql(cluster, 'SELECT 1;')
    if (code === 0) return cluster
    if (/password authentication failed/.test(stderr)) throw new Refusal(`The passwords in ${settings.dataDir}/database.json do not fit the database in ${cluster.data}.`)
    if (Date.now() > deadline) throw new Refusal(`The database server does not answer:\n${lastLines(stderr)}`)
  }
}

async function launchPostmaster(cluster: Cluster, wantedPort: number): Promise<void> {
  await endOrphans(cluster)
  rmSync(path.join(cluster.data, 'postmaster.pid'), { force: true })
  cluster.port = await freePort('DATABASE_PORT', wantedPort)
  writeClusterSettings(cluster)
  // Without -l the server would hold this command's pipe open.
  const log = path.join(cluster.home, 'server.log')
  const { code } = await runPostgresql(cluster, 'pg_ctl', ['start', '-D', cluster.data, '-l', log, '-w', '-t', '120'])
  if (code !== 0) throw new Refusal(`The database server did not start:\n${lastLines(readFileSync(log, 'utf8'))}`)
}

/**
 * Processes of a killed server, or of one that lost its pid file. They end by themselves or are ended:
 * beside them a new server would damage the data.
 */
async function endOrphans({ data }: Cluster): Promise<void> {
  const orphans = () => readdirSync('/proc').filter((name) => /^\d+$/.test(name) && worksIn(name, data))
  const steps = [
    { signal: undefined, patienceMs: 5_000 },
    { signal: 'SIGINT', patienceMs: 20_000 },
    { signal: 'SIGKILL', patienceMs: 5_000 },
  ] as const
  for (const { signal, patienceMs } of steps) {
    for (const pid of signal ? orphans() : []) process.kill(Number(pid), signal)
    for (const deadline = Date.now() + patienceMs; Date.now() < deadline; await sleep(100)) if (orphans().length === 0) return
  }
  throw new Refusal(`Processes ${orphans().join(', ')} of an earlier database server still use ${data}. End them first.`)
}

async function stopPostmaster(cluster: Cluster): Promise<void> {
  if (!runningPostmaster(cluster.data)) return
  const mode = cluster.throwAway ? 'immediate' : 'fast'
  const { code, stderr } = await runPostgresql(cluster, 'pg_ctl', ['stop', '-D', cluster.data, '-m', mode, '-w', '-t', '60'])
  if (code !== 0) say(`The database server did not stop: ${lastLines(stderr, 3)}`)
}

/** Stops the server that this command started or adopted; a throw-away cluster goes with it. */
export async function stopStartedCluster(): Promise<void> {
  if (!started) return
  await stopPostmaster(started)
  if (started.throwAway) rmSync(started.home, { recursive: true, force: true })
}
