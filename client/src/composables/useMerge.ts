import { computed, shallowRef, type Ref } from 'vue'
import type { Revision } from '#shared/contracts/specifications'
import type { SpecificationDocument } from '#shared/engine/specification'
import { mergeDocuments, type MergeConflict, type Side } from '#shared/workflow/merge-documents'

/** Two works on one draft: what only one of both changed is settled, the rest waits for a choice per field. */
export function useMerge(base: Readonly<Ref<SpecificationDocument>>, mine: Readonly<Ref<SpecificationDocument>>) {
  const theirs = shallowRef<Revision | null>(null)
  const choices = shallowRef<ReadonlyMap<string, Side>>(new Map())
  /** My document before and after theirs came into it, for telling what came. */
  const last = shallowRef<{ before: SpecificationDocument; after: SpecificationDocument } | null>(null)

  const merged = computed(() => theirs.value && mergeDocuments(base.value, mine.value, theirs.value.document, choices.value))
  const conflicts = computed<readonly MergeConflict[]>(() => merged.value?.conflicts ?? [])
  const unanswered = computed(() => conflicts.value.filter(({ key }) => !choices.value.has(key)))

  function open(revision: Revision) {
    theirs.value = revision
    choices.value = new Map()
  }

  const choose = (key: string, side: Side) => (choices.value = new Map([...choices.value, [key, side]]))
  const chooseAll = (side: Side) => (choices.value = new Map(conflicts.value.map(({ key }) => [key, side])))

  /** Ends it: their revision, and the change that carries it into any state of my document. */
  function close() {
    const [revision, before, chosen, current] = [theirs.value!, base.value, choices.value, mine.value]
    const change = (value: SpecificationDocument) => mergeDocuments(before, value, revision.document, chosen).document
    last.value = { before: current, after: change(current) }
    theirs.value = null
    return { theirs: revision, change }
  }

  return { theirs, conflicts, choices, unanswered, last, open, choose, chooseAll, close }
}
