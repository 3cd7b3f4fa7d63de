import { computed, onScopeDispose, ref, shallowRef, watch, type Ref } from 'vue'
import { evaluate } from '#shared/engine/index'
import type { Evaluation, Working } from '#shared/engine/evaluation'
import type { Library } from '#shared/engine/library'
import type { SpecificationDocument } from '#shared/engine/specification'

/** Evaluates a document once per frame while it changes; what an engine refuses leaves the last result in sight. */
export function useEvaluation(document: Readonly<Ref<SpecificationDocument>>, library: Readonly<Ref<Library>>) {
  const evaluation = shallowRef<Evaluation | null>(null)
  const refused = ref<string | null>(null)
  let frame = 0

  function run() {
    frame = 0
    try {
      evaluation.value = evaluate(document.value, library.value)
      refused.value = null
    } catch (error) {
      refused.value = error instanceof Error ? error.message : String(error)
    }
  }

  watch([document, library], () => (frame ||= requestAnimationFrame(run)))
  onScopeDispose(() => cancelAnimationFrame(frame))
  run()

  /** How each figure came about is collected only while somebody asks. */
  const asked = ref<string | null>(null)
  const working = computed<Working | null>(() => {
    if (asked.value === null || refused.value !== null) return null
    return evaluate(document.value, library.value, { working: true }).working[asked.value] ?? null
  })

  return { evaluation, refused, asked, working }
}
