import { describeCluster, loadSecrets, psql, type Cluster } from './cluster'
import { ensureDebian } from './debian'
import { runningPostmaster, startCluster } from './postmaster'
import { Refusal, lastLines } from './report'
import { runProgram } from './run'
import type { Settings } from './settings'

const DATABASE = 'dotside'
const OWNER = `${DATABASE}_owner`

/** Addresses and rights that the programs need; see `.env.example`. */
export interface DatabaseEnvironment {
  DATABASE_OWNER_URL: string
  DATABASE_AUTH_URL: string
  DATABASE_APP_URL: string
  DATABASE_WORKER_URL: string
  DATABASE_BACKUP_URL: string
  POSTGRES_BIN: string
}

/** A running server with the database and its owner: ours, or the one that DATABASE_OWNER_URL names. */
export async function setUpDatabase(settings: Settings): Promise<DatabaseEnvironment> {
  if (settings.ownerUrl) return useExistingServer(settings, settings.ownerUrl)
  await ensureDebian('postgresql')
  const cluster = await startCluster(settings)
  await ensureOwner(cluster)
  return ownEnvironment(cluster)
}

async function ensureOwner(cluster: Cluster): Promise<void> {
  const { code, stderr } = await psql(
    cluster,
    `
    SELECT 'CREATE ROLE ${OWNER}' WHERE NOT EXISTS (SELECT FROM pg_roles WHERE rolname = '${OWNER}') \\gexec
    ALTER ROLE ${OWNER} LOGIN CREATEROLE NOSUPERUSER NOCREATEDB NOBYPASSRLS PASSWORD '${cluster.secrets.passwords.owner}';
    SELECT 'CREATE DATABASE ${DATABASE} OWNER ${OWNER} TEMPLATE template0 ENCODING ''UTF8'' LOCALE ''C.UTF-8'''
      WHERE NOT EXISTS (SELECT FROM pg_database WHERE datname = '${DATABASE}') \\gexec
    `,
  )
  if (code !== 0) throw new Refusal(`The database could not be made:\n${lastLines(stderr)}`)
}

const signedInAs = (url: string, username: string, password: string) => Object.assign(new URL(url), { username, password }).href

function ownEnvironment({ port, bin, secrets: { passwords } }: Cluster): DatabaseEnvironment {
  const server = `postgres://127.0.0.1:${port}/${DATABASE}`
  return {
    DATABASE_OWNER_URL: signedInAs(server, OWNER, passwords.owner),
    DATABASE_AUTH_URL: signedInAs(server, `${DATABASE}_auth`, passwords.auth),
    DATABASE_APP_URL: signedInAs(server, `${DATABASE}_app`, passwords.app),
    DATABASE_WORKER_URL: signedInAs(server, `${DATABASE}_worker`, passwords.worker),
    DATABASE_BACKUP_URL: signedInAs(server, 'postgres', passwords.superuser),
    POSTGRES_BIN: bin,
  }
}

async function useExistingServer({ env, dataDir }: Settings, ownerUrl: string): Promise<DatabaseEnvironment> {
  const { passwords } = loadSecrets(dataDir)
  const environment = {
    DATABASE_OWNER_URL: ownerUrl,
    DATABASE_AUTH_URL: env.DATABASE_AUTH_URL || signedInAs(ownerUrl, `${DATABASE}_auth`, passwords.auth),
    DATABASE_APP_URL: env.DATABASE_APP_URL || signedInAs(ownerUrl, `${DATABASE}_app`, passwords.app),
    DATABASE_WORKER_URL: env.DATABASE_WORKER_URL || signedInAs(ownerUrl, `${DATABASE}_worker`, passwords.worker),
    DATABASE_BACKUP_URL: env.DATABASE_BACKUP_URL || ownerUrl,
    POSTGRES_BIN: env.POSTGRES_BIN ?? '',
  }
  const obstacle = await runProgram('server/db/check-owner.ts', { ...env, ...environment })
  if (obstacle) throw new Refusal(obstacle.trimEnd())
  return environment
}

/** The database of a Dotside that runs on this data folder under another command. */
export function databaseOfRunning(settings: Settings): DatabaseEnvironment {
  const cluster = describeCluster(settings)
  const postmaster = runningPostmaster(cluster.data)
  if (!postmaster) throw new Refusal('Dotside is just starting or stopping. Try again in a moment.')
  return ownEnvironment({ ...cluster, port: postmaster.port })
}
