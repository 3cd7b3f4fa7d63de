import type { Context } from '#server/context'
import { checkHealth } from '#server/services/mail/check-health'
import * as contract from '#shared/contracts/health'
import { Router } from 'express'
import { handle } from './handle'
import { openApiDocument } from './openapi'

export function healthRoutes(ctx: Context): Router {
  const router = Router()
  handle(router, contract.readHealth, () => checkHealth(ctx))
  handle(router, contract.readOpenApi, async () => openApiDocument(ctx.config.PUBLIC_URL))
  return router
}
