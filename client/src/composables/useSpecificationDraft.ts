import { computed, onScopeDispose, ref, shallowRef, watch } from 'vue'
import { specificationDocumentSchema } from '#shared/contracts/specification-document'
import type { Revision } from '#shared/contracts/specifications'
import type { SpecificationDocument } from '#shared/engine/specification'
import { same } from '#shared/workflow/document-rows'
import { ApiError } from '@/api/api-error'
import { documentPath, placeOf, withValue } from '@/components/specifications/document-paths'
import { keepInStep } from '@/components/specifications/keep-in-step'
import { forgetKept, keepLocally, readKept } from './kept-document'
import { useHistory } from './useHistory'
import { useMerge } from './useMerge'

const PAUSE_MS = 1200
/** A server that could not be reached is tried again by itself. */
const RETRY_MS = 10_000

export type SaveState = 'stored' | 'waiting' | 'storing' | 'not-fitting' | 'conflict' | 'failed'

interface DraftServer {
  save: (version: number, document: SpecificationDocument) => Promise<Revision>
  load: () => Promise<Revision>
}

/**
 * One draft being worked on: every change is kept in this tab at once and stored on the server after a pause, each
 * from the version it was made on. What somebody else stored meanwhile is brought together with it, field by field;
 * where both changed one field, a person decides.
 */
export function useSpecificationDraft(initial: Revision, personId: string, server: DraftServer) {
  const kept = readKept(personId, initial.id)
  const history = useHistory<SpecificationDocument>(kept?.document ?? initial.document)
  const document = history.current
  const version = ref(kept?.version ?? initial.version)
  /** What the server holds in `version`. */
  const stored = shallowRef<SpecificationDocument>(kept?.base ?? initial.document)
  const storedAt = ref(initial.updatedAt)
  const state = ref<SaveState>('stored')
  const failure = shallowRef<ApiError | null>(null)
  const schemaProblems = shallowRef<ReadonlyMap<string, string>>(new Map())
  const dirty = computed(() => document.value !== stored.value)
  const merge = useMerge(stored, document)
  let timer: ReturnType<typeof setTimeout> | undefined
  let running: Promise<void> | null = null

  function write(changes: Readonly<Record<string, unknown>>) {
    const all = keepInStep(document.value, changes)
    const next = Object.entries(all).reduce((tree, [place, value]) => withValue(tree, documentPath(place), value), document.value)
    history.commit(next, Object.keys(changes).sort().join())
  }

  function fits(): boolean {
    const parsed = specificationDocumentSchema.safeParse(document.value)
    schemaProblems.value = new Map(parsed.success ? [] : parsed.error.issues.map(({ path, message }) => [placeOf(path.join('.')), message]))
    return parsed.success
  }

  function settle(result: Revision, sent: SpecificationDocument) {
    version.value = result.version
    stored.value = sent
    storedAt.value = result.updatedAt
    failure.value = null
    if (dirty.value) schedule()
    else done()
  }

  function done() {
    state.value = 'stored'
    schemaProblems.value = new Map()
    forgetKept(personId, initial.id)
  }

  function fail(error: unknown) {
    failure.value = error instanceof ApiError ? error : new ApiError({ code: 'internal', message: String(error) })
    state.value = 'failed'
    if (failure.value.code === 'no-connection') timer = setTimeout(() => void sendNow(), RETRY_MS)
    for (const [path, sentence] of Object.entries(failure.value.fields)) schemaProblems.value = new Map([...schemaProblems.value, [placeOf(path), sentence]])
  }

  async function send() {
    if (!dirty.value) return done()
    if (!fits()) return void (state.value = 'not-fitting')
    const sent = document.value
    state.value = 'storing'
    try {
      settle(await server.save(version.value, sent), sent)
    } catch (error) {
      if (error instanceof ApiError && error.code === 'stale-version') await meet()
      else fail(error)
    }
  }

  /** Somebody stored meanwhile: what does not touch the same field comes together by itself. */
  async function meet() {
    try {
      merge.open(await server.load())
      if (merge.conflicts.value.length === 0) bringTogether()
      else state.value = 'conflict'
    } catch (error) {
      fail(error)
    }
  }

  /** Goes on from their version with both works in it; what is mine of it is stored next. */
  function bringTogether() {
    const { theirs, change } = merge.close()
    version.value = theirs.version
    storedAt.value = theirs.updatedAt
    stored.value = theirs.document
    history.rebase(change)
    if (same(document.value, theirs.document)) stored.value = document.value
    keepLocally(personId, initial.id, { version: version.value, base: stored.value, document: document.value })
    state.value = 'waiting'
    schedule()
  }

  /** One sending at a time; two would race for the same version. */
  async function sendNow() {
    clearTimeout(timer)
    await running
    if (state.value !== 'conflict') await (running = send().finally(() => (running = null)))
  }

  /** Stores what is not stored yet, also what was typed meanwhile; true when everything is. */
  async function flush(): Promise<boolean> {
    do await sendNow()
    while (state.value === 'waiting')
    return state.value === 'stored'
  }

  function schedule() {
    if (state.value === 'conflict') return
    state.value = 'waiting'
    clearTimeout(timer)
    timer = setTimeout(() => void sendNow(), PAUSE_MS)
  }

  watch(document, (next) => {
    if (next === stored.value) return
    keepLocally(personId, initial.id, { version: version.value, base: stored.value, document: next })
    schedule()
  })
  if (kept) schedule()
  onScopeDispose(() => clearTimeout(timer))

  /** After a conflict, when each field has its answer. */
  async function resolve() {
    bringTogether()
    await flush()
  }

  const { commit, undo, redo, canUndo, canRedo } = history
  return { document, stored, version, state, storedAt, failure, schemaProblems, dirty, restored: kept !== null, write, commit, undo, redo, canUndo, canRedo, flush, resolve, merge }
}
