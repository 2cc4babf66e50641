/** Starts the real module worker. Apart from the client so that tests can run it over a message channel. */
import type { WorkerHandle } from './client'
import { decodeAnswer } from './decodeMessages'

export function spawnWorker(): WorkerHandle {
  const worker = new Worker(new URL('./entry.ts', import.meta.url), { type: 'module' })
  return {
    post: (message, handedOver = []) => worker.postMessage(message, [...handedOver]),
    listen: (listener) =>
      worker.addEventListener('message', (event: MessageEvent<unknown>) => {
        const answer = decodeAnswer(event.data)
        if (answer !== null) listener(answer)
      }),
    onCrash: (listener) =>
      worker.addEventListener('error', (event) => {
        event.preventDefault()
        listener(event.message === '' ? 'the worker stopped' : event.message)
      }),
    terminate: () => worker.terminate(),
  }
}
