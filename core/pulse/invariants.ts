/**
 * Circulation, impulse and energy of a pulse: the slug model, the start over-pressure, and sums of them.
 *
 * Slug: Gamma = 1/2 int U^2 dt, I = rho A int U^2 dt, E = 1/2 rho A int U^3 dt.
 * Start: one side of the potential flow of a disc set in motion (Lamb, Hydrodynamics, art. 102; exact for that flow), used
 * for a quick start after P. S. Krueger 2005, J. Fluid Mech. 545:427.
 */
import type { Moments } from './moments'
import type { Invariants } from './types'

export const NOTHING: Invariants = { circulation: 0, impulse: 0, energy: 0 }

/**
 * Slug integrals.
 *
 * @param density rho [kg/m3]
 * @param diameter exit diameter of equal area [m]
 * @param factors exit factors, 1 for a parallel uniform jet
 */
export function slugInvariants(moments: Moments, density: number, diameter: number, factors: Invariants): Invariants {
  const area = (Math.PI / 4) * diameter * diameter
  return {
    circulation: 0.5 * moments.square * factors.circulation,
    impulse: density * area * moments.square * factors.impulse,
    energy: 0.5 * density * area * moments.cube * factors.energy,
  }
}

/** Quick-start terms Gamma_p = U D/pi, I_p = rho D^3 U/6, E_p = rho D^3 U^2/12 at the speed U [m/s] the start reaches. */
export function quickStartTerms(speed: number, density: number, diameter: number): Invariants {
  const cube = diameter ** 3
  return {
    circulation: (speed * diameter) / Math.PI,
    impulse: (density * cube * speed) / 6,
    energy: (density * cube * speed * speed) / 12,
  }
}

export function addInvariants(a: Invariants, b: Invariants): Invariants {
  return { circulation: a.circulation + b.circulation, impulse: a.impulse + b.impulse, energy: a.energy + b.energy }
}

export function subtractInvariants(a: Invariants, b: Invariants): Invariants {
  return { circulation: a.circulation - b.circulation, impulse: a.impulse - b.impulse, energy: a.energy - b.energy }
}

/** E / (rho^1/2 I^1/2 Gamma^3/2): pure number of a ring or a slug. */
export function dimensionlessEnergy(invariants: Invariants, density: number): number {
  return invariants.energy / (Math.sqrt(density * invariants.impulse) * invariants.circulation ** 1.5)
}

/**
 * Circulation of a quick-started tube over that of its slug: 1.14 + 0.32/(L/D), a fit to Didden's measurements.
 *
 * Source: K. Shariff & A. Leonard 1992, Annu. Rev. Fluid Mech. 24:235; recalled, not re-read. @returns null at L/D <= 0.6.
 */
export function diddenRatio(strokeRatio: number): number | null {
  return strokeRatio > 0.6 ? 1.14 + 0.32 / strokeRatio : null
}
