import type { Context } from '#server/context'
import { asAuth } from '#server/db/as-actor'
import { stateOf } from '#server/routes/request-state'
import { resolveSession, SESSION_COOKIE } from '#server/services/people/sessions'
import type { RequestHandler } from 'express'

/** Finds out who asks. Roles are read anew each time, so a change counts from the next request. */
export const session =
  (ctx: Context): RequestHandler =>
  async (req, res, next) => {
    const { cookie } = req.headers
    if (cookie?.includes(SESSION_COOKIE)) {
      stateOf(res).session = await asAuth(ctx, (tx) => resolveSession(tx, ctx.config, cookie))
    }
    next()
  }
