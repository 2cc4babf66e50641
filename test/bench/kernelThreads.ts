import { fileURLToPath } from 'node:url'
import { Worker } from 'node:worker_threads'
import { build } from 'vite'
import type { WorkerPort } from '../../core/kernel'

const entry = fileURLToPath(new URL('./kernelThread.ts', import.meta.url))

/** Bundles the worker's script, and gives what starts one: the `spawn` of `startKernelPool` for Node. */
export async function kernelThreads(): Promise<() => WorkerPort> {
  const bundle = await build({
    configFile: false,
    logLevel: 'silent',
    build: {
      ssr: entry,
      write: false,
      minify: false,
      rolldownOptions: { output: { format: 'cjs' } },
    },
  })
  const output = 'output' in bundle ? bundle.output : Array.isArray(bundle) ? bundle.flatMap((part) => part.output) : []
  const script = output.find((part) => part.type === 'chunk' && part.isEntry)
  if (script?.type !== 'chunk') throw new Error('the kernel thread was not bundled')
  return () => wrapped(new Worker(script.code, { eval: true }))
}

function wrapped(worker: Worker): WorkerPort {
  return {
    postMessage: (message) => worker.postMessage(message),
    onMessage: (listener) => void worker.on('message', listener),
    onError: (listener) => void worker.on('error', listener),
    terminate: () => void worker.terminate(),
  }
}
