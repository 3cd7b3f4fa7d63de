import type { CompanyKind, Role } from '#shared/contracts/endpoint'
import { sql } from 'drizzle-orm'
import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres'
import pg, { type PoolClient } from 'pg'
import { poolOf, type Database, type DatabaseRole } from './client'
import * as schema from './schema/index'

/** Who acts: one person of one company with the roles held there. */
export interface Actor {
  personId: string
  companyId: string
  companyKind: CompanyKind
  roles: readonly Role[]
}

/**
 * Queries inside one open transaction. Without the query builder's own `transaction`, whose BEGIN and COMMIT
 * would end ours; use `savepoint` to try something that may fail.
 */
export type Transaction = Omit<NodePgDatabase<typeof schema>, 'transaction' | '$client' | '_'>

interface HasDatabase {
  database: Database
}

/** Runs `work` in a transaction in which row security sees the actor. The only way to the data for a request. */
export function asActor<T>(ctx: HasDatabase, actor: Actor, work: (tx: Transaction) => Promise<T>): Promise<T> {
  const settings = { person_id: actor.personId, company_id: actor.companyId, company_kind: actor.companyKind, roles: actor.roles.join(',') }
  return inTransaction(ctx.database, 'app', settings, work)
}

/** For signing in, sessions and mail links, where nobody is known yet. */
export function asAuth<T>(ctx: HasDatabase, work: (tx: Transaction) => Promise<T>): Promise<T> {
  return inTransaction(ctx.database, 'auth', {}, work)
}

/** For the outbox, due times and chaining: what happens without a person. */
export function asWorker<T>(ctx: HasDatabase, work: (tx: Transaction) => Promise<T>): Promise<T> {
  return inTransaction(ctx.database, 'worker', {}, work)
}

async function inTransaction<T>(database: Database, role: DatabaseRole, settings: Record<string, string>, work: (tx: Transaction) => Promise<T>): Promise<T> {
  const client = await poolOf(database, role).connect()
  let broken: Error | undefined
  try {
    // One message, so that saying who acts costs one round trip.
    await client.query(['BEGIN', ...setConfig(settings)].join('; '))
    const result = await work(drizzle(client, { schema }))
    await client.query('COMMIT')
    return result
  } catch (error) {
    broken = await rollback(client)
    throw error
  } finally {
    client.release(broken)
  }
}

function setConfig(settings: Record<string, string>): string[] {
  const parts = Object.entries(settings).map(([name, value]) => `set_config('app.${name}', ${pg.escapeLiteral(value)}, true)`)
  return parts.length > 0 ? [`SELECT ${parts.join(', ')}`] : []
}

/** A connection that cannot even roll back is thrown away. */
async function rollback(client: PoolClient): Promise<Error | undefined> {
  try {
    await client.query('ROLLBACK')
    return undefined
  } catch (error) {
    return error instanceof Error ? error : new Error(String(error))
  }
}

/** Runs `work`; when it fails only its own changes are undone and the transaction goes on. */
export async function savepoint<T>(tx: Transaction, work: () => Promise<T>): Promise<T> {
  await tx.execute(sql`savepoint attempt`)
  try {
    const result = await work()
    await tx.execute(sql`release savepoint attempt`)
    return result
  } catch (error) {
    await tx.execute(sql`rollback to savepoint attempt`)
    throw error
  }
}

/** The one clock. Read it after the lock on the row it decides about. */
export async function appNow(tx: Transaction): Promise<Date> {
  const { rows } = await tx.execute<{ now: Date | string }>(sql`select app_now() as now`)
  return new Date(rows[0]!.now)
}
