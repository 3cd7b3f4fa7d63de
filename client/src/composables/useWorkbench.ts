import { computed, nextTick, onMounted, ref, type Ref } from 'vue'
import { useRoute, useRouter } from 'vue-router'
import type { Library } from '#shared/engine/library'
import type { SpecificationDocument } from '#shared/engine/specification'
import { documentPath, isWithin, valueAt } from '@/components/specifications/document-paths'
import { SECTIONS, sectionOf } from '@/components/specifications/sections'
import { provideDocumentEntry } from './useDocumentEntry'

interface Sources {
  document: Readonly<Ref<SpecificationDocument>>
  library: Readonly<Ref<Library>>
  problems: Readonly<Ref<ReadonlyMap<string, string>>>
  flags: Readonly<Ref<ReadonlyMap<string, readonly string[]>>>
  readonly: Readonly<Ref<boolean>>
  write: (changes: Readonly<Record<string, unknown>>) => void
}

const ENTRY = 'input, select, textarea, button.switch-button, .group-entry button'

/** The element of a place: its own, else the one of the whole it lies in. */
function elementOf(place: string): HTMLElement | null {
  const all = [...document.querySelectorAll<HTMLElement>('.form-pane [data-place]')]
  const named = (element: HTMLElement) => element.dataset.place!
  const inside = all.filter((element) => isWithin(named(element), place) || isWithin(place, named(element)))
  const distance = (element: HTMLElement) => Math.abs(named(element).length - place.length) + (isWithin(place, named(element)) ? 0 : 0.5)
  return inside.sort((a, b) => distance(a) - distance(b))[0] ?? null
}

/** The form's side of the workbench: which section is open, where a check leads, what is pointed at. */
export function useWorkbench({ document: source, library, problems, flags, readonly, write }: Sources) {
  const route = useRoute()
  const router = useRouter()
  const target = ref<{ path: string; turn: number } | null>(null)
  const marked = ref<string | null>(null)
  const known = SECTIONS.some(({ key }) => key === route.query.section)
  const open = ref(known ? String(route.query.section) : 'title')

  const section = computed({
    get: () => open.value,
    set: (key) => {
      open.value = key
      void router.replace({ query: { ...route.query, section: key } })
    },
  })

  /** Opens the section and row of a place and puts the cursor into its entry. */
  async function go(path: string) {
    section.value = sectionOf(path).key
    target.value = { path, turn: (target.value?.turn ?? 0) + 1 }
    await nextTick()
    await nextTick()
    const element = elementOf(path)
    const entry = element?.matches(ENTRY) ? element : element?.querySelector<HTMLElement>(ENTRY)
    element?.scrollIntoView({ block: 'center' })
    entry?.focus({ preventScroll: true })
    if (!element) return
    element.classList.add('led-to')
    setTimeout(() => element.classList.remove('led-to'), 1600)
  }

  // A check on another sheet leads here by its place.
  onMounted(() => {
    if (typeof route.query.go === 'string') void go(route.query.go)
  })

  provideDocumentEntry({ read: (path) => valueAt(source.value, documentPath(path)), write, document: source, library, readonly, problems, flags, target, marked })
  return { section, go, marked }
}
