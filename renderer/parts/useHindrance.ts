/** Why there is nothing newer than what is shown, in a sentence; null for nothing. */
import { computed, type ComputedRef } from 'vue'
import { problemInWords } from '../model/problemWords'
import type { ResultFailure } from '../model/results'
import { useWorkspace } from '../model/workspace'

/** What the plan breaks comes first, then what hindered the last run. */
export function useHindrance(failure: () => ResultFailure | null): ComputedRef<string | null> {
  const { problems } = useWorkspace()
  return computed(() => {
    const message = problems.value[0]?.message ?? failure()?.message
    return message === undefined ? null : problemInWords(message)
  })
}
