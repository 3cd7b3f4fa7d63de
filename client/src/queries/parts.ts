import { defineQueryOptions, useMutation, useQueryCache } from '@pinia/colada'
import type { BodyOf } from '#shared/contracts/endpoint'
import type { PartDraft } from '#shared/contracts/part-rows'
import * as parts from '#shared/contracts/parts'
import type { Confidence, LibraryKind } from '#shared/engine/library'
import { call } from '@/api/call'
import { useUpload } from '@/composables/useUpload'

export interface PartKey {
  kind: LibraryKind
  id: string
}

export interface PartListFilter {
  kind: LibraryKind
  search: string
  family?: string
  confidence?: Confidence
  origin?: parts.PartOrigin
}

const PART_KEYS = {
  root: ['parts'] as const,
  list: ({ kind, search, family, confidence, origin }: PartListFilter) =>
    [...PART_KEYS.root, 'list', kind, search, family ?? '', confidence ?? '', origin ?? ''] as const,
  lists: () => [...PART_KEYS.root, 'list'] as const,
  ones: () => [...PART_KEYS.root, 'one'] as const,
  flags: () => [...PART_KEYS.root, 'flags'] as const,
  one: ({ kind, id }: PartKey) => [...PART_KEYS.root, 'one', kind, id] as const,
  library: (versions: 'current' | 'all') => [...PART_KEYS.root, 'library', versions] as const,
}

const LARGEST_PAGE = 500

/** Every row that passes the filter, page after page. */
async function allRows(filter: PartListFilter) {
  const first = await call(parts.listParts, { query: { ...filter, limit: LARGEST_PAGE } })
  const rows = [...first.rows]
  while (rows.length < first.total) {
    const next = await call(parts.listParts, { query: { ...filter, limit: LARGEST_PAGE, offset: rows.length } })
    if (next.rows.length === 0) break
    rows.push(...next.rows)
  }
  return { ...first, rows }
}

export const partListQuery = defineQueryOptions((filter: PartListFilter) => ({
  key: PART_KEYS.list(filter),
  query: () => allRows(filter),
  // The rows found before stay on the sheet while the next search runs.
  placeholderData: (previous: Awaited<ReturnType<typeof allRows>> | undefined) => previous,
}))

export const partQuery = defineQueryOptions((key: PartKey) => ({
  key: PART_KEYS.one(key),
  query: () => call(parts.getPart, { params: { kind: key.kind, id: key.id } }),
}))

/** The whole library for the engine: `all` when a document names versions that are no longer the newest. */
export const libraryQuery = defineQueryOptions((versions: 'current' | 'all') => ({
  key: PART_KEYS.library(versions),
  query: () => call(parts.getLibrary, { query: { versions } }),
  staleTime: 5 * 60_000,
}))

export function useCreatePart() {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: BodyOf<typeof parts.createPart>) => call(parts.createPart, { body }),
    onSettled: () => cache.invalidateQueries({ key: PART_KEYS.root }),
  })
}

export function useChangePart(key: PartKey) {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: BodyOf<typeof parts.changePart>) => call(parts.changePart, { params: { kind: key.kind, id: key.id }, body }),
    onSettled: () => cache.invalidateQueries({ key: PART_KEYS.root }),
  })
}

/** The rows that steer a search of this company. */
export const partFlagsQuery = defineQueryOptions({ key: PART_KEYS.flags(), query: () => call(parts.getPartFlags) })

export function useSetPartFlags() {
  const cache = useQueryCache()
  return useMutation({
    mutation: ({ kind, id, ...body }: PartKey & parts.PartFlags) => call(parts.setPartFlags, { params: { kind, id }, body }),
    // The library itself stays as it is.
    onSettled: () => Promise.all([PART_KEYS.flags(), PART_KEYS.lists(), PART_KEYS.ones()].map((key) => cache.invalidateQueries({ key }))),
  })
}

/** Reads a table and says what would become of it; nothing is stored. */
export function usePreviewImport() {
  const { progress, send, stop } = useUpload(parts.previewPartImport)
  const sending = useMutation({ mutation: ({ kind, file }: { kind: LibraryKind; file: File }) => send(file, { body: { kind } }) })
  return { progress, stop, sending }
}

export function useImportParts() {
  const cache = useQueryCache()
  const { progress, send, stop } = useUpload(parts.importParts)
  const sending = useMutation({
    mutation: ({ file, ...body }: BodyOf<typeof parts.importParts> & { file: File }) => send(file, { body }),
    onSettled: () => cache.invalidateQueries({ key: PART_KEYS.root }),
  })
  return { progress, stop, sending }
}

/** A form's entries as the contract takes them; what is missing or wrong the server says, field by field. */
export const asDraft = (entry: object) => entry as PartDraft
