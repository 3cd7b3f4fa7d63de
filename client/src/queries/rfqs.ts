import { defineQueryOptions, useMutation, useQueryCache } from '@pinia/colada'
import type { BodyOf } from '#shared/contracts/endpoint'
import { listVendors } from '#shared/contracts/people'
import { listQuotes, quoteFile } from '#shared/contracts/quotes'
import * as rfqs from '#shared/contracts/rfqs'
import type { Rfq, RfqInput } from '#shared/contracts/rfqs'
import { listReleases } from '#shared/contracts/specifications'
import { call } from '@/api/call'
import { download } from '@/api/download'

const KEYS = {
  root: ['rfqs'] as const,
  one: (rfqId: string) => ['rfqs', rfqId] as const,
  quotes: (rfqId: string) => ['rfqs', rfqId, 'quotes'] as const,
  choices: ['rfqs', 'choices'] as const,
}

export const rfqsQuery = defineQueryOptions({ key: KEYS.root, query: () => call(rfqs.listRfqs) })

export const rfqQuery = defineQueryOptions((rfqId: string) => ({ key: KEYS.one(rfqId), query: () => call(rfqs.getRfq, { params: { rfqId } }) }))

/** Opened quotations; before the opening the list is empty whatever lies in it. */
export const rfqQuotesQuery = defineQueryOptions((rfqId: string) => ({ key: KEYS.quotes(rfqId), query: () => call(listQuotes, { params: { rfqId } }) }))

/** What an enquiry is made from: released revisions in force, and vendors that may be asked. */
export const rfqChoicesQuery = defineQueryOptions({
  key: KEYS.choices,
  query: async () => {
    const [releases, vendors] = await Promise.all([call(listReleases), call(listVendors)])
    return { releases: releases.filter(({ current }) => current), vendors }
  },
})

export function useWriteRfq() {
  const cache = useQueryCache()
  return useMutation({
    mutation: ({ rfqId, version, input }: { rfqId: string; version: number; input: RfqInput }) =>
      rfqId === '' ? call(rfqs.createRfq, { body: input }) : call(rfqs.updateRfq, { params: { rfqId }, body: { ...input, version } }),
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
}

/** What a person does to an enquiry on its page; each answers the enquiry as it then is. */
export function useMoveRfq(rfqId: string) {
  const cache = useQueryCache()
  const params = { rfqId }
  const options = <V>(mutation: (value: V) => Promise<Rfq>) => ({
    mutation,
    onSuccess: (rfq: Rfq) => cache.setQueryData(KEYS.one(rfqId), rfq),
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
  return {
    issue: useMutation(options((version: number) => call(rfqs.issueRfq, { params, body: { version } }))),
    extend: useMutation(options((body: BodyOf<typeof rfqs.extendRfq>) => call(rfqs.extendRfq, { params, body }))),
    cancel: useMutation(options((reason: string) => call(rfqs.cancelRfq, { params, body: { reason } }))),
    askOpening: useMutation(options((_: void) => call(rfqs.askOpening, { params }))),
    open: useMutation(options((_: void) => call(rfqs.openRfq, { params }))),
  }
}

export const useQuoteFile = (rfqId: string) => useMutation({ mutation: (quoteId: string) => download(quoteFile, { params: { rfqId, quoteId } }) })
