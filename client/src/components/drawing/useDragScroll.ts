import type { Ref } from 'vue'

/** Listeners that move a scrolled element under the pointer while its main button is held. Touch scrolls by itself. */
export function useDragScroll(element: Readonly<Ref<HTMLElement | null>>) {
  let last: { x: number; y: number } | null = null
  return {
    pointerdown(event: PointerEvent) {
      if (event.button !== 0 || event.pointerType === 'touch') return
      last = { x: event.clientX, y: event.clientY }
      element.value?.setPointerCapture?.(event.pointerId)
    },
    pointermove(event: PointerEvent) {
      if (!last || !element.value) return
      element.value.scrollBy(last.x - event.clientX, last.y - event.clientY)
      last = { x: event.clientX, y: event.clientY }
    },
    pointerup() {
      last = null
    },
    pointercancel() {
      last = null
    },
  }
}
