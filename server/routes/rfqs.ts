import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { issueRfq } from '#server/services/rfqs/issue-rfq'
import { askOpening, cancelRfq, extendRfq, openRfq } from '#server/services/rfqs/move-rfq'
import { listRfqs, readRfq } from '#server/services/rfqs/read-rfq'
import { downloadVendorDrawing } from '#server/services/rfqs/vendor-drawing'
import { acceptConfidentiality, declineRfq, listVendorRfqs, readVendorRfq } from '#server/services/rfqs/vendor-rfq'
import { createRfq, updateRfq } from '#server/services/rfqs/write-rfq'
import * as contract from '#shared/contracts/rfqs'
import { Router } from 'express'
import { handle } from './handle'

export function rfqRoutes(ctx: Context): Router {
  const router = Router()

  handle(router, contract.listRfqs, ({ actor, query }) => asActor(ctx, actor, (tx) => listRfqs(tx, actor, query.state)))
  handle(router, contract.createRfq, ({ actor, body }) => asActor(ctx, actor, (tx) => createRfq(tx, actor, body)))
  handle(router, contract.getRfq, ({ actor, params }) => asActor(ctx, actor, (tx) => readRfq(tx, actor, params.rfqId)))
  handle(router, contract.updateRfq, ({ actor, params, body: { version, ...input } }) => asActor(ctx, actor, (tx) => updateRfq(tx, actor, params.rfqId, version, input)))
  handle(router, contract.issueRfq, ({ actor, params, body }) => asActor(ctx, actor, (tx) => issueRfq(tx, actor, params.rfqId, body.version)))
  handle(router, contract.extendRfq, ({ actor, params, body }) => asActor(ctx, actor, (tx) => extendRfq(tx, actor, params.rfqId, new Date(body.dueAt), body.reason)))
  handle(router, contract.cancelRfq, ({ actor, params, body }) => asActor(ctx, actor, (tx) => cancelRfq(tx, actor, params.rfqId, body.reason)))
  handle(router, contract.askOpening, ({ actor, params }) => asActor(ctx, actor, (tx) => askOpening(tx, actor, params.rfqId)))
  handle(router, contract.openRfq, ({ actor, params }) => asActor(ctx, actor, (tx) => openRfq(tx, actor, params.rfqId)))

  handle(router, contract.listVendorRfqs, ({ actor }) => asActor(ctx, actor, (tx) => listVendorRfqs(tx, actor)))
  handle(router, contract.getVendorRfq, ({ actor, params }) => asActor(ctx, actor, (tx) => readVendorRfq(tx, actor, params.rfqId)))
  handle(router, contract.acceptConfidentiality, ({ actor, params }) => asActor(ctx, actor, (tx) => acceptConfidentiality(tx, actor, params.rfqId)))
  handle(router, contract.declineRfq, ({ actor, params, body }) => asActor(ctx, actor, (tx) => declineRfq(tx, actor, params.rfqId, body.reason, body.text)))
  handle(router, contract.vendorDrawing, ({ actor, params }) => downloadVendorDrawing(ctx, actor, params.rfqId, params.lineId))

  return router
}
