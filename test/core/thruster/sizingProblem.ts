/** A small underwater vehicle that holds station and moves on: what the tests of the sizing start from. */
import type { DesignProblem } from '../../../core/thruster/designTypes'
import type { SearchInput, ThrusterSection } from '../../../core/thruster/types'

export const SEARCH: SearchInput = {
  diameter: [0.01, 0.08],
  strokeRatio: [1, 6],
  frequency: [0.2, 5],
  count: [1, 4],
  ejectShare: [0.3, 0.7],
  stock: null,
  seed: 1,
  goal: 'power',
}

export const SECTION: ThrusterSection = {
  count: 1,
  spacing: null,
  inTurn: false,
  cant: 0,
  arm: null,
  vehicle: {
    speed: null,
    mass: 30,
    addedMass: 10,
    length: 1.2,
    drag: { kind: 'area', dragArea: 0.01 },
  },
  actuator: {
    maxForce: 60,
    maxSpeed: 0.4,
    maxAcceleration: null,
    maxPower: 40,
    maxTravel: 0.08,
    efficiency: 0.6,
    ejectShare: 0.5,
    valveLag: 0.02,
  },
  intake: { area: 0.002, recoveredShare: 0.2, lossCoefficient: 0.5 },
  bay: { length: 0.3, diameter: 0.09 },
  energyStore: null,
  target: [{ speed: 0.5, share: 1 }],
  search: SEARCH,
  manufacture: { diameter: 0.005, stroke: 0.01, frequency: 0.01 },
}

export const PROBLEM: DesignProblem = {
  section: SECTION,
  pulse: {
    density: 1025,
    kinematicViscosity: 1.19e-6,
    nozzle: {
      shape: 'converging',
      diameter: 0.03,
      pistonDiameter: 0.05,
      axisRatio: 1,
      exitProfile: 'uniform',
      contraction: null,
      radialRatio: 0,
      length: 0.02,
      lossCoefficient: 0.1,
    },
    programme: { shape: 'trapezoid', stroke: 0.12, peakSpeed: 0.5, riseTime: 0.05, fallTime: 0.03, rows: [] },
    axialFlow: 0,
    overPressure: 'off',
    formationBasis: 'energyLimit',
    jet: null,
  },
  absolutePressure: 151_000,
  vapourPressure: 1700,
}

export function problemWith(
  section: Partial<ThrusterSection>,
  pulse: Partial<DesignProblem['pulse']> = {},
): DesignProblem {
  return { ...PROBLEM, section: { ...SECTION, ...section }, pulse: { ...PROBLEM.pulse, ...pulse } }
}
