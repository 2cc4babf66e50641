/** Moving the time of the jet that is shown: by pointer along the ruler, by keys from shape to shape. */
import type { JetView } from '../../model/jetView'

export interface Playhead {
  grab(event: PointerEvent): void
  move(event: PointerEvent): void
  release(event: PointerEvent): void
  press(event: KeyboardEvent): void
}

/** Shapes that a page key goes on. */
const PAGE = 10

/** @param placeAt place on the ruler under a pointer */
export function usePlayhead(
  { playback, place, seekPlace }: Pick<JetView, 'playback' | 'place' | 'seekPlace'>,
  placeAt: (event: PointerEvent) => number,
): Playhead {
  let held = false
  /** From the pointer to the place shown, so that it does not jump when it is grabbed. */
  let offset = 0
  const keys: Readonly<Record<string, () => void>> = {
    ArrowRight: () => playback.step(1),
    ArrowUp: () => playback.step(1),
    ArrowLeft: () => playback.step(-1),
    ArrowDown: () => playback.step(-1),
    PageUp: () => playback.step(PAGE),
    PageDown: () => playback.step(-PAGE),
    Home: () => playback.step(-Infinity),
    End: () => playback.step(Infinity),
    ' ': () => playback.toggle(),
  }
  return {
    grab(event) {
      if (event.button !== 0 || !(event.currentTarget instanceof Element)) return
      event.currentTarget.setPointerCapture(event.pointerId)
      playback.pause()
      offset = (place.value ?? 0) - placeAt(event)
      held = true
    },
    move(event) {
      if (held) seekPlace(placeAt(event) + offset)
    },
    release(event) {
      held = false
      if (event.currentTarget instanceof Element && event.currentTarget.hasPointerCapture(event.pointerId))
        event.currentTarget.releasePointerCapture(event.pointerId)
    },
    press(event) {
      if (event.altKey || event.ctrlKey || event.metaKey) return
      const act = keys[event.key]
      if (act === undefined) return
      event.preventDefault()
      act()
    },
  }
}
