/**
 * The window's side: one worker, jobs as promises, cancellation that takes effect even when the worker is deep in a sum,
 * and a fresh worker after a crash.
 */
import type { Plan } from '../../core/plan'
import type { Progress } from '../../core/base'
import type { RunRequest, RunResult, Section, WakeData, WakePicture, WakePictureRequest } from '../../core/run'
import type { Port, WorkerAnswer, WorkerRequest } from './messages'

/** Time a cancelled job has to answer before its worker is replaced [ms]. */
export const CANCEL_PATIENCE = 150

/** A running worker as the client sees it. */
export interface WorkerHandle extends Port<WorkerRequest, WorkerAnswer> {
  /** Called once if the worker stops by itself. */
  onCrash(listener: (message: string) => void): void
  terminate(): void
}

/** How a job ended without an answer of its own. */
type NoAnswer = { readonly kind: 'cancelled' } | { readonly kind: 'crashed'; readonly message: string }

/** How a job ended, beyond the run's own result. */
export type JobOutcome = { readonly kind: 'result'; readonly result: RunResult } | NoAnswer

export type PictureOutcome = { readonly kind: 'picture'; readonly picture: WakePicture } | NoAnswer

export interface Job<Outcome = JobOutcome> {
  readonly outcome: Promise<Outcome>
  cancel(): void
}

export interface WorkerClient {
  /** @param jet how a starting jet is come by, as in RunRequest; default run */
  run(
    plan: Plan,
    sections: readonly Section[],
    onProgress?: (progress: Progress) => void,
    jet?: NonNullable<RunRequest['jet']>,
  ): Job
  /** Dye and field of a finished wake of this plan. */
  picture(
    plan: Plan,
    data: WakeData,
    request: WakePictureRequest,
    onProgress?: (progress: Progress) => void,
  ): Job<PictureOutcome>
  dispose(): void
}

/** Whatever may end a job; each kind of job takes its own answer out of it. */
type AnyOutcome = JobOutcome | PictureOutcome

interface OpenJob {
  readonly settle: (outcome: AnyOutcome) => void
  readonly onProgress: ((progress: Progress) => void) | undefined
}

/**
 * @param spawn starts a worker; called again whenever one had to be given up
 * @param later timer, for tests
 */
export function createWorkerClient(
  spawn: () => WorkerHandle,
  later: (action: () => void, milliseconds: number) => unknown = (action, milliseconds) =>
    setTimeout(action, milliseconds),
): WorkerClient {
  const jobs = new Map<number, OpenJob>()
  let nextId = 1
  let worker: WorkerHandle | null = null

  function current(): WorkerHandle {
    if (worker !== null) return worker
    const fresh = spawn()
    worker = fresh
    fresh.listen((message) => {
      if (fresh === worker) receive(message)
    })
    fresh.onCrash((message) => {
      if (fresh === worker) giveUp({ kind: 'crashed', message })
    })
    return fresh
  }

  function receive(message: WorkerAnswer): void {
    const job = jobs.get(message.id)
    if (job === undefined) return
    if (message.kind === 'progress') {
      job.onProgress?.(message.progress)
      return
    }
    jobs.delete(message.id)
    if (message.kind === 'result') job.settle({ kind: 'result', result: message.result })
    else if (message.kind === 'picture') job.settle({ kind: 'picture', picture: message.picture })
    else job.settle({ kind: 'crashed', message: message.message })
  }

  /** Stop the worker and settle all it had open; the next job starts a fresh one. */
  function giveUp(outcome: NoAnswer): void {
    worker?.terminate()
    worker = null
    const open = [...jobs.values()]
    jobs.clear()
    for (const job of open) job.settle(outcome)
  }

  /** Post a request and wait for what ends it; `own` takes the job's own kind of answer. */
  function open<Outcome>(
    request: (id: number) => WorkerRequest,
    own: (outcome: AnyOutcome) => Outcome | NoAnswer,
    onProgress: ((progress: Progress) => void) | undefined,
  ): Job<Outcome | NoAnswer> {
    const id = nextId++
    const outcome = new Promise<Outcome | NoAnswer>((resolve) =>
      jobs.set(id, { settle: (ended) => resolve(own(ended)), onProgress }),
    )
    current().post(request(id))
    return {
      outcome,
      cancel() {
        if (!jobs.has(id)) return
        current().post({ kind: 'cancel', id })
        later(() => {
          if (jobs.has(id)) giveUp({ kind: 'cancelled' })
        }, CANCEL_PATIENCE)
      },
    }
  }

  return {
    run: (plan, sections, onProgress, jet = 'run') =>
      open<JobOutcome>(
        (id) => ({ kind: 'run', id, plan, asked: { sections, jet } }),
        (ended) => (ended.kind === 'picture' ? MIXED_UP : ended),
        onProgress,
      ),
    picture: (plan, data, request, onProgress) =>
      open<PictureOutcome>(
        (id) => ({ kind: 'picture', id, plan, data, request }),
        (ended) => (ended.kind === 'result' ? MIXED_UP : ended),
        onProgress,
      ),
    dispose: () => giveUp({ kind: 'cancelled' }),
  }
}

/** An answer of another kind than was asked for: never by our own worker. */
const MIXED_UP: NoAnswer = { kind: 'crashed', message: 'the worker answered another question' }
