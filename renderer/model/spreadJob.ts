/**
 * The spread of the open plan: drawn many times in a worker when it is asked for. What was drawn before a cancellation is kept and marked;
 * a change of what a sample reads marks it stale.
 */
import { computed, shallowRef, type ComputedRef, type ShallowRef } from 'vue'
import type { Progress } from '../../core/base'
import type { Caution, Plan } from '../../core/plan'
import type { SpreadData } from '../../core/run'
import type { Job, JobOutcome, WorkerClient } from '../worker/client'
import type { ResultFailure } from './results'

export interface FinishedSpread {
  readonly plan: Plan
  readonly spread: SpreadData
  readonly cautions: readonly Caution[]
  /** Why it ends before its time, in a sentence; null for a whole spread. */
  readonly partial: string | null
}

export type SpreadStatus = 'none' | 'current' | 'partial' | 'stale' | 'running' | 'failed'

export interface SpreadJob {
  readonly finished: Readonly<ShallowRef<FinishedSpread | null>>
  readonly status: ComputedRef<SpreadStatus>
  readonly progress: Readonly<ShallowRef<Progress | null>>
  /** What hindered the last run, while its inputs stand. */
  readonly failure: ComputedRef<ResultFailure | null>
  run(): void
  /** Stop the run under way and keep what it has. */
  cancel(): void
}

const READ = [
  'water',
  'nozzle',
  'programme',
  'ambient',
  'models',
  'jet',
  'wake',
  'thruster',
  'tankRun',
  'spread',
] as const

/** Whether two plans have the same spread: what no sample reads may differ. */
export function sameSpread(a: Plan, b: Plan): boolean {
  return a === b || READ.every((section) => a[section] === b[section])
}

/** Whether the plan says what is uncertain. */
export function drawsAnything({ spread }: Plan): boolean {
  return spread !== null && Object.keys(spread.relative).length + Object.keys(spread.absolute).length > 0
}

/** @param open the plan as it is shown @param onCrash told once a crash, with a sentence */
export function createSpreadJob(
  client: WorkerClient,
  open: () => Plan,
  onCrash: (sentence: string) => void = () => undefined,
): SpreadJob {
  const finished = shallowRef<FinishedSpread | null>(null)
  const progress = shallowRef<Progress | null>(null)
  const failed = shallowRef<{ readonly plan: Plan; readonly failure: ResultFailure } | null>(null)
  const running = shallowRef<Job | null>(null)
  /** Another run was asked for while one is being given up. */
  const next = shallowRef(false)

  function start(): void {
    const plan = open()
    const job = client.run(plan, ['water', 'spread'], (step) => {
      if (running.value === job) progress.value = step
    })
    running.value = job
    progress.value = { share: 0, what: 'starting' }
    void job.outcome.then((outcome) => {
      running.value = null
      progress.value = null
      if (next.value) {
        next.value = false
        start()
      } else settle(plan, outcome)
    })
  }

  function settle(plan: Plan, outcome: JobOutcome): void {
    const fail = (message: string, field: string | null = null): void => {
      failed.value = { plan, failure: { field, message } }
    }
    failed.value = null
    if (outcome.kind === 'crashed') {
      fail('The spread stopped unexpectedly. Change a value or run it again.')
      onCrash(`The spread stopped unexpectedly and its worker was started afresh (${outcome.message}).`)
      return
    }
    const { status, message, data, field } =
      outcome.kind === 'result' ? outcome.result : { status: 'cancelled', message: '', data: null, field: undefined }
    const spread = data?.spread ?? null
    if (data !== null && spread !== null && spread.used > 0)
      finished.value = { plan, spread, cautions: data.cautions, partial: status === 'done' ? null : message }
    else if (status === 'cancelled') fail('The spread was cancelled before its first sample.')
    else fail(status === 'done' ? 'No sample could be computed: see what is uncertain by how much.' : message, field)
  }

  const failure = computed(() =>
    failed.value !== null && sameSpread(failed.value.plan, open()) ? failed.value.failure : null,
  )
  return {
    finished,
    progress,
    failure,
    status: computed<SpreadStatus>(() => {
      if (running.value !== null) return 'running'
      if (failure.value !== null) return 'failed'
      const now = finished.value
      if (now === null) return 'none'
      if (!sameSpread(now.plan, open())) return 'stale'
      return now.partial === null ? 'current' : 'partial'
    }),
    run() {
      if (running.value === null) start()
      else {
        next.value = true
        running.value.cancel()
      }
    },
    cancel() {
      next.value = false
      running.value?.cancel()
    },
  }
}
