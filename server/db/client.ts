import type { Config } from '#server/config'
import { Pool } from 'pg'

export type DatabaseRole = 'auth' | 'app' | 'worker'

declare const opaque: unique symbol
/** The three connection pools, closed up: a query runs only through `asActor`, `asAuth` or `asWorker`. */
export interface Database {
  readonly [opaque]: true
}

const pools = new WeakMap<Database, Pools>()

/** The server process has no address of the worker's role. */
type Pools = Record<'auth' | 'app', Pool> & { worker: Pool | null }

const LIMITS = { statement_timeout: 30_000, lock_timeout: 10_000, idle_in_transaction_session_timeout: 60_000 }

function openPool(connectionString: string, max: number): Pool {
  const pool = new Pool({ connectionString, max, ...LIMITS })
  // An idle connection that breaks is replaced at the next query; without a listener it would end the process.
  pool.on('error', () => undefined)
  return pool
}

export function openDatabase(config: Pick<Config, 'DATABASE_AUTH_URL' | 'DATABASE_APP_URL' | 'DATABASE_WORKER_URL'>): Database {
  const database = {} as Database
  pools.set(database, {
    auth: openPool(config.DATABASE_AUTH_URL, 5),
    app: openPool(config.DATABASE_APP_URL, 10),
    worker: config.DATABASE_WORKER_URL === undefined ? null : openPool(config.DATABASE_WORKER_URL, 5),
  })
  return database
}

export async function closeDatabase(database: Database): Promise<void> {
  await Promise.all(Object.values(pools.get(database) ?? {}).map((pool) => pool?.end()))
}

/** @NOTE For `as-actor.ts` only; everybody else gets a transaction from there. */
export function poolOf(database: Database, role: DatabaseRole): Pool {
  const pool = pools.get(database)?.[role]
  if (!pool) throw new Error(`There is no connection for the role ${role} in this process.`)
  return pool
}
