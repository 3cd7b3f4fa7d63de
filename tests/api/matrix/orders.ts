import { buildApproved, buildOpenedRfq, buildOrder, orderInput } from '../../support/build-opened'
import type { CallParts } from '../../support/test-app'
import type { Expectation, FeatureExpectations } from './expectation'
import { placedOrder } from './opened'
import type { MatrixWorld, World } from './world'

const both = (parts: (matrix: MatrixWorld, world: World) => Promise<CallParts>): Expectation => ({
  own: (matrix) => parts(matrix, matrix.own),
  foreign: (matrix) => parts(matrix, matrix.foreign),
})

const placed = both(async (matrix, world) => ({ params: { orderId: (await placedOrder(matrix, world)).id } }))
const list: Expectation = {
  own: async (matrix) => {
    await placedOrder(matrix, matrix.foreign)
    return {}
  },
}

export const orders: FeatureExpectations = {
  placeOrder: both(async (matrix, world) => {
    const award = await buildApproved(matrix.test, world, await buildOpenedRfq(matrix.test, world))
    return { params: { awardId: award.id }, body: orderInput() }
  }),
  listOrders: list,
  getOrder: placed,
  orderPdf: placed,
  listVendorOrders: list,
  getVendorOrder: placed,
  vendorOrderPdf: placed,
  acknowledgeOrder: both(async (matrix, world) => ({ params: { orderId: (await buildOrder(matrix.test, world)).id }, body: { answer: 'accepted', text: '' } })),
}
