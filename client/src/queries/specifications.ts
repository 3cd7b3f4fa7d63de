import { defineQueryOptions, useMutation, useQueryCache } from '@pinia/colada'
import type { BodyOf, QueryOf } from '#shared/contracts/endpoint'
import * as contract from '#shared/contracts/specifications'
import type { Revision } from '#shared/contracts/specifications'
import type { Sheet } from '#shared/drawing/model'
import type { Evaluation } from '#shared/engine/evaluation'
import { call } from '@/api/call'
import { download } from '@/api/download'

export interface RevisionKey {
  specificationId: string
  revisionId: string
}

const KEYS = {
  root: ['specifications'] as const,
  list: (filter: string) => ['specifications', 'list', filter] as const,
  one: (specificationId: string) => ['specifications', 'one', specificationId] as const,
  revision: ({ specificationId, revisionId }: RevisionKey) => ['specifications', 'revision', specificationId, revisionId] as const,
  comments: ({ revisionId }: RevisionKey) => ['specifications', 'comments', revisionId] as const,
  use: (specificationId: string) => ['specifications', 'use', specificationId] as const,
  compared: (ids: readonly string[]) => ['specifications', 'compared', ...ids] as const,
  releases: ['specifications', 'releases'] as const,
  // Apart from the rest: nothing that happens to a part makes it old.
  results: ({ revisionId }: RevisionKey) => ['released-results', revisionId] as const,
}

export type SpecificationFilter = Partial<QueryOf<typeof contract.listSpecifications>>

export const specificationListQuery = defineQueryOptions((filter: SpecificationFilter) => ({
  key: KEYS.list(JSON.stringify(filter)),
  query: () => call(contract.listSpecifications, { query: filter }),
  // The rows found before stay on the sheet while the next search runs.
  placeholderData: (previous: contract.SpecificationPage | undefined) => previous,
}))

/** Released revisions, to copy from or to enquire about. */
export const releasesQuery = defineQueryOptions(() => ({
  key: KEYS.releases,
  query: () => call(contract.listReleases),
}))

export const specificationQuery = defineQueryOptions((specificationId: string) => ({
  key: KEYS.one(specificationId),
  query: () => call(contract.getSpecification, { params: { specificationId } }),
}))

export const revisionQuery = defineQueryOptions((key: RevisionKey) => ({
  key: KEYS.revision(key),
  query: () => call(contract.getRevision, { params: key }),
  // A draft is worked on here and by others: what was seen before is never taken for the present.
  staleTime: 0,
}))

/** What rests on the releases of a part. */
export const specificationUseQuery = defineQueryOptions((specificationId: string) => ({
  key: KEYS.use(specificationId),
  query: () => call(contract.specificationUse, { params: { specificationId } }),
  staleTime: 0,
}))

/** Two revisions with the evaluations that were sealed with them. */
export const comparedQuery = defineQueryOptions(({ specificationId, summaries }: { specificationId: string; summaries: readonly contract.RevisionSummary[] }) => ({
  key: KEYS.compared(summaries.map(({ id }) => id)),
  query: async () => {
    const keys = summaries.map(({ id }) => ({ specificationId, revisionId: id }))
    const revisions = await Promise.all(keys.map(loadRevision))
    const released = keys.filter((_, index) => summaries[index]!.release !== null)
    const results = await Promise.all(released.map(async (key) => [key.revisionId, (await call(contract.releasedResults, { params: key })).evaluation as unknown as Evaluation] as const))
    return { revisions, sealed: new Map(results) }
  },
  staleTime: 0,
}))

/** What was sealed at release. It never changes. */
export const releasedResultsQuery = defineQueryOptions((key: RevisionKey) => ({
  key: KEYS.results(key),
  query: async () => {
    const { evaluation, sheets } = await call(contract.releasedResults, { params: key })
    return { evaluation: evaluation as unknown as Evaluation, sheets: sheets as unknown as Sheet[] }
  },
  staleTime: Infinity,
}))

export function useCreateSpecification() {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: BodyOf<typeof contract.createSpecification>) => call(contract.createSpecification, { body }),
    onSettled: () => cache.invalidateQueries({ key: KEYS.root }),
  })
}

/** Storing does not fetch anything again: the workbench holds what it sent. */
export const saveDraft = (params: RevisionKey, body: BodyOf<typeof contract.saveDraft>): Promise<Revision> => call(contract.saveDraft, { params, body })
export const loadRevision = (params: RevisionKey): Promise<Revision> => call(contract.getRevision, { params })

export const loadSpecification = (specificationId: string): Promise<contract.Specification> => call(contract.getSpecification, { params: { specificationId } })

/** What moves a revision on; everything about it is fetched again afterwards, a refusal included. */
export function useRevisionActions(params: () => RevisionKey) {
  const cache = useQueryCache()
  const moving = <V>(mutation: (value: V) => Promise<Revision>) => useMutation({ mutation, onSettled: () => cache.invalidateQueries({ key: KEYS.root }) })
  return {
    submit: moving((version: number) => call(contract.submitDraft, { params: params(), body: { version } })),
    sendBack: moving((reason: string) => call(contract.returnDraft, { params: params(), body: { reason } })),
    letPass: moving((body: BodyOf<typeof contract.overrideCheck>) => call(contract.overrideCheck, { params: params(), body })),
    release: moving((version: number) => call(contract.releaseRevision, { params: params(), body: { version } })),
    withdraw: moving((reason: string) => call(contract.withdrawRevision, { params: params(), body: { reason } })),
    nextDraft: moving((_: void) => call(contract.createDraft, { params: { specificationId: params().specificationId } })),
  }
}

export const useSheetsDownload = () => useMutation({ mutation: (params: RevisionKey) => download(contract.draftPdf, { params }) })
export const useOutlineDownload = () => useMutation({ mutation: (params: RevisionKey) => download(contract.outlineDxf, { params }) })
export const useDocumentDownload = () => useMutation({ mutation: (params: RevisionKey) => download(contract.releasedDocument, { params }) })

/** Leaving the workbench shows the revision as it is stored. */
export function useForgetRevisions() {
  const cache = useQueryCache()
  return () => cache.invalidateQueries({ key: KEYS.root })
}

export const commentsQuery = defineQueryOptions((key: RevisionKey) => ({
  key: KEYS.comments(key),
  query: () => call(contract.listComments, { params: key }),
  staleTime: 0,
}))

/** Both answer the whole list, which takes the place of the one fetched before. */
export function useCommentActions(key: RevisionKey) {
  const cache = useQueryCache()
  const onSuccess = (comments: contract.SpecificationComment[]) => cache.setQueryData(KEYS.comments(key), comments)
  return {
    write: useMutation({ mutation: (body: BodyOf<typeof contract.writeComment>) => call(contract.writeComment, { params: key, body }), onSuccess }),
    settle: useMutation({ mutation: ({ commentId, settled }: { commentId: string; settled: boolean }) => call(contract.settleComment, { params: { ...key, commentId }, body: { settled } }), onSuccess }),
  }
}

/** The whole calculation with its working, as PDF. */
export const useCalculationDownload = () => useMutation({ mutation: (params: RevisionKey) => download(contract.calculationPdf, { params }) })
