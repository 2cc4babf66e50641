/**
 * Rings anywhere in space: what goes in and what comes out. SI; the jet axis is +x.
 */
import type { CoaxialLaw, CoaxialOptions, WakeAgeing, WakeOutcome } from '../coaxial'
import type { CoreModel } from '../ring'
import type { Vector } from './vector'

/** An explicit ring of the plan. */
export interface WakeRing {
  /** Gamma [m2/s], not 0; positive moves along the direction. */
  readonly circulation: number
  /** R [m], of the circle of equal area where axisRatio is not 1. */
  readonly radius: number
  /** a [m] */
  readonly coreRadius: number
  readonly core: CoreModel
  /** [m] */
  readonly centre: Vector
  /** Any length but 0. */
  readonly direction: Vector
  /**
   * Extent across the direction towards y over that towards z (for a jet along x; see `acrossOf`), default 1. Both a value and its
   * inverse stand for an ellipse, with its long axis along y or along z.
   */
  readonly axisRatio?: number
  /** When it appears [s], >= 0, default 0. */
  readonly startTime?: number
  /**
   * Nodes x y z of a closed curve, at equal steps of a smooth parameter and right-handed about the way it moves; replaces radius,
   * centre, direction and axisRatio as the shape. At least 16 nodes.
   */
  readonly curve?: Float64Array
}

/** A plane wall: any point of it [m] and its normal. */
export interface WakeWall {
  readonly point: Vector
  readonly normal: Vector
}

export type WakeModel = 'auto' | 'coaxial' | 'filament'

export interface WakeInput {
  readonly model: WakeModel
  /** Read by the coaxial engine; rings in space always follow the regularised kernel. */
  readonly law: CoaxialLaw
  readonly rings: readonly WakeRing[]
  /** True: rings of one sense on one axis whose cores touch merge, and the run goes on. Rings in space never do. Default false. */
  readonly merging?: boolean
  /** nu [m2/s] */
  readonly kinematicViscosity: number
  readonly viscous: boolean
  readonly ageing: WakeAgeing
  /** Uniform stream along +x [m/s]. */
  readonly axialFlow: number
  readonly wall: WakeWall | null
  /** Radius of a round tube about the rings' axis [m]. */
  readonly tube: number | null
  /** x of the stations [m]. */
  readonly stations: readonly number[]
  readonly duration: number
  readonly outputStep: number
  readonly tolerance: number
}

export interface WakeOptions extends CoaxialOptions {
  /** Most nodes all rings together may have, default 20 000. */
  readonly nodeLimit?: number
}

/** One ring's path at the output times of its life; every array has one length. The columns of trajectory.csv. */
export interface WakeTrajectory {
  readonly time: Float64Array
  /** Centroid by arc length [m]. */
  readonly x: Float64Array
  readonly y: Float64Array
  readonly z: Float64Array
  /** sqrt(impulse / (rho pi Gamma)) [m] */
  readonly radius: Float64Array
  readonly coreRadius: Float64Array
  readonly circulation: Float64Array
  /** Of the centroid along the direction, laboratory frame [m/s]. */
  readonly speed: Float64Array
  /** Unit vector about which the ring turns by the right hand. */
  readonly directionX: Float64Array
  readonly directionY: Float64Array
  readonly directionZ: Float64Array
  /** Length of the curve [m]. */
  readonly length: Float64Array
}

/** Shapes of the rings at one output time. */
export interface WakeFrame {
  readonly time: number
  /** Numbers from 1 of the rings that have appeared. */
  readonly rings: readonly number[]
  /** Nodes x y z of each of them. */
  readonly curves: readonly Float64Array[]
}

export interface Wake extends WakeOutcome {
  readonly model: 'coaxial' | 'filament'
  /** Why this engine. */
  readonly modelReason: string
  /** In the order of the input; empty arrays for a ring that never appeared. */
  readonly trajectories: readonly WakeTrajectory[]
  /** Shapes at every output time, for rings in space; empty from the coaxial engine, whose rings stay circles. */
  readonly frames: readonly WakeFrame[]
  /** Sentences on what was adjusted or left out. */
  readonly notes: readonly string[]
}
