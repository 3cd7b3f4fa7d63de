import type { Context } from '#server/context'
import { asAuth } from '#server/db/as-actor'
import { attempts } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { and, eq, sql } from 'drizzle-orm'
import { sha256 } from './secrets'

export interface AttemptLimit {
  bucket: string
  limit: number
  windowSeconds: number
}

/**
 * Counts one attempt and refuses it when there were too many in the window. In a transaction of its own, so that
 * a failure afterwards does not undo it, and one after the other for a key, so that attempts at the same moment
 * see each other.
 */
export async function countAttempt(ctx: Context, { bucket, limit, windowSeconds }: AttemptLimit, key: string): Promise<void> {
  const keyHash = sha256(`${bucket}:${key}`)
  const count = await asAuth(ctx, async (tx) => {
    await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`${bucket}:${key}`}, 3))`)
    await tx.insert(attempts).values({ bucket, keyHash, at: sql`app_now()` })
    const window = sql`${attempts.at} > app_now() - make_interval(secs => ${windowSeconds})`
    return tx.$count(attempts, and(eq(attempts.bucket, bucket), eq(attempts.keyHash, keyHash), window))
  })
  if (count > limit) {
    throw new AppError('too-many-attempts', `There were too many attempts. Please wait ${Math.ceil(windowSeconds / 60)} minutes and try again.`)
  }
}
