/**
 * Watches a slender elliptic ring for the moment at which its sides come nearest.
 *
 * Its axes change over first: the sides part. They then approach in the other direction, and there a ring of axis ratio 0.2 splits
 * (Dhanak & de Bernardinis 1981, J. Fluid Mech. 109:189).
 */
import { distanceToItself } from './approach'
import type { CurveSums } from './closedCurve'

/** The sides have parted when their distance has grown by this. */
const PARTED = 1.2
/** They have come nearest when their distance has grown again by this. */
const TURNED = 1.02

export class SplitWatch {
  private first: number | null = null
  private widest = 0
  private nearest = Infinity

  /** Look at the ring after a step; true once, when its sides have just come nearest. */
  isNearest(nodes: Float64Array, sums: CurveSums): boolean {
    const waist = distanceToItself(nodes, sums, sums.length / 4)
    this.first ??= waist
    this.widest = Math.max(this.widest, waist)
    if (this.widest < PARTED * this.first) return false
    this.nearest = Math.min(this.nearest, waist)
    return this.nearest < this.first && waist > TURNED * this.nearest
  }
}
