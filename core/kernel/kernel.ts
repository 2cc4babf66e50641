/** Coaxial circular filaments. Every array holds at least `count` values; the rest is not read. */
export interface CoaxialRings {
  readonly count: number
  /** Position on the axis, m. */
  readonly x: Float64Array
  /** Radius, m, above 0. */
  readonly r: Float64Array
  /** Gamma, m2/s; positive moves fluid towards +x inside the ring. */
  readonly circulation: Float64Array
  /** Smoothing delta^2, m2; 0 is the plain filament. */
  readonly deltaSquared: Float64Array
}

/** What rings are summed at which points of the meridional plane. */
export interface CoaxialInput {
  /** Number of targets; the last computed is the one before it. */
  readonly targetCount: number
  /** Number of the first target to compute and write, 0 when absent: a call can take a part of the targets. */
  readonly firstTarget?: number
  /** Axial position of the targets, m. */
  readonly targetX: Float64Array
  /** Distance of the targets from the axis, m, 0 or above. */
  readonly targetR: Float64Array
  /** delta^2 of the targets, m2: a pair takes the mean of the two. null: a pair takes the source's. */
  readonly targetDeltaSquared: Float64Array | null
  readonly rings: CoaxialRings
  /** Target i is ring i, and its own contribution is left out (for a self speed computed elsewhere). */
  readonly skipSelf: boolean
}

/** Velocity in the meridional plane, m/s; each array at least `targetCount` long, the rest left as it was. */
export interface CoaxialVelocity {
  readonly axial: Float64Array
  readonly radial: Float64Array
}

/** `double`: IEEE double throughout. `mixed`: about 2e-7 of the root mean square, for previews; never a result. */
export type Precision = 'double' | 'mixed'

/** Straight segments as 64-byte records, see `segmentRecords`, and the points they are summed at. */
export interface SegmentInput {
  /** Number of targets; the last computed is the one before it. */
  readonly targetCount: number
  /** Number of the first target to compute and write, 0 when absent: a call can take a part of the targets. */
  readonly firstTarget?: number
  /** x y z of each target, m. */
  readonly targets: Float64Array
  /** delta^2 of the targets, m2: a pair takes the mean of the two. null: a pair takes the source's. */
  readonly targetDeltaSquared: Float64Array | null
  readonly segmentCount: number
  /** Eight doubles a segment: midpoint x y z, Gamma dl / (4 pi) x y z, delta^2, unused. */
  readonly segments: Float64Array
  readonly precision?: Precision
}

/** How a sum to a tolerance was done. */
export interface TreeReport {
  readonly method: 'plain' | 'tree'
  /** Relative root mean square error, seen at 200 targets; 0 for the plain sum, null where it was not looked at. */
  readonly error: number | null
}

/**
 * The hot sums. Two implementations do the same operations in the same order, so that they agree to the last bit.
 *
 * Nothing is refused here: the rooms above check their input. NaN or infinity in a source gives NaN (or infinity) at every
 * target, in the components it enters, in a target at that target only; a target that lies on a source whose delta is 0 gives infinity or NaN.
 * A target's value does not depend on which other targets are in the call, so targets can be split freely.
 * A kernel's memory grows with the largest call and is kept; where the engine has none left, a call throws RangeError.
 */
export interface Kernel {
  readonly name: 'wasm' | 'typescript'
  /** Velocity of rings, Rosenhead-Moore smoothed; writes `out`. */
  readonly coaxialVelocity: (input: CoaxialInput, out: CoaxialVelocity) => void
  /**
   * As coaxialVelocity to a relative root mean square error of at most `tolerance`, by a tree where that is faster: from
   * about 1000 targets and rings on, at tolerances of 1e-9 and above, without skipSelf. The error is looked at on 200
   * targets and the tree sharpened, or given up, when it is too large.
   *
   * @param check false takes the error on trust: for the stages between two checked calls on much the same points.
   */
  readonly coaxialVelocityWithin: (
    input: CoaxialInput,
    tolerance: number,
    out: CoaxialVelocity,
    check?: boolean,
  ) => TreeReport
  /** Stokes stream function psi of rings, m3/s (2 pi psi is the flux through the target's circle); writes `out`. */
  readonly coaxialStream: (input: CoaxialInput, out: Float64Array) => void
  /** Velocity of segments, Rosenhead-Moore kernel; writes x y z of each target to `out`. */
  readonly segmentVelocity: (input: SegmentInput, out: Float64Array) => void
  /** As coaxialVelocityWithin, for segments: from about 1500 on, at tolerances of 1e-8 and above. */
  readonly segmentVelocityWithin: (
    input: SegmentInput,
    tolerance: number,
    out: Float64Array,
    check?: boolean,
  ) => TreeReport
}
