import type { Order } from '#shared/contracts/orders'
import { buildOpenedRfq, buildOrder, type OpenedRfq } from '../../support/build-opened'
import type { MatrixWorld, World } from './world'

const openedRfqs = new WeakMap<World, Promise<OpenedRfq>>()
const orders = new WeakMap<World, Promise<Order>>()

function once<T>(made: WeakMap<World, Promise<T>>, world: World, make: () => Promise<T>): Promise<T> {
  const present = made.get(world) ?? make()
  made.set(world, present)
  return present
}

/** One opened enquiry per world, for whatever leaves it as it is. Both vendors have quoted. */
export const openedRfq = ({ test }: MatrixWorld, world: World): Promise<OpenedRfq> => once(openedRfqs, world, () => buildOpenedRfq(test, world))

/** One order per world, placed with its first vendor. */
export const placedOrder = ({ test }: MatrixWorld, world: World): Promise<Order> => once(orders, world, () => buildOrder(test, world))
