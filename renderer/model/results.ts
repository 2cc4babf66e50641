/**
 * Results of the open plan: computed in the worker, kept while a newer run is on its way and marked stale meanwhile.
 *
 * Scheduling is latest-wins: one run at a time; what changed while it ran is one following run of the newest plan, so
 * dragging never builds a queue and the numbers never stop following.
 */
import { computed, shallowRef, type ComputedRef, type ShallowRef } from 'vue'
import type { Plan } from '../../core/plan'
import type { Progress } from '../../core/base'
import type { RunData, Section } from '../../core/run'
import type { Job, JobOutcome, WorkerClient } from '../worker/client'

/** Why there is no newer result, in a sentence; `field` where a value of the plan is the reason. */
export interface ResultFailure {
  readonly field: string | null
  readonly message: string
}

/** Finished data with the plan it belongs to. */
export interface Finished {
  readonly plan: Plan
  readonly data: RunData
}

export type ResultsStatus = 'none' | 'current' | 'stale' | 'running' | 'failed'

export interface Results {
  /** The last finished data; null before the first. */
  readonly finished: Readonly<ShallowRef<Finished | null>>
  readonly status: ComputedRef<ResultsStatus>
  readonly progress: Readonly<ShallowRef<Progress | null>>
  readonly failure: Readonly<ShallowRef<ResultFailure | null>>
  /** Compute a plan, now or after the run under way. */
  request(plan: Plan): void
  /** Stop the run under way and forget what waits. */
  cancel(): void
}

/** A wake of explicit rings may come without nozzle and programme: then there is only the water. */
function pulseSections(plan: Plan): readonly Section[] {
  return plan.absent.length === 0 ? ['water', 'pulse'] : ['water']
}

/**
 * @param onCrash told once a crash, with a sentence
 * @param sectionsOf what is computed of a plan at every change: nothing that takes long
 */
export function createResults(
  client: WorkerClient,
  onCrash: (sentence: string) => void = () => {},
  sectionsOf: (plan: Plan) => readonly Section[] = pulseSections,
): Results {
  const finished = shallowRef<Finished | null>(null)
  const progress = shallowRef<Progress | null>(null)
  const failure = shallowRef<ResultFailure | null>(null)
  const shown = shallowRef<Plan | null>(null)
  let waiting: Plan | null = null
  const running = shallowRef<{ readonly plan: Plan; readonly job: Job } | null>(null)

  function start(plan: Plan): void {
    // A starting jet takes seconds: at every change only a finished one is used, and a caution tells where there is none.
    const job = client.run(
      plan,
      sectionsOf(plan),
      (step) => {
        if (running.value?.job === job) progress.value = step
      },
      'cached',
    )
    running.value = { plan, job }
    void job.outcome.then((outcome) => {
      running.value = null
      progress.value = null
      settle(plan, outcome)
      const next = waiting
      waiting = null
      if (next !== null) start(next)
    })
  }

  function settle(plan: Plan, outcome: JobOutcome): void {
    if (outcome.kind === 'result') {
      const { result } = outcome
      if (result.status === 'done' && result.data !== null) {
        finished.value = { plan, data: result.data }
        failure.value = null
      } else if (result.status === 'failed') failure.value = { field: result.field ?? null, message: result.message }
    } else if (outcome.kind === 'crashed') {
      failure.value = { field: null, message: 'The calculation stopped unexpectedly. Change a value or run it again.' }
      onCrash(`The calculation stopped unexpectedly and was started afresh (${outcome.message}).`)
    }
  }

  const status = computed<ResultsStatus>(() => {
    if (finished.value !== null && finished.value.plan === shown.value) return 'current'
    if (running.value !== null) return 'running'
    if (failure.value !== null) return 'failed'
    return finished.value === null ? 'none' : 'stale'
  })

  return {
    finished,
    status,
    progress,
    failure,
    request(plan) {
      shown.value = plan
      if (running.value === null) start(plan)
      else waiting = plan
    },
    cancel() {
      waiting = null
      running.value?.job.cancel()
    },
  }
}
