/**
 * What the table of the steady family holds for one ring: differences from known limits, which are smooth and small at the thin end.
 */
import { bodyVolume, carriedBody, type CarriedBody } from './dividingStreamline'
import { FILAMENT } from './filamentFlow'
import { sphereRatios } from './hillVortex'
import { secondOrderRatios } from './secondOrderRing'
import { carriedVolume, steadyIntegrals } from './steadyIntegrals'
import type { SolvedRing } from './steadySolver'

export interface SteadyRow {
  /** 4 pi L U / Gamma less its second-order value. */
  readonly speed: number
  /** I / (rho pi Gamma L^2) less its second-order value. */
  readonly impulse: number
  /** 2 E / (rho Gamma^2 L) less its second-order value. */
  readonly energy: number
  /** Inner radius over (1 - eps / sqrt 2) L. */
  readonly inner: number
  /** Volume carried over that of a vortex line of equal impulse, circulation and speed. */
  readonly carried: number
}

/** Panels towards the axis for the volume of a vortex line: enough where the hole is about to close. */
const LINE_DEPTH = 24
/** The same for a solved ring, whose surface is smoother; a further panel changes the volume by less than 1e-9. */
const CORE_DEPTH = 8

/** Body carried by a vortex line of unit radius and circulation moving at `speed` / (4 pi). @throws {Error} where none is found */
export function lineBody(speed: number): CarriedBody {
  // Stagnation points of a fast line are 2 / speed from it: start well inside of them.
  const near = 0.01 / speed
  const body = carriedBody(FILAMENT, speed / (4 * Math.PI), 1 - near, 1 + near)
  if (body === null) throw new Error(`no dividing streamline for a vortex line of speed ${speed}`)
  return body
}

/** Volume carried by a vortex line of unit radius and circulation moving at `speed` / (4 pi). */
export function lineCarriedVolume(speed: number): number {
  return bodyVolume(lineBody(speed), LINE_DEPTH)
}

export function steadyRow(ring: SolvedRing): SteadyRow {
  const { circulation, impulse, energy, innerRadius } = steadyIntegrals(ring)
  const thin = secondOrderRatios(ring.coreRatio)
  const speed = (4 * Math.PI * ring.speed) / circulation
  const impulseRatio = impulse / (Math.PI * circulation)
  const lineRadius = Math.sqrt(impulseRatio)
  return {
    speed: speed - thin.speed,
    impulse: impulseRatio - thin.impulse,
    energy: (2 * energy) / (circulation * circulation) - thin.energy,
    inner: innerRadius / (1 - ring.coreRatio / Math.SQRT2),
    carried: carriedVolume(ring, CORE_DEPTH) / (lineRadius ** 3 * lineCarriedVolume(speed * lineRadius)),
  }
}

/** Ratios of the family near Hill's vortex to first order in sqrt 2 - eps: a sphere of radius 2 - (sqrt 2 - eps) / sqrt 2. */
export function sphereLimit(coreRatio: number): { speed: number; impulse: number; energy: number; carried: number } {
  const a = 2 - (Math.SQRT2 - coreRatio) / Math.SQRT2
  const sphere = sphereRatios(a)
  const lineRadius = Math.sqrt(sphere.impulse)
  const volume = (4 / 3) * Math.PI * a ** 3
  return { ...sphere, carried: volume / (lineRadius ** 3 * lineCarriedVolume(sphere.speed * lineRadius)) }
}
