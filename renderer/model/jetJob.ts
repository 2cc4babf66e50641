/**
 * The starting jet of the open plan: computed in a worker when it is asked for.
 *
 * A run shows how far it is and can be cancelled; what was finished by then is kept and marked. A change of what the jet depends on
 * marks the results stale; a step back to a plan whose jet is known brings that back.
 */
import { computed, shallowRef, type ComputedRef, type ShallowRef } from 'vue'
import type { Progress } from '../../core/base'
import type { Plan } from '../../core/plan'
import type { PulseResult } from '../../core/pulse'
import type { JetData, RunData } from '../../core/run'
import type { Job, JobOutcome, WorkerClient } from '../worker/client'
import type { ResultFailure } from './results'

export interface FinishedJet {
  readonly plan: Plan
  readonly data: RunData
  readonly jet: JetData
  /** The pulse of the same plan; null where the run ended before it. */
  readonly pulse: PulseResult | null
  /** Why it ends before its time, in a sentence; null for a whole run. */
  readonly partial: string | null
}

export type JetStatus = 'none' | 'current' | 'partial' | 'stale' | 'running' | 'failed'

export interface JetJob {
  /** The jet of the open plan where it is known, else the last one; null before the first. */
  readonly finished: ComputedRef<FinishedJet | null>
  readonly status: ComputedRef<JetStatus>
  /** How far a run is; null while none is under way. */
  readonly progress: Readonly<ShallowRef<Progress | null>>
  /** What hindered the last run, while its inputs stand. */
  readonly failure: ComputedRef<ResultFailure | null>
  /** Compute the open plan's jet. */
  run(): void
  /** Stop the run under way and keep what it has. */
  cancel(): void
}

export interface JetJobOptions {
  readonly client: WorkerClient
  /** The plan as it is shown. */
  readonly open: () => Plan
  /** Told once a crash, with a sentence. */
  readonly onCrash?: (sentence: string) => void
  /** A whole jet is there: what reads it can be computed anew. */
  readonly onDone?: () => void
}

/** Jets kept in the window for steps back. */
const MOST_KEPT = 4

/** Whether two plans have the same starting jet: what it does not read may differ. */
export function sameJet(a: Plan, b: Plan): boolean {
  if (a === b) return true
  return (
    a.water === b.water &&
    a.nozzle === b.nozzle &&
    a.programme === b.programme &&
    a.ambient === b.ambient &&
    a.jet === b.jet
  )
}

interface Running {
  readonly plan: Plan
  readonly job: Job
  /** True for a run whose outcome is of no interest any more. */
  dropped: boolean
}

export function createJetJob({
  client,
  open,
  onCrash = () => undefined,
  onDone = () => undefined,
}: JetJobOptions): JetJob {
  /** Newest first. */
  const kept = shallowRef<readonly FinishedJet[]>([])
  const progress = shallowRef<Progress | null>(null)
  const failed = shallowRef<{ readonly plan: Plan; readonly failure: ResultFailure } | null>(null)
  const running = shallowRef<Running | null>(null)
  /** Another run was asked for while one is being given up. */
  const next = shallowRef(false)

  function start(): void {
    const plan = open()
    let current: Running | null = null
    const job = client.run(plan, ['water', 'pulse', 'jet'], (step) => {
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
    const fail = (message: string, field: string | null = null): void => {
      failed.value = { plan, failure: { field, message } }
    }
    if (outcome.kind === 'crashed') {
      fail('The computation stopped unexpectedly. Change a value or run it again.')
      onCrash(`The starting jet stopped unexpectedly and its worker was started afresh (${outcome.message}).`)
      return
    }
    if (outcome.kind === 'cancelled') {
      fail('The run was cancelled before it had any results.')
      return
    }
    const { status, message, data, field } = outcome.result
    const jet = data?.jet ?? null
    if (data !== null && jet !== null && jet.own.shown.snapshots.length > 0) {
      const partial = status === 'done' ? null : status === 'cancelled' ? CANCELLED : message
      const others = kept.value.filter((one) => one.partial === null && !sameJet(one.plan, plan))
      kept.value = [{ plan, data, jet, pulse: data.pulse, partial }, ...others].slice(0, MOST_KEPT)
    } else if (status === 'cancelled') {
      fail('The run was cancelled before it had any results.')
      return
    }
    failed.value = status === 'failed' ? { plan, failure: { field: field ?? null, message } } : null
    if (status === 'done') onDone()
  }

  const failure = computed(() =>
    failed.value !== null && sameJet(failed.value.plan, open()) ? failed.value.failure : null,
  )
  const finished = computed(() => kept.value.find(({ plan }) => sameJet(plan, open())) ?? kept.value[0] ?? null)
  return {
    finished,
    progress,
    failure,
    status: computed<JetStatus>(() => {
      if (running.value !== null || next.value) return 'running'
      const now = finished.value
      if (now !== null && sameJet(now.plan, open())) return now.partial === null ? 'current' : 'partial'
      if (failure.value !== null) return 'failed'
      return now === null ? 'none' : 'stale'
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

const CANCELLED = 'Cancelled: only the part computed by then is shown.'
