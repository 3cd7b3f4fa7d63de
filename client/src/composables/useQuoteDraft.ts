import { computed, onScopeDispose, ref, shallowRef, watch } from 'vue'
import type { QuoteDraft } from '#shared/contracts/quotes'
import { ApiError } from '@/api/api-error'
import { fromDraftForm, toDraftForm } from '@/components/quotes/quote-draft'
import type { QuoteEntry } from '@/components/quotes/quote-entry'

type Form = QuoteDraft['form']

const PAUSE_MS = 1200
/** A server that could not be reached is tried again by itself. */
const RETRY_MS = 10_000

export type QuoteSaveState = 'untouched' | 'stored' | 'waiting' | 'storing' | 'conflict' | 'failed'

interface StoredDraft {
  version: number
  form: Form
  updatedAt: string
}

interface DraftServer {
  save: (version: number, form: Form) => Promise<{ draft: StoredDraft | null }>
  load: () => Promise<{ draft: StoredDraft | null }>
}

/** What is typed and not stored yet, with the stored version that it was made from. */
type Kept = Pick<StoredDraft, 'version' | 'form'>

function readKept(key: string): Kept | null {
  try {
    const kept = JSON.parse(sessionStorage.getItem(key) ?? 'null') as Kept | null
    return kept !== null && typeof kept.version === 'number' && typeof kept.form === 'object' && kept.form !== null ? kept : null
  } catch {
    return null
  }
}

function writeKept(key: string, kept: Kept): void {
  try {
    sessionStorage.setItem(key, JSON.stringify(kept))
  } catch {
    // Storage is full or switched off: the page itself still holds everything.
  }
}

const textOf = (form: Form) => JSON.stringify(Object.entries(form).sort(([a], [b]) => (a < b ? -1 : 1)))

/**
 * A quotation being typed: kept in this tab at once and on the server after a pause, each time from the version it
 * was made on, so that it is there after a reload, a new sign-in and on another device. When a colleague stored
 * meanwhile, a person decides.
 */
export function useQuoteDraft(start: QuoteEntry, initial: StoredDraft | null, place: { personId: string; rfqId: string }, server: DraftServer) {
  const key = `draft:${place.personId}:quotation:${place.rfqId}`
  const kept = readKept(key)
  const stored = initial && Object.keys(initial.form).length > 0 ? initial : null
  const beginning = fromDraftForm(stored?.form ?? {}, start)

  const entry = ref<QuoteEntry>(kept ? fromDraftForm(kept.form, start) : beginning)
  let version = kept?.version ?? initial?.version ?? 0
  const storedText = ref(textOf(toDraftForm(beginning)))
  const storedAt = ref(stored?.updatedAt ?? null)
  const state = ref<QuoteSaveState>(stored ? 'stored' : 'untouched')
  const failure = shallowRef<ApiError | null>(null)
  const form = computed(() => toDraftForm(entry.value))
  const dirty = computed(() => textOf(form.value) !== storedText.value)
  let timer: ReturnType<typeof setTimeout> | undefined
  let running: Promise<void> | null = null

  function settle(draft: StoredDraft, sent: Form) {
    version = draft.version
    storedText.value = textOf(sent)
    storedAt.value = draft.updatedAt
    failure.value = null
    if (dirty.value) return schedule()
    state.value = 'stored'
    sessionStorage.removeItem(key)
  }

  function fail(error: unknown) {
    failure.value = error instanceof ApiError ? error : new ApiError({ code: 'internal', message: 'Storing failed.' })
    state.value = failure.value.code === 'stale-version' ? 'conflict' : 'failed'
    if (failure.value.code === 'no-connection') timer = setTimeout(() => void sendNow(), RETRY_MS)
  }

  /** An answer that was lost on its way leaves our own form on the server: that is no conflict. */
  async function ownAfterAll(error: unknown, sent: Form): Promise<StoredDraft | null> {
    if (!(error instanceof ApiError) || error.code !== 'stale-version') return null
    const { draft } = await server.load().catch(() => ({ draft: null }))
    return draft && textOf(draft.form) === textOf(sent) ? draft : null
  }

  async function send() {
    const sent = form.value
    if (!dirty.value) {
      if (state.value === 'waiting') state.value = 'stored'
      return
    }
    state.value = 'storing'
    try {
      settle((await server.save(version, sent)).draft!, sent)
    } catch (error) {
      const own = await ownAfterAll(error, sent)
      if (own) settle(own, sent)
      else fail(error)
    }
  }

  /** One sending at a time; two would race for the same version. */
  async function sendNow() {
    clearTimeout(timer)
    await running
    if (state.value !== 'conflict') await (running = send().finally(() => (running = null)))
  }

  function schedule() {
    if (state.value === 'conflict') return
    state.value = 'waiting'
    clearTimeout(timer)
    timer = setTimeout(() => void sendNow(), PAUSE_MS)
  }

  /** Stores what is not stored yet, also what was typed meanwhile; true when everything is. */
  async function flush(): Promise<boolean> {
    do await sendNow()
    while (state.value === 'waiting')
    return state.value === 'stored' || state.value === 'untouched'
  }

  watch(form, (next) => {
    if (!dirty.value && state.value !== 'waiting') return
    writeKept(key, { version, form: next })
    schedule()
  })
  if (kept && dirty.value) schedule()
  onScopeDispose(() => {
    clearTimeout(timer)
    if (state.value === 'waiting') void sendNow()
  })

  /** What a colleague stored meanwhile shows at once where nothing of one's own is at stake. */
  function adopt(draft: StoredDraft | null) {
    const settled = state.value === 'stored' || state.value === 'untouched'
    if (!draft || draft.version <= version || dirty.value || !settled || Object.keys(draft.form).length === 0) return
    storedText.value = textOf(draft.form)
    entry.value = fromDraftForm(draft.form, start)
    settle(draft, form.value)
  }

  /** After a conflict: theirs, or mine over theirs. */
  async function resolve(choice: 'theirs' | 'mine') {
    try {
      const { draft } = await server.load()
      if (!draft) return
      version = draft.version
      storedText.value = textOf(draft.form)
      state.value = 'waiting'
      if (choice === 'mine') return void (await flush())
      entry.value = fromDraftForm(draft.form, start)
      settle(draft, form.value)
    } catch (error) {
      fail(error)
    }
  }

  return { entry, state, storedAt, failure, flush, adopt, resolve }
}
