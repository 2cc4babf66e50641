/**
 * The family of steady vortex rings with vorticity proportional to the distance from the axis, from thin rings to Hill's vortex.
 *
 * Norbury 1973, J. Fluid Mech. 57:417. Measures: L mean of inner and outer radius, core area pi eps^2 L^2, 0 < eps <= sqrt 2.
 * Values come from series fitted to this project's own solution of the free-boundary problem (steadySolver.ts):
 *
 * - eps from 0.01 to sqrt 2 - 0.001: within 1e-10 relative of the solver, which itself repeats to 1e-12 with more harmonics;
 * - thinner: second-order law plus what it misses at 0.01, falling as eps^4; within 1e-9 (what is neglected is the change of
 *   ln^2 eps in that term);
 * - fatter: the sphere plus d^2 (b ln d + c), d = sqrt 2 - eps; within 1e-9; Hill's vortex itself at eps = sqrt 2. Next to it
 *   the inner radius, itself going to 0, is within 1e-6 relative.
 *
 * The volume carried along is within 1e-7 relative everywhere, also where the carried body opens into a torus (R/a = 86).
 */
import { requireRange } from '../base'
import { chebyshevSum } from './chebyshev'
import { HILL_DIMENSIONLESS_ENERGY, sphereRatios } from './hillVortex'
import { secondOrderHalfWidth, secondOrderRatios, type SecondOrderRatios } from './secondOrderRing'
import {
  CARRIED,
  ENERGY,
  FIRST_COORDINATE,
  IMPULSE,
  INNER,
  LAST_COORDINATE,
  LINE_FAST,
  LINE_FAST_LIMIT,
  LINE_SLOW,
  LINE_SLOW_LIMIT,
  NEAR_HILL,
  SPEED,
} from './steadyFamilyTable'

/** A steady ring, SI. */
export interface SteadyRing {
  /** Gamma [m2/s] */
  readonly circulation: number
  /** L [m], mean of inner and outer radius. */
  readonly radius: number
  /** eps = meanCoreRadius / radius; sqrt 2 is Hill's vortex. */
  readonly coreRatio: number
  /** sqrt(core area / pi) [m] */
  readonly meanCoreRadius: number
  /** U [m/s] */
  readonly speed: number
  /** I [N s] */
  readonly impulse: number
  /** E [J] */
  readonly energy: number
  /** Radius of the core's inner edge in the plane of the ring [m]. */
  readonly innerRadius: number
  /** Radius of the core's outer edge [m]. */
  readonly outerRadius: number
  /** Volume of fluid that travels with the ring, core included [m3]. */
  readonly carriedVolume: number
}

/** Place on the family: eps and sqrt 2 - eps, both with all their digits. */
export interface FamilyPlace {
  readonly eps: number
  readonly delta: number
}

const speedSeries = Float64Array.from(SPEED)
const impulseSeries = Float64Array.from(IMPULSE)
const energySeries = Float64Array.from(ENERGY)
const innerSeries = Float64Array.from(INNER)
const carriedSeries = Float64Array.from(CARRIED)
const lineFastSeries = Float64Array.from(LINE_FAST)
const lineSlowSeries = Float64Array.from(LINE_SLOW)

const MIDDLE = (FIRST_COORDINATE + LAST_COORDINATE) / 2
const HALF = (LAST_COORDINATE - FIRST_COORDINATE) / 2
const FIRST_EPS = Math.SQRT2 / (1 + Math.exp(-FIRST_COORDINATE))
const LAST_DELTA = Math.SQRT2 / (1 + Math.exp(LAST_COORDINATE))

const SPEED_AT_FIRST = chebyshevSum(speedSeries, -1)
const IMPULSE_AT_FIRST = chebyshevSum(impulseSeries, -1)
const ENERGY_AT_FIRST = chebyshevSum(energySeries, -1)
const CARRIED_AT_FIRST = chebyshevSum(carriedSeries, -1)

