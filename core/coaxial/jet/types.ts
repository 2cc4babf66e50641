/**
 * The starting jet: what goes in and what comes out. SI; x along the jet, the lip at x = 0, t = 0 at the first piston motion.
 */
import type { RunOptions, RunStatus } from '../../base'
import type { Kernel } from '../../kernel'
import type { Invariants, ProgrammeInput } from '../../pulse'

export interface StartingJetInput {
  /** rho [kg/m3] */
  readonly density: number
  /** nu [m2/s] */
  readonly kinematicViscosity: number
  /** D of the tube [m] */
  readonly diameter: number
  /** Any programme of a plan, a table included. */
  readonly programme: ProgrammeInput
  /** Stream past the tube along the jet [m/s]: + co-flow, - counter-flow; smaller than the peak speed. */
  readonly axialFlow: number
  /** True: delta^2 of every filament grows by 4.5 nu times its age. */
  readonly coreGrowth: boolean
  /** Smoothing length over D, 0.03 to 0.2. */
  readonly delta: number
  readonly settings?: JetSettings
}

/** Numerical settings, each with a default; for tests of independence and for previews. */
export interface JetSettings {
  /** Longest time step in D / U_peak, default 0.025; never above a quarter of delta. */
  readonly timeStep?: number
  /** Factor on the length of the wall's panels, default 1. */
  readonly panelFactor?: number
  /** Number of filaments above which the oldest are merged, default 1500. */
  readonly filamentLimit?: number
  /** Time between two shapes of the sheet in D / U_peak, default 0.25; 0 for none. */
  readonly snapshotStep?: number
  /** Time to follow the ring after pinch-off in D / U_peak, default 0.5; the stroke is followed to its end in any case. */
  readonly followTime?: number
  /** False: a run ends after pinch-off though the stroke goes on, and does not tell what leaves beyond the slug. Default true. */
  readonly wholeStroke?: boolean
  /** Time after the stroke without a trailing jet after which one ring has taken everything, in D / U_peak, default 3. */
  readonly settleTime?: number
  /** Time without the tube in which the drift is measured, in D / U_peak, default 0.25; 0 for none. */
  readonly freeFlight?: number
}

export interface JetOptions extends RunOptions {
  readonly kernel: Kernel
  /** Awaited after every step: lets messages in, so that a cancellation can arrive. It may return at once. */
  readonly pause?: () => Promise<void>
}

/** The jet at rising times, a tenth of D / U_peak apart; every array has one length. */
export interface JetHistory {
  readonly time: readonly number[]
  /** T* = int U dt / D, constant after the stroke. */
  readonly formationTime: readonly number[]
  /** Circulation shed so far, the stopping vortex included [m2/s]. */
  readonly totalCirculation: readonly number[]
  /** Impulse of everything shed [N s]: rho pi sum Gamma r^2. */
  readonly totalImpulse: readonly number[]
  /** Energy of everything shed [J], as if the tube were not there. */
  readonly totalEnergy: readonly number[]
  /** Of the ring; null until one is cut. */
  readonly ringCirculation: readonly (number | null)[]
  /** Centroid sum Gamma r^2 x / sum Gamma r^2 [m]. */
  readonly ringX: readonly (number | null)[]
  /** sqrt(sum Gamma r^2 / sum Gamma) [m] */
  readonly ringRadius: readonly (number | null)[]
  readonly ringImpulse: readonly (number | null)[]
  readonly ringEnergy: readonly (number | null)[]
  /** Place of the cut [m]; null without one: before a ring is cut, and where the ring is everything. */
  readonly cutX: readonly (number | null)[]
}

/** Shape of the sheet at one time. */
export interface JetSnapshot {
  readonly time: number
  readonly formationTime: number
  /** Filaments 0 to looseCount - 1 are single; from there on they are one line, from the tip of the sheet to the lip. */
  readonly looseCount: number
  readonly x: Float64Array
  readonly r: Float64Array
  readonly circulation: Float64Array
  /** Time since it was shed [s]. */
  readonly age: Float64Array
  /** The ring lies beyond; null without a cut. */
  readonly cutX: number | null
}

/** The ring: means over the first plateau of its circulation, or over the end of a run in which it takes everything. */
export interface JetRing extends Invariants {
  /** E / (rho^1/2 I^1/2 Gamma^3/2) */
  readonly dimensionlessEnergy: number
  readonly radius: number
  /** Place at the end of the plateau. */
  readonly x: number
  /** Slope of its place over the plateau [m/s]. */
  readonly speed: number
  /** Gamma / ((I / rho)^1/3 speed^2/3); null for a ring that does not move downstream. */
  readonly limitingCirculation: number | null
}

export interface JetPinchOff {
  /** When it is seen: the end of the plateau [s]. */
  readonly time: number
  readonly formationTime: number
  /** Place of the cut then [m]. */
  readonly cutX: number
  /** What the ring has gained on the plateau by the end of the run [m2/s]: billows it swallowed later; a little below 0 for none. */
  readonly takenInLater: number
}

export interface JetCounters {
  readonly steps: number
  readonly evaluations: number
  /** Most filaments at any time. */
  readonly filaments: number
  readonly inserted: number
  readonly merges: number
  /** Filaments taken away by merging. */
  readonly merged: number
}

export interface JetRun {
  readonly status: RunStatus
  readonly message: string
  /** Over D. */
  readonly delta: number
  /** Time reached [s]. */
  readonly time: number
  readonly strokeRatio: number
  readonly history: JetHistory
  readonly snapshots: readonly JetSnapshot[]
  /** null where no ring is known: pinch-off not seen, or the run ended early. */
  readonly ring: JetRing | null
  /** True: there is a trailing jet behind the ring. False: one ring takes everything. null: the run could not say. */
  readonly trailingJet: boolean | null
  /** null where it was not seen. */
  readonly pinchOff: JetPinchOff | null
  /** Stroke ratio at which the total circulation equalled the pinched ring's; null without pinch-off. */
  readonly formationNumber: number | null
  /** When that was [s]. */
  readonly formationInstant: number | null
  /** Everything shed at the end of the stroke; null where the run did not come to it. */
  readonly atStrokeEnd: Invariants | null
  /** The same beyond the slug. */
  readonly beyondSlug: Invariants | null
  /** Circulation of the stopping vortex, 0 or below [m2/s]. */
  readonly stoppingCirculation: number
  readonly counters: JetCounters
  /** Relative drift of the sheet without tube and core growth, measured at the end; null where not measured. */
  readonly drift: { readonly impulse: number; readonly energy: number } | null
}
