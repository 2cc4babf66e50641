/**
 * What goes into one pulse and what comes out of it. SI throughout; x along the jet, t = 0 at the first piston motion.
 */

export type NozzleShape = 'tube' | 'converging' | 'orifice'
export type ExitProfile = 'uniform' | 'parabolic'

/** The nozzle. `diameter` is the exit diameter of equal area; every length in metres. */
export interface NozzleInput {
  readonly shape: NozzleShape
  readonly diameter: number
  readonly pistonDiameter: number
  /** Long over short axis of the exit, 1 for round. */
  readonly axisRatio: number
  readonly exitProfile: ExitProfile
  /** Jet area over exit area of a sharp orifice; null: the usual formula from the area ratio. */
  readonly contraction: number | null
  /** Radial over axial speed at the lip, 0 for a parallel jet. */
  readonly radialRatio: number
  readonly length: number
  readonly lossCoefficient: number
}

export type ClosedShape = 'rectangular' | 'trapezoid' | 'linear-ramp' | 'half-sine' | 'sine-squared'
export type ProgrammeShape = ClosedShape | 'table'

/** One row of a measured or designed programme at the exit: speed [m/s] or position [m] at a time [s]. */
export type ProgrammeRow =
  { readonly time: number; readonly speed: number } | { readonly time: number; readonly position: number }

/**
 * The speed programme. `stroke` is slug length at the exit. A table is ruled by its rows; its `stroke` and `peakSpeed`
 * are then what the rows give, and the ramps are not used.
 */
export interface ProgrammeInput {
  readonly shape: ProgrammeShape
  readonly stroke: number
  readonly peakSpeed: number
  readonly riseTime: number
  readonly fallTime: number
  readonly rows: readonly ProgrammeRow[]
}

export type OverPressureBasis = 'off' | 'quick-start' | 'computed'
export type FormationBasis = 'energyLimit' | 'carriedVolume' | 'speedMatch' | 'published' | 'computed'

/** What a computed starting jet hands to the pulse; null until one has been run. */
export interface ComputedJet {
  readonly formationNumber: number | null
  readonly formationNumberLow: number | null
  readonly formationNumberHigh: number | null
  /** Beyond the slug, at the end of the stroke. */
  readonly circulationBeyondSlug: number
  readonly impulseBeyondSlug: number
  readonly energyBeyondSlug: number
}

export interface PulseInput {
  readonly density: number
  readonly kinematicViscosity: number
  readonly nozzle: NozzleInput
  readonly programme: ProgrammeInput
  /** Flow past the nozzle along the jet [m/s]: + co-flow, - counter-flow. */
  readonly axialFlow: number
  readonly overPressure: OverPressureBasis
  readonly formationBasis: FormationBasis
  readonly jet: ComputedJet | null
}

/** Circulation [m2/s], impulse [N s] and energy [J] that travel together. */
export interface Invariants {
  readonly circulation: number
  readonly impulse: number
  readonly energy: number
}

/**
 * Every estimate of the formation number with this plan's modifiers, none clipped into the published band; null where it
 * has no crossing or does not apply.
 */
export interface FormationNumbers {
  readonly energyLimit: number | null
  readonly carriedVolume: number | null
  readonly speedMatch: number | null
  readonly computed: number | null
  /** Published band with this plan's modifiers, [low, high]; null where no ring is expected. */
  readonly published: readonly [number, number] | null
  /** Value of the user's chosen basis; null where that has none. */
  readonly adopted: number | null
  /** Ends of the published band and of the finite energyLimit and computed values together. */
  readonly low: number | null
  readonly high: number | null
  /** The estimates before the modifiers of stream, axis ratio and contraction. */
  readonly unmodified: {
    readonly energyLimit: number | null
    readonly carriedVolume: number | null
    readonly speedMatch: number | null
    readonly computed: number | null
  }
  /** One sentence an estimate or modifier that is absent, held or outside its measurements. */
  readonly notes: readonly { readonly estimate: keyof FormationNumbers | 'modifier'; readonly text: string }[]
}

/**
 * Stroke left before pinch-off, in exit diameters; negative past it. From the lowest to the highest of all that stands beside it: every
 * estimate that has a value, and the published band.
 */
export interface StrokeMargin {
  readonly low: number
  readonly high: number
  /** By the adopted estimate; null where it has no value. */
  readonly adopted: number | null
}

/** The ring of a pulse, matched to the steady family. */
export interface PulseRing extends Invariants {
  /** Mean of inner and outer core radius, L_r [m]. */
  readonly radius: number
  /** sqrt(core area / pi) [m]. */
  readonly meanCoreRadius: number
  /** meanCoreRadius / radius. */
  readonly coreRatio: number
  readonly speed: number
  /** Gamma / nu. */
  readonly reynolds: number
  /** Volume of fluid carried along [m3], the core included. */
  readonly carriedVolume: number
  /**
   * How the ring was found: matched to the steady family, or held at Hill's vortex because no steady ring is that thick.
   * At the Hill limit impulse and energy are kept and the circulation Hill's vortex cannot hold is left behind: keeping the
   * circulation instead would give the ring more energy than the pulse has.
   */
  readonly model: 'steady family' | 'hill limit'
}

