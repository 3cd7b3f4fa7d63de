import type { Config } from '#server/config'
import { AppError } from '#server/errors'
import type { RequestHandler } from 'express'

const SAFE_METHODS = new Set(['GET', 'HEAD', 'OPTIONS'])

/** A request that changes something comes from our own pages, or it is refused. */
export const originCheck =
  ({ PUBLIC_URL }: Pick<Config, 'PUBLIC_URL'>): RequestHandler =>
  (req, _res, next) => {
    if (SAFE_METHODS.has(req.method)) return next()
    const { origin, host } = req.headers
    if (origin && (origin === new URL(PUBLIC_URL).origin || (host !== undefined && hostOf(origin) === host))) return next()
    next(new AppError('wrong-origin', `The request does not come from a page of this address (Origin header “${origin ?? 'missing'}”).`))
  }

function hostOf(origin: string): string | null {
  return URL.canParse(origin) ? new URL(origin).host : null
}
