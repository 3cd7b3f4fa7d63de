import type { Context } from '#server/context'
import { asAuth } from '#server/db/as-actor'
import { attempts, signInTokens } from '#server/db/schema/index'
import { sql } from 'drizzle-orm'
import { deleteEndedSessions } from './sessions'

/** Removes what signing in no longer needs: ended sessions, old links, counted attempts. */
export async function purgeSignIn(ctx: Context): Promise<void> {
  await asAuth(ctx, async (tx) => {
    await deleteEndedSessions(tx, ctx.config)
    await tx.delete(signInTokens).where(sql`${signInTokens.expiresAt} < app_now() - interval '30 days'`)
    await tx.delete(attempts).where(sql`${attempts.at} < app_now() - interval '1 day'`)
  })
}
