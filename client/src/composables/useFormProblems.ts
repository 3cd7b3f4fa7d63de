import { computed, inject, onScopeDispose, provide, reactive, toValue, watchEffect, type InjectionKey, type MaybeRefOrGetter } from 'vue'

const FORM_PROBLEMS: InjectionKey<Map<string, string>> = Symbol('form problems')

/**
 * Collects what the entries inside a form could not read, so that it is not sent by half.
 * Call it in the component that owns the form; entries report themselves.
 */
export function useFormProblems() {
  const problems = reactive(new Map<string, string>())
  provide(FORM_PROBLEMS, problems)

  /** Takes the person to the first entry with a problem; false when there is none. */
  function goToFirstProblem(): boolean {
    const ids = [...problems.keys()]
    const entries = ids.map((id) => document.getElementById(id)).filter((entry) => entry !== null)
    entries.sort((a, b) => (a.compareDocumentPosition(b) & Node.DOCUMENT_POSITION_FOLLOWING ? -1 : 1))
    entries[0]?.focus()
    return ids.length > 0
  }

  return { problems, hasProblems: computed(() => problems.size > 0), goToFirstProblem }
}

/** Reports one entry's problem to the form around it, if there is one. */
export function useReportProblem(id: string, problem: MaybeRefOrGetter<string | null>): void {
  const problems = inject(FORM_PROBLEMS, null)
  if (!problems) return
  watchEffect(() => {
    const sentence = toValue(problem)
    if (sentence) problems.set(id, sentence)
    else problems.delete(id)
  })
  onScopeDispose(() => problems.delete(id))
}
