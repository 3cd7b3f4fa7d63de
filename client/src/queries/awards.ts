import { defineQueryOptions, useMutation, useQueryCache } from '@pinia/colada'
import * as awards from '#shared/contracts/awards'
import type { BodyOf } from '#shared/contracts/endpoint'
import { listQuotes } from '#shared/contracts/quotes'
import { getRfq, listRfqs } from '#shared/contracts/rfqs'
import { call } from '@/api/call'

const KEYS = {
  root: ['awards'] as const,
  list: ['awards', 'list'] as const,
  one: (awardId: string) => ['awards', 'one', awardId] as const,
  /** What a comparison starts from. */
  offers: (rfqId: string) => ['awards', 'offers', rfqId] as const,
  opened: ['awards', 'opened-rfqs'] as const,
}

export const awardListQuery = defineQueryOptions({ key: KEYS.list, query: () => call(awards.listAwards, { query: {} }) })

export const awardQuery = defineQueryOptions((awardId: string) => ({ key: KEYS.one(awardId), query: () => call(awards.getAward, { params: { awardId } }) }))

/** Enquiries whose quotations are open and not decided about. */
export const undecidedRfqsQuery = defineQueryOptions({ key: KEYS.opened, query: () => call(listRfqs, { query: { state: 'opened' } }) })

export const offersQuery = defineQueryOptions((rfqId: string) => ({
  key: KEYS.offers(rfqId),
  query: async () => {
    const [rfq, quotes] = await Promise.all([call(getRfq, { params: { rfqId } }), call(listQuotes, { params: { rfqId } })])
    return { rfq, quotes: quotes.filter(({ state }) => state === 'submitted') }
  },
}))

export const useCompareOffers = (rfqId: string) =>
  useMutation({ mutation: (basis: awards.ComparisonBasis) => call(awards.compareOffers, { params: { rfqId }, body: { basis } }) })

export function useProposeAward(rfqId: string) {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: BodyOf<typeof awards.proposeAward>) => call(awards.proposeAward, { params: { rfqId }, body }),
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
}

export function useDecideAward(awardId: string) {
  const cache = useQueryCache()
  const onSettled = () => cache.invalidateQueries({ key: KEYS.root })
  const params = { awardId }
  const approving = useMutation({ mutation: (body: BodyOf<typeof awards.approveAward>) => call(awards.approveAward, { params, body }), onSettled })
  const rejecting = useMutation({ mutation: (reason: string) => call(awards.rejectAward, { params, body: { reason } }), onSettled })
  return { approving, rejecting }
}
