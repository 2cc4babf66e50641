/**
 * What viscosity and turbulence do to a ring on its way: position, speed and size in closed form.
 *
 * Laminar: the Gaussian core grows, a^2 = a0^2 + 4 nu t, and the thin ring slows by Saffman's law (Saffman 1970, Stud. Appl. Math.
 * 49:371). A ring whose core has grown to 0.3 R goes on by the later-life law
 *     U = (I / rho) / k (l^2)^(-3/2),  l^2 = l0^2 + k' nu t,  k = 10.15, k' = 8.909
 * (Fukumoto & Kaplanski 2008, Phys. Fluids 20:053103, recalled, not re-read), at constant impulse and with l0 such that the speed is
 * continuous. Its end is the Stokes limit U = 0.0037038 (I / rho) (nu t)^(-3/2) (Rott & Cantwell 1993, recalled, not re-read).
 *
 * Turbulent: at constant impulse size grows in proportion to distance s from a virtual origin and U falls as s^-3, so that size goes as
 * t^(1/4) and U as t^(-3/4) (Glezer & Coles 1990, J. Fluid Mech. 211:243; Maxworthy 1974, J. Fluid Mech. 64:227, both recalled).
 */
import { bracketedRoot, requireRange } from '../base'
import { CORE_CONSTANT, thinRingImpulse, thinRingSpeed } from './thinRing'

/** Theory pair k, k' of the later-life law. */
export const LATE_LAW = { k: 10.15, growth: 8.909 } as const

/** Coefficient of the Stokes limit. */
const STOKES_COEFFICIENT = 0.0037038

/** dR/dx of a turbulent ring, 0.011 +- 0.001 (Maxworthy 1974, recalled, not re-read). */
export const TURBULENT_GROWTH_RATE = 0.011

/** Ring Reynolds numbers Gamma / nu that bound the two laws (common practice). */
export const LAMINAR_BELOW = 3000
export const TURBULENT_ABOVE = 10_000

/** Core ratio up to which the thin law is used. */
const THIN_LIMIT = 0.3

export type AgeingRegime = 'laminar' | 'between' | 'turbulent'

/** A ring at one instant, time and distance counted from the start of the law. */
export interface AgedRing {
  /** [s] */
  readonly time: number
  /** [m] */
  readonly distance: number
  /** U [m/s] */
  readonly speed: number
  /** Ring radius [m]; under the late law scaled with its length l. */
  readonly radius: number
  /** Core radius [m]: sqrt(a0^2 + 4 nu t) under the laminar law, in proportion to the radius under the turbulent one; null where not given. */
  readonly coreRadius: number | null
  readonly law: 'thin' | 'late' | 'turbulent'
}

/** How a ring ages. */
export interface Ageing {
  /** @param time [s], >= 0. @throws {DomainError} */
  readonly atTime: (time: number) => AgedRing
  /** Time to travel a distance [s], or null where the ring never gets that far. @param distance [m], >= 0. @throws {DomainError} */
  readonly timeToReach: (distance: number) => number | null
  /** Distance the ring comes to in endless time [m]; Infinity where it does not stop. */
  readonly reach: number
}

/** Law by ring Reynolds number Gamma / nu: laminar below 3000, turbulent above 10 000, both to be shown between. */
export function ageingRegime(circulation: number, viscosity: number): AgeingRegime {
  requireRange('circulation', circulation, { unit: 'm2/s' })
  requireRange('viscosity', viscosity, { above: 0, unit: 'm2/s' })
  const reynolds = Math.abs(circulation) / viscosity
  if (reynolds < LAMINAR_BELOW) return 'laminar'
  return reynolds > TURBULENT_ABOVE ? 'turbulent' : 'between'
}

/** Core radius after a time: sqrt(a0^2 + 4 nu t) [m]. */
export function laminarCoreRadius(coreRadius: number, viscosity: number, time: number): number {
  requireRange('coreRadius', coreRadius, { min: 0, unit: 'm' })
  requireRange('viscosity', viscosity, { above: 0, unit: 'm2/s' })
  requireRange('time', time, { min: 0, unit: 's' })
  return Math.sqrt(coreRadius * coreRadius + 4 * viscosity * time)
}

