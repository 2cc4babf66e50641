import { coaxialStream, coaxialVelocity } from './coaxialReference'
import type { Kernel } from './kernel'
import { segmentVelocity } from './segmentReference'

/** The reference, and the fallback where WebAssembly SIMD is missing. `mixed` precision is double here, and there is no tree. */
export const typescriptKernel: Kernel = {
  name: 'typescript',
  coaxialVelocity,
  coaxialStream,
  segmentVelocity,
  coaxialVelocityWithin: (input, _tolerance, out) => {
    coaxialVelocity(input, out)
    return { method: 'plain', error: 0 }
  },
  segmentVelocityWithin: (input, _tolerance, out) => {
    segmentVelocity(input, out)
    return { method: 'plain', error: 0 }
  },
}
