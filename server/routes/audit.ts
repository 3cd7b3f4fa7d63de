import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { listAudit } from '#server/services/audit/list-audit'
import * as contract from '#shared/contracts/audit'
import { Router } from 'express'
import { handle } from './handle'

export function auditRoutes(ctx: Context): Router {
  const router = Router()
  handle(router, contract.listAudit, ({ actor, query }) => asActor(ctx, actor, (tx) => listAudit(tx, actor, query)))
  return router
}