/**
 * Speed of a ring in its Stokes end state.
 *
 * @param impulsePerDensity I / rho [m4/s], finite
 * @param viscosity nu [m2/s], > 0
 * @param time since the virtual start [s], > 0
 * @throws {DomainError} for an argument outside its range
 */
export function stokesRingSpeed(impulsePerDensity: number, viscosity: number, time: number): number {
  requireRange('impulsePerDensity', impulsePerDensity, { unit: 'm4/s' })
  requireRange('viscosity', viscosity, { above: 0, unit: 'm2/s' })
  requireRange('time', time, { above: 0, unit: 's' })
  return STOKES_COEFFICIENT * impulsePerDensity * (viscosity * time) ** -1.5
}

export interface LateRing {
  /** U at the start [m/s], > 0. */
  readonly speed: number
  /** R at the start [m], > 0. */
  readonly radius: number
  /** I / rho [m4/s], > 0, constant. */
  readonly impulsePerDensity: number
  /** nu [m2/s], > 0 */
  readonly viscosity: number
}

/** Later-life laminar law from a known speed. @throws {DomainError} for an argument outside its range */
export function lateAgeing(ring: LateRing): Ageing {
  const { speed, radius, impulsePerDensity, viscosity } = ring
  requireRange('speed', speed, { above: 0, unit: 'm/s' })
  requireRange('radius', radius, { above: 0, unit: 'm' })
  requireRange('impulsePerDensity', impulsePerDensity, { above: 0, unit: 'm4/s' })
  requireRange('viscosity', viscosity, { above: 0, unit: 'm2/s' })
  const strength = impulsePerDensity / LATE_LAW.k
  const rate = LATE_LAW.growth * viscosity
  const start = Math.cbrt(strength / speed)
  // int strength l^-3 dt = 2 strength / rate (1/l0 - 1/l)
  const reach = (2 * strength) / (rate * start)
  return {
    reach,
    atTime(time) {
      requireRange('time', time, { min: 0, unit: 's' })
      const length = Math.sqrt(start * start + rate * time)
      // 1/l0 - 1/l = (l^2 - l0^2) / (l0 l (l0 + l)): no loss of digits at short times.
      const distance = (2 * strength * time) / (start * length * (start + length))
      return {
        time,
        distance,
        speed: strength / length ** 3,
        radius: (radius * length) / start,
        coreRadius: null,
        law: 'late',
      }
    },
    timeToReach(distance) {
      requireRange('distance', distance, { min: 0, unit: 'm' })
      const left = 1 - distance / reach
      if (left <= 0) return null
      const length = start / left
      return ((length - start) * (length + start)) / rate
    },
  }
}

export interface LaminarRing {
  /** Gamma [m2/s], > 0 */
  readonly circulation: number
  /** R [m], > 0 */
  readonly radius: number
  /** a = sqrt(4 nu t) of a Gaussian core at the start [m], 0 < a <= R. */
  readonly coreRadius: number
  /** nu [m2/s], > 0 */
  readonly viscosity: number
  /** Speed at the start where it is known better than by the thin law [m/s]; used where the core is already above 0.3 R. */
  readonly speed?: number
}

/**
 * Laminar ageing of a ring: Saffman's law until the core is 0.3 R, the later-life law from there on.
 *
 * @throws {DomainError} for an argument outside its range
 */
