/**
 * The steady ring that has a given circulation, impulse and energy.
 *
 * The three fix E_n = E / (rho^1/2 I^1/2 Gamma^3/2), E_n fixes the core ratio (it falls along the family), and impulse and circulation
 * then fix the radius. No steady ring of this family has E_n below that of Hill's vortex.
 */
import { requireRange } from '../base'
import { HILL_DIMENSIONLESS_ENERGY } from './hillVortex'
import {
  dimensionlessEnergyExcess,
  familyRatios,
  placeAt,
  ringFrom,
  type FamilyPlace,
  type SteadyRing,
} from './steadyFamily'

/** Circulation [m2/s], impulse [N s] and energy [J] to match, in fluid of a density [kg/m3]; all > 0. */
export interface RingInvariants {
  readonly density: number
  readonly circulation: number
  readonly impulse: number
  readonly energy: number
}

/** `below-hill`: E_n is less than Hill's 0.160143, and no steady ring has these three values. */
export interface MatchedRing {
  readonly status: 'matched' | 'below-hill'
  readonly ring: SteadyRing | null
  /** E_n of the values given. */
  readonly dimensionlessEnergy: number
}

/** Relative width about Hill's E_n that is rounding of the caller's sums: taken as Hill's vortex. */
const HILL_TOLERANCE = 1e-12

/** Knots of ln(E_n - Hill) against w, from which the inversion starts. Beyond the last, sqrt 2 - eps is below 1e-7. */
const FIRST_KNOT = -20
const KNOT_STEP = 0.1
const KNOTS = buildKnots()
/** E_n - Hill at the first knot. Above this the leading terms are exact to rounding. */
const THIN_EXCESS = Math.exp(-(KNOTS[0] ?? NaN))
const LEAST_EXCESS = Math.exp(-(KNOTS[KNOTS.length - 1] ?? NaN))

/** -ln(E_n - Hill) at w = FIRST_KNOT + i KNOT_STEP: rising. */
function buildKnots(): Float64Array {
  return Float64Array.from({ length: 366 }, (_, i) => -logExcess(FIRST_KNOT + i * KNOT_STEP))
}

function logExcess(w: number): number {
  return Math.log(dimensionlessEnergyExcess(placeAt(w)))
}

/** Place on the family of a given E_n - Hill > 0. */
function placeOfExcess(excess: number): FamilyPlace {
  if (excess >= THIN_EXCESS) {
    // 2 sqrt pi E_n = ln(8/eps) - 7/4 to O(eps^2 ln eps), eps below 3e-9 here.
    const eps = 8 * Math.exp(-2 * Math.sqrt(Math.PI) * (excess + HILL_DIMENSIONLESS_ENERGY) - 1.75)
    return { eps, delta: Math.SQRT2 - eps }
  }
  if (excess <= LEAST_EXCESS) return { eps: Math.SQRT2, delta: 0 }
  const target = -Math.log(excess)
  const i = knotBefore(target)
  let w = FIRST_KNOT + KNOT_STEP * (i + inverseCubic(i, target))
  let slope = ((KNOTS[i + 1] ?? NaN) - (KNOTS[i] ?? NaN)) / KNOT_STEP
  let lastW = Number.NaN
  let lastError = Number.NaN
  // The start is good to about 1e-6; the secant then needs two or three steps.
  for (let n = 0; n < 8; n++) {
    const error = -logExcess(w) - target
    if (Math.abs(w - lastW) > 1e-9) slope = (error - lastError) / (w - lastW)
    if (Number.isNaN(slope)) slope = ((KNOTS[i + 1] ?? NaN) - (KNOTS[i] ?? NaN)) / KNOT_STEP
    lastW = w
    lastError = error
    const step = error / slope
    w -= step
    if (Math.abs(step) < 1e-12 * (1 + Math.abs(w))) break
  }
  return placeAt(w)
}

/** Index i, 1 to length - 3, with the target between knots i and i + 1 (or beside them at the ends). */
function knotBefore(target: number): number {
  let low = 1
  let high = KNOTS.length - 2
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if ((KNOTS[middle] ?? NaN) <= target) low = middle
    else high = middle
  }
  return low
}

/** Index offset from knot i at which the cubic of offset against knot value through i - 1..i + 2 takes a value. */
function inverseCubic(i: number, target: number): number {
  let sum = 0
  for (let j = -1; j <= 2; j++) {
    let term = j
    for (let k = -1; k <= 2; k++)
      if (k !== j) term *= (target - (KNOTS[i + k] ?? NaN)) / ((KNOTS[i + j] ?? NaN) - (KNOTS[i + k] ?? NaN))
    sum += term
  }
  return sum
}

/**
 * Find the steady ring of given circulation, impulse and energy.
 *
 * @returns status `matched` with the ring, or `below-hill` with null where E_n < 0.160143 (no steady ring has so little energy)
 * @throws {DomainError} for a value that is not finite and positive
 */
export function matchSteadyRing(invariants: RingInvariants): MatchedRing {
  const { density, circulation, impulse, energy } = invariants
  requireRange('density', density, { above: 0, unit: 'kg/m3' })
  requireRange('circulation', circulation, { above: 0, unit: 'm2/s' })
  requireRange('impulse', impulse, { above: 0, unit: 'N s' })
  requireRange('energy', energy, { above: 0, unit: 'J' })
  const dimensionlessEnergy = energy / (Math.sqrt(density * impulse) * circulation * Math.sqrt(circulation))
  const excess = dimensionlessEnergy - HILL_DIMENSIONLESS_ENERGY
  if (excess < -HILL_TOLERANCE * HILL_DIMENSIONLESS_ENERGY)
    return { status: 'below-hill', ring: null, dimensionlessEnergy }
  const place = placeOfExcess(excess)
  const ratios = familyRatios(place)
  const radius = Math.sqrt(impulse / (density * Math.PI * circulation * ratios.impulse))
  return { status: 'matched', ring: ringFrom(place, ratios, density, circulation, radius), dimensionlessEnergy }
}

/**
 * Core ratio of the steady ring with dimensionless energy E_n.
 *
 * @param dimensionlessEnergy E_n, at least Hill's 0.160143
 * @throws {DomainError} below that
 */
export function coreRatioOfDimensionlessEnergy(dimensionlessEnergy: number): number {
  requireRange('dimensionlessEnergy', dimensionlessEnergy, {
    min: HILL_DIMENSIONLESS_ENERGY * (1 - HILL_TOLERANCE),
  })
  return placeOfExcess(dimensionlessEnergy - HILL_DIMENSIONLESS_ENERGY).eps
}
