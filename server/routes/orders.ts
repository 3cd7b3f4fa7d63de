import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { placeOrder } from '#server/services/orders/place-order'
import { acknowledgeOrder, downloadOrder, listOrders, readOrder } from '#server/services/orders/read-orders'
import * as contract from '#shared/contracts/orders'
import { Router } from 'express'
import { handle } from './handle'

export function ordersRoutes(ctx: Context): Router {
  const router = Router()

  handle(router, contract.placeOrder, ({ actor, params, body }) => placeOrder(ctx, actor, params.awardId, body))
  handle(router, contract.listOrders, ({ actor }) => asActor(ctx, actor, (tx) => listOrders(tx, actor)))
  handle(router, contract.getOrder, ({ actor, params }) => asActor(ctx, actor, (tx) => readOrder(tx, actor, params.orderId)))
  handle(router, contract.orderPdf, ({ actor, params }) => downloadOrder(ctx, actor, params.orderId))

  handle(router, contract.listVendorOrders, ({ actor }) => asActor(ctx, actor, (tx) => listOrders(tx, actor)))
  handle(router, contract.getVendorOrder, ({ actor, params }) => asActor(ctx, actor, (tx) => readOrder(tx, actor, params.orderId)))
  handle(router, contract.vendorOrderPdf, ({ actor, params }) => downloadOrder(ctx, actor, params.orderId))
  handle(router, contract.acknowledgeOrder, ({ actor, params, body }) => asActor(ctx, actor, (tx) => acknowledgeOrder(tx, actor, params.orderId, body.answer, body.text)))

  return router
}
