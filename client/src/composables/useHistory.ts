import { computed, ref, shallowRef } from 'vue'

const MOST_STEPS = 200
/** Keystrokes at one place within this time are one step. */
const ONE_STEP_MS = 1200

/** A value that is replaced as a whole, with the way back and forth. */
export function useHistory<T>(initial: T, now: () => number = () => performance.now()) {
  const current = shallowRef(initial)
  const past = shallowRef<readonly T[]>([])
  const future = shallowRef<readonly T[]>([])
  const last = ref<{ what: string; at: number } | null>(null)

  /** `what` names the place that changed. */
  function commit(next: T, what: string) {
    const continues = last.value?.what === what && now() - last.value.at < ONE_STEP_MS && past.value.length > 0
    if (!continues) past.value = [...past.value, current.value].slice(-MOST_STEPS)
    last.value = { what, at: now() }
    future.value = []
    current.value = next
  }

  function undo() {
    const before = past.value.at(-1)
    if (before === undefined) return
    past.value = past.value.slice(0, -1)
    future.value = [current.value, ...future.value]
    current.value = before
    last.value = null
  }

  function redo() {
    const [next, ...rest] = future.value
    if (next === undefined) return
    past.value = [...past.value, current.value]
    future.value = rest
    current.value = next
    last.value = null
  }

  /** Another beginning: nothing before it can be brought back. */
  function restart(value: T) {
    current.value = value
    past.value = []
    future.value = []
    last.value = null
  }

  /** Carries a change from outside into every state, so that going back does not take it away. */
  function rebase(change: (value: T) => T) {
    current.value = change(current.value)
    past.value = past.value.map(change)
    future.value = future.value.map(change)
    last.value = null
  }

  return { current, commit, rebase, undo, redo, restart, canUndo: computed(() => past.value.length > 0), canRedo: computed(() => future.value.length > 0) }
}
