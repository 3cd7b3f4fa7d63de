import { ref } from 'vue'

interface Target {
  index: number
  side: 'before' | 'after'
}

/** Where a dragged row would come to lie among the rows without it. */
export function dropIndex(from: number, { index, side }: Target): number {
  const gap = side === 'before' ? index : index + 1
  return gap > from ? gap - 1 : gap
}

/** Dragging a row of one table to another place of the same table. */
export function useRowDrag(move: (from: number, to: number) => unknown) {
  const dragged = ref<number | null>(null)
  const over = ref<Target | null>(null)

  const start = (index: number) => (dragged.value = index)
  const enter = (index: number, side: Target['side']) => {
    if (dragged.value !== null) over.value = { index, side }
  }
  const end = () => {
    dragged.value = null
    over.value = null
  }
  function drop() {
    if (dragged.value !== null && over.value) move(dragged.value, dropIndex(dragged.value, over.value))
    end()
  }
  return { dragged, over, start, enter, drop, end }
}
