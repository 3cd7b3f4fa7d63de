import { onScopeDispose, ref, toValue, type MaybeRefOrGetter } from 'vue'
import { onBeforeRouteLeave } from 'vue-router'

/**
 * Asks before leaving a form whose content is not kept as a draft. Show a ConfirmDialog while `asking` is true,
 * with `leave` for its confirmation and `stay` for everything else.
 */
export function useUnsavedGuard(dirty: MaybeRefOrGetter<boolean>) {
  const asking = ref(false)
  let answer: ((mayLeave: boolean) => void) | null = null

  function settle(mayLeave: boolean) {
    asking.value = false
    answer?.(mayLeave)
    answer = null
  }

  onBeforeRouteLeave(() => {
    if (!toValue(dirty)) return true
    asking.value = true
    return new Promise<boolean>((resolve) => {
      answer = resolve
    })
  })

  const warnOnClose = (event: BeforeUnloadEvent) => {
    if (toValue(dirty)) event.preventDefault()
  }
  addEventListener('beforeunload', warnOnClose)
  onScopeDispose(() => removeEventListener('beforeunload', warnOnClose))

  return { asking, leave: () => settle(true), stay: () => settle(false) }
}
