/**
 * What the exit does to the slug: its velocity profile, radial inflow and the contraction of a sharp orifice.
 *
 * Sources: [K] M. Krieg & K. Mohseni 2013, J. Fluid Mech. 719:488 (converging exits and orifices);
 * [L] D. Limbourg & J. Nedic 2021, J. Fluid Mech. (sharp orifices).
 */
import { DomainError, requireRange } from '../base'
import type { Invariants, NozzleInput } from './types'

/** Radial over axial speed at which [K] measured, and the middle of what was found there over a parallel jet. */
const MEASURED_RADIAL_RATIO = 0.4
const MEASURED_FACTORS: Invariants = { circulation: 1.95, impulse: 1.725, energy: 2.2 }
/** Beyond this the quadratic would be an extrapolation of one measured point. */
export const LARGEST_RADIAL_RATIO = 0.45

/**
 * Slug of a parabolic exit speed over the slug of a uniform one of equal flow: with 2 U on the axis the circulation flux is
 * (2 U)^2/2, the mean of u^2 is 4/3 U^2 and that of u^3 is 2 U^3. Exact.
 */
const PARABOLIC: Invariants = { circulation: 4, impulse: 4 / 3, energy: 2 }
const ONE: Invariants = { circulation: 1, impulse: 1, energy: 1 }

/** Factors of the exit profile alone. */
export function profileFactors(nozzle: NozzleInput): Invariants {
  return nozzle.exitProfile === 'parabolic' ? PARABOLIC : ONE
}

/**
 * Factors of the radial inflow: 1 + k x^2 through (0, 1) and the mid-band of [K] at 0.4, so everything between is interpolated.
 *
 * @param ratio radial over axial speed at the lip, 0..0.45
 */
export function radialFactors(ratio: number): Invariants {
  const square = (ratio / MEASURED_RADIAL_RATIO) ** 2
  return {
    circulation: 1 + (MEASURED_FACTORS.circulation - 1) * square,
    impulse: 1 + (MEASURED_FACTORS.impulse - 1) * square,
    energy: 1 + (MEASURED_FACTORS.energy - 1) * square,
  }
}

/** Profile and radial inflow together: slug over the slug of a parallel, uniform jet of equal flow. */
export function exitFactors(nozzle: NozzleInput): Invariants {
  return multiply(profileFactors(nozzle), radialFactors(nozzle.radialRatio))
}

/**
 * Factors with which a formation number is searched.
 *
 * A sharp orifice is corrected by its measured contraction afterwards. That contraction is the radial inflow at work (the
 * same stroke counted on the jet's own diameter), so the radial factors stay out of the search there: they would count it twice.
 */
export function searchFactors(nozzle: NozzleInput): Invariants {
  return nozzle.shape === 'orifice' ? profileFactors(nozzle) : exitFactors(nozzle)
}

/** What factors do to the dimensionless energy of a slug. */
export function energyShare(factors: Invariants): number {
  return factors.energy / (Math.sqrt(factors.impulse) * factors.circulation ** 1.5)
}

/**
 * Jet area over exit area of a sharp orifice; 1 for every other nozzle.
 *
 * As given, or 0.63 + 0.37 (exit area over piston area)^3: the usual engineering fit for sharp orifices; recalled, not re-read.
 */
export function contraction(nozzle: NozzleInput): number {
  if (nozzle.shape !== 'orifice') return 1
  return nozzle.contraction ?? 0.63 + 0.37 * (nozzle.diameter / nozzle.pistonDiameter) ** 6
}

/**
 * Refuse a nozzle that cannot be.
 *
 * @throws {DomainError} on nozzle.…
 */
export function requireNozzle(nozzle: NozzleInput): void {
  requireRange('nozzle.diameter', nozzle.diameter, { above: 0, unit: 'm' })
  requireRange('nozzle.pistonDiameter', nozzle.pistonDiameter, { above: 0, unit: 'm' })
  requireRange('nozzle.axisRatio', nozzle.axisRatio, { min: 1 })
  requireRange('nozzle.radialRatio', nozzle.radialRatio, { min: 0, max: LARGEST_RADIAL_RATIO })
  requireRange('nozzle.length', nozzle.length, { min: 0, unit: 'm' })
  requireRange('nozzle.lossCoefficient', nozzle.lossCoefficient, { min: 0 })
  if (nozzle.shape !== 'orifice') return
  if (nozzle.contraction !== null) {
    requireRange('nozzle.contraction', nozzle.contraction, { above: 0, max: 1 })
  } else if (nozzle.pistonDiameter < nozzle.diameter) {
    throw new DomainError(
      'nozzle.pistonDiameter',
      `nozzle.pistonDiameter must be at least nozzle.diameter, ${nozzle.diameter} m, to estimate an orifice's contraction, got ${nozzle.pistonDiameter} m`,
    )
  }
}

function multiply(a: Invariants, b: Invariants): Invariants {
  return { circulation: a.circulation * b.circulation, impulse: a.impulse * b.impulse, energy: a.energy * b.energy }
}

/** Piston area over exit area: how far the slug moves while the piston moves one. */
export function exitPerPiston({ diameter, pistonDiameter }: NozzleInput): number {
  return (pistonDiameter / diameter) ** 2
}
