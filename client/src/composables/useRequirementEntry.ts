import { computed, ref, shallowRef, toValue, type MaybeRefOrGetter, type WritableComputedRef } from 'vue'
import { requirementSheetSchema } from '#shared/contracts/specification-document'
import type { Library } from '#shared/engine/library'
import type { RequirementSheet } from '#shared/engine/specification'
import { valueAt, withValue } from '@/components/specifications/document-paths'
import { provideDocumentEntry } from './useDocumentEntry'

const NO_LIBRARY: Library = { cores: [], formers: [], materials: [], wires: [], tapes: [], sleeves: [] }

/** A requirement sheet on its own, before there is a document. */
export function useRequirementEntry(requirement: WritableComputedRef<RequirementSheet | null>, library: MaybeRefOrGetter<Library | undefined>) {
  const document = computed(() => ({ requirement: requirement.value }))
  const schemaProblems = shallowRef<ReadonlyMap<string, string>>(new Map())

  function write(changes: Readonly<Record<string, unknown>>) {
    requirement.value = Object.entries(changes).reduce((tree, [place, value]) => withValue(tree, place, value), document.value).requirement
    if (schemaProblems.value.size > 0) fits()
  }

  /** Says at the entries what does not go together; true when everything does. */
  function fits(): boolean {
    const parsed = requirementSheetSchema.safeParse(requirement.value)
    schemaProblems.value = new Map(parsed.success ? [] : parsed.error.issues.map(({ path, message }) => [`requirement.${path.join('.')}`, message]))
    return parsed.success
  }

  provideDocumentEntry({
    read: (path) => valueAt(document.value, path),
    write,
    document,
    library: computed(() => toValue(library) ?? NO_LIBRARY),
    readonly: ref(false),
    problems: schemaProblems,
    flags: ref(new Map()),
    target: ref(null),
    marked: ref(null),
  })
  return { schemaProblems, fits }
}
