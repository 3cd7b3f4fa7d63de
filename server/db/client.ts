import type { Config } from '#server/config'
import { Pool } from 'pg'

export type DatabaseRole = 'auth' | 'app' | 'worker'

declare const opaque: unique symbol
/** The three connection pools, closed up: a query runs only through `asActor`, `asAuth` or `asWorker`. */
export interface Database {
  readonly [opaque]: true
}

const pools = new WeakMap<Database, Record<DatabaseRole, Pool>>()

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
    worker: openPool(config.DATABASE_WORKER_URL, 3),
  })
  return database
}

export async function closeDatabase(database: Database): Promise<void> {
  await Promise.all(Object.values(poolsOf(database)).map((pool) => pool.end()))
}

/** @NOTE For `as-actor.ts` only; everybody else gets a transaction from there. */
export function poolsOf(database: Database): Record<DatabaseRole, Pool> {
  const found = pools.get(database)
  if (!found) throw new Error('The database is not open.')
  return found
}
