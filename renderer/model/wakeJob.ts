/**
 * The wake of the open plan: marched in a worker of its own, so that the ruler and the pulse stay live beside a long run.
 *
 * A run is asked for, shows how far it is and can be cancelled; what was finished by then is kept and marked. A change of the
 * inputs marks the results stale. Short wakes need no asking: each change tries a run that is given up when it takes longer
 * than a moment.
 */
import { computed, shallowRef, type ComputedRef, type ShallowRef } from 'vue'
import type { Progress } from '../../core/base'
import { startsFromJet, type Plan } from '../../core/plan'
import type { RunData, WakeData } from '../../core/run'
import type { Job, JobOutcome, WorkerClient } from '../worker/client'
import type { ResultFailure } from './results'

/** A run that nobody asked for is given up after this long [ms]. */
export const QUICK_BUDGET = 400

export interface FinishedWake {
  readonly plan: Plan
  readonly data: RunData
  readonly wake: WakeData
  /** Why it ends before its time, in a sentence; null for a whole run. */
  readonly partial: string | null
}

export type WakeStatus = 'none' | 'current' | 'partial' | 'stale' | 'running' | 'failed'

export interface WakeJob {
  /** The last results; null before the first. */
  readonly finished: Readonly<ShallowRef<FinishedWake | null>>
  readonly status: ComputedRef<WakeStatus>
  /** How far an asked run is; null while none is under way. */
  readonly progress: Readonly<ShallowRef<Progress | null>>
  /** What hindered the last run, while its inputs stand. */
  readonly failure: ComputedRef<ResultFailure | null>
  /** March the open plan's wake. */
  run(): void
  /** March it if that takes no more than a moment. */
  tryQuickly(): void
  /** Stop an asked run and keep what it has. */
  cancel(): void
}

interface Running {
  readonly plan: Plan
  readonly job: Job
  readonly asked: boolean
  /** True for a run whose outcome is of no interest any more. */
  dropped: boolean
}

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
  const finished = shallowRef<FinishedWake | null>(null)
  const progress = shallowRef<Progress | null>(null)
  const failed = shallowRef<{ readonly plan: Plan; readonly failure: ResultFailure } | null>(null)
  const running = shallowRef<Running | null>(null)
  /** What is started when the run under way has ended: one worker marches one wake at a time. */
  const next = shallowRef<'asked' | 'quick' | null>(null)

  function start(asked: boolean): void {
    const plan = open()
    let current: Running | null = null
    const job = client.run(plan, ['water', 'wake'], (step) => {
      if (asked && running.value === current) progress.value = step
    })
    current = { plan, job, asked, dropped: false }
    running.value = current
    progress.value = asked ? { share: 0, what: 'starting' } : null
    const own = current
    if (!asked)
      later(() => {
        if (running.value === own) drop(own)
      }, QUICK_BUDGET)
    void job.outcome.then((outcome) => {
      running.value = null
      progress.value = null
      if (!own.dropped) settle(own, outcome)
      const waiting = next.value
      next.value = null
      if (waiting !== null) start(waiting === 'asked')
    })
  }

  function settle({ plan, asked }: Running, outcome: JobOutcome): void {
    if (outcome.kind === 'crashed') {
      failed.value = {
        plan,
        failure: { field: null, message: 'The march stopped unexpectedly. Change a value or run it again.' },
      }
      onCrash(`The march of the rings stopped unexpectedly and was started afresh (${outcome.message}).`)
      return
    }
    if (outcome.kind === 'cancelled') {
      if (asked)
        failed.value = { plan, failure: { field: null, message: 'The run was cancelled before it had any results.' } }
      return
    }
    const { status, message, data, field } = outcome.result
    const wake = data?.wake ?? null
    if (data !== null && wake !== null && wake.wake.outputTimes.length > 0)
      finished.value = { plan, data, wake, partial: status === 'done' ? null : partialInWords(status, message) }
    failed.value = status === 'failed' ? { plan, failure: { field: field ?? null, message } } : null
  }

  /** Let go of a run: its outcome does not count. */
  function drop(run: Running): void {
    run.dropped = true
    run.job.cancel()
  }

  const failure = computed(() =>
    failed.value !== null && sameWake(failed.value.plan, open()) ? failed.value.failure : null,
  )
  return {
    finished,
    progress,
    failure,
    status: computed<WakeStatus>(() => {
      if (running.value?.asked === true || next.value === 'asked') return 'running'
      const now = finished.value
      if (now !== null && sameWake(now.plan, open())) return now.partial === null ? 'current' : 'partial'
      if (failure.value !== null) return 'failed'
      return now === null ? 'none' : 'stale'
    }),
    run() {
      const now = running.value
      if (now === null) {
        start(true)
        return
      }
      next.value = 'asked'
      progress.value = { share: 0, what: 'starting' }
      drop(now)
    },
    tryQuickly() {
      if (finished.value !== null && finished.value.partial === null && sameWake(finished.value.plan, open())) return
      if (running.value === null) start(false)
      else if (!running.value.asked && next.value === null) next.value = 'quick'
    },
    cancel() {
      if (next.value === 'asked') next.value = null
      if (running.value?.asked === true) running.value.job.cancel()
    },
  }
}

function partialInWords(status: 'cancelled' | 'failed', message: string): string {
  return status === 'cancelled' ? 'Cancelled: only the part computed by then is shown.' : message
}
