/**
 * Rings on one axis: what goes in and what comes out. SI; x along the axis, a ring of positive circulation moves towards +x.
 */
import type { RunOptions } from '../base'
import type { Kernel } from '../kernel'
import type { CoreModel } from '../ring'
import type { WakeOutcome } from './wakeTypes'

/**
 * Law of motion. `thin`: each ring's own speed from the thin-core law, the others as plain filaments. `regularised`: own and
 * mutual speeds from the smoothed kernel whose delta matches the core.
 */
export type CoaxialLaw = 'thin' | 'regularised'

export type WakeAgeing = 'laminar' | 'turbulent'

export interface CoaxialRing {
  /** Gamma [m2/s], not 0. */
  readonly circulation: number
  /** R [m] */
  readonly radius: number
  /** a [m], at most 1.5 R; the thin-core law is told as valid below 0.3 R */
  readonly coreRadius: number
  readonly core: CoreModel
  /** Place on the axis when it appears [m]. */
  readonly x: number
  /** When it appears [s], >= 0. */
  readonly startTime: number
}

export interface CoaxialWakeInput {
  /** At least one. */
  readonly rings: readonly CoaxialRing[]
  readonly law: CoaxialLaw
  /** nu [m2/s] */
  readonly kinematicViscosity: number
  /** True: rings age. */
  readonly viscous: boolean
  /**
   * How: a^2 of every core grows by 4 nu dt, or every ring grows in proportion to its own way at constant impulse. Where the ring
   * Reynolds number does not say which, run both: the two runs are the ends of the range.
   */
  readonly ageing: WakeAgeing
  /** Uniform stream along the axis [m/s]. */
  readonly axialFlow: number
  /** Place on the axis of a plane wall across it [m], or null. */
  readonly wall: number | null
  /** Radius of a round tube about the axis [m], or null. */
  readonly tubeRadius: number | null
  /** Places on the axis where arrivals are told [m]. */
  readonly stations: readonly number[]
  /** [s] */
  readonly duration: number
  /** [s] */
  readonly outputStep: number
  /** Error allowed in a step, relative to the size of a ring. */
  readonly tolerance: number
}

export interface CoaxialOptions extends RunOptions {
  readonly kernel: Kernel
  /** Lets messages in between steps, so that a cancellation can arrive; it may return at once when called again soon. */
  readonly pause?: () => Promise<void>
}

/** One ring's path at the output times of its life; every array has one length. */
export interface CoaxialTrajectory {
  readonly time: Float64Array
  readonly x: Float64Array
  readonly radius: Float64Array
  readonly coreRadius: Float64Array
  /** Constant save under turbulent ageing. */
  readonly circulation: Float64Array
  /** dx/dt [m/s] */
  readonly speed: Float64Array
}

export interface CoaxialWake extends WakeOutcome {
  /** In the order of the input; empty arrays for a ring that never appeared. */
  readonly trajectories: readonly CoaxialTrajectory[]
}
