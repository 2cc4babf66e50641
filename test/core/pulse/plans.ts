import type { NozzleInput, ProgrammeInput, PulseInput } from '../../../core/pulse'

/** A plain round tube, 20 mm, with a parallel uniform jet. */
export const TUBE: NozzleInput = {
  shape: 'tube',
  diameter: 0.02,
  pistonDiameter: 0.04,
  axisRatio: 1,
  exitProfile: 'uniform',
  contraction: null,
  radialRatio: 0,
  length: 0,
  lossCoefficient: 0,
}

/** Constant speed over 2 diameters of the tube. */
export const CONSTANT: ProgrammeInput = {
  shape: 'rectangular',
  stroke: 0.04,
  peakSpeed: 0.5,
  riseTime: 0,
  fallTime: 0,
  rows: [],
}

/** The tube at constant speed in water near 20 degrees. */
export const PLAIN: PulseInput = {
  density: 998.2,
  kinematicViscosity: 1.0034e-6,
  nozzle: TUBE,
  programme: CONSTANT,
  axialFlow: 0,
  overPressure: 'off',
  formationBasis: 'energyLimit',
  jet: null,
}

/** The plain plan at another stroke ratio. */
export function atStrokeRatio(strokeRatio: number, input: PulseInput = PLAIN): PulseInput {
  return { ...input, programme: { ...input.programme, stroke: strokeRatio * input.nozzle.diameter } }
}
