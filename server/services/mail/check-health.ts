import type { Context } from '#server/context'
import { asAuth } from '#server/db/as-actor'
import { outboxHealth } from '#server/db/schema/index'
import type { readHealth } from '#shared/contracts/health'
import type { ResponseOf } from '#shared/contracts/endpoint'
import { sql } from 'drizzle-orm'

type Health = ResponseOf<typeof readHealth>

/** Mails that wait longer than this, or a worker not seen for as long, are late. */
const LATE_SECONDS = 120

/** What works and what does not; never why, since anybody may ask. */
export async function checkHealth(ctx: Context): Promise<Health> {
  const [outbox, files] = await Promise.all([outboxState(ctx), fileState(ctx)])
  const database = outbox === 'failed' ? 'failed' : 'ok'
  const isWell = database === 'ok' && outbox === 'ok' && files === 'ok'
  return { status: isWell ? 'ok' : 'degraded', database, outbox, files }
}

async function outboxState(ctx: Context): Promise<Health['outbox']> {
  const late = sql<boolean>`coalesce(seen_at < app_now() - make_interval(secs => ${LATE_SECONDS}), true)
    or coalesce(oldest_waiting_since < app_now() - make_interval(secs => ${LATE_SECONDS}), false)`
  try {
    const [row] = await asAuth(ctx, (tx) => tx.select({ late }).from(outboxHealth))
    return row && !row.late ? 'ok' : 'late'
  } catch (error) {
    ctx.logger.error('The database does not answer', { error })
    return 'failed'
  }
}

async function fileState(ctx: Context): Promise<Health['files']> {
  try {
    await ctx.files.check()
    return 'ok'
  } catch (error) {
    ctx.logger.error('The file store cannot be written', { error })
    return 'failed'
  }
}
