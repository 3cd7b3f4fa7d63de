import { computed, onScopeDispose, ref, watch } from 'vue'
import { useRoute, useRouter } from 'vue-router'
import { REVISION_STATES, type RevisionSummary } from '#shared/contracts/specifications'

const TYPING_PAUSE_MS = 250

export interface SpecificationListState {
  search: string
  state: RevisionSummary['state'] | null
  /** Column, with a minus for descending. */
  sort: string
}

const textOf = (value: unknown) => (typeof value === 'string' ? value : '')

/** Search, filter and order of the list, kept in the address so that going back finds them again. */
export function useSpecificationFilter() {
  const route = useRoute()
  const router = useRouter()
  const filter = ref<SpecificationListState>({
    search: textOf(route.query.search),
    state: REVISION_STATES.find((state) => state === route.query.state) ?? null,
    sort: textOf(route.query.sort) || '-updatedAt',
  })
  const applied = ref({ ...filter.value })
  let timer: ReturnType<typeof setTimeout> | undefined

  function apply() {
    applied.value = { ...filter.value }
    const { search, state, sort } = filter.value
    void router.replace({ query: { ...(search && { search }), ...(state && { state }), ...(sort !== '-updatedAt' && { sort }) } })
  }

  watch(filter, (next, before) => {
    clearTimeout(timer)
    if (next.search === before.search) apply()
    else timer = setTimeout(apply, TYPING_PAUSE_MS)
  })
  onScopeDispose(() => clearTimeout(timer))

  const query = computed(() => ({ search: applied.value.search.trim(), state: applied.value.state ?? undefined }))
  return { filter, query }
}
