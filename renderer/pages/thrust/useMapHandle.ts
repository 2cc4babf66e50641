/** Moving the plan on its map: dragged as one step of undo, or stepped by arrow keys. */
import { ref, type Ref } from 'vue'
import { toBase } from '../../../core/quantity'
import { tickStep, type MapDrawing, type ThrustMapModel } from '../../../core/report'
import { TYPING_PAUSE } from '../../model/document'
import { useWorkspace } from '../../model/workspace'

export interface MapHandleOptions {
  readonly model: () => ThrustMapModel
  readonly drawing: () => MapDrawing
  readonly svg: () => SVGSVGElement | null
}

/** Arrow keys cross an axis in about this many steps. */
const STEPS = 100
const KEYS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
}

export interface MapHandle {
  readonly dragging: Ref<boolean>
  press(event: PointerEvent): void
  follow(event: PointerEvent): void
  release(event: PointerEvent): void
  key(event: KeyboardEvent): void
}

export function useMapHandle({ model, drawing, svg }: MapHandleOptions): MapHandle {
  const { document, thrust } = useWorkspace()
  const dragging = ref(false)
  let drags = 0
  let start: { readonly x: number; readonly y: number } | null = null

  /** Go to a place on the map, held inside it, at numbers as one would type them. */
  function go(x: number, y: number, burst: { readonly id: string; readonly pause: number }): void {
    const axes = [model().x, model().y]
    const [a, b] = [x, y].map((value, i) => {
      const axis = axes[i] ?? model().x
      const step = tickStep(axis.max - axis.min, STEPS) / 2
      const held = Math.min(axis.max, Math.max(axis.min, value))
      const rounded = Number((Math.round(held / step) * step).toPrecision(12))
      return toBase(Math.min(axis.max, Math.max(axis.min, rounded)), axis.unit)
    })
    if (a !== undefined && b !== undefined) thrust.moveTo(a, b, burst)
  }

  function placeOf(event: PointerEvent): { readonly x: number; readonly y: number } | null {
    const box = svg()?.getBoundingClientRect()
    return box === undefined ? null : drawing().toPlace({ x: event.clientX - box.left, y: event.clientY - box.top })
  }

  return {
    dragging,
    press(event) {
      if (event.button !== 0) return
      event.preventDefault()
      if (event.currentTarget instanceof SVGElement) event.currentTarget.focus()
      svg()?.setPointerCapture?.(event.pointerId)
      dragging.value = true
      drags += 1
      start = model().marks.find(({ kind }) => kind === 'present') ?? null
    },
    follow(event) {
      const place = placeOf(event)
      if (place !== null) go(place.x, place.y, { id: `map drag ${drags}`, pause: Infinity })
    },
    release() {
      if (!dragging.value) return
      dragging.value = false
      document.endBurst()
    },
    key(event) {
      if (event.key === 'Escape' && dragging.value && start !== null) {
        event.preventDefault()
        event.stopPropagation()
        go(start.x, start.y, { id: `map drag ${drags}`, pause: Infinity })
        dragging.value = false
        document.endBurst()
        return
      }
      const move = KEYS[event.key]
      const present = model().marks.find(({ kind }) => kind === 'present')
      if (move === undefined || present === undefined || event.ctrlKey || event.metaKey) return
      event.preventDefault()
      event.stopPropagation()
      const scale = event.shiftKey ? 10 : 1
      const stepOf = (axis: { readonly min: number; readonly max: number }): number =>
        tickStep(axis.max - axis.min, STEPS) * scale
      go(present.x + move[0] * stepOf(model().x), present.y + move[1] * stepOf(model().y), {
        id: 'map keys',
        pause: TYPING_PAUSE,
      })
    },
  }
}
