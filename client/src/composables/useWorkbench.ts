import { computed, nextTick, onMounted, onScopeDispose, ref, type Ref } from 'vue'
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
  writeBlock: () => Promise<void>
  comments: Readonly<Ref<ReadonlyMap<string, number>>>
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
export function useWorkbench({ document: source, library, problems, flags, readonly, write, writeBlock, comments }: Sources) {
  const route = useRoute()
  const router = useRouter()
  const target = ref<{ path: string; turn: number } | null>(null)
  const marked = ref<string | null>(null)
  /** The place that was last under the focus or the pointer's press, for a comment on it. */
  const place = ref('')
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

  /** Remembers the innermost place that an event of the form comes from. */
  function notice(event: Event) {
    const element = event.target instanceof Element ? event.target.closest<HTMLElement>('.form-pane [data-place]') : null
    if (element) place.value = element.dataset.place!.replace(/\.value(\..*)?$/, '')
  }
  onMounted(() => ['focusin', 'click'].forEach((kind) => document.addEventListener(kind, notice)))
  onScopeDispose(() => ['focusin', 'click'].forEach((kind) => document.removeEventListener(kind, notice)))

  // A check on another sheet leads here by its place.
  onMounted(() => {
    if (typeof route.query.go === 'string') void go(route.query.go)
  })

  provideDocumentEntry({ read: (path) => valueAt(source.value, documentPath(path)), write, document: source, library, readonly, problems, flags, target, marked, writeBlock, comments })
  return { section, go, marked, place }
}
