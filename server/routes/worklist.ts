import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { listWorklist } from '#server/services/worklist/list-worklist'
import * as contract from '#shared/contracts/worklist'
import { Router } from 'express'
import { handle } from './handle'

export function worklistRoutes(ctx: Context): Router {
  const router = Router()
  handle(router, contract.listWorklist, ({ actor }) => asActor(ctx, actor, (tx) => listWorklist(tx, actor)))
  return router
}
