/**
 * Two rings of one sense whose cores have met become one. What merging conserves is kept; what the cores do on the way is not computed.
 */
import type { Kernel } from '../kernel'
import { coreRatioOfEnergy, smoothedEnergy, type StandingRing } from './smoothedRing'

export interface Merger {
  readonly ring: StandingRing
  /** Energy of the ring less that of the two, their mutual energy included, over the latter. */
  readonly energyChange: number
}

/**
 * The ring of the circulation, sum Gamma R^2 and centroid of two of the same sense.
 *
 * Its core has the volume of both, for vortical fluid is neither made nor lost. Where a core of that volume would hold more energy than the
 * two rings had it is widened until it holds as much: merging cannot make energy. So rings that hold less together than Hill's vortex
 * become one that is thicker than its radius: a puff rather than a ring, slow as it would be.
 */
export function mergeRings(a: StandingRing, b: StandingRing, kernel: Kernel): Merger {
  const circulation = a.circulation + b.circulation
  const [squareA, squareB] = [a.circulation * a.radius ** 2, b.circulation * b.radius ** 2]
  const square = squareA + squareB
  const radius = Math.sqrt(square / circulation)
  const before = smoothedEnergy([a, b], kernel)
  const volume = a.coreRadius ** 2 * a.radius + b.coreRadius ** 2 * b.radius
  const core = a.core === b.core ? a.core : 'uniform'
  const ofVolume = Math.sqrt(volume / radius) / radius
  const ofEnergy = coreRatioOfEnergy(circulation, radius, core, before, kernel)
  const ratio = Math.max(ofVolume, ofEnergy)
  const ring = { circulation, radius, coreRadius: ratio * radius, core, x: (squareA * a.x + squareB * b.x) / square }
  return { ring, energyChange: smoothedEnergy([ring], kernel) / before - 1 }
}

/** Whether the cores of two rings touch: their distance is below the sum of their core radii. */
export function coresTouch(a: StandingRing, b: StandingRing): boolean {
  return Math.hypot(a.x - b.x, a.radius - b.radius) < a.coreRadius + b.coreRadius
}
