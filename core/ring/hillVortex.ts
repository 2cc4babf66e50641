/**
 * Hill's spherical vortex, the fat end of the steady family.
 *
 * M. J. M. Hill 1894, Phil. Trans. R. Soc. A 185:213; Lamb, Hydrodynamics, art. 165: with sphere radius a, Gamma = 5 U a,
 * I = 2 pi rho a^3 U, E = (10/7) pi rho a^3 U^2. The core is the whole sphere: its meridional section is a half disc of area
 * pi a^2 / 2 with inner radius 0, so L = a / 2 and eps = sqrt 2.
 */

/** E / (rho^1/2 I^1/2 Gamma^3/2) of Hill's vortex, 0.160143: the least of the family. */
export const HILL_DIMENSIONLESS_ENERGY = ((10 / 7) * Math.PI) / (Math.sqrt(2 * Math.PI) * 5 * Math.sqrt(5))

/** Dimensionless values of a Hill vortex of sphere radius a, in the measures of the family with L = 1. */
export function sphereRatios(a: number): { speed: number; impulse: number; energy: number } {
  return { speed: (4 * Math.PI) / (5 * a), impulse: 0.4 * a * a, energy: (4 * Math.PI * a) / 35 }
}
