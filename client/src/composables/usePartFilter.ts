import { computed, onScopeDispose, ref, toValue, watch, type MaybeRefOrGetter } from 'vue'
import { useRoute, useRouter } from 'vue-router'
import type { PartOrigin } from '#shared/contracts/parts'
import { CONFIDENCES } from '#shared/contracts/part-rows'
import type { Confidence, LibraryKind } from '#shared/engine/library'

export interface PartFilter {
  search: string
  family: string | null
  confidence: Confidence | null
  origin: PartOrigin | null
}

const TYPING_PAUSE_MS = 250
const ORIGINS: readonly PartOrigin[] = ['shared', 'company']

const oneOf = <T extends string>(values: readonly T[], value: unknown): T | null => values.find((known) => known === value) ?? null
const textOf = (value: unknown) => (typeof value === 'string' ? value : '')

/** The filter of the list, kept in the address so that going back finds it again; typing waits for a pause. */
export function usePartFilter(kind: MaybeRefOrGetter<LibraryKind>) {
  const route = useRoute()
  const router = useRouter()
  const fromAddress = (): PartFilter => ({
    search: textOf(route.query.search),
    family: textOf(route.query.family) || null,
    confidence: oneOf(CONFIDENCES, route.query.confidence),
    origin: oneOf(ORIGINS, route.query.origin),
  })

  const filter = ref(fromAddress())
  const applied = ref(fromAddress())
  let timer: ReturnType<typeof setTimeout> | undefined

  function apply() {
    applied.value = { ...filter.value }
    const entries = Object.entries(filter.value).filter(([, value]) => value !== null && value !== '')
    void router.replace({ query: Object.fromEntries(entries) })
  }

  watch(filter, (next, before) => {
    clearTimeout(timer)
    if (next.search === before.search) apply()
    else timer = setTimeout(apply, TYPING_PAUSE_MS)
  })
  watch(
    () => toValue(kind),
    () => {
      clearTimeout(timer)
      filter.value = fromAddress()
      applied.value = fromAddress()
    },
  )
  onScopeDispose(() => clearTimeout(timer))

  const query = computed(() => ({
    kind: toValue(kind),
    search: applied.value.search.trim(),
    family: applied.value.family ?? undefined,
    confidence: applied.value.confidence ?? undefined,
    origin: applied.value.origin ?? undefined,
  }))
  return { filter, query }
}
