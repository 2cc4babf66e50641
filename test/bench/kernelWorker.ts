import type { Worker } from 'node:worker_threads'
import type { WorkerPort } from '../../core/kernel'

/** A worker of Node as the pool sees it. */
export function workerPort(worker: Worker): WorkerPort {
  return {
    postMessage: (message) => worker.postMessage(message),
    onMessage: (listener) => void worker.on('message', listener),
    onError: (listener) => void worker.on('error', listener),
    terminate: () => void worker.terminate(),
  }
}
