import { computed, shallowRef } from 'vue'

const KEY = 'collapsed-parts'

function readStored(): Readonly<Record<string, boolean>> {
  try {
    return JSON.parse(sessionStorage.getItem(KEY) ?? '{}') as Record<string, boolean>
  } catch {
    return {}
  }
}

const chosen = shallowRef(readStored())

/** Whether a part of the form is folded away. What a person chose holds for this tab; else `initially` decides. */
export function useCollapsed(part: () => string, initially: () => boolean) {
  return computed({
    get: () => chosen.value[part()] ?? initially(),
    set: (collapsed) => {
      chosen.value = { ...chosen.value, [part()]: collapsed }
      try {
        sessionStorage.setItem(KEY, JSON.stringify(chosen.value))
      } catch {
        // Storage is full or switched off: the choice holds until the page is left.
      }
    },
  })
}
