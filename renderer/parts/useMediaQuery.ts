/** A media query as a live value. */
import { onScopeDispose, ref, type Ref } from 'vue'

export function useMediaQuery(query: string): Readonly<Ref<boolean>> {
  const list = globalThis.matchMedia?.(query) ?? null
  const matches = ref(list?.matches ?? false)
  const follow = (): void => {
    matches.value = list?.matches ?? false
  }
  list?.addEventListener('change', follow)
  onScopeDispose(() => list?.removeEventListener('change', follow))
  return matches
}
