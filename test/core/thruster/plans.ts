import type { PulseInput } from '../../../core/pulse'
import type { BudgetSetting, ThrusterInput, ThrusterSection, VehicleInput } from '../../../core/thruster'
import { PLAIN, TUBE } from '../pulse/plans'

/** One thruster on a bench, no limit set, no loss anywhere but the intake's usual one. */
export const BENCH: ThrusterSection = {
  count: 1,
  spacing: null,
  inTurn: false,
  cant: 0,
  arm: null,
  vehicle: null,
  actuator: {
    maxForce: null,
    maxSpeed: null,
    maxAcceleration: null,
    maxPower: null,
    maxTravel: null,
    efficiency: 1,
    ejectShare: 0.5,
    valveLag: 0,
  },
  intake: { area: null, recoveredShare: 0, lossCoefficient: 0.5 },
  bay: { length: null, diameter: null },
  energyStore: null,
  target: [],
  search: null,
  manufacture: { diameter: 0, stroke: 0, frequency: 0 },
}

export const VEHICLE: VehicleInput = {
  speed: null,
  mass: 8,
  addedMass: 2,
  length: 0.6,
  drag: { kind: 'area', dragArea: 0.002 },
}

/** Four diameters of slug with ramps, from a tube that holds water. */
export const PUSH: PulseInput = {
  ...PLAIN,
  nozzle: { ...TUBE, length: 0.03, lossCoefficient: 0.1 },
  programme: { shape: 'trapezoid', stroke: 0.08, peakSpeed: 0.5, riseTime: 0.04, fallTime: 0.04, rows: [] },
}

export const ON_BENCH: ThrusterInput = {
  section: BENCH,
  pulse: PUSH,
  vapourPressure: 2339,
  absolutePressure: 101325 + 998.2 * 9.80665 * 2,
  frequency: 2,
}

export const UNDER_WAY: ThrusterInput = { ...ON_BENCH, section: { ...BENCH, vehicle: VEHICLE } }

/** A bare budget: 20 mm tube, unit efficiency, nothing but the jet and the refill. */
export const BARE: BudgetSetting = {
  density: 998.2,
  diameter: 0.02,
  pistonDiameter: 0.04,
  nozzleLength: 0,
  lossCoefficient: 0,
  impulseFactor: 1,
  energyFactor: 1,
  overPressure: 'off',
  computedBeyondSlug: null,
  speed: 0,
  frequency: 1,
  count: 1,
  spacing: null,
  cant: 0,
  ejectShare: 0.5,
  valveLag: 0,
  efficiency: 1,
  intakeArea: null,
  recoveredShare: 0,
  intakeLossCoefficient: 0,
}

/** The section with other fields of its vehicle. */
export function withVehicle(vehicle: Partial<VehicleInput>, input: ThrusterInput = UNDER_WAY): ThrusterInput {
  return { ...input, section: { ...input.section, vehicle: { ...VEHICLE, ...vehicle } } }
}

/** The input with other fields of its section. */
export function withSection(section: Partial<ThrusterSection>, input: ThrusterInput = ON_BENCH): ThrusterInput {
  return { ...input, section: { ...input.section, ...section } }
}
