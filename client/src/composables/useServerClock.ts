import { onScopeDispose, ref, toValue, watch, type MaybeRefOrGetter } from 'vue'

const TICK_MS = 1000

/**
 * The database's clock in milliseconds, carried on from each reading by the time that has passed since; the
 * browser's own clock may be wrong and has no say.
 */
export function useServerClock(reading: MaybeRefOrGetter<string | undefined>) {
  const nowMs = ref<number | null>(null)
  let readMs = 0
  let readAt = 0

  const tick = () => {
    if (readMs > 0) nowMs.value = readMs + performance.now() - readAt
  }
  watch(
    () => toValue(reading),
    (moment) => {
      if (!moment) return
      readMs = Date.parse(moment)
      readAt = performance.now()
      tick()
    },
    { immediate: true },
  )

  const timer = setInterval(tick, TICK_MS)
  onScopeDispose(() => clearInterval(timer))
  return { nowMs }
}
