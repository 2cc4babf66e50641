/** A field tells the window how many of its entries are refused and so not in the plan. */
import { inject, onScopeDispose, watch } from 'vue'
import { WORKSPACE_KEY } from '../model/workspace'

/** @param count entries refused now; a field that goes takes its own with it */
export function useUntaken(count: () => number): void {
  const untaken = inject(WORKSPACE_KEY, null)?.untaken
  if (untaken === undefined) return
  const field = Symbol('field')
  watch(count, (now) => untaken.tell(field, now), { immediate: true, flush: 'sync' })
  onScopeDispose(() => untaken.tell(field, 0))
}
