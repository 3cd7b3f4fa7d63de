import { ref, watch, type Ref } from 'vue'
import { useRoute } from 'vue-router'
import { useSessionStore } from '@/stores/session'

const PREFIX = 'draft:'

function readStored(key: string): Record<string, unknown> | null {
  try {
    const stored: unknown = JSON.parse(sessionStorage.getItem(key) ?? 'null')
    return typeof stored === 'object' && stored !== null && !Array.isArray(stored) ? (stored as Record<string, unknown>) : null
  } catch {
    return null
  }
}

/** Only entries the form still has: a draft may be older than the program. */
function merged<T extends object>(initial: T, stored: Record<string, unknown> | null): T {
  if (!stored) return initial
  const kept = Object.entries(stored).filter(([key]) => key in initial)
  return { ...initial, ...(Object.fromEntries(kept) as Partial<T>) }
}

/**
 * Keeps what is typed into a form in this tab, per person, address and form, so that it survives a reload, a lost
 * connection and an ended session. Values must be plain data; leave passwords out. Call `clear` after success.
 */
export function useDraft<T extends object>(form: string, initial: () => T) {
  const person = useSessionStore().person?.id ?? 'nobody'
  const key = `${PREFIX}${person}:${useRoute().path}:${form}`

  const stored = readStored(key)
  const draft = ref(merged(initial(), stored)) as Ref<T>
  const restored = ref(stored !== null)

  function store(value: T) {
    try {
      sessionStorage.setItem(key, JSON.stringify(value))
    } catch {
      // Storage is full or switched off: the form itself still holds everything.
    }
  }

  let storing = true
  watch(draft, (value) => storing && store(value), { deep: true, flush: 'sync' })

  /** Back to the beginning; the emptied form is not stored until something is typed again. */
  function clear() {
    storing = false
    draft.value = initial()
    storing = true
    restored.value = false
    sessionStorage.removeItem(key)
  }

  return { draft, restored, clear }
}

/** Signing out on purpose leaves nothing typed behind. */
export function forgetDrafts(): void {
  const keys = Array.from({ length: sessionStorage.length }, (_, index) => sessionStorage.key(index))
  for (const key of keys) if (key?.startsWith(PREFIX)) sessionStorage.removeItem(key)
}
