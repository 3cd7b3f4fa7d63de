import { defineQueryOptions, useMutation, useQueryCache } from '@pinia/colada'
import type { BodyOf } from '#shared/contracts/endpoint'
import { getRfq, listRfqs } from '#shared/contracts/rfqs'
import * as samples from '#shared/contracts/samples'
import type { SampleReport, SampleSet } from '#shared/contracts/samples'
import type { Answer } from '#shared/measurement/model'
import { call } from '@/api/call'
import { download } from '@/api/download'
import { useUpload } from '@/composables/useUpload'

const KEYS = {
  root: ['samples'] as const,
  list: (rfqId: string) => ['samples', 'list', rfqId] as const,
  one: (requestId: string) => ['samples', 'one', requestId] as const,
  set: (setId: string) => ['samples', 'set', setId] as const,
  opened: ['samples', 'opened-rfqs'] as const,
  rfq: (rfqId: string) => ['samples', 'rfq', rfqId] as const,
}

/** `mine` is the vendor's side of the same documents. */
export const sampleListQuery = defineQueryOptions(({ mine, rfqId }: { mine: boolean; rfqId?: string }) => ({
  key: KEYS.list(rfqId ?? ''),
  query: () => (mine ? call(samples.listVendorSamples) : call(samples.listSampleRequests, { query: { rfqId } })),
}))

export const sampleQuery = defineQueryOptions(({ requestId, mine }: { requestId: string; mine: boolean }) => ({
  key: KEYS.one(requestId),
  query: () => call(mine ? samples.getVendorSample : samples.getSampleRequest, { params: { requestId } }),
}))

export const sampleSetQuery = defineQueryOptions(({ setId, mine }: { setId: string; mine: boolean }) => ({
  key: KEYS.set(setId),
  query: () => call(mine ? samples.getVendorSet : samples.getSampleSet, { params: { setId } }),
}))

/** Enquiries whose vendors can be asked for samples. */
export const openedRfqsQuery = defineQueryOptions({
  key: KEYS.opened,
  query: async () => [...(await call(listRfqs, { query: { state: 'opened' } })), ...(await call(listRfqs, { query: { state: 'awarded' } }))],
})

export const sampleRfqQuery = defineQueryOptions((rfqId: string) => ({ key: KEYS.rfq(rfqId), query: () => call(getRfq, { params: { rfqId } }) }))

export function useRequestSamples() {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: samples.SampleRequestInput) => call(samples.requestSamples, { body }),
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
}

export function useCancelSamples(requestId: string) {
  const cache = useQueryCache()
  return useMutation({
    mutation: (reason: string) => call(samples.cancelSampleRequest, { params: { requestId }, body: { reason } }),
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
}

export function useDisposeSet(setId: string) {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: BodyOf<typeof samples.disposeSet>) => call(samples.disposeSet, { params: { setId }, body }),
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
}

export const useTemplate = (requestId: string) => useMutation({ mutation: () => download(samples.sampleTemplate, { params: { requestId } }) })

export const useSampleFile = ({ setId, mine }: { setId: string; mine: boolean }) =>
  useMutation({ mutation: (fileId: string) => download(mine ? samples.vendorSampleFile : samples.sampleFile, { params: { setId, fileId } }) })

export function useUploadReport(requestId: string) {
  const cache = useQueryCache()
  const { progress, send, stop } = useUpload(samples.uploadReport)
  const sending = useMutation({
    mutation: (file: File) => send(file, { params: { requestId } }),
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
  return { progress, stop, sending }
}

export function useUploadEvidence(setId: string) {
  const cache = useQueryCache()
  const { progress, send, stop } = useUpload(samples.uploadEvidence)
  const sending = useMutation({
    mutation: (file: File) => send(file, { params: { setId } }),
    onSettled: () => cache.invalidateQueries({ key: KEYS.set(setId) }),
  })
  return { progress, stop, sending }
}

/** Changes of a report that is not sent yet; each names the version it was made from. */
export function useReportChanges(setId: string) {
  const cache = useQueryCache()
  const keep = (set: SampleSet) => cache.setQueryData(KEYS.set(setId), set)
  const params = { setId }
  const answering = useMutation({
    mutation: (body: { version: number; answers: Answer[] }) => call(samples.answerQuestions, { params, body }),
    onSuccess: keep,
  })
  const declaring = useMutation({
    mutation: (body: { version: number; report: SampleReport }) => call(samples.saveReport, { params, body }),
    onSuccess: keep,
  })
  const confirming = useMutation({
    mutation: (version: number) => call(samples.confirmSet, { params, body: { version } }),
    onSuccess: keep,
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
  return { answering, declaring, confirming }
}
