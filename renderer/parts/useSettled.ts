/** A value that has stood for a while: what flickers by faster is not shown. */
import { onScopeDispose, shallowRef, watch, type ShallowRef } from 'vue'

/**
 * @param source watched
 * @param patience how long a value must stand [ms]
 * @param waits which values wait; others are taken at once
 */
export function useSettled<T>(
  source: () => T,
  patience: number,
  waits: (value: T) => boolean,
): Readonly<ShallowRef<T>> {
  const settled = shallowRef(source())
  let timer: ReturnType<typeof setTimeout> | undefined
  watch(source, (value) => {
    clearTimeout(timer)
    if (waits(value)) timer = setTimeout(() => (settled.value = value), patience)
    else settled.value = value
  })
  onScopeDispose(() => clearTimeout(timer))
  return settled
}