/** Sums along the pulse at rising times, for plots and pulse.csv; every array has one length. */
export interface PulseHistory {
  readonly time: readonly number[]
  readonly exitSpeed: readonly number[]
  readonly formationTime: readonly number[]
  readonly circulation: readonly number[]
  readonly impulse: readonly number[]
  readonly energy: readonly number[]
  /** E / (rho^1/2 I^1/2 Gamma^3/2) so far; null before the first fluid has left. */
  readonly dimensionlessEnergy: readonly (number | null)[]
  /**
   * Circulation with the quick-start term [m2/s], which follows the exit speed up to its peak and not down again; equal to
   * circulation where the start is not quick.
   */
  readonly circulationQuickStart: readonly number[]
}

/** One thing to be said beside the results of a pulse; its id names it in the table of cautions. */
export interface PulseNote {
  readonly id:
    | 'table-read'
    | 'reduced-peak'
    | 'no-start-over-pressure'
    | 'parabolic-start'
    | 'parallel-jet-assumed'
    | 'radial-inflow'
    | 'no-matching-ring'
    | 'thin-core'
    | 'no-steady-ring'
    | 'elliptic-exit'
    | 'stream-left-out'
  readonly text: string
}

/** What one pulse makes. Field names follow `pulse` of summary.json. */
export interface PulseResult {
  readonly stroke: number
  readonly strokeRatio: number
  readonly duration: number
  /** Highest exit speed that is reached [m/s]; below the plan's where a trapezoid is too short for its ramps. */
  readonly peakSpeed: number
  /** True where a trapezoid's stroke is too short for its ramps, which keep their slopes. */
  readonly reducedPeak: boolean
  /** Way of the piston, stroke times exit area over piston area [m]. */
  readonly pistonTravel: number
  /** Peak speed of the piston, by the same ratio of areas [m/s]. */
  readonly pistonPeakSpeed: number
  /** stroke / duration. */
  readonly meanSpeed: number
  /** Peak speed times diameter over kinematic viscosity. */
  readonly jetReynolds: number
  /** True where 95 % of the peak comes within one formation time at peak speed. */
  readonly quickStart: boolean
  /** peakSpeed (time to 95 % of peak) / D. */
  readonly startFormationTime: number
  /** Slug integrals of the whole stroke, exit factors included. */
  readonly slug: Invariants
  /** The quick-start terms at the reached peak speed, whatever is adopted and whether or not the start is quick. */
  readonly overPressure: Invariants
  /** What ring and trailing jet share: the slug and what the adopted over-pressure basis adds to it. */
  readonly total: Invariants
  /** Of the slug: E / (rho^1/2 I^1/2 Gamma^3/2). */
  readonly dimensionlessEnergy: number
  readonly formationNumber: FormationNumbers
  /** null where no ring is expected. */
  readonly margin: StrokeMargin | null
  /** strokeRatio > adopted; null where there is no adopted value. */
  readonly pinchedOff: boolean | null
  /** Ring by the adopted basis. Null where no ring is expected. */
  readonly ring: PulseRing | null
  /** The ring of the slug alone: one end of the range shown, and `ring` itself where over-pressure is off. */
  readonly ringFromSlug: PulseRing | null
  /** The ring with the quick-start terms: the other end of the range shown; null where the start is not quick. */
  readonly ringWithOverPressure: PulseRing | null
  /** total - ring: zeros while the ring takes everything. */
  readonly trailingJet: Invariants
  readonly history: PulseHistory
  /** Speed factor of the core flow in the tube from its boundary layer, 1 + (8/sqrt pi) sqrt(nu t)/D: a note, not applied. */
  readonly boundaryLayerFactor: number
  /** Circulation over slug circulation by the fit to Didden's measurements; null at L/D <= 0.6, for a slow start and for
   * any other exit than a plain round tube. */
  readonly diddenRatio: number | null
  /** Most unstable azimuthal wave number of the ring; null without a ring or with a core thicker than it. */
  readonly unstableWaveNumber: number | null
  /** Core pressure drop of the ring [Pa]: Rankine core of the mean core radius, or of sqrt(4 nu duration) where that is larger. */
  readonly corePressureDrop: number | null
  /** Limiting circulation Gamma / ((I/rho)^(1/3) U_ring^(2/3)) of the ring. */
  readonly limitingCirculation: number | null
  /** Slug over the slug of a parallel, uniform jet of equal flow: exit profile times radial ratio; already in slug. */
  readonly exitFactors: Invariants
  /** One sentence each on how the programme was read and on what was held or left out, formation number apart. */
  readonly notes: readonly PulseNote[]
  /** Matches to the steady family that this result took: a measure of its cost. */
  readonly ringMatches: number
}
