/**
 * The ring that circulation, impulse and energy make: matched to the steady family, or held at Hill's vortex.
 */
import { matchSteadyRing } from '../ring'
import { dimensionlessEnergy } from './invariants'
import type { Invariants, PulseRing } from './types'

/** E / (I U) of Hill's vortex, 5/7: Gamma = 5 U a, I = 2 pi rho a^3 U, E = (10/7) pi rho a^3 U^2 (Hill 1894). */
const HILL_ENERGY_SHARE = 5 / 7

/** Above this dimensionless energy the matched core, 8 R exp(-2 sqrt(pi) E_n - 7/4), is no longer a number: no ring is given. */
const THINNEST_ENERGY = 200

/**
 * Ring of given circulation, impulse and energy.
 *
 * Below the dimensionless energy of Hill's vortex no steady ring has all three. The ring is then held at Hill's vortex with
 * impulse and energy kept; its circulation is less than what was given.
 *
 * @param invariants all > 0
 * @param density [kg/m3]
 * @param kinematicViscosity [m2/s]
 * @returns null where the core would be thinner than any number: a constant-speed stroke below 0.0063 diameters
 */
export function ringOfInvariants(
  invariants: Invariants,
  density: number,
  kinematicViscosity: number,
): PulseRing | null {
  if (dimensionlessEnergy(invariants, density) > THINNEST_ENERGY) return null
  const match = matchSteadyRing({ density, ...invariants })
  if (match.ring === null) return hillRing(invariants, density, kinematicViscosity)
  const { radius, meanCoreRadius, coreRatio, speed, carriedVolume } = match.ring
  const { circulation, impulse, energy } = invariants
  const reynolds = circulation / kinematicViscosity
  return {
    circulation,
    impulse,
    energy,
    radius,
    meanCoreRadius,
    coreRatio,
    speed,
    reynolds,
    carriedVolume,
    model: 'steady family',
  }
}

function hillRing(invariants: Invariants, density: number, kinematicViscosity: number): PulseRing {
  const { impulse, energy } = invariants
  const speed = energy / (HILL_ENERGY_SHARE * impulse)
  const sphere = Math.cbrt(impulse / (2 * Math.PI * density * speed))
  const circulation = 5 * speed * sphere
  return {
    circulation,
    impulse,
    energy,
    // The core is the half disc of the sphere: from 0 to the sphere's radius, of area pi a^2/2.
    radius: sphere / 2,
    meanCoreRadius: sphere / Math.SQRT2,
    coreRatio: Math.SQRT2,
    speed,
    reynolds: circulation / kinematicViscosity,
    carriedVolume: (4 / 3) * Math.PI * sphere ** 3,
    model: 'hill limit',
  }
}

/** Gamma / ((I/rho)^(1/3) U^(2/3)): the limiting circulation of Mohseni & Gharib 1998, Phys. Fluids 10:2436. */
export function limitingCirculation(ring: PulseRing, density: number): number {
  return ring.circulation / (Math.cbrt(ring.impulse / density) * Math.cbrt(ring.speed) ** 2)
}
