/**
 * What a starting jet lets go of, as rings that can be marched on. SI; x along the jet from the lip.
 */
import type { Kernel } from '../../kernel'
import type { JetRun } from './types'

export interface JetReleaseInput {
  /** A run with its shapes kept. */
  readonly run: JetRun
  /** rho [kg/m3] */
  readonly density: number
  /** nu the run was computed with [m2/s] */
  readonly kinematicViscosity: number
  /** D [m] */
  readonly diameter: number
  /** Whether its smoothing grew with age. */
  readonly coreGrowth: boolean
  /** When the piston stops [s]. */
  readonly strokeDuration: number
  readonly kernel: Kernel
}

export interface ReleasedRing {
  /** Gamma [m2/s] */
  readonly circulation: number
  /** sqrt(sum Gamma r^2 / sum Gamma) of its filaments [m] */
  readonly radius: number
  /** a [m]: the uniform core with which the regularised law gives the speed of the steady ring of the same circulation, impulse and energy. */
  readonly coreRadius: number
  /** Centroid sum Gamma r^2 x / sum Gamma r^2 [m]. */
  readonly x: number
  /** False: no steady ring has so little energy, and it is given the speed of Hill's vortex; or its core came from merging. */
  readonly energyKept: boolean
}

/** Sum Gamma [m2/s], sum Gamma r^2 [m4/s] and sum Gamma r^2 x [m5/s]. */
export interface JetSums {
  readonly circulation: number
  readonly square: number
  readonly moment: number
}

export interface JetRelease {
  /** [s] from the first piston motion. */
  readonly time: number
  /** The pinched ring, then the billows behind it, downstream first. */
  readonly rings: readonly ReleasedRing[]
  /** Everything shed by then. */
  readonly total: JetSums
  /** What stays at the lip: the stopping vortex, and scraps that joined neither ring nor billow. */
  readonly leftOut: JetSums
  /** Circulation of the ring at release less that at pinch-off [m2/s]: billows it swallowed in between. */
  readonly takenIn: number
}
