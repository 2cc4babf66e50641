/**
 * How many nodes a ring needs, and its first shape.
 */
import { evenlySpaced, sampleCurve } from './closedCurve'
import { LARGEST_STRIDE } from './sourceStrides'
import type { WakeRing } from './types'
import { acrossOf, along, unit, type Vector } from './vector'

/**
 * delta over the length of a segment when a ring is meshed. The error of the trapezoidal rule falls as exp(-2 pi) a unit of it, and the
 * greater part of what is left is added back (see `FilamentFlow`): the self speed of a circle errs by 1e-5 at 1 and 1e-6 at 1.25.
 */
export const MESHED_RATIO = 1.25
/** Below this the ring is meshed anew. */
export const REFINE_BELOW = 1.05
/** Below this the smoothing no longer holds the segments together, and the run is no longer told as valid. */
export const LEAST_RATIO = 1
/** Longest over shortest segment above which a ring is meshed anew. */
export const LARGEST_SPREAD = 1.6
/** A ring whose segments are finer than needed by this is meshed anew. */
const COARSEN_ABOVE = 1.9
/** Fewest nodes of a meshed ring: its own shape asks for them, whatever its core. */
const FEWEST_MESHED = 48
/** Default of `nodeLimit`: a sum over all pairs of so many takes about 0.15 s. */
export const NODE_LIMIT = 10_000

/** Nodes a ring of this length and smoothing needs: a multiple of the largest stride. */
export function nodesNeeded(length: number, delta: number): number {
  return Math.max(FEWEST_MESHED, LARGEST_STRIDE * Math.ceil((MESHED_RATIO * length) / delta / LARGEST_STRIDE))
}

/** Node counts within a limit: what each ring needs, or its share of the limit. */
export function nodeCounts(needed: readonly number[], limit: number): number[] {
  const total = needed.reduce((sum, count) => sum + count, 0)
  if (total <= limit) return [...needed]
  const share = limit / total / LARGEST_STRIDE
  return needed.map((count) => LARGEST_STRIDE * Math.max(1, Math.floor(count * share)))
}

/** True where a ring should be meshed anew, because its segments are too long, too uneven or far finer than needed. */
export function wantsMesh(ring: {
  readonly delta: number
  readonly longest: number
  readonly shortest: number
  readonly nodes: number
  readonly needed: number
}): boolean {
  const { delta, longest, shortest, nodes, needed } = ring
  if (longest > LARGEST_SPREAD * shortest) return true
  if (delta < REFINE_BELOW * longest) return true
  return nodes > (COARSEN_ABOVE / MESHED_RATIO) * needed && nodes > FEWEST_MESHED
}

/** A fine, evenly spaced first shape of a ring: circle, ellipse or the curve that was given. */
export function firstShape(ring: WakeRing): Float64Array {
  const fine = 1024
  if (ring.curve !== undefined) return ring.curve.slice()
  const direction = unit(ring.direction)
  const [first, second] = acrossOf(direction)
  const stretch = Math.sqrt(ring.axisRatio ?? 1)
  const place = (angle: number): Vector =>
    along(
      along(ring.centre, first, ring.radius * stretch * Math.cos(angle)),
      second,
      (ring.radius / stretch) * Math.sin(angle),
    )
  const nodes = sampleCurve(place, fine)
  return stretch === 1 ? nodes : evenlySpaced(nodes, fine)
}