/** Argument of the series, -1 at the thin end and 1 at the fat end; beyond them outside of -1..1. */
export function seriesArgument(place: FamilyPlace): number {
  return (Math.log(place.eps / place.delta) - MIDDLE) / HALF
}

/** Place at w = ln(eps / (sqrt 2 - eps)). */
export function placeAt(w: number): FamilyPlace {
  return { eps: Math.SQRT2 / (1 + Math.exp(-w)), delta: Math.SQRT2 / (1 + Math.exp(w)) }
}

function nearHill(terms: readonly [number, number], delta: number): number {
  return delta === 0 ? 0 : delta * delta * (terms[0] * Math.log(delta) + terms[1])
}

/** 4 pi L U / Gamma, I / (rho pi Gamma L^2) and 2 E / (rho Gamma^2 L). */
export function familyRatios(place: FamilyPlace): SecondOrderRatios {
  const { eps, delta } = place
  if (delta < LAST_DELTA) {
    const sphere = sphereRatios(2 - delta / Math.SQRT2)
    return {
      speed: sphere.speed + nearHill(NEAR_HILL.speed, delta),
      impulse: sphere.impulse + nearHill(NEAR_HILL.impulse, delta),
      energy: sphere.energy + nearHill(NEAR_HILL.energy, delta),
    }
  }
  const thin = secondOrderRatios(eps)
  if (eps < FIRST_EPS) {
    const share = (eps / FIRST_EPS) ** 4
    return {
      speed: thin.speed + share * SPEED_AT_FIRST,
      impulse: thin.impulse + share * IMPULSE_AT_FIRST,
      energy: thin.energy + share * ENERGY_AT_FIRST,
    }
  }
  const s = seriesArgument(place)
  return {
    speed: thin.speed + chebyshevSum(speedSeries, s),
    impulse: thin.impulse + chebyshevSum(impulseSeries, s),
    energy: thin.energy + chebyshevSum(energySeries, s),
  }
}

/** E_n less Hill's value, without loss of digits next to Hill's vortex. */
export function dimensionlessEnergyExcess(place: FamilyPlace): number {
  const { eps, delta } = place
  if (delta < LAST_DELTA) {
    // For the sphere alone E_n is Hill's whatever its radius: only the added terms count.
    const sphere = sphereRatios(2 - delta / Math.SQRT2)
    const energy = nearHill(NEAR_HILL.energy, delta) / sphere.energy
    const impulse = nearHill(NEAR_HILL.impulse, delta) / sphere.impulse
    const root = Math.sqrt(1 + impulse)
    return (HILL_DIMENSIONLESS_ENERGY * (energy - impulse / (1 + root))) / root
  }
  const thin = secondOrderRatios(eps)
  let { impulse, energy } = thin
  if (eps < FIRST_EPS) {
    const share = (eps / FIRST_EPS) ** 4
    impulse += share * IMPULSE_AT_FIRST
    energy += share * ENERGY_AT_FIRST
  } else {
    const s = seriesArgument(place)
    impulse += chebyshevSum(impulseSeries, s)
    energy += chebyshevSum(energySeries, s)
  }
  return energy / (2 * Math.sqrt(Math.PI * impulse)) - HILL_DIMENSIONLESS_ENERGY
}

/** Radius of the core's inner edge over L. */
export function innerRadiusRatio(place: FamilyPlace): number {
  const { eps, delta } = place
  if (eps < FIRST_EPS) return 1 - secondOrderHalfWidth(eps)
  if (delta === 0) return 0
  const [b, c] = NEAR_HILL.inner
  const factor =
    delta < LAST_DELTA ? 1 + delta * (b * Math.log(delta) + c) : chebyshevSum(innerSeries, seriesArgument(place))
  return (delta / Math.SQRT2) * factor
}

/** Volume carried by a vortex line of unit radius at speed 4 pi R U / Gamma. */
function lineCarriedVolume(speed: number): number {
  const ratio = speed / (2 * Math.PI)
  const root = Math.sqrt(Math.abs(Math.log(ratio)))
  const logarithm =
    ratio > 1
      ? chebyshevSum(lineFastSeries, (2 * root) / LINE_FAST_LIMIT - 1)
      : chebyshevSum(lineSlowSeries, (2 * root) / LINE_SLOW_LIMIT - 1)
  return Math.exp(logarithm) / (speed * speed)
}