export function laminarAgeing(ring: LaminarRing): Ageing {
  const { circulation, radius, coreRadius, viscosity } = ring
  requireRange('circulation', circulation, { above: 0, unit: 'm2/s' })
  requireRange('viscosity', viscosity, { above: 0, unit: 'm2/s' })
  const startSpeed = thinRingSpeed(circulation, radius, coreRadius, 'gaussian')
  const limit = THIN_LIMIT * radius
  const thinTime = Math.max(0, (limit * limit - coreRadius * coreRadius) / (4 * viscosity))
  const thinDistance = (time: number): number => saffmanDistance(ring, time)
  const switchDistance = thinDistance(thinTime)
  const late = lateAgeing({
    speed: thinTime > 0 ? thinRingSpeed(circulation, radius, limit, 'gaussian') : (ring.speed ?? startSpeed),
    radius,
    impulsePerDensity: thinRingImpulse(1, circulation, radius),
    viscosity,
  })
  return {
    reach: switchDistance + late.reach,
    atTime(time) {
      const core = laminarCoreRadius(coreRadius, viscosity, time)
      if (time < thinTime)
        return {
          time,
          distance: thinDistance(time),
          speed: thinRingSpeed(circulation, radius, core, 'gaussian'),
          radius,
          coreRadius: core,
          law: 'thin',
        }
      const aged = late.atTime(time - thinTime)
      return { ...aged, time, distance: switchDistance + aged.distance, coreRadius: core }
    },
    timeToReach(distance) {
      requireRange('distance', distance, { min: 0, unit: 'm' })
      if (distance >= switchDistance) {
        const rest = late.timeToReach(distance - switchDistance)
        return rest === null ? null : thinTime + rest
      }
      return bracketedRoot((time) => thinDistance(time) - distance, 0, thinTime)
    },
  }
}

/** int of Saffman's speed from 0 to time: with s = a^2, int ln s dt = (s ln s - s) / (4 nu). */
function saffmanDistance(ring: LaminarRing, time: number): number {
  const { circulation, radius, coreRadius, viscosity } = ring
  if (time === 0) return 0
  const s0 = (coreRadius / radius) ** 2
  const growth = (4 * viscosity * time) / (radius * radius)
  const s1 = s0 + growth
  // Mean of ln s over the time; log1p keeps the digits when growth is small.
  const meanLog = Math.log(s1) - 1 + (s0 / growth) * Math.log1p(growth / s0)
  const mean = Math.log(8) - 0.5 * meanLog + CORE_CONSTANT.gaussian - 0.5
  return ((circulation * time) / (4 * Math.PI * radius)) * mean
}

export interface TurbulentRing {
  /** U at the start [m/s], > 0 */
  readonly speed: number
  /** R at the start [m], > 0 */
  readonly radius: number
  /** Core radius at the start [m], if it is to be followed. */
  readonly coreRadius?: number
  /** dR/dx, default TURBULENT_GROWTH_RATE, > 0 */
  readonly growthRate?: number
}

/**
 * Turbulent ageing at constant impulse from the virtual origin R / growthRate behind the start.
 *
 * @throws {DomainError} for an argument outside its range
 */
export function turbulentAgeing(ring: TurbulentRing): Ageing {
  const { speed, radius, coreRadius, growthRate = TURBULENT_GROWTH_RATE } = ring
  requireRange('speed', speed, { above: 0, unit: 'm/s' })
  requireRange('radius', radius, { above: 0, unit: 'm' })
  requireRange('growthRate', growthRate, { above: 0, unit: '' })
  if (coreRadius !== undefined) requireRange('coreRadius', coreRadius, { above: 0, max: radius, unit: 'm' })
  const origin = radius / growthRate
  return {
    reach: Infinity,
    atTime(time) {
      requireRange('time', time, { min: 0, unit: 's' })
      // (s / s0)^4 = 1 + 4 U0 t / s0; expm1 and log1p keep short distances.
      const growth = Math.log1p((4 * speed * time) / origin) / 4
      return turbulentAt(time, origin * Math.expm1(growth))
    },
    timeToReach(distance) {
      requireRange('distance', distance, { min: 0, unit: 'm' })
      return (origin * Math.expm1(4 * Math.log1p(distance / origin))) / (4 * speed)
    },
  }

  function turbulentAt(time: number, distance: number): AgedRing {
    const size = 1 + distance / origin
    return {
      time,
      distance,
      speed: speed / size ** 3,
      radius: radius * size,
      coreRadius: coreRadius === undefined ? null : coreRadius * size,
      law: 'turbulent',
    }
  }
}
