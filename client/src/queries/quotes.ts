import { defineQueryOptions, useMutation, useQueryCache } from '@pinia/colada'
import type { ResponseOf } from '#shared/contracts/endpoint'
import * as quotes from '#shared/contracts/quotes'
import type { QuoteDraft, QuoteInput } from '#shared/contracts/quotes'
import { call } from '@/api/call'
import { download } from '@/api/download'
import { useUpload } from '@/composables/useUpload'
import { ENQUIRY_KEYS } from './enquiries'

export type OwnQuote = ResponseOf<typeof quotes.getOwnQuote>

const QUOTE_KEYS = { own: (rfqId: string) => ['quotes', rfqId] as const }

export const ownQuoteQuery = defineQueryOptions((rfqId: string) => ({
  key: QUOTE_KEYS.own(rfqId),
  query: () => call(quotes.getOwnQuote, { params: { rfqId } }),
}))

/** Where the typed form is kept between reloads and devices. */
export function useDraftServer(rfqId: string) {
  const cache = useQueryCache()
  const params = { rfqId }
  const keep = (own: OwnQuote) => {
    cache.setQueryData(QUOTE_KEYS.own(rfqId), own)
    return own
  }
  return {
    save: (version: number, form: QuoteDraft['form']) => call(quotes.saveQuoteDraft, { params, body: { version, form } }).then(keep),
    load: () => call(quotes.getOwnQuote, { params }).then(keep),
  }
}

export function useQuoteFile(rfqId: string) {
  const cache = useQueryCache()
  const keep = (own: OwnQuote) => cache.setQueryData(QUOTE_KEYS.own(rfqId), own)
  const { progress, send, stop } = useUpload(quotes.uploadQuoteFile)
  const params = { rfqId }
  const sending = useMutation({ mutation: (file: File) => send(file, { params }), onSuccess: keep })
  const removing = useMutation({ mutation: () => call(quotes.removeQuoteFile, { params }), onSuccess: keep })
  const fetching = useMutation({ mutation: (fileId: string) => download(quotes.ownQuoteFile, { params: { rfqId, fileId } }) })
  return { progress, stop, sending, removing, fetching }
}

export function useSubmitQuote(rfqId: string) {
  const cache = useQueryCache()
  const params = { rfqId }
  const keep = (own: OwnQuote) => cache.setQueryData(QUOTE_KEYS.own(rfqId), own)
  const onSettled = () => cache.invalidateQueries({ key: ENQUIRY_KEYS.root })
  const submitting = useMutation({ mutation: (body: QuoteInput) => call(quotes.submitQuote, { params, body }), onSuccess: keep, onSettled })
  const withdrawing = useMutation({
    mutation: (quoteId: string) => call(quotes.withdrawQuote, { params: { rfqId, quoteId } }),
    onSuccess: keep,
    onSettled,
  })
  return { submitting, withdrawing }
}
