import { computed, onScopeDispose, ref, watch } from 'vue'
import { useRoute, useRouter } from 'vue-router'
import { REVISION_STATES, SPECIFICATION_SORTS, type RevisionSummary } from '#shared/contracts/specifications'

const TYPING_PAUSE_MS = 250
export const PAGE_ROWS = 50

export type SpecificationSort = (typeof SPECIFICATION_SORTS)[number]

export interface SpecificationListState {
  search: string
  state: RevisionSummary['state'] | null
  topology: string | null
  mine: boolean
  /** Column, with a minus for falling order. */
  sort: SpecificationSort
  /** Counted from 1. */
  page: number
}

const NEWEST: SpecificationSort = '-updatedAt'
const textOf = (value: unknown) => (typeof value === 'string' ? value : '')

/** Search, filters, order and page of the list, kept in the address so that going back finds them again. */
export function useSpecificationFilter() {
  const route = useRoute()
  const router = useRouter()
  const filter = ref<SpecificationListState>({
    search: textOf(route.query.search),
    state: REVISION_STATES.find((state) => state === route.query.state) ?? null,
    topology: textOf(route.query.topology) || null,
    mine: route.query.owner === 'mine',
    sort: SPECIFICATION_SORTS.find((sort) => sort === route.query.sort) ?? NEWEST,
    page: Math.max(1, Math.trunc(Number(textOf(route.query.page))) || 1),
  })
  const applied = ref({ ...filter.value })
  let timer: ReturnType<typeof setTimeout> | undefined

  function apply() {
    applied.value = { ...filter.value }
    const { search, state, topology, mine, sort, page } = filter.value
    void router.replace({
      query: { ...(search && { search }), ...(state && { state }), ...(topology && { topology }), ...(mine && { owner: 'mine' }), ...(sort !== NEWEST && { sort }), ...(page > 1 && { page: String(page) }) },
    })
  }

  watch(filter, (next, before) => {
    clearTimeout(timer)
    if (next.search === before.search) apply()
    else timer = setTimeout(apply, TYPING_PAUSE_MS)
  })
  onScopeDispose(() => clearTimeout(timer))

  /** A change of what is searched begins on the first page again. */
  const update = (part: Partial<SpecificationListState>) => (filter.value = { ...filter.value, page: 1, ...part })

  const query = computed(() => {
    const { search, state, topology, mine, sort, page } = applied.value
    return { search: search.trim(), state: state ?? undefined, topology: topology ?? undefined, owner: mine ? ('mine' as const) : undefined, sort, offset: (page - 1) * PAGE_ROWS, limit: PAGE_ROWS }
  })
  return { filter, query, update }
}
