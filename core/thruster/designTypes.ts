/**
 * Designs of a sizing: what is asked for, what a design is, and what it comes to.
 */
import type { Budget } from './budget'
import type { ThrusterInput } from './resultTypes'
import type { StrokeMoments } from './shapeMoments'
import type { Limit } from './types'

/** What a sizing starts from: its nozzle and programme lend their proportions and shape to every design. */
export type DesignProblem = Omit<ThrusterInput, 'frequency'>

/** One choice of what is searched. */
export interface Design {
  /** Exit diameter of equal area [m]. */
  readonly diameter: number
  /** Full stroke over exit diameter. */
  readonly strokeRatio: number
  /** Thrusters. */
  readonly count: number
  /** Share of the period that ejects, one valve lag included. */
  readonly ejectShare: number
  /** Pulses a second; null: at each duty point what just gives its thrust. */
  readonly frequency: number | null
}

export type DesignField = 'diameter' | 'strokeRatio' | 'count' | 'ejectShare' | 'frequency'

/** What one duty point asks for. */
export interface DutyDemand {
  /** Of the vehicle [m/s]; null: where thrust meets drag. */
  readonly speed: number | null
  /** Thrust [N] that must be held; null: none is asked for. */
  readonly thrust: number | null
  /** Weight of this point in the mean power; all together 1. */
  readonly share: number
}

/** A thruster at one duty point with nothing left to be found. */
export interface HeldPoint {
  readonly diameter: number
  readonly pistonDiameter: number
  /** Slug length [m]. */
  readonly stroke: number
  readonly frequency: number
  readonly ejectShare: number
  readonly count: number
}

/** A design at one duty point. */
export interface PointFigures {
  /** Of the vehicle [m/s]. */
  readonly speed: number
  /** Asked for [N]; null: nothing is. */
  readonly thrustAsked: number | null
  /** Its stroke is the full one, or less where the slowest frequency gives too much. */
  readonly held: HeldPoint
  /** Highest exit speed [m/s]. */
  readonly peakSpeed: number
  /** Of the stroke [s]. */
  readonly duration: number
  readonly budget: Budget
  readonly moments: StrokeMoments
  readonly limits: readonly Limit[]
  /** Sum of what is broken, each over its limit; 0 where every limit holds. */
  readonly violation: number
}

/** What a design comes to. */
export interface DesignFigures {
  readonly design: Design
  readonly points: readonly PointFigures[]
  /** Mean of the points' total power by their shares [W]. */
  readonly power: number
  /** Thrust at the first point [N]. */
  readonly thrust: number
  /** Swept by all plungers together at the full stroke [m3]: the size of a design. */
  readonly sweptVolume: number
  readonly violation: number
}
