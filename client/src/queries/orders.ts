import { defineQueryOptions, useMutation, useQueryCache } from '@pinia/colada'
import type { BodyOf } from '#shared/contracts/endpoint'
import * as orders from '#shared/contracts/orders'
import { call } from '@/api/call'
import { download } from '@/api/download'

const KEYS = {
  root: ['orders'] as const,
  list: ['orders', 'list'] as const,
  one: (orderId: string) => ['orders', 'one', orderId] as const,
}

/** `mine` is the vendor's side of the same documents. */
export const orderListQuery = defineQueryOptions(({ mine }: { mine: boolean }) => ({ key: KEYS.list, query: () => call(mine ? orders.listVendorOrders : orders.listOrders) }))

export const orderQuery = defineQueryOptions(({ orderId, mine }: { orderId: string; mine: boolean }) => ({
  key: KEYS.one(orderId),
  query: () => call(mine ? orders.getVendorOrder : orders.getOrder, { params: { orderId } }),
}))

export const useOrderPdf = ({ orderId, mine }: { orderId: string; mine: boolean }) =>
  useMutation({ mutation: () => download(mine ? orders.vendorOrderPdf : orders.orderPdf, { params: { orderId } }) })

export function usePlaceOrder(awardId: string) {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: orders.OrderInput) => call(orders.placeOrder, { params: { awardId }, body }),
    onSettled: () => {
      void cache.invalidateQueries({ key: ['awards'] })
      return cache.invalidateQueries({ key: KEYS.root })
    },
  })
}

export function useAcknowledgeOrder(orderId: string) {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: BodyOf<typeof orders.acknowledgeOrder>) => call(orders.acknowledgeOrder, { params: { orderId }, body }),
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
}
