/**
 * Where a ring is at a time, in closed form: the law by which the tank's march moves a lone ring, cheap enough for fits.
 *
 * Laminar: R and Gamma stay, a^2 grows by 4 nu t, and the thin-core law is integrated exactly. Turbulent: R grows by a fixed share of the
 * ring's own way at constant Gamma R^2 and a/R. The walls slow it as they do a dipole, by Gamma R^2, which neither law changes. Before
 * its start the law is carried back as far as half of the time the ring is old by it, and from there at the speed of then.
 */
import type { WakeAgeing } from '../../coaxial'
import { CORE_CONSTANT, TURBULENT_GROWTH_RATE } from '../../ring'

/** A ring as it starts. The core is the thin uniform one that moves as fast as the ring. */
export interface RingStart {
  /** Gamma [m2/s], > 0 */
  readonly circulation: number
  /** R [m], > 0 */
  readonly radius: number
  /** a [m], > 0 */
  readonly coreRadius: number
  /** [s] */
  readonly time: number
  /** [m] */
  readonly x: number
}

/** What stands around the ring. */
export interface RingSurroundings {
  readonly ageing: WakeAgeing
  /** nu [m2/s] */
  readonly kinematicViscosity: number
  /** Stream along the axis [m/s]. */
  readonly axialFlow: number
  /** Change of speed by the walls over Gamma R^2 [1/m3], 0 or below. */
  readonly wallSlowing: number
}

export interface RingState {
  readonly x: number
  readonly radius: number
  readonly circulation: number
  readonly coreRadius: number
  readonly speed: number
}

/** The law is carried back by this share of the time since the ring would have been a point, or its core none. */
const BACK_SHARE = 0.5

/** The ring at a time [s]. Not a number where the core is so thick that the thin-core law has no forward speed. */
export function ringAt(start: RingStart, around: RingSurroundings, time: number): RingState {
  const since = time - start.time
  const back = -BACK_SHARE * ageAtStart(start, around)
  if (since >= back) return lawAt(start, around, since)
  const first = lawAt(start, around, back)
  return { ...first, x: first.x + first.speed * (since - back) }
}

/** How long before its start the law would have begun [s]. */
function ageAtStart({ circulation, radius, coreRadius }: RingStart, around: RingSurroundings): number {
  if (around.ageing === 'laminar') return (coreRadius * coreRadius) / (4 * around.kinematicViscosity)
  return radius / TURBULENT_GROWTH_RATE / (4 * ownSpeed(circulation, radius, coreRadius))
}

function lawAt(start: RingStart, around: RingSurroundings, since: number): RingState {
  const { circulation, radius, coreRadius } = start
  const drift = around.axialFlow + around.wallSlowing * circulation * radius * radius
  const carried = start.x + drift * since
  if (around.ageing === 'laminar') {
    const grown = Math.sqrt(coreRadius * coreRadius + 4 * around.kinematicViscosity * since)
    const way = (circulation / (4 * Math.PI * radius)) * since * meanShare(start, around.kinematicViscosity * since)
    return {
      x: carried + way,
      radius,
      circulation,
      coreRadius: grown,
      speed: ownSpeed(circulation, radius, grown) + drift,
    }
  }
  // (s / s0)^4 = 1 + 4 U0 t / s0 from the virtual origin; expm1 and log1p keep short ways.
  const first = ownSpeed(circulation, radius, coreRadius)
  const origin = radius / TURBULENT_GROWTH_RATE
  const way = origin * Math.expm1(Math.log1p((4 * first * since) / origin) / 4)
  const size = 1 + way / origin
  return {
    x: carried + way,
    radius: radius * size,
    circulation: circulation / (size * size),
    coreRadius: coreRadius * size,
    speed: first / size ** 3 + drift,
  }
}

/** Gamma / (4 pi R) (ln(8 R / a) + A - 1/2) [m/s]. */
function ownSpeed(circulation: number, radius: number, coreRadius: number): number {
  return (circulation / (4 * Math.PI * radius)) * (Math.log((8 * radius) / coreRadius) + CORE_CONSTANT.uniform - 0.5)
}

/** Mean of ln(8 R / a) + A - 1/2 while nu t grows from 0: with s = (a/R)^2, int ln s dt = (s ln s - s) / (4 nu). */
function meanShare({ radius, coreRadius }: RingStart, grown: number): number {
  const s0 = (coreRadius / radius) ** 2
  const growth = (4 * grown) / (radius * radius)
  const meanLog = growth === 0 ? Math.log(s0) : Math.log(s0 + growth) - 1 + (s0 / growth) * Math.log1p(growth / s0)
  return Math.log(8) - 0.5 * meanLog + CORE_CONSTANT.uniform - 0.5
}
