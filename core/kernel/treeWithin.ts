import type { CoaxialTree } from './coaxialTree'
import type { Kernel, TreeReport } from './kernel'
import type { SegmentTree } from './segmentTree'
import {
  COAXIAL_TOLERANCE,
  coaxialTreeSettings,
  SEGMENT_TOLERANCE,
  segmentTreeSettings,
  sharperCoaxialTree,
  sharperSegmentTree,
} from './treeSettings'

/** Pairs below which the plain sum is the faster one at any tolerance. */
const SEGMENT_PAIRS = 2e6
const COAXIAL_PAIRS = 1e6

/** Targets whose plain sum is taken to see the error. */
const SAMPLES = 200

/** Tries before the plain sum is taken after all. */
const TRIES = 3

const PLAIN: TreeReport = { method: 'plain', error: 0 }

/** One sum to a tolerance: the ways to do it, and the settings of the tree. */
interface Ways<Settings> {
  readonly plain: () => void
  readonly tree: (settings: Settings) => void
  /** Relative root mean square error at the samples. */
  readonly look: () => number
  readonly first: Settings
  readonly sharper: (settings: Settings, error: number) => Settings
}

/** Runs the tree, sharpens it while the error is too large, and takes the plain sum when that does not help. */
function within<Settings>(ways: Ways<Settings>, tolerance: number, check: boolean): TreeReport {
  let settings = ways.first
  for (let attempt = 0; attempt < TRIES; attempt++) {
    ways.tree(settings)
    if (!check) return { method: 'tree', error: null }
    const error = ways.look()
    if (error <= tolerance) return { method: 'tree', error }
    // NaN in the input: the plain sum shows where.
    if (Number.isNaN(error)) break
    settings = ways.sharper(settings, error)
  }
  ways.plain()
  return PLAIN
}

/** @see Kernel.segmentVelocityWithin */
export function segmentVelocityWithin(
  plain: Kernel['segmentVelocity'],
  tree: SegmentTree,
): Kernel['segmentVelocityWithin'] {
  const targets = new Float64Array(3 * SAMPLES)
  const deltaSquared = new Float64Array(SAMPLES)
  const exact = new Float64Array(3 * SAMPLES)
  return (input, tolerance, out, check = true) => {
    const { targetCount, segmentCount, segments, targetDeltaSquared } = input
    const unfit = input.firstTarget !== undefined || !(tolerance >= SEGMENT_TOLERANCE.smallest)
    if (unfit || targetCount * segmentCount < SEGMENT_PAIRS) {
      plain(input, out)
      return PLAIN
    }
    const aim = Math.min(tolerance, SEGMENT_TOLERANCE.largest)
    const look = (): number => {
      for (let k = 0; k < SAMPLES; k++) {
        const from = sampled(k, targetCount)
        for (let axis = 0; axis < 3; axis++) targets[3 * k + axis] = input.targets[3 * from + axis] ?? NaN
        deltaSquared[k] = targetDeltaSquared?.[from] ?? 0
      }
      const own = targetDeltaSquared === null ? null : deltaSquared
      plain({ segmentCount, segments, targetCount: SAMPLES, targets, targetDeltaSquared: own }, exact)
      return relativeError(
        targetCount,
        [0, 1, 2].map((axis) => [exact, out, 3, axis] as const),
      )
    }
    return within(
      {
        plain: () => plain(input, out),
        tree: (settings) => tree(input, settings, out),
        look,
        first: segmentTreeSettings(aim),
        sharper: (settings, error) => sharperSegmentTree(settings, aim, error),
      },
      aim,
      check,
    )
  }
}

/** @see Kernel.coaxialVelocityWithin */
export function coaxialVelocityWithin(
  plain: Kernel['coaxialVelocity'],
  tree: CoaxialTree,
): Kernel['coaxialVelocityWithin'] {
  const targetX = new Float64Array(SAMPLES)
  const targetR = new Float64Array(SAMPLES)
  const deltaSquared = new Float64Array(SAMPLES)
  const exact = { axial: new Float64Array(SAMPLES), radial: new Float64Array(SAMPLES) }
  return (input, tolerance, out, check = true) => {
    const { targetCount, rings, targetDeltaSquared, skipSelf } = input
    const unfit = skipSelf || input.firstTarget !== undefined || !(tolerance >= COAXIAL_TOLERANCE.smallest)
    if (unfit || targetCount * rings.count < COAXIAL_PAIRS) {
      plain(input, out)
      return PLAIN
    }
    const aim = Math.min(tolerance, COAXIAL_TOLERANCE.largest)
    const look = (): number => {
      for (let k = 0; k < SAMPLES; k++) {
        const from = sampled(k, targetCount)
        targetX[k] = input.targetX[from] ?? NaN
        targetR[k] = input.targetR[from] ?? NaN
        deltaSquared[k] = targetDeltaSquared?.[from] ?? 0
      }
      const own = targetDeltaSquared === null ? null : deltaSquared
      plain({ rings, targetCount: SAMPLES, targetX, targetR, targetDeltaSquared: own, skipSelf }, exact)
      return relativeError(targetCount, [
        [exact.axial, out.axial, 1, 0],
        [exact.radial, out.radial, 1, 0],
      ])
    }
    return within(
      {
        plain: () => plain(input, out),
        tree: (settings) => tree(input, settings, out),
        look,
        first: coaxialTreeSettings(aim),
        sharper: sharperCoaxialTree,
      },
      aim,
      check,
    )
  }
}

/** Target of sample k: spread evenly through the list. */
function sampled(k: number, count: number): number {
  return Math.floor(((k + 0.5) * count) / SAMPLES)
}

/** Exact values at the samples, values at all targets, and where a target's stands: stride i + offset. */
type Component = readonly [exact: Float64Array, out: Float64Array, stride: number, offset: number]

function relativeError(targetCount: number, components: readonly Component[]): number {
  let difference = 0
  let size = 0
  for (const [exact, out, stride, offset] of components) {
    for (let k = 0; k < SAMPLES; k++) {
      const value = exact[stride * k + offset] ?? NaN
      difference += ((out[stride * sampled(k, targetCount) + offset] ?? NaN) - value) ** 2
      size += value * value
    }
  }
  return size === 0 ? (difference === 0 ? 0 : Infinity) : Math.sqrt(difference / size)
}
