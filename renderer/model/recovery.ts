/**
 * Unsaved changes survive a crash: a copy is kept beside the program, never in the person's own file, a little after the
 * last change, and offered at the next start. It is gone as soon as nothing is unsaved.
 */
import { onScopeDispose, shallowRef, watch, type ShallowRef } from 'vue'
import { readPlan, writePlan, type Plan } from '../../core/plan'
import type { PlanDocument } from './document'

const STORAGE_KEY = 'ringwright.recovery'
/** A copy is kept when nothing has changed for this long [ms]. */
export const RECOVERY_DELAY = 2000

export interface Recovery {
  /** The plan that was not saved last time; null when there is none or the offer was answered. */
  readonly offer: Readonly<ShallowRef<Plan | null>>
  restore(): void
  discard(): void
}

export type RecoveryStorage = Pick<Storage, 'getItem' | 'setItem' | 'removeItem'>

/** @param storage null where the program keeps nothing: then nothing is offered either */
export function createRecovery(document: PlanDocument, storage: RecoveryStorage | null): Recovery {
  const offer = shallowRef<Plan | null>(readKept(storage))
  let timer: ReturnType<typeof setTimeout> | undefined

  function keep(): void {
    try {
      storage?.setItem(STORAGE_KEY, writePlan(document.plan.value))
    } catch {
      // A full storage loses the safety copy only; the plan itself is untouched.
    }
  }

  watch(
    [document.plan, document.edited],
    () => {
      clearTimeout(timer)
      // While an offer is open, its copy is the only one and stays.
      if (offer.value !== null) return
      if (document.edited.value) timer = setTimeout(keep, RECOVERY_DELAY)
      else storage?.removeItem(STORAGE_KEY)
    },
    { flush: 'sync' },
  )
  onScopeDispose(() => clearTimeout(timer))

  return {
    offer,
    restore() {
      const plan = offer.value
      offer.value = null
      if (plan !== null) document.replace(plan, null, true)
    },
    discard() {
      offer.value = null
      storage?.removeItem(STORAGE_KEY)
    },
  }
}

function readKept(storage: RecoveryStorage | null): Plan | null {
  const text = storage?.getItem(STORAGE_KEY) ?? null
  if (text === null) return null
  const reading = readPlan(text)
  return reading.ok ? reading.plan : null
}