const HILL = sphereRatios(2)
/** The sphere's volume over that of the vortex line of its impulse and speed. */
const CARRIED_AT_HILL =
  ((4 / 3) * Math.PI * 8) / (HILL.impulse ** 1.5 * lineCarriedVolume(HILL.speed * Math.sqrt(HILL.impulse)))

/** Volume carried over L^3. */
export function carriedVolumeRatio(place: FamilyPlace, ratios: SecondOrderRatios): number {
  const { eps, delta } = place
  const lineRadius = Math.sqrt(ratios.impulse)
  let factor: number
  if (delta < LAST_DELTA) factor = CARRIED_AT_HILL + nearHill(NEAR_HILL.carried, delta)
  else if (eps < FIRST_EPS) factor = 1 + (CARRIED_AT_FIRST - 1) * (eps / FIRST_EPS) ** 4
  else factor = chebyshevSum(carriedSeries, seriesArgument(place))
  return factor * lineRadius ** 3 * lineCarriedVolume(ratios.speed * lineRadius)
}

/** The ring at a place with given circulation and radius. */
export function ringAt(place: FamilyPlace, density: number, circulation: number, radius: number): SteadyRing {
  return ringFrom(place, familyRatios(place), density, circulation, radius)
}

/** The same where the ratios are known already. */
export function ringFrom(
  place: FamilyPlace,
  ratios: SecondOrderRatios,
  density: number,
  circulation: number,
  radius: number,
): SteadyRing {
  const inner = innerRadiusRatio(place)
  return {
    circulation,
    radius,
    coreRatio: place.eps,
    meanCoreRadius: place.eps * radius,
    speed: (circulation / (4 * Math.PI * radius)) * ratios.speed,
    impulse: density * Math.PI * circulation * radius * radius * ratios.impulse,
    energy: 0.5 * density * circulation * circulation * radius * ratios.energy,
    innerRadius: inner * radius,
    outerRadius: (2 - inner) * radius,
    carriedVolume: carriedVolumeRatio(place, ratios) * radius ** 3,
  }
}

/** Place of a core ratio, refused outside 0 < eps <= sqrt 2. */
export function placeOf(coreRatio: number): FamilyPlace {
  requireRange('coreRatio', coreRatio, { above: 0, max: Math.SQRT2 })
  return { eps: coreRatio, delta: Math.SQRT2 - coreRatio }
}

/**
 * The steady ring of given circulation, radius and core.
 *
 * @param circulation Gamma [m2/s], finite; its sign gives the direction of speed and impulse
 * @param radius L [m], mean of the core's inner and outer radius, > 0
 * @param coreRatio eps = sqrt(core area / pi) / L, 0 < eps <= sqrt 2 (Hill's vortex of sphere radius 2 L)
 * @param density rho [kg/m3], > 0
 * @throws {DomainError} for an argument outside its range
 */
export function steadyRing(circulation: number, radius: number, coreRatio: number, density: number): SteadyRing {
  requireRange('circulation', circulation, { unit: 'm2/s' })
  requireRange('radius', radius, { above: 0, unit: 'm' })
  requireRange('density', density, { above: 0, unit: 'kg/m3' })
  return ringAt(placeOf(coreRatio), density, circulation, radius)
}

/**
 * E_n = E / (rho^1/2 I^1/2 Gamma^3/2) of the steady ring of a core ratio: falls from large values for thin rings to 0.160143.
 *
 * @param coreRatio 0 < eps <= sqrt 2
 * @throws {DomainError} outside that range
 */
export function dimensionlessEnergyOfSteadyRing(coreRatio: number): number {
  return HILL_DIMENSIONLESS_ENERGY + dimensionlessEnergyExcess(placeOf(coreRatio))
}
