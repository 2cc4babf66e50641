/** A value that follows its source once the browser has painted: what is costly to draw waits for what is not. */
import { onScopeDispose, shallowRef, watch, type ShallowRef } from 'vue'

/** The source as it is now, then each newest value after the next paint; values in between are passed over. */
export function useAfterPaint<T>(source: () => T): Readonly<ShallowRef<T>> {
  const followed = shallowRef(source())
  let frame = 0
  let timer: ReturnType<typeof setTimeout> | undefined
  watch(source, () => {
    cancelAnimationFrame(frame)
    clearTimeout(timer)
    // A task queued from within a frame runs after that frame is painted.
    frame = requestAnimationFrame(() => {
      timer = setTimeout(() => {
        followed.value = source()
      })
    })
  })
  onScopeDispose(() => {
    cancelAnimationFrame(frame)
    clearTimeout(timer)
  })
  return followed
}
