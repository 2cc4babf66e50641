import { loadKernel, typescriptKernel, type Kernel } from '../../../core/kernel'

/** Both implementations, to run every check on each. */
export const kernels: readonly Kernel[] = [typescriptKernel, await loadKernel()]
