import { Worker } from 'node:worker_threads'
import type { WorkerPort } from '../../core/kernel'
import { bundled } from './kernelBundle'
import { workerPort } from './kernelWorker'

/** Bundles the worker's script, and gives what starts one: the `spawn` of `startKernelPool` for Node. */
export async function kernelThreads(): Promise<() => WorkerPort> {
  const script = await bundled('./kernelThread.ts', 'cjs')
  return () => workerPort(new Worker(script, { eval: true }))
}
