/**
 * Flow of a circular vortex line of unit radius and unit circulation, fluid at rest far away.
 *
 * Source: Lamb, Hydrodynamics, 6th ed. 1932, art. 161, in complete elliptic integrals.
 */
import { completeEllipticFromComplement } from '../base'
import type { AxisymmetricFlow, FlowValue } from './dividingStreamline'

/** Stream function and velocity at (x, r) of the line at x = 0, r = 1. */
export function filamentFlow(x: number, r: number, out: FlowValue): void {
  if (r === 0) {
    out.psi = 0
    out.ux = 0.5 / (1 + x * x) ** 1.5
    out.ur = 0
    return
  }
  const far2 = x * x + (1 + r) * (1 + r)
  const near2 = x * x + (1 - r) * (1 - r)
  const far = Math.sqrt(far2)
  const { K, E } = completeEllipticFromComplement(near2 / far2)
  const m = (4 * r) / far2
  out.psi = (far / (2 * Math.PI)) * ((1 - m / 2) * K - E)
  out.ux = (K + ((1 - r * r - x * x) / near2) * E) / (2 * Math.PI * far)
  out.ur = (x * (((1 + r * r + x * x) / near2) * E - K)) / (2 * Math.PI * r * far)
}

export const FILAMENT: AxisymmetricFlow = filamentFlow

/** Distance from the ring plane at which the axial velocity on the axis is `speed`, 0 < speed <= 1/2: 1 / (2 (1 + x^2)^1.5). */
export function lineStagnationPoint(speed: number): number {
  return Math.sqrt(Math.max(0, Math.cbrt(2 * speed) ** -2 - 1))
}
