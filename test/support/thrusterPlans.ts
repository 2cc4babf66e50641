/** Plans of thrusters that outside checks are known for. */

/** Water of a stated density that stands still; its viscosity and vapour pressure are those of about 20 degrees. */
function waterOf(density: number): object {
  return { kind: 'given', density, kinematicViscosity: 1.0034e-6, vapourPressure: 2339 }
}

/** D 2 cm, L/D 4, 0.5 m/s at constant speed, once a second: f rho A U L = 12.5438 mN for rho 998.2 kg/m3. */
export const CONSTANT_SPEED = {
  water: waterOf(998.2),
  nozzle: { shape: 'tube', diameter: 0.02, pistonDiameter: 0.04 },
  programme: { shape: 'rectangular', stroke: 0.08, peakSpeed: 0.5 },
  train: { pulses: 4, period: 1 },
  thruster: { count: 1, vehicle: null },
} as const

/**
 * A sinusoidal plunger, D 1 cm, L/D 4, 10 Hz, rho 1000 kg/m3, half of each period pushing out: 0.0310063 N.
 * Source: Krieg & Mohseni 2008, IEEE J. Ocean. Eng. 33:123, (pi^3/16) rho D^4 (L/D)^2 f^2 (re-derived).
 */
export const SINUSOIDAL = {
  water: waterOf(1000),
  nozzle: { shape: 'tube', diameter: 0.01, pistonDiameter: 0.02 },
  // A half sine of 1/20 s and a stroke of 4 cm: peak = pi stroke / (2 duration).
  programme: { shape: 'half-sine', stroke: 0.04, peakSpeed: 0.4 * Math.PI },
  train: { pulses: 10, period: 0.1 },
  thruster: { count: 1, vehicle: null },
} as const
