import compression from 'compression'
import express, { type Express } from 'express'
import { existsSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import type { Context } from './context'
import { AppError } from './errors'
import { errorHandler } from './middleware/error-handler'
import { originCheck } from './middleware/origin-check'
import { rateLimit } from './middleware/rate-limit'
import { requestId } from './middleware/request-id'
import { securityHeaders } from './middleware/security-headers'
import { session } from './middleware/session'
import { featureRouters } from './routes/index'

const CLIENT_FOLDER = fileURLToPath(new URL('../dist/client', import.meta.url))

/** The whole application on a context; listening is the caller's. */
export function createApp(ctx: Context): Express {
  const app = express()
  app.locals.ctx = ctx
  app.disable('x-powered-by')
  app.set('trust proxy', 'loopback')
  app.set('query parser', 'simple')
  app.use(requestId, securityHeaders(ctx.config.PUBLIC_URL.startsWith('https:')), compression())
  app.use('/api', noStore, originCheck(ctx.config), express.json({ limit: '2mb', type: 'application/json' }), session(ctx), rateLimit(ctx))
  for (const router of featureRouters(ctx)) app.use(router)
  app.use('/api', () => {
    throw new AppError('not-found', 'There is no such address.')
  })
  serveClient(app)
  app.use(errorHandler(ctx))
  return app
}

const noStore: express.RequestHandler = (_req, res, next) => {
  res.set('cache-control', 'no-store')
  next()
}

/** The built client; every other address is one of its pages. */
function serveClient(app: Express): void {
  const index = `${CLIENT_FOLDER}/index.html`
  // Built files carry a hash in their name, the page itself does not.
  app.use('/assets', express.static(`${CLIENT_FOLDER}/assets`, { immutable: true, maxAge: '1y', fallthrough: false }))
  app.use(express.static(CLIENT_FOLDER, { index: false, maxAge: 0 }))
  app.get('/{*page}', (_req, res, next) => {
    if (!existsSync(index)) return next(new AppError('not-found', 'The pages have not been built yet.'))
    res.set('cache-control', 'no-cache').sendFile(index)
  })
}
