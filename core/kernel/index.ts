/**
 * The hot sums: coaxial rings and straight segments, behind one interface with two implementations.
 */
export {
  type CoaxialInput,
  type CoaxialRings,
  type CoaxialVelocity,
  type Kernel,
  type Precision,
  type SegmentInput,
  type TreeReport,
} from './kernel'
export { startKernelPool, type ThreadedKernel, type WorkerPort } from './kernelPool'
export { loadKernel } from './loadKernel'
export { serveKernelPool, type ThreadPort } from './poolThread'
export { SEGMENT_RECORD, writeSegmentRecords, type ClosedCurve } from './segmentRecords'
export { splitPlan, type SplitKind, type SplitPlan } from './splitPlan'
export { typescriptKernel } from './typescriptKernel'
