import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { compareRfq } from '#server/services/awards/build-comparison'
import { approveAward, rejectAward } from '#server/services/awards/decide-award'
import { proposeAward } from '#server/services/awards/propose-award'
import { listAwards, readAward } from '#server/services/awards/read-awards'
import * as contract from '#shared/contracts/awards'
import { Router } from 'express'
import { handle } from './handle'

export function awardsRoutes(ctx: Context): Router {
  const router = Router()

  handle(router, contract.compareOffers, ({ actor, params, body }) => asActor(ctx, actor, (tx) => compareRfq(tx, actor, params.rfqId, body.basis)))
  handle(router, contract.proposeAward, ({ actor, params, body }) => asActor(ctx, actor, (tx) => proposeAward(tx, actor, params.rfqId, body)))
  handle(router, contract.listAwards, ({ actor, query }) => asActor(ctx, actor, (tx) => listAwards(tx, actor, query.rfqId)))
  handle(router, contract.getAward, ({ actor, params }) => asActor(ctx, actor, (tx) => readAward(tx, actor, params.awardId)))
  handle(router, contract.approveAward, ({ actor, params, body }) => asActor(ctx, actor, (tx) => approveAward(tx, actor, params.awardId, body.comparisonSha256, body.remark)))
  handle(router, contract.rejectAward, ({ actor, params, body }) => asActor(ctx, actor, (tx) => rejectAward(tx, actor, params.awardId, body.reason)))

  return router
}
