/**
 * The window's side: one worker, jobs as promises, cancellation that takes effect even when the worker is deep in a sum,
 * and a fresh worker after a crash.
 */
import type { Plan } from '../../core/plan'
import type { Progress } from '../../core/base'
import type { RunResult, Section } from '../../core/run'
import type { Port, WorkerAnswer, WorkerRequest } from './messages'

/** Time a cancelled job has to answer before its worker is replaced [ms]. */
export const CANCEL_PATIENCE = 150

/** A running worker as the client sees it. */
export interface WorkerHandle extends Port<WorkerRequest, WorkerAnswer> {
  /** Called once if the worker stops by itself. */
  onCrash(listener: (message: string) => void): void
  terminate(): void
}

/** How a job ended, beyond the run's own result. */
export type JobOutcome =
  | { readonly kind: 'result'; readonly result: RunResult }
  | { readonly kind: 'cancelled' }
  | { readonly kind: 'crashed'; readonly message: string }

export interface Job {
  readonly outcome: Promise<JobOutcome>
  cancel(): void
}

export interface WorkerClient {
  run(plan: Plan, sections: readonly Section[], onProgress?: (progress: Progress) => void): Job
  dispose(): void
}

interface OpenJob {
  readonly settle: (outcome: JobOutcome) => void
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
    job.settle(
      message.kind === 'result'
        ? { kind: 'result', result: message.result }
        : { kind: 'crashed', message: message.message },
    )
  }

  /** Stop the worker and settle all it had open; the next job starts a fresh one. */
  function giveUp(outcome: JobOutcome): void {
    worker?.terminate()
    worker = null
    const open = [...jobs.values()]
    jobs.clear()
    for (const job of open) job.settle(outcome)
  }

  return {
    run(plan, sections, onProgress) {
      const id = nextId++
      const outcome = new Promise<JobOutcome>((settle) => jobs.set(id, { settle, onProgress }))
      current().post({ kind: 'run', id, plan, sections })
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
    },
    dispose: () => giveUp({ kind: 'cancelled' }),
  }
}
