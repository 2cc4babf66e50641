/** How the targets of one call are shared out: chunk k is targets k size .. min((k + 1) size, count). */
export interface SplitPlan {
  readonly chunks: number
  readonly size: number
}

/** Which sum is split; they differ in the cost of a pair. */
export type SplitKind = 'coaxialVelocity' | 'coaxialStream' | 'segmentVelocity'

/** Pairs from which a second thread pays, waking it included; measured with two threads. */
const WORTHWHILE_PAIRS = { coaxialVelocity: 20_000, coaxialStream: 40_000, segmentVelocity: 120_000 } as const

/** Chunks a thread: a late or slow thread costs at most one of them, and each costs one copy of the sources. */
const CHUNKS_A_THREAD = 4

/** Targets go in fours, the widest step of the kernels, so that no chunk but the last has idle lanes. */
const STEP = 4

/**
 * Cuts targets into even chunks, or into one where threads do not pay.
 *
 * A target's sum does not depend on the others in its chunk, so any plan gives the same bits.
 */
export function splitPlan(kind: SplitKind, targetCount: number, sourceCount: number, threads: number): SplitPlan {
  if (threads < 2 || targetCount * sourceCount < WORTHWHILE_PAIRS[kind]) return { chunks: 1, size: targetCount }
  const even = Math.ceil(targetCount / (threads * CHUNKS_A_THREAD))
  const size = Math.ceil(even / STEP) * STEP
  return { chunks: Math.ceil(targetCount / size), size }
}
