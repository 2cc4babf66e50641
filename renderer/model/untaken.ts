/**
 * Entries that stand in their fields and are not in the plan, because what was typed was refused. Each field tells its own.
 */
import { computed, shallowRef, type ComputedRef } from 'vue'

export interface Untaken {
  /** How many there are in the fields on the screen. */
  readonly count: ComputedRef<number>
  /** A field tells how many it holds; 0 when it holds none or is gone. */
  tell(field: symbol, count: number): void
}

export function createUntaken(): Untaken {
  const held = shallowRef<ReadonlyMap<symbol, number>>(new Map())
  return {
    count: computed(() => [...held.value.values()].reduce((sum, count) => sum + count, 0)),
    tell(field, count) {
      if ((held.value.get(field) ?? 0) === count) return
      const next = new Map(held.value)
      if (count === 0) next.delete(field)
      else next.set(field, count)
      held.value = next
    },
  }
}
