import { parentPort } from 'node:worker_threads'
import { serveKernelPool } from '../../core/kernel'

/** A worker of Node as a thread of a kernel pool; bundled by kernelThreads.ts, since Node does not read TypeScript. */
const port = parentPort
if (port !== null) {
  serveKernelPool({
    postMessage: (message) => port.postMessage(message),
    onMessage: (listener) => void port.on('message', listener),
  })
}
