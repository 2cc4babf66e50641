/**
 * The worker's side: core/run behind a message port. Several jobs may be open; each is cancelled by its own number.
 */
import { run } from '../../core/run'
import type { Port, WorkerAnswer, WorkerRequest } from './messages'

/** Answer requests on a port for as long as it lives. */
export function serve(port: Port<WorkerAnswer, WorkerRequest>): void {
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
      port.post(message)
    })
  })

  async function answer(
    request: Extract<WorkerRequest, { kind: 'run' }>,
    signal: { readonly aborted: boolean },
  ): Promise<WorkerAnswer> {
    const { id, plan, sections } = request
    try {
      const result = await run(
        plan,
        { sections },
        { signal, onProgress: (progress) => port.post({ kind: 'progress', id, progress }) },
      )
      return { kind: 'result', id, result }
    } catch (error) {
      return { kind: 'crashed', id, message: error instanceof Error ? error.message : String(error) }
    }
  }
}
