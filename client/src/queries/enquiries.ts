import { defineQueryOptions, useMutation, useQueryCache } from '@pinia/colada'
import { acceptConfidentiality, declineRfq, getVendorRfq, listVendorRfqs, vendorDrawing, type NoBid, type VendorRfq } from '#shared/contracts/rfqs'
import { call } from '@/api/call'
import { download } from '@/api/download'

export const ENQUIRY_KEYS = {
  root: ['enquiries'] as const,
  list: ['enquiries', 'list'] as const,
  one: (rfqId: string) => ['enquiries', 'one', rfqId] as const,
}

export const enquiriesQuery = defineQueryOptions({ key: ENQUIRY_KEYS.list, query: () => call(listVendorRfqs) })

export const enquiryQuery = defineQueryOptions((rfqId: string) => ({
  key: ENQUIRY_KEYS.one(rfqId),
  query: () => call(getVendorRfq, { params: { rfqId } }),
}))

/** Accepting and declining answer with the enquiry as it stands afterwards. */
export function useAnswerEnquiry(rfqId: string) {
  const cache = useQueryCache()
  const params = { rfqId }
  const keep = (rfq: VendorRfq) => cache.setQueryData(ENQUIRY_KEYS.one(rfqId), rfq)
  const onSettled = () => cache.invalidateQueries({ key: ENQUIRY_KEYS.root })
  const accepting = useMutation({
    mutation: () => call(acceptConfidentiality, { params, body: { accepted: true } }),
    onSuccess: keep,
    onSettled,
  })
  const declining = useMutation({
    mutation: (body: NoBid) => call(declineRfq, { params, body }),
    onSuccess: keep,
    onSettled: async () => {
      await onSettled()
      await cache.invalidateQueries({ key: ['quotes', rfqId] })
    },
  })
  return { accepting, declining }
}

export const useDrawingDownload = (rfqId: string) => useMutation({ mutation: (lineId: string) => download(vendorDrawing, { params: { rfqId, lineId } }) })
