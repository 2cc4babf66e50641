/**
 * Ring whose vorticity is proportional to the distance from the axis, to second order in the core ratio.
 *
 * Sources: F. W. Dyson 1893, Phil. Trans. R. Soc. A 184:43; L. E. Fraenkel 1972, J. Fluid Mech. 51:119. Error of each relative
 * value O(eps^4 ln^2 eps): at eps = 0.1 3e-5 in speed, 2.5e-4 in impulse, 2e-4 in energy against the computed family.
 */
import { requireRange } from '../base'

/** Speed, impulse and energy in dimensionless form. */
export interface SecondOrderRatios {
  /** 4 pi L U / Gamma */
  readonly speed: number
  /** I / (rho pi Gamma L^2) */
  readonly impulse: number
  /** 2 E / (rho Gamma^2 L) */
  readonly energy: number
}

export interface SecondOrderRing {
  /** U [m/s] */
  readonly speed: number
  /** I [N s] */
  readonly impulse: number
  /** E [J] */
  readonly energy: number
}

/** Dimensionless second-order values at a core ratio. */
export function secondOrderRatios(coreRatio: number): SecondOrderRatios {
  const square = coreRatio * coreRatio
  const log = Math.log(8 / coreRatio)
  return {
    speed: log - 0.25 - 0.375 * square * (log - 1.25),
    impulse: 1 + 0.75 * square,
    energy: log - 1.75 + 0.375 * square * log,
  }
}

/**
 * Half the core's radial width over L to the same order. The section is an ellipse, wider along the axis by the self-strain.
 * (Fraenkel 1972, recalled, not re-read; agrees with the computed family to O(eps^5).)
 */
export function secondOrderHalfWidth(coreRatio: number): number {
  return coreRatio * (1 - 0.375 * coreRatio * coreRatio * (Math.log(8 / coreRatio) - 17 / 12))
}

/**
 * Speed, impulse and energy of a ring of modest core to second order.
 *
 * @param density rho [kg/m3], > 0
 * @param circulation Gamma [m2/s], finite; its sign gives the direction of speed and impulse
 * @param radius L [m], mean of inner and outer radius, > 0
 * @param coreRatio eps = sqrt(core area / pi) / L, 0 < eps <= 0.5; for thicker cores use `steadyRing`
 * @throws {DomainError} for an argument outside its range
 */
export function secondOrderRing(
  density: number,
  circulation: number,
  radius: number,
  coreRatio: number,
): SecondOrderRing {
  requireRange('density', density, { above: 0, unit: 'kg/m3' })
  requireRange('circulation', circulation, { unit: 'm2/s' })
  requireRange('radius', radius, { above: 0, unit: 'm' })
  requireRange('coreRatio', coreRatio, { above: 0, max: 0.5 })
  const ratios = secondOrderRatios(coreRatio)
  return {
    speed: (circulation / (4 * Math.PI * radius)) * ratios.speed,
    impulse: density * Math.PI * circulation * radius * radius * ratios.impulse,
    energy: 0.5 * density * circulation * circulation * radius * ratios.energy,
  }
}
