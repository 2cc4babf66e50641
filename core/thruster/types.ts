/**
 * Pulses in a row on a vehicle: what goes in. SI; thrust positive along the vehicle's way, against the jet.
 */

/** Drag of the vehicle against its speed. */
export type DragInput =
  /** drag = rho V^2 / 2 x dragArea [m2] */
  | { readonly kind: 'area'; readonly dragArea: number }
  /** Friction line on the wetted area [m2] with form factor k: (1 + k) C_F; needs the vehicle's length. */
  | { readonly kind: 'hull'; readonly wettedArea: number; readonly formFactor: number }
  /** Speeds [m/s] rising from 0 or above, drag [N]. */
  | { readonly kind: 'table'; readonly rows: readonly { readonly speed: number; readonly drag: number }[] }

export interface VehicleInput {
  /** Held speed [m/s]; null: found from thrust and drag. */
  readonly speed: number | null
  /** [kg] */
  readonly mass: number | null
  /** Water that is accelerated with it [kg]. */
  readonly addedMass: number | null
  /** [m] */
  readonly length: number | null
  readonly drag: DragInput | null
}

/** The actuator of one thruster; null: no limit. */
export interface ActuatorInput {
  /** On the plunger [N]. */
  readonly maxForce: number | null
  /** Of the plunger [m/s]. */
  readonly maxSpeed: number | null
  /** Of the plunger [m/s2]. */
  readonly maxAcceleration: number | null
  /** Highest power at any time [W], electrical. */
  readonly maxPower: number | null
  /** Of the plunger [m]. */
  readonly maxTravel: number | null
  /** Work on the water over work put in, above 0 to 1. */
  readonly efficiency: number
  /** Share of the period in which the water is pushed out, the valve's lag included; the rest refills. */
  readonly ejectShare: number
  /** Dead time at each turn of the valve [s]. */
  readonly valveLag: number
}

export interface IntakeInput {
  /** Opening that refills the cavity [m2]; null: the exit itself. */
  readonly area: number | null
  /** Share of the momentum of the water taken in that is not lost, 0 to 1. */
  readonly recoveredShare: number
  /** Pressure loss over the dynamic pressure in the opening. */
  readonly lossCoefficient: number
}

/** Room for one thruster inside the vehicle; null: no limit. */
export interface BayInput {
  /** Cavity with nozzle along the axis [m]. */
  readonly length: number | null
  /** Largest plunger or nozzle [m]. */
  readonly diameter: number | null
}

/** One thing the vehicle must do: hold a speed against its drag, or give a thrust while standing. */
export type DutyPoint =
  { readonly speed: number; readonly share: number } | { readonly thrust: number; readonly share: number }

/** Low and high end. */
export type Span = readonly [number, number]

export interface StockInput {
  /** Nozzle bores to be had [m]; empty: any. */
  readonly diameters: readonly number[]
  /** Plunger strokes to be had [m]; empty: any. */
  readonly strokes: readonly number[]
}

export interface SearchInput {
  readonly diameter: Span
  readonly strokeRatio: Span
  /** [1/s] */
  readonly frequency: Span
  /** Whole numbers of thrusters. */
  readonly count: Span
  /** Share of the period that ejects; null: the actuator's. */
  readonly ejectShare: Span | null
  readonly stock: StockInput | null
  readonly seed: number
  /** Least power for the duty points, or most thrust inside the limits at the vehicle's speed. */
  readonly goal: 'power' | 'thrust'
}

export interface ThrusterSection {
  readonly count: number
  /** Between the axes of neighbouring nozzles [m]; null: far apart. */
  readonly spacing: number | null
  /** True: the thrusters fire one after another through the period. */
  readonly inTurn: boolean
  /** Angle between each jet and the way of the vehicle [rad]. */
  readonly cant: number
  /** Arm of a vectored pair about the vehicle's centre [m]; null: no turning moment is computed. */
  readonly arm: number | null
  /** null: the thruster stands on a bench. */
  readonly vehicle: VehicleInput | null
  readonly actuator: ActuatorInput
  readonly intake: IntakeInput
  readonly bay: BayInput
  /** Energy on board for the thrusters [J]. */
  readonly energyStore: number | null
  /** Duty points of the sizing; empty: none asked for. */
  readonly target: readonly DutyPoint[]
  /** null: no search is made. */
  readonly search: SearchInput | null
  /** Relative standard deviations of manufacture, for the spread of thrust beside a candidate. */
  readonly manufacture: { readonly diameter: number; readonly stroke: number; readonly frequency: number }
}

/** A named limit with how the plan stands to it. */
export interface Limit {
  readonly name: LimitName
  readonly value: number
  readonly limit: number
  readonly ok: boolean
}

/** Limits of a thruster, in the words the trade uses. */
export const LIMIT_NAMES = [
  'plunger force',
  'plunger speed',
  'plunger acceleration',
  'actuator power',
  'plunger travel',
  'eject time',
  'refill time',
  'bay length',
  'bay diameter',
  'core cavitation',
  'intake cavitation',
  'thrust',
  'formation number',
] as const
export type LimitName = (typeof LIMIT_NAMES)[number]
