/**
 * Pulses in a row on a vehicle: what comes out. SI; all thrusters together unless said otherwise.
 */
import type { PulseInput, PulseResult } from '../pulse'
import type { ThrusterPower } from './budget'
import type { Cavitation } from './cavitation'
import type { Cruise } from './cruise'
import type { CycleHistory } from './cycle'
import type { RingImpulseCurve, RingShare } from './ringShare'
import type { StartUp } from './startUp'
import type { Limit, ThrusterSection } from './types'
import type { RingSpacing, Turning } from './vectoring'

export interface ThrusterInput {
  readonly section: ThrusterSection
  /** Water, nozzle, programme and models of one pulse; its axial flow is read on a bench only, under way the vehicle's speed is it. */
  readonly pulse: PulseInput
  /** null: not known. */
  readonly vapourPressure: number | null
  /** At the depth of the nozzle [Pa]. */
  readonly absolutePressure: number
  /** Pulses a second of each thruster [1/s]: one over the train's period. */
  readonly frequency: number
}

/** One thing to be said beside the results; its id names it in the table of cautions. */
export interface ThrusterNote {
  readonly id: ThrusterNoteId
  readonly text: string
}

export const THRUSTER_NOTES = [
  'thruster-does-not-start',
  'thruster-shortfall',
  'thruster-several-speeds',
  'thruster-limits',
  'thruster-speed-jumps',
  'thruster-no-column',
  'thruster-braking-suction',
  'thruster-close-nozzles',
  'thruster-close-rings',
  'thruster-past-ring',
  'thruster-strong-stream',
  'thruster-refill-by-exit',
  'thruster-hull-reynolds',
  'thruster-light-vehicle',
  'thruster-no-added-mass',
  'thruster-jet-other-stream',
] as const
export type ThrusterNoteId = (typeof THRUSTER_NOTES)[number]

/** How a duty point is met. */
export interface Duty {
  /** Speed aimed at [m/s]; null for a thrust while standing. */
  readonly speed: number | null
  /** Mean thrust there [N], and what is asked for: the drag at that speed, or the thrust. */
  readonly thrust: number
  readonly needed: number
  /** What is missing [N]; 0 where it is met. */
  readonly shortfall: number
}

/** The plunger of one thruster; Infinity where the programme's speed jumps. */
export interface PlungerFigures {
  readonly travel: number
  readonly speed: number
  readonly acceleration: number
  readonly force: number
  /** Put into the actuator [W]. */
  readonly peakPower: number
}

/** Field names of the first part follow `thruster` of summary.json. */
export interface ThrusterResult {
  /** Of one thruster, along the way of the vehicle, the intake's share taken off [N s]. */
  readonly thrustPerPulse: number
  readonly meanThrust: number
  /** From the slug with the loss of close neighbours to the slug with the over-pressure of a quick start; the adopted value within. */
  readonly meanThrustRange: readonly [number, number]
  /** Highest in the period. */
  readonly peakThrust: number
  /** Steady jets of equal mean flow through the same exits, at rest: rho A (f L)^2 of every thruster. */
  readonly steadyJetThrust: number
  /** Mean thrust over that. */
  readonly thrustRatio: number
  readonly power: ThrusterPower
  /** Null at rest and without thrust, both. */
  readonly froudeEfficiency: number | null
  readonly overallEfficiency: number | null
  /** Of the vehicle: held, or found from thrust and drag; 0 on a bench. */
  readonly speed: number
  /** null without a drag. */
  readonly dragAtSpeed: number | null
  /** Power over weight times speed; null at rest and without a mass. */
  readonly costOfTransport: number | null
  /** [s]; null without an energy store. */
  readonly endurance: number | null
  /** Absolute [Pa]; null without a ring. */
  readonly corePressure: number | null
  /** Smallest pressure over vapour pressure [Pa]; null without a vapour pressure. */
  readonly cavitationMargin: number | null
  readonly limits: readonly Limit[]

  /** [1/s] and [s]. */
  readonly frequency: number
  readonly period: number
  /** Share of the period the stroke takes. */
  readonly duty: number
  /** Mean flow of all thrusters [m3/s]. */
  readonly flow: number
  readonly quickStart: boolean
  /** (highest - lowest) / mean of the thrust in a period; null where the mean is not above 0. */
  readonly ripple: number | null
  /** Share of thrust close neighbours may cost: in the low end of the range only. */
  readonly proximityLoss: number
  /** [J/m] and [m]; null at rest, and without an energy store. */
  readonly energyPerDistance: number | null
  readonly range: number | null
  /** Thrust less drag at the speed [N]; null without a drag. */
  readonly excessThrust: number | null
  /** All speeds at which thrust meets drag; null without a drag. */
  readonly cruise: Cruise | null
  readonly duties: readonly Duty[]
  /** From rest to cruise; null without mass, drag or a cruise speed above 0. */
  readonly startUp: StartUp | null
  readonly plunger: PlungerFigures
  /** Longest stroke the eject share leaves, and what is left to refill [s]. */
  readonly ejectTimeAllowed: number
  readonly refillTime: number
  /** Peak speed in the intake opening [m/s]. */
  readonly intakeSpeed: number
  readonly cavity: {
    readonly volume: number
    /** Plunger travel and nozzle together. */
    readonly length: number
    /** Over and under the pressure outside [Pa]: flow loading only; Infinity where the speed jumps. */
    readonly pressureHigh: number
    readonly pressureLow: number
  }
  readonly cavitation: Cavitation
  /** Share of the pulse's impulse that goes into the ring: what the spread of the formation number moves; thrust and power it does not. */
  readonly ringShare: RingShare
  /** null where no formation number is adopted. */
  readonly ringImpulsePerWork: RingImpulseCurve | null
  /** null where there is no ring or it does not leave. */
  readonly ringSpacing: RingSpacing | null
  /** null without an arm. */
  readonly turning: Turning | null
  /** The pulse in the stream of the vehicle's speed. */
  readonly pulse: PulseResult
  readonly cycle: CycleHistory
  readonly notes: readonly ThrusterNote[]
}
