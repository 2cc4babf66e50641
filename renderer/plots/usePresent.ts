/** A line at the present abscissa over a plot: it moves without the plot being drawn anew. */
import { computed, onBeforeUnmount, onMounted, shallowRef, watch, type ComputedRef, type Ref } from 'vue'
import type { PlotChart } from './chart'

export interface Present {
  /** Style of the line; null while the present is absent or outside the part shown. */
  readonly style: ComputedRef<Readonly<Record<string, string>> | null>
  /** The plot was drawn anew: its scale may be another. */
  place(): void
}

export function usePresent(
  value: () => number | undefined,
  chart: () => PlotChart | null,
  stage: Ref<HTMLElement | null>,
): Present {
  const at = shallowRef<{ readonly left: number; readonly top: number; readonly height: number } | null>(null)
  let resizing: ResizeObserver | null = null

  function place(): void {
    const [drawn, present] = [chart(), value()]
    if (drawn === null || present === undefined) return
    const { left, right, top, bottom } = drawn.area
    const x = drawn.pixelOf(present, 0).x
    const inside = x >= left - 0.5 && x <= right + 0.5
    at.value = inside ? { left: x, top, height: bottom - top } : null
  }

  onMounted(() => {
    place()
    if (stage.value === null || typeof ResizeObserver === 'undefined') return
    // The chart follows the size of its stage a frame later.
    resizing = new ResizeObserver(() => requestAnimationFrame(place))
    resizing.observe(stage.value)
  })
  onBeforeUnmount(() => resizing?.disconnect())
  watch(value, place)

  const style = computed(() => {
    if (at.value === null) return null
    const { left, top, height } = at.value
    return { transform: `translate(${left}px, ${top}px)`, height: `${height}px` }
  })
  return { style, place }
}
