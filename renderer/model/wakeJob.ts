/**
 * The wake of the open plan: marched in a worker of its own, so that the ruler and the pulse stay live beside a long run.
 *
 * A run is asked for, shows how far it is and can be cancelled; what was finished by then is kept and marked. A change of the
 * inputs marks the results stale. Short wakes need no asking: each change tries a run that is given up when it takes longer
 * than a moment.
 */
import { startsFromJet, type Plan } from '../../core/plan'
import type { RunData, RunResult, WakeData } from '../../core/run'
import type { WorkerClient } from '../worker/client'
import { CANCELLED_PART, createAskedJob, NO_RESULTS, type Answer, type AskedResults, type TriedJob } from './askedJob'

/** A run that nobody asked for is given up after this long [ms]. */
export const QUICK_BUDGET = 400

export interface FinishedWake extends AskedResults {
  readonly data: RunData
  readonly wake: WakeData
}

export type WakeJob = TriedJob<FinishedWake>

/** Whether two plans have the same wake: what it does not read may differ. */
export function sameWake(a: Plan, b: Plan): boolean {
  if (a === b) return true
  if (a.wake !== b.wake || a.water !== b.water || a.ambient !== b.ambient) return false
  if (a.wake !== null && a.wake.rings.length > 0) return true
  if (startsFromJet(a.wake) && a.jet !== b.jet) return false
  return a.nozzle === b.nozzle && a.programme === b.programme && a.models === b.models && a.train === b.train
}

/**
 * @param open the plan as it is shown
 * @param onCrash told once a crash, with a sentence
 * @param later timer, for tests
 */
export function createWakeJob(
  client: WorkerClient,
  open: () => Plan,
  onCrash: (sentence: string) => void = () => {},
  later: (action: () => void, milliseconds: number) => unknown = (action, milliseconds) =>
    setTimeout(action, milliseconds),
): WakeJob {
  return createAskedJob({
    client,
    open,
    onCrash,
    later,
    quickBudget: QUICK_BUDGET,
    sections: ['water', 'wake'],
    same: sameWake,
    answerOf,
    words: {
      nothing: NO_RESULTS,
      crashed: 'The march stopped unexpectedly. Change a value or run it again.',
      crashNotice: 'The march of the rings stopped unexpectedly and was started afresh',
    },
  })
}

function answerOf(plan: Plan, { status, message, data, field }: RunResult): Answer<FinishedWake> {
  const wake = data?.wake ?? null
  const partial = status === 'done' ? null : status === 'cancelled' ? CANCELLED_PART : message
  const marched = data !== null && wake !== null && wake.wake.outputTimes.length > 0
  return {
    kept: marched ? { plan, data, wake, partial } : null,
    failure: status === 'failed' ? { field: field ?? null, message } : null,
  }
}
