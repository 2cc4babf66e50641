/**
 * The window's side: one worker, jobs as promises, cancellation that takes effect even when the worker is deep in a sum,
 * and a fresh worker after a crash.
 */
import type { Plan } from '../../core/plan'
import type { Progress } from '../../core/base'
import type {
  RunRequest,
  RunResult,
  Section,
  ThrusterMapRequest,
  ThrusterMapResult,
  WakeData,
  WakePicture,
  WakePictureRequest,
} from '../../core/run'
import type { FieldAnswer, FieldStep } from './fieldSteps'
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

export type MapOutcome = { readonly kind: 'map'; readonly map: ThrusterMapResult } | NoAnswer

export type FieldsOutcome = { readonly kind: 'fields'; readonly answer: FieldAnswer } | NoAnswer

export interface Job<Outcome = JobOutcome> {
  readonly outcome: Promise<Outcome>
  cancel(): void
}

export interface WorkerClient {
  /**
   * @param jet how a starting jet is come by, as in RunRequest; default run; cached: nothing that takes long is computed
   * @param fields what velocity fields gave, for the readings
   */
  run(
    plan: Plan,
    sections: readonly Section[],
    onProgress?: (progress: Progress) => void,
    jet?: NonNullable<RunRequest['jet']>,
    fields?: NonNullable<RunRequest['fields']> | null,
  ): Job
  /** Dye and field of a finished wake of this plan. */
  picture(
    plan: Plan,
    data: WakeData,
    request: WakePictureRequest,
    onProgress?: (progress: Progress) => void,
  ): Job<PictureOutcome>
  /** Map of the plan's thruster. */
  map(plan: Plan, request: ThrusterMapRequest): Job<MapOutcome>
  /** One step of reading velocity fields; a file's bytes are handed over. */
  fields(step: FieldStep): Job<FieldsOutcome>
  dispose(): void
}

/** Whatever may end a job; each kind of job takes its own answer out of it. */
type AnyOutcome = JobOutcome | PictureOutcome | MapOutcome | FieldsOutcome

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
    else if (message.kind === 'fields') job.settle({ kind: 'fields', answer: message.answer })
    else if (message.kind === 'map') job.settle({ kind: 'map', map: message.map })
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
    handedOver: readonly ArrayBuffer[] = [],
  ): Job<Outcome | NoAnswer> {
    const id = nextId++
    const outcome = new Promise<Outcome | NoAnswer>((resolve) =>
      jobs.set(id, { settle: (ended) => resolve(own(ended)), onProgress }),
    )
    current().post(request(id), handedOver)
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
    run: (plan, sections, onProgress, jet = 'run', fields = null) =>
      open<JobOutcome>(
        (id) => ({ kind: 'run', id, plan, asked: { sections, jet, sizing: jet === 'cached' ? 'off' : 'run', fields } }),
        only('result'),
        onProgress,
      ),
    picture: (plan, data, request, onProgress) =>
      open<PictureOutcome>((id) => ({ kind: 'picture', id, plan, data, request }), only('picture'), onProgress),
    map: (plan, request) => open<MapOutcome>((id) => ({ kind: 'map', id, plan, request }), only('map'), undefined),
    fields: (step) =>
      open<FieldsOutcome>(
        (id) => ({ kind: 'fields', id, step }),
        only('fields'),
        undefined,
        step.do === 'file' ? [step.bytes] : [],
      ),
    dispose: () => giveUp({ kind: 'cancelled' }),
  }
}

/** Takes the job's own kind of answer, and the ends without one. */
function only<K extends AnyOutcome['kind']>(
  kind: K,
): (ended: AnyOutcome) => Extract<AnyOutcome, { kind: K }> | NoAnswer {
  const isOwn = (ended: AnyOutcome): ended is Extract<AnyOutcome, { kind: K }> => ended.kind === kind
  return (ended) => (isOwn(ended) ? ended : ended.kind === 'cancelled' || ended.kind === 'crashed' ? ended : MIXED_UP)
}

/** An answer of another kind than was asked for: never by our own worker. */
const MIXED_UP: NoAnswer = { kind: 'crashed', message: 'the worker answered another question' }
