/**
 * Integrals of a solved steady ring, vorticity r and mean radius 1.
 *
 * Energy by two routes. Virial: with chi = psi - U r^2/2 - c, zero on the boundary, the identity E = 2 pi int omega r (r u_x - x u_r) dx dr
 * (Lamb, art. 162) gives 7 E = 5 U I + 6 pi c Gamma. Boundary: pi int psi omega by Green's theorem with r^4/8, whose
 * operator value is r, as one sum over boundary values of psi and its normal slope. The two share the shape only.
 */
import { contourMoments, emptyPoint, harmonics, pointOnContour } from './coreContour'
import { boundaryField, gradedPanels, type FieldValue } from './coreField'
import { carriedBody, bodyVolume, type CarriedBody } from './dividingStreamline'
import { coreFlow } from './coreFlow'
import { read } from './read'
import type { SolvedRing } from './steadySolver'

/** Per unit density, vorticity r, mean radius 1. */
export interface SteadyIntegrals {
  readonly circulation: number
  readonly impulse: number
  readonly energy: number
  readonly coreVolume: number
  readonly innerRadius: number
  readonly outerRadius: number
}

export function steadyIntegrals(ring: SolvedRing): SteadyIntegrals {
  const moments = contourMoments(ring.contour)
  const circulation = moments.first
  const impulse = Math.PI * moments.third
  const { radial } = ring.contour
  let outerRadius = 0
  let innerRadius = 0
  for (let k = 0; k < radial.length; k++) {
    outerRadius += read(radial, k)
    innerRadius += k % 2 === 0 ? read(radial, k) : -read(radial, k)
  }
  return {
    circulation,
    impulse,
    energy: (5 * ring.speed * impulse + 6 * Math.PI * ring.level * circulation) / 7,
    coreVolume: 2 * Math.PI * moments.first,
    innerRadius,
    outerRadius,
  }
}

/** Energy by Green's theorem over the boundary, independent of U, c and the virial identity. */
export function energyByBoundary(ring: SolvedRing, points: number): number {
  const { contour } = ring
  // The velocity carries ln d, and the sum below cancels to the core's small area: go as near to the point as rounding of r = 1 allows.
  const panels = gradedPanels(contour.radial.length - 1, 2e-13 / ring.coreRatio)
  const cosines = new Float64Array(contour.radial.length)
  const sines = new Float64Array(contour.radial.length)
  const point = emptyPoint()
  const field: FieldValue = { psi: 0, ux: 0, ur: 0 }
  let sum = 0
  for (let i = 0; i <= points; i++) {
    const t = (Math.PI * i) / points
    boundaryField(field, contour, t, panels)
    harmonics(t, cosines, sines)
    pointOnContour(point, contour, cosines, sines)
    const { r } = point
    const nx = -point.rSlope
    const nr = point.xSlope
    const normalSlope = r * (nr * field.ux - nx * field.ur)
    const ends = i === 0 || i === points ? 0.5 : 1
    sum += (ends * (field.psi * nr * (r * r))) / 2 - (ends * r ** 3 * normalSlope) / 8
  }
  // The half t in 0..pi stands for both by symmetry.
  return Math.PI * ((2 * Math.PI * sum) / points - contourMoments(contour).fifth / 8)
}

/** The fluid carried along, or null where no dividing streamline is found. */
export function solvedCarriedBody(ring: SolvedRing): CarriedBody | null {
  const { innerRadius, outerRadius } = steadyIntegrals(ring)
  return carriedBody(coreFlow(ring.contour), ring.speed, innerRadius, outerRadius)
}

/** Volume carried along, in units of the mean radius cubed. */
export function carriedVolume(ring: SolvedRing, depth = 10): number {
  const body = solvedCarriedBody(ring)
  return body === null ? Number.NaN : bodyVolume(body, depth)
}
