/**
 * Turning, moving and magnifying a drawing by pointer, wheel and keys; a press that does not move is a click on it.
 */
import type { Ref } from 'vue'
import type { Pixel } from '../../core/report'
import { magnified, shifted, type Size, type View } from './view'

/** A press that moved less is a click, in pixels. */
const STILL = 4
const TURN = Math.PI / 36

export interface PointingTarget {
  readonly view: Readonly<Ref<View>>
  readonly size: Readonly<Ref<Size>>
  turn(azimuth: number, elevation: number): void
  look(view: View): void
  fit(): void
}

export interface PointingOptions {
  readonly canvas: Readonly<Ref<HTMLCanvasElement | null>>
  readonly target: PointingTarget
  /** Least and most pixels a metre. */
  readonly limits: () => readonly [number, number]
  readonly onClick?: (at: Pixel) => void
  /** Keys of the drawing's own. */
  readonly keys?: Readonly<Record<string, () => void>>
}

export interface Pointing {
  grab(event: PointerEvent): void
  drag(event: PointerEvent): void
  release(event: PointerEvent): void
  cancel(): void
  wheel(event: WheelEvent): void
  press(event: KeyboardEvent): void
  zoom(factor: number, about?: Pixel): void
}

export function usePointing(options: PointingOptions): Pointing {
  const { canvas, target } = options
  let last: Pixel | null = null
  let travelled = 0

  function inPicture(event: MouseEvent): Pixel {
    const box = canvas.value?.getBoundingClientRect()
    return { x: event.clientX - (box?.left ?? 0), y: event.clientY - (box?.top ?? 0) }
  }

  function zoom(
    factor: number,
    about: Pixel = { x: target.size.value.width / 2, y: target.size.value.height / 2 },
  ): void {
    target.look(magnified(target.view.value, factor, about, target.size.value, options.limits()))
  }

  const keys: Readonly<Record<string, () => void>> = {
    ArrowLeft: () => target.turn(-TURN, 0),
    ArrowRight: () => target.turn(TURN, 0),
    ArrowUp: () => target.turn(0, TURN),
    ArrowDown: () => target.turn(0, -TURN),
    '+': () => zoom(1.15),
    '=': () => zoom(1.15),
    '-': () => zoom(1 / 1.15),
    Home: () => target.fit(),
    ...options.keys,
  }

  return {
    grab(event) {
      if (event.button > 2 || canvas.value === null) return
      last = { x: event.clientX, y: event.clientY }
      travelled = 0
      canvas.value.setPointerCapture(event.pointerId)
    },
    drag(event) {
      if (last === null) return
      const [dx, dy] = [event.clientX - last.x, event.clientY - last.y]
      travelled += Math.abs(dx) + Math.abs(dy)
      last = { x: event.clientX, y: event.clientY }
      const across = event.shiftKey || (event.buttons & 6) !== 0
      if (across) target.look(shifted(target.view.value, dx, dy))
      else target.turn(-dx * 0.008, dy * 0.008)
    },
    release(event) {
      if (last !== null && travelled < STILL && event.button === 0) options.onClick?.(inPicture(event))
      last = null
    },
    cancel() {
      last = null
    },
    wheel(event) {
      event.preventDefault()
      // Lines, pages and pixels of wheels come to one notch of about a tenth.
      const notches = event.deltaMode === 0 ? event.deltaY / 100 : event.deltaY / 3
      zoom(Math.exp(-Math.max(-2, Math.min(2, notches)) * 0.12), inPicture(event))
    },
    press(event) {
      const act = event.ctrlKey || event.metaKey || event.altKey ? undefined : keys[event.key]
      if (act === undefined) return
      act()
      event.preventDefault()
      event.stopPropagation()
    },
    zoom,
  }
}
