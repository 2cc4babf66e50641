/**
 * One thin circular vortex ring in unbounded fluid, to leading order in core radius over ring radius.
 *
 * With Lam = ln(8 R / a):  U = Gamma / (4 pi R) (Lam + A - 1/2),  E = rho Gamma^2 R / 2 (Lam + A - 2),  I = rho pi Gamma R^2,
 * and A set by how vorticity is spread over the core. U = dE/dI at fixed Gamma and a^2 R (Roberts & Donnelly 1970, Phys. Lett. A
 * 31:137) holds exactly between these forms.
 *
 * Sources: W. Thomson (Kelvin) 1867, Phil. Mag. 33:511; Lamb, Hydrodynamics, 6th ed. 1932, art. 163 (uniform); Hicks 1884, Phil.
 * Trans. R. Soc. A 175:161 (hollow, constant volume); P. G. Saffman 1970, Stud. Appl. Math. 49:371 (Gaussian).
 */
import { EULER_GAMMA, requireRange } from '../base'

/**
 * How vorticity is spread over the core: `uniform` over a disc of radius a; `hollow`, all at radius a round a hollow of constant volume;
 * `gaussian`, exp(-s^2 / a^2) with a = sqrt(4 nu t).
 */
export type CoreModel = 'uniform' | 'hollow' | 'gaussian'

/** A of the laws above, from the kinetic energy in the core. */
export const CORE_CONSTANT: Readonly<Record<CoreModel, number>> = {
  uniform: 1 / 4,
  hollow: 0,
  gaussian: (EULER_GAMMA - Math.LN2) / 2,
}

function requireThinRing(circulation: number, radius: number, coreRadius: number): void {
  requireRange('circulation', circulation, { unit: 'm2/s' })
  requireRange('radius', radius, { above: 0, unit: 'm' })
  requireRange('coreRadius', coreRadius, { above: 0, max: radius, unit: 'm' })
}

/**
 * Speed of a thin ring along its axis.
 *
 * @param circulation Gamma [m2/s], finite; its sign gives the direction
 * @param radius R [m] of the core centre, > 0
 * @param coreRadius a [m], 0 < a <= R. The law is meant for a <= 0.3 R: at 0.3 it is 2.2 % above the steady ring of the same core area
 * @param model spread of vorticity, default uniform
 * @returns U [m/s]; relative error O((a/R)^2 ln(R/a))
 * @throws {DomainError} for an argument outside its range
 */
export function thinRingSpeed(
  circulation: number,
  radius: number,
  coreRadius: number,
  model: CoreModel = 'uniform',
): number {
  requireThinRing(circulation, radius, coreRadius)
  return (circulation / (4 * Math.PI * radius)) * (Math.log((8 * radius) / coreRadius) + CORE_CONSTANT[model] - 0.5)
}

/**
 * Kinetic energy of a thin ring.
 *
 * @param density rho [kg/m3], > 0
 * @returns E [J]; arguments, limits and errors otherwise as for `thinRingSpeed`
 */
export function thinRingEnergy(
  density: number,
  circulation: number,
  radius: number,
  coreRadius: number,
  model: CoreModel = 'uniform',
): number {
  requireRange('density', density, { above: 0, unit: 'kg/m3' })
  requireThinRing(circulation, radius, coreRadius)
  const bracket = Math.log((8 * radius) / coreRadius) + CORE_CONSTANT[model] - 2
  return 0.5 * density * circulation * circulation * radius * bracket
}

/**
 * Impulse of a thin ring along its axis: rho pi Gamma R^2.
 *
 * @param density rho [kg/m3], > 0
 * @param circulation Gamma [m2/s], finite; its sign gives the direction
 * @param radius R [m], > 0
 * @returns I [N s]
 * @throws {DomainError} for an argument outside its range
 */
export function thinRingImpulse(density: number, circulation: number, radius: number): number {
  requireRange('density', density, { above: 0, unit: 'kg/m3' })
  requireRange('circulation', circulation, { unit: 'm2/s' })
  requireRange('radius', radius, { above: 0, unit: 'm' })
  return density * Math.PI * circulation * radius * radius
}
