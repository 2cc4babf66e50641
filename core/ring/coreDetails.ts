/**
 * Inside a thin core: swirl, pressure and the waves it is most prone to.
 *
 * The core is taken as a straight vortex: uniform (Rankine) to radius a, or Gaussian exp(-s^2 / a^2) with a = sqrt(4 nu t).
 */
import { requireRange } from '../base'

/** s / a at the largest swirl of a Gaussian core: the positive root of exp(s^2) = 1 + 2 s^2. */
const GAUSSIAN_PEAK = 1.1209064227785

/**
 * Radius of largest swirl speed of a Gaussian core.
 *
 * @param coreRadius a = sqrt(4 nu t) [m], > 0
 * @returns 1.12090642 a [m]
 * @throws {DomainError} for an argument outside its range
 */
export function peakSwirlRadius(coreRadius: number): number {
  requireRange('coreRadius', coreRadius, { above: 0, unit: 'm' })
  return GAUSSIAN_PEAK * coreRadius
}

/**
 * Fall of pressure from far away to the centre of the core: int rho v^2 / s ds.
 *
 * @param density rho [kg/m3], > 0
 * @param circulation Gamma [m2/s], finite
 * @param coreRadius a [m], > 0
 * @returns rho Gamma^2 / (4 pi^2 a^2) for a uniform core, ln 2 times that for a Gaussian one [Pa]
 * @throws {DomainError} for an argument outside its range
 */
export function corePressureDrop(
  density: number,
  circulation: number,
  coreRadius: number,
  model: 'uniform' | 'gaussian',
): number {
  requireRange('density', density, { above: 0, unit: 'kg/m3' })
  requireRange('circulation', circulation, { unit: 'm2/s' })
  requireRange('coreRadius', coreRadius, { above: 0, unit: 'm' })
  const edgeSpeed = circulation / (2 * Math.PI * coreRadius)
  return density * edgeSpeed * edgeSpeed * (model === 'uniform' ? 1 : Math.LN2)
}

/** Wave number times a / R of the most unstable bending wave (recalled, not re-read). */
const UNSTABLE_WAVE = { uniform: 2.5, gaussian: 2.26 } as const

/**
 * Number of waves round the ring that grow fastest.
 *
 * Widnall, Bliss & Tsai 1974, J. Fluid Mech. 66:35 (uniform core); 2.26 R / a for a Gaussian core (both recalled, not re-read).
 *
 * @param radius R [m], > 0
 * @param coreRadius a [m], 0 < a <= R
 * @returns the nearest whole number, at least 1
 * @throws {DomainError} for an argument outside its range
 */
export function mostUnstableWaveNumber(radius: number, coreRadius: number, model: 'uniform' | 'gaussian'): number {
  requireRange('radius', radius, { above: 0, unit: 'm' })
  requireRange('coreRadius', coreRadius, { above: 0, max: radius, unit: 'm' })
  return Math.max(1, Math.round((UNSTABLE_WAVE[model] * radius) / coreRadius))
}
