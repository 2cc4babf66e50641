/**
 * Moving the stroke's end: by pointer, by keys, as one step of undo a gesture.
 */
import { onScopeDispose, ref, type Ref } from 'vue'
import { setStrokeRatio } from '../../../core/plan'
import { TYPING_PAUSE, type PlanDocument } from '../../model/document'
import { planStrokeRatio } from './rulerModel'

/** Shortest stroke the handle can be moved to [exit diameters]; shorter ones are typed. */
export const SHORTEST_RATIO = 0.05
/** Steps of the arrow keys, with Shift and for the page keys [exit diameters]. */
const STEP = 0.05
const LARGE_STEP = 0.5

export interface HandleScale {
  /** Formation time at a horizontal place on the screen [px]. */
  readonly ratioAt: (clientX: number) => number
  /** End of the axis while it stands still. */
  readonly end: number
  /** Formation time of one pixel. */
  readonly perPixel: number
}

export interface StrokeHandle {
  readonly dragging: Readonly<Ref<boolean>>
  grab(event: PointerEvent): void
  move(event: PointerEvent): void
  release(event: PointerEvent): void
  press(event: KeyboardEvent): void
}

let gestures = 0

export function useStrokeHandle(document: PlanDocument, scale: () => HandleScale): StrokeHandle {
  const dragging = ref(false)
  let gesture = ''
  let offset = 0
  let moved = false

  function set(ratio: number, burst: { readonly id: string; readonly pause: number }): void {
    const held = Math.min(scale().end, Math.max(SHORTEST_RATIO, ratio))
    if (held === planStrokeRatio(document.content.value)) return
    moved = true
    document.change('stroke', setStrokeRatio(document.content.value, held), burst)
  }

  function end(): void {
    if (!dragging.value) return
    dragging.value = false
    document.endBurst()
  }
  onScopeDispose(end)

  return {
    dragging,
    grab(event) {
      if (event.button !== 0 || !(event.currentTarget instanceof Element)) return
      event.currentTarget.setPointerCapture(event.pointerId)
      gesture = `stroke drag ${++gestures}`
      offset = planStrokeRatio(document.content.value) - scale().ratioAt(event.clientX)
      moved = false
      dragging.value = true
    },
    move(event) {
      if (!dragging.value) return
      // Whole hundredths, or coarser where a pixel is more: the hand cannot do better and the numbers stay round.
      const grain = Math.max(0.01, 10 ** Math.floor(Math.log10(scale().perPixel)))
      const ratio = Math.round((scale().ratioAt(event.clientX) + offset) / grain) * grain
      set(Number(ratio.toFixed(6)), { id: gesture, pause: Infinity })
    },
    release(event) {
      if (event.currentTarget instanceof Element && event.currentTarget.hasPointerCapture(event.pointerId))
        event.currentTarget.releasePointerCapture(event.pointerId)
      end()
    },
    press(event) {
      if (event.key === 'Escape' && dragging.value) {
        event.stopPropagation()
        end()
        if (moved) document.undo()
        return
      }
      // Alt with an arrow leads back in a browser, and Ctrl and Cmd belong to commands.
      if (event.altKey || event.ctrlKey || event.metaKey) return
      const now = planStrokeRatio(document.content.value)
      const step = event.shiftKey ? LARGE_STEP : STEP
      const next = new Map([
        ['ArrowRight', now + step],
        ['ArrowUp', now + step],
        ['ArrowLeft', now - step],
        ['ArrowDown', now - step],
        ['PageUp', now + LARGE_STEP],
        ['PageDown', now - LARGE_STEP],
        ['Home', SHORTEST_RATIO],
        ['End', scale().end],
      ]).get(event.key)
      if (next === undefined) return
      event.preventDefault()
      set(Number(next.toFixed(6)), { id: 'stroke keys', pause: TYPING_PAUSE })
    },
  }
}
