import type { Transaction } from '#server/db/as-actor'
import { signInTokens } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import type { LINK_PURPOSES } from '#shared/contracts/people'
import { and, eq, isNull, sql } from 'drizzle-orm'
import { newToken, sha256 } from './secrets'

export type TokenRow = typeof signInTokens.$inferSelect

export interface TokenRequest {
  purpose: (typeof LINK_PURPOSES)[number]
  personId: string | null
  changeId?: string
  validHours: number
}

/** Returns the token, which is kept nowhere, and when it ends. */
export async function createToken(tx: Transaction, { purpose, personId, changeId, validHours }: TokenRequest): Promise<{ token: string; expiresAt: Date }> {
  const token = newToken()
  const { rows } = await tx.execute<{ expires_at: string | Date }>(sql`select app_now() + make_interval(hours => ${validHours}) as expires_at`)
  const expiresAt = new Date(rows[0]!.expires_at)
  await tx.insert(signInTokens).values({ purpose, personId, changeId, tokenHash: sha256(token), expiresAt })
  return { token, expiresAt }
}

/** The token's row, locked; a link that was used, has expired or never existed is refused in the same words. */
export async function lockToken(tx: Transaction, token: string): Promise<TokenRow> {
  const [row] = await tx
    .select()
    .from(signInTokens)
    .where(eq(signInTokens.tokenHash, sha256(token)))
    .for('update')
  const { rows } = await tx.execute<{ living: boolean }>(sql`select ${row?.expiresAt.toISOString() ?? '-infinity'}::timestamptz > app_now() as living`)
  if (!row || row.usedAt || !rows[0]!.living) {
    throw new AppError('link-expired', 'This link has expired or was used before. Sign in if you have a password, or ask for a new link.')
  }
  return row
}

/** A link works once; with it go all others that were sent to the person for the same purpose. */
export async function useUpTokens(tx: Transaction, { id, personId, purpose }: TokenRow): Promise<void> {
  const same = personId ? and(eq(signInTokens.personId, personId), eq(signInTokens.purpose, purpose)) : eq(signInTokens.id, id)
  await tx.update(signInTokens).set({ usedAt: sql`app_now()` }).where(and(same, isNull(signInTokens.usedAt)))
}
