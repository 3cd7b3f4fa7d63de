import type { Context } from '#server/context'
import { stateOf } from '#server/routes/request-state'
import { countAttempt } from '#server/services/people/count-attempt'
import type { RequestHandler } from 'express'

/** Requests that change something, from one address, by nobody who is signed in. */
const ANONYMOUS_LIMIT = { bucket: 'anonymous', limit: 120, windowSeconds: 60 } as const

export const rateLimit =
  (ctx: Context): RequestHandler =>
  async (req, res, next) => {
    if (req.method !== 'GET' && !stateOf(res).session) await countAttempt(ctx, ANONYMOUS_LIMIT, req.ip ?? '')
    next()
  }
