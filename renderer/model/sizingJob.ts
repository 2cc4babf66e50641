/**
 * The sizing of the open plan: searched in a worker when it is asked for.
 *
 * A run shows how far it is and can be cancelled; what was found by then is kept and marked. A change of what the search reads marks
 * the candidates stale; opening one of them does not, since a search does not depend on the design it starts from.
 */
import { computed, shallowRef, type ComputedRef, type ShallowRef } from 'vue'
import type { Progress } from '../../core/base'
import type { Plan } from '../../core/plan'
import type { RunData } from '../../core/run'
import type { SizingResult } from '../../core/thruster'
import type { Job, JobOutcome, WorkerClient } from '../worker/client'
import { designKey } from './designKey'
import type { ResultFailure } from './results'

export interface FinishedSizing {
  readonly plan: Plan
  readonly key: string
  readonly data: RunData
  readonly sizing: SizingResult
  /** Why it ends before its time, in a sentence; null for a whole search. */
  readonly partial: string | null
}

export type SizingStatus = 'none' | 'current' | 'partial' | 'stale' | 'running' | 'failed'

export interface SizingJob {
  /** The last results; null before the first. */
  readonly finished: Readonly<ShallowRef<FinishedSizing | null>>
  readonly status: ComputedRef<SizingStatus>
  /** How far a search is; null while none is under way. */
  readonly progress: Readonly<ShallowRef<Progress | null>>
  /** What hindered the last search, while its inputs stand. */
  readonly failure: ComputedRef<ResultFailure | null>
  /** Search for the open plan. */
  run(): void
  /** Stop the search under way and keep what it has. */
  cancel(): void
}

interface Running {
  readonly plan: Plan
  readonly job: Job
  /** True for a search whose outcome is of no interest any more. */
  dropped: boolean
}

/** Computes the key of a plan once while that plan stands. */
function keys(): (plan: Plan) => string {
  let known: { readonly plan: Plan; readonly key: string } | null = null
  return (plan) => {
    if (known?.plan !== plan) known = { plan, key: designKey(plan) }
    return known.key
  }
}

/**
 * @param open the plan as it is shown
 * @param onCrash told once a crash, with a sentence
 */
export function createSizingJob(
  client: WorkerClient,
  open: () => Plan,
  onCrash: (sentence: string) => void = () => undefined,
): SizingJob {
  const finished = shallowRef<FinishedSizing | null>(null)
  const progress = shallowRef<Progress | null>(null)
  const failed = shallowRef<{ readonly key: string; readonly failure: ResultFailure } | null>(null)
  const running = shallowRef<Running | null>(null)
  /** Another search was asked for while one is being given up. */
  const next = shallowRef(false)
  const keyOf = keys()

  function start(): void {
    const plan = open()
    let current: Running | null = null
    const job = client.run(plan, ['water', 'thruster'], (step) => {
      if (running.value === current) progress.value = step
    })
    current = { plan, job, dropped: false }
    running.value = current
    progress.value = { share: 0, what: 'starting' }
    const own = current
    void job.outcome.then((outcome) => {
      running.value = null
      progress.value = null
      if (!own.dropped) settle(own.plan, outcome)
      if (!next.value) return
      next.value = false
      start()
    })
  }

  function settle(plan: Plan, outcome: JobOutcome): void {
    const key = designKey(plan)
    const fail = (message: string, field: string | null = null): void => {
      failed.value = { key, failure: { field, message } }
    }
    failed.value = null
    if (outcome.kind === 'crashed') {
      fail('The search stopped unexpectedly. Change a value or size it again.')
      onCrash(`The sizing stopped unexpectedly and its worker was started afresh (${outcome.message}).`)
    } else if (outcome.kind === 'cancelled') fail(NOTHING)
    else {
      const { status, message, data, field } = outcome.result
      const sizing = data?.thruster?.sizing ?? null
      const found = sizing !== null && (sizing.candidates.length > 0 || sizing.nearest !== null)
      if (data !== null && sizing !== null && found)
        finished.value = { plan, key, data, sizing, partial: status === 'done' ? null : message }
      else if (status === 'cancelled') fail(NOTHING)
      else fail(message, field ?? null)
    }
  }

  const failure = computed(() =>
    failed.value !== null && failed.value.key === keyOf(open()) ? failed.value.failure : null,
  )
  return {
    finished,
    progress,
    failure,
    status: computed<SizingStatus>(() => {
      if (running.value !== null || next.value) return 'running'
      const now = finished.value
      if (failure.value !== null) return 'failed'
      if (now === null) return 'none'
      if (now.key !== keyOf(open())) return 'stale'
      return now.partial === null ? 'current' : 'partial'
    }),
    run() {
      const now = running.value
      if (now === null) {
        start()
        return
      }
      next.value = true
      progress.value = { share: 0, what: 'starting' }
      now.dropped = true
      now.job.cancel()
    },
    cancel() {
      next.value = false
      running.value?.job.cancel()
    },
  }
}

const NOTHING = 'The search was cancelled before it had found anything.'
