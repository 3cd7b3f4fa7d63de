import { computed, nextTick, ref, type Ref } from 'vue'
import type { BoxMm, Sheet } from '#shared/drawing/model'

const ZOOMS = [1, 1.5, 2, 3, 4, 6, 8] as const
/** A place that was found is shown at least this large. */
const READING_INDEX = 2
const MARGIN_PIXELS = 12

/** Zoom steps of a scrolled sheet; what is in the middle of the view stays there. */
export function useSheetZoom(paper: Readonly<Ref<HTMLElement | null>>) {
  const index = ref(0)
  const zoom = computed(() => ZOOMS[index.value]!)
  const limits = computed(() => ({ smallest: index.value === 0, largest: index.value === ZOOMS.length - 1 }))

  function change(step: number): void {
    const next = Math.min(Math.max(index.value + step, 0), ZOOMS.length - 1)
    const element = paper.value
    const grow = ZOOMS[next]! / zoom.value
    index.value = next
    if (!element) return
    const [x, y] = [element.scrollLeft + element.clientWidth / 2, element.scrollTop + element.clientHeight / 2]
    requestAnimationFrame(() => element.scrollTo(x * grow - element.clientWidth / 2, y * grow - element.clientHeight / 2))
  }

  /** Brings a place of a sheet into the middle of the view; of one that is wider than the view, its beginning. */
  async function show(box: BoxMm, { widthMm, heightMm }: Pick<Sheet, 'widthMm' | 'heightMm'>): Promise<void> {
    index.value = Math.max(index.value, READING_INDEX)
    await nextTick()
    const element = paper.value
    if (!element) return
    const scale = element.scrollWidth / widthMm
    const wide = (box.rightMm - box.leftMm) * scale > element.clientWidth
    const x = wide ? box.leftMm * scale - MARGIN_PIXELS : ((box.leftMm + box.rightMm) / 2) * scale - element.clientWidth / 2
    element.scrollTo(x, (heightMm - (box.bottomMm + box.topMm) / 2) * scale - element.clientHeight / 2)
  }

  return { zoom, limits, change, fit: () => change(-ZOOMS.length), show }
}
