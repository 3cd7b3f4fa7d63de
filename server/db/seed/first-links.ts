import type { Context } from '#server/context'
import { asAuth } from '#server/db/as-actor'
import { memberships, signInTokens } from '#server/db/schema/index'
import { createToken } from '#server/services/people/sign-in-tokens'
import { and, arrayOverlaps, eq, isNull } from 'drizzle-orm'

const VALID_HOURS = 7 * 24

export interface FirstLinks {
  firstAdminLink?: string
  firstOperatorLink?: string
}

/** One-time links for the first administrator and the first operator, new ones at each start until they were used. */
export async function makeFirstLinks(ctx: Context): Promise<FirstLinks> {
  return {
    firstAdminLink: await makeLink(ctx, 'first-admin', 'admin'),
    firstOperatorLink: await makeLink(ctx, 'first-operator', 'operator'),
  }
}

function makeLink(ctx: Context, purpose: 'first-admin' | 'first-operator', role: 'admin' | 'operator'): Promise<string | undefined> {
  return asAuth(ctx, async (tx) => {
    const holders = await tx.$count(memberships, arrayOverlaps(memberships.roles, [role]))
    if (holders > 0) return undefined
    await tx.delete(signInTokens).where(and(eq(signInTokens.purpose, purpose), isNull(signInTokens.usedAt)))
    const { token } = await createToken(tx, { purpose, personId: null, validHours: VALID_HOURS })
    return `${ctx.config.PUBLIC_URL.replace(/\/$/, '')}/link#${token}`
  })
}
