/** What velocity fields give: numbers of each frame, and of the whole run. */
import type { ReadingsCalibration } from './types'

export interface FieldOptions {
  /** Of the exit [m]. */
  readonly diameter: number
  /** Peak exit speed [m/s]: the scale of a flat stretch. */
  readonly peakSpeed: number
  /** rho [kg/m3] */
  readonly density: number
  /** y of the axis in the frames, after the calibration [m]; default 0. */
  readonly axis?: number
  /** x of the exit plane [m], default 0: what lies upstream is not counted. */
  readonly from?: number
  /** int U dt / D of the pulse up to a time; null where it is not known. */
  readonly formationTime?: (time: number) => number | null
  readonly calibration?: ReadingsCalibration
}

/** The leading ring in one frame. */
export interface FieldRing {
  /** By area, and round its edge [m2/s]. */
  readonly circulation: number
  readonly circulationByContour: number | null
  /** Centroid of its vorticity [m]. */
  readonly x: number
  readonly radius: number
  readonly coreRadius: number
  /** [N s] */
  readonly impulse: number
}

export interface FieldNumbers {
  readonly time: number
  readonly formationTime: number | null
  /** Everything downstream of the exit plane, by area and round the edge of the frame [m2/s]. */
  readonly totalCirculation: number
  readonly totalByContour: number
  /** [N s] */
  readonly totalImpulse: number
  /** null where no ring stands out. */
  readonly ring: FieldRing | null
  /** Density of circulation at the cut over that of the ring; null where nothing follows the ring. */
  readonly cutRatio: number | null
  readonly trailingJet: boolean
  /** [1/s] */
  readonly peakVorticity: number
  /** Share of it below which vorticity was left out. */
  readonly threshold: number
  /** Of the total circulation, from the noise [m2/s]. */
  readonly circulationError: number
  /** Difference of the two half planes' circulation over their mean; null for one half. */
  readonly asymmetry: number | null
  /** Vectors that were missing and filled. */
  readonly filled: number
}

export interface MeasuredValue {
  readonly value: number
  readonly standardError: number
}

export interface FieldResult {
  /** In the order of time. */
  readonly frames: readonly FieldNumbers[]
  /** First flat stretch of the ring's circulation after it came apart; null where there is none. */
  readonly pinchOff: {
    readonly time: number
    readonly formationTime: number | null
    /** Indices of the frames of the flat stretch. */
    readonly from: number
    readonly to: number
  } | null
  /**
   * Means over the flat stretch, or without one over the frames after the stroke, or those in which the ring is whole; the core is
   * the median. null where no ring was seen.
   */
  readonly ring: {
    readonly circulation: MeasuredValue
    readonly radius: MeasuredValue
    readonly coreRadius: MeasuredValue
    readonly impulse: MeasuredValue
    /** Slope of its place [m/s]; null for a single frame. */
    readonly speed: number | null
    /** How many frames it is of, and the indices of the first and the last. */
    readonly frames: number
    readonly from: number
    readonly to: number
  } | null
  /** Formation time at which the total circulation came to the ring's; null where it cannot be told. */
  readonly formationNumber: MeasuredValue | null
  readonly notes: readonly string[]
}
