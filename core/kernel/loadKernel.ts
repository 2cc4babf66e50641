import type { Kernel } from './kernel'
import { typescriptKernel } from './typescriptKernel'
import { wasmKernel } from './wasmKernel'

let loading: Promise<Kernel> | undefined

/** The WebAssembly kernel, or the TypeScript one where it cannot be started. Loaded once; later calls give the same. */
export function loadKernel(): Promise<Kernel> {
  loading ??= wasmKernel().then((kernel) => kernel ?? typescriptKernel)
  return loading
}
