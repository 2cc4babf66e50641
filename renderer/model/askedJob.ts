/**
 * A computation that runs in a worker when it is asked for: how far it is, cancelling with what it has by then, and how its results
 * stand to the plan as it is shown. What is computed, kept and said is passed in.
 */
import { computed, shallowRef, type ComputedRef, type ShallowRef } from 'vue'
import type { Progress } from '../../core/base'
import type { Plan } from '../../core/plan'
import type { RunResult, Section } from '../../core/run'
import type { Job, JobOutcome, WorkerClient } from '../worker/client'
import type { ResultFailure } from './results'

/** Why results are a part only, after a cancellation. */
export const CANCELLED_PART = 'Cancelled: only the part computed by then is shown.'

/** Cancelled with nothing to show. */
export const NO_RESULTS = 'The run was cancelled before it had any results.'

/** What the results of every asked computation hold. */
export interface AskedResults {
  readonly plan: Plan
  /** Why they end before their time, in a sentence; null for a whole run. */
  readonly partial: string | null
}

export type AskedStatus = 'none' | 'current' | 'partial' | 'stale' | 'running' | 'failed'

export interface AskedJob<Results extends AskedResults> {
  /** The results of the open plan where they are known, else the last ones; null before the first. */
  readonly finished: ComputedRef<Results | null>
  readonly status: ComputedRef<AskedStatus>
  /** How far an asked run is; null while none is under way. */
  readonly progress: Readonly<ShallowRef<Progress | null>>
  /** What hindered the last run, while its inputs stand. */
  readonly failure: ComputedRef<ResultFailure | null>
  /** Compute the open plan. */
  run(): void
  /** Stop an asked run and keep what it has. */
  cancel(): void
}

/** An asked computation that is also tried unasked where it takes no more than a moment. */
export interface TriedJob<Results extends AskedResults> extends AskedJob<Results> {
  /** Compute the open plan if that takes no more than a moment. */
  tryQuickly(): void
}

/** What a run's answer comes to: results worth keeping, and what hindered it. */
export interface Answer<Results> {
  readonly kept: Results | null
  readonly failure: ResultFailure | null
}

export interface AskedJobOptions<Results extends AskedResults> {
  readonly client: WorkerClient
  /** The plan as it is shown. */
  readonly open: () => Plan
  readonly sections: readonly Section[]
  /** Whether two plans have the same results: what the computation does not read may differ. */
  readonly same: (a: Plan, b: Plan) => boolean
  readonly answerOf: (plan: Plan, result: RunResult) => Answer<Results>
  readonly words: {
    /** Cancelled without results. */
    readonly nothing: string
    /** Stopped unexpectedly, beside the inputs. */
    readonly crashed: string
    /** Stopped unexpectedly, as a notice; what was wrong follows in brackets. */
    readonly crashNotice: string
  }
  /** Told once a crash, with a sentence. */
  readonly onCrash: (sentence: string) => void
  /** A whole run is there. */
  readonly onDone?: () => void
  /** Results kept for steps back; default 1. */
  readonly mostKept?: number
  /** A failure of the open plan is told even where earlier results of it are known; default false. */
  readonly failureFirst?: boolean
  /** A run stopped for another counts after all where that other is cancelled before it starts; default false. */
  readonly keepsStopped?: boolean
  /** A run that nobody asked for is given up after this long [ms]; default 0. */
  readonly quickBudget?: number
  /** Timer, for tests. */
  readonly later?: (action: () => void, milliseconds: number) => unknown
}

interface Running {
  readonly plan: Plan
  readonly job: Job
  readonly asked: boolean
  /** True for a run whose outcome is of no interest any more. */
  dropped: boolean
}

const STARTING: Progress = { share: 0, what: 'starting' }

/** One worker computes one plan at a time: a run asked for meanwhile starts when the one under way has ended. */
export function createAskedJob<Results extends AskedResults>({
  client,
  open,
  sections,
  same,
  answerOf,
  words,
  onCrash,
  onDone = () => undefined,
  mostKept = 1,
  failureFirst = false,
  keepsStopped = false,
  quickBudget = 0,
  later = (action, milliseconds) => setTimeout(action, milliseconds),
}: AskedJobOptions<Results>): TriedJob<Results> {
  /** Newest first. */
  const kept = shallowRef<readonly Results[]>([])
  const progress = shallowRef<Progress | null>(null)
  const failed = shallowRef<{ readonly plan: Plan; readonly failure: ResultFailure } | null>(null)
  const running = shallowRef<Running | null>(null)
  /** What is started when the run under way has ended. */
  const next = shallowRef<'asked' | 'quick' | null>(null)

  function start(asked: boolean): void {
    const plan = open()
    let current: Running | null = null
    const job = client.run(plan, sections, (step) => {
      if (asked && running.value === current) progress.value = step
    })
    current = { plan, job, asked, dropped: false }
    running.value = current
    progress.value = asked ? STARTING : null
    const own = current
    if (!asked)
      later(() => {
        if (running.value === own) drop(own)
      }, quickBudget)
    void job.outcome.then((outcome) => {
      running.value = null
      progress.value = null
      const waiting = next.value
      if (!own.dropped && waiting !== 'asked') settle(own, outcome)
      next.value = null
      if (waiting !== null) start(waiting === 'asked')
    })
  }

  function settle({ plan, asked }: Running, outcome: JobOutcome): void {
    const fail = (message: string): void => {
      failed.value = { plan, failure: { field: null, message } }
    }
    if (outcome.kind === 'crashed') {
      fail(words.crashed)
      onCrash(`${words.crashNotice} (${outcome.message}).`)
      return
    }
    if (outcome.kind === 'cancelled') {
      if (asked) fail(words.nothing)
      return
    }
    const answer = answerOf(plan, outcome.result)
    if (answer.kept !== null) {
      const others = kept.value.filter((one) => one.partial === null && !same(one.plan, plan))
      kept.value = [answer.kept, ...others].slice(0, mostKept)
    }
    failed.value = answer.failure === null ? null : { plan, failure: answer.failure }
    if (outcome.result.status === 'done') onDone()
  }

  /** Let go of a run: its outcome does not count. */
  function drop(run: Running): void {
    run.dropped = true
    run.job.cancel()
  }

  const failure = computed(() =>
    failed.value !== null && same(failed.value.plan, open()) ? failed.value.failure : null,
  )
  const known = computed(() => kept.value.find(({ plan }) => same(plan, open())) ?? null)
  const finished = computed(() => known.value ?? kept.value[0] ?? null)
  const status = computed<AskedStatus>(() => {
    if (running.value?.asked === true || next.value === 'asked') return 'running'
    if (failure.value !== null && (failureFirst || known.value === null)) return 'failed'
    if (known.value !== null) return known.value.partial === null ? 'current' : 'partial'
    return finished.value === null ? 'none' : 'stale'
  })
  return {
    finished,
    progress,
    failure,
    status,
    run() {
      const now = running.value
      if (now === null) {
        start(true)
        return
      }
      next.value = 'asked'
      if (keepsStopped) {
        now.job.cancel()
        return
      }
      progress.value = STARTING
      drop(now)
    },
    tryQuickly() {
      if (known.value !== null && known.value.partial === null) return
      if (running.value === null) start(false)
      else if (!running.value.asked && next.value === null) next.value = 'quick'
    },
    cancel() {
      if (next.value === 'asked') next.value = null
      if (running.value?.asked === true) running.value.job.cancel()
    },
  }
}
