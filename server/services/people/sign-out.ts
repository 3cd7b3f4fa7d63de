import type { Context } from '#server/context'
import { asAuth } from '#server/db/as-actor'
import { recordAudit } from '#server/services/audit/record-audit'
import { endSession, type OpenSession } from './sessions'

/** Ends the session and returns the cookie that makes the browser forget it. */
export function signOut(ctx: Context, { id, person }: OpenSession): Promise<string> {
  return asAuth(ctx, async (tx) => {
    await recordAudit(tx, { personId: person.id, companyId: person.company.id }, { type: 'signed-out', personId: person.id })
    return endSession(tx, ctx.config, id)
  })
}
