import type { JetRun, StartingJetInput } from '../../../../core/coaxial'
import type { ProgrammeInput } from '../../../../core/pulse'

/** A tube of 20 mm in water with 0.5 m/s at the peak. */
export const DIAMETER = 0.02
export const SPEED = 0.5
export const DENSITY = 998.2
export const VISCOSITY = 1.0034e-6
/** Units of the scaled quantities: D / U, U D, rho U D^3. */
export const TIME = DIAMETER / SPEED
export const CIRCULATION = SPEED * DIAMETER
export const IMPULSE = DENSITY * SPEED * DIAMETER ** 3

/** A stroke at constant speed after a straight ramp, which may be 0 [D / U]; it stops at once. */
export function ramped(strokeRatio: number, ramp = 0): ProgrammeInput {
  return {
    shape: 'trapezoid',
    stroke: strokeRatio * DIAMETER,
    peakSpeed: SPEED,
    riseTime: ramp * TIME,
    fallTime: 0,
    rows: [],
  }
}

/** A jet without core growth, smoothing 0.10 D, stroke ratio 4. */
export const JET: StartingJetInput = {
  density: DENSITY,
  kinematicViscosity: VISCOSITY,
  diameter: DIAMETER,
  programme: ramped(4),
  axialFlow: 0,
  coreGrowth: false,
  delta: 0.1,
}

/** No shapes kept and no free flight: for runs of which only numbers are read. */
export const BARE = { snapshotStep: 0, freeFlight: 0 } as const

/** Circulation beyond the slug over U D at the end of the stroke. */
export function excess(run: JetRun): number {
  return (run.beyondSlug?.circulation ?? NaN) / CIRCULATION
}
