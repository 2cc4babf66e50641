/**
 * The worker's side: core/run behind a message port. Several jobs may be open; each is cancelled by its own number.
 */
import type { Progress } from '../../core/base'
import { createJetCache, run, thrusterMap } from '../../core/run'
import type { FieldAnswer, FieldStep } from './fieldSteps'
import { buffersOf } from './handOver'
import type { Port, WorkerAnswer, WorkerRequest } from './messages'
import { createPause } from './pauses'

/** Shortest time between two reports of progress [ms]: a march makes thousands of steps in a second. */
const REPORT_EVERY = 60

/** Answer requests on a port for as long as it lives. */
export function serve(port: Port<WorkerAnswer, WorkerRequest>, now: () => number = () => performance.now()): void {
  // One for the life of the worker: a jet takes seconds, and most changes of a plan leave it as it is.
  const jetCache = createJetCache()
  let fieldSteps: Promise<(step: FieldStep) => Promise<FieldAnswer>> | null = null
  const signals = new Map<number, { aborted: boolean }>()
  port.listen((request) => {
    if (request.kind === 'cancel') {
      const signal = signals.get(request.id)
      if (signal !== undefined) signal.aborted = true
      return
    }
    const signal = { aborted: false }
    signals.set(request.id, signal)
    void answer(request, signal).then((message) => {
      signals.delete(request.id)
      port.post(message, buffersOf(message))
    })
  })

  async function answer(
    request: Exclude<WorkerRequest, { kind: 'cancel' }>,
    signal: { readonly aborted: boolean },
  ): Promise<WorkerAnswer> {
    const { id } = request
    let reported = -Infinity
    const onProgress = (progress: Progress): void => {
      const time = now()
      if (time - reported < REPORT_EVERY) return
      reported = time
      port.post({ kind: 'progress', id, progress })
    }
    try {
      const options = { signal, onProgress, pause: createPause(now) }
      // What few jobs ask for is loaded with the first of them.
      if (request.kind === 'fields') {
        fieldSteps ??= import('./fieldSteps').then(({ createFieldSteps }) => createFieldSteps())
        const take = await fieldSteps
        return { kind: 'fields', id, answer: await take(request.step) }
      }
      const { plan } = request
      if (request.kind === 'picture') {
        const { wakePicture } = await import('./pictures')
        return { kind: 'picture', id, picture: await wakePicture(plan, request.data, request.request, options) }
      }
      if (request.kind === 'map') return { kind: 'map', id, map: thrusterMap(plan, request.request, jetCache) }
      return { kind: 'result', id, result: await run(plan, request.asked, { ...options, jetCache }) }
    } catch (error) {
      return { kind: 'crashed', id, message: error instanceof Error ? error.message : String(error) }
    }
  }
}
