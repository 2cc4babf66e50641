/**
 * Looking closer at part of a plot's abscissa: by dragging across it, or by keys about the cursor.
 */
import { computed, ref, shallowRef, watch, type ComputedRef, type Ref, type ShallowRef } from 'vue'
import { plotDomain, type PlotModel } from '../../core/report'

export interface PlotZoom {
  /** The model with the part looked at as its abscissa. */
  readonly shown: ComputedRef<PlotModel>
  readonly zoomed: Readonly<Ref<boolean>>
  /** Ends of a drag under way, null when there is none. */
  readonly selection: ShallowRef<readonly [number, number] | null>
  /** Look at the part between two abscissae, in either order. */
  look(a: number, b: number): void
  /** Magnify about an abscissa; null: about the middle. */
  magnify(factor: number, about: number | null): void
  reset(): void
}

/** Closest look, as a share of the whole. */
const CLOSEST = 0.005

export function usePlotZoom(model: () => PlotModel): PlotZoom {
  const part = shallowRef<readonly [number, number] | null>(null)
  const zoomed = ref(false)
  const selection = shallowRef<readonly [number, number] | null>(null)
  watch(part, (next) => {
    zoomed.value = next !== null
  })
  // Another stroke may end before the part looked at begins.
  watch(model, (next) => {
    const { xMin, xMax } = plotDomain(next)
    if (part.value !== null && (part.value[0] >= xMax || part.value[1] <= xMin)) part.value = null
  })
  const shown = computed(() => {
    if (part.value === null) return model()
    const [min, max] = part.value
    return { ...model(), x: { ...model().x, min, max } }
  })

  function look(a: number, b: number): void {
    const { xMin, xMax } = plotDomain(model())
    const [from, to] = [Math.max(xMin, Math.min(a, b)), Math.min(xMax, Math.max(a, b))]
    if (to - from < CLOSEST * (xMax - xMin)) return
    part.value = from <= xMin && to >= xMax ? null : [from, to]
  }

  return {
    shown,
    zoomed,
    selection,
    look,
    magnify(factor, about) {
      const { xMin, xMax } = plotDomain(shown.value)
      const centre = about ?? (xMin + xMax) / 2
      look(centre - (centre - xMin) / factor, centre + (xMax - centre) / factor)
    },
    reset() {
      part.value = null
    },
  }
}
