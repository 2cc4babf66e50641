/**
 * What the walls of a rectangular tank do to a ring that travels along it.
 *
 * Every wall mirrors the ring, and the mirrors mirror one another: a doubly infinite lattice of equal rings in one plane, all moving the
 * same way, whose return flow holds the ring back. Four images alone miss about half of it. Ring axis along the tank; the
 * surface is taken as flat.
 */
import { completeEllipticFromComplement, requireRange } from '../base'

/** Cross-section of the tank and where the ring's centre stands in it, from one side wall and from the floor [m]. */
export interface TankSection {
  readonly width: number
  readonly depth: number
  readonly fromSide: number
  readonly fromFloor: number
}

/** Cells of the lattice summed on each side; the rest is the integral of the dipole part, good to 1e-6 of the whole. */
const CELLS = 48
/** Images nearer than this many radii are summed by their whole field, others by its first two multipoles (error (R/d)^4). */
const WHOLE_FIELD_WITHIN = 24
/** Points round the ring for its mean. */
const POINTS = 48

/**
 * Change of a ring's speed [m/s] by the tank's walls, against its motion: the mean over the ring of what its images induce.
 *
 * @param circulation Gamma [m2/s]
 * @param radius R [m]; the ring must lie inside the section
 * @throws {DomainError}
 */
export function tankSlowing(circulation: number, radius: number, section: TankSection): number {
  const { width, depth, fromSide, fromFloor } = section
  requireRange('circulation', circulation, { unit: 'm2/s' })
  requireRange('radius', radius, { above: 0, unit: 'm' })
  requireRange('fromSide', fromSide, { above: radius, max: width - radius, unit: 'm' })
  requireRange('fromFloor', fromFloor, { above: radius, max: depth - radius, unit: 'm' })
  let sum = 0
  for (let m = -CELLS; m <= CELLS; m++)
    for (let n = -CELLS; n <= CELLS; n++)
      for (const dy of [2 * m * width, 2 * m * width - 2 * fromSide])
        for (const dz of [2 * n * depth, 2 * n * depth - 2 * fromFloor])
          if (dy !== 0 || dz !== 0) sum += meanOverRing(radius, dy, dz)
  // The lattice holds one ring per width x depth; it was summed out to these half sides about the mean of each cell.
  const halfY = (2 * CELLS + 1) * width
  const halfZ = (2 * CELLS + 1) * depth
  const beyond = (4 * Math.hypot(halfY, halfZ)) / (halfY * halfZ * width * depth)
  return circulation * (sum - (radius * radius * beyond) / 4)
}

/** Mean over the ring of the axial velocity of a ring of unit circulation (dy, dz) aside in the same plane. */
function meanOverRing(radius: number, dy: number, dz: number): number {
  const distance = Math.hypot(dy, dz)
  if (distance > WHOLE_FIELD_WITHIN * radius) {
    const share = (radius / distance) ** 2
    return (-share / (4 * distance)) * (1 + (27 / 8) * share)
  }
  let sum = 0
  for (let k = 0; k < POINTS; k++) {
    const angle = (2 * Math.PI * k) / POINTS
    sum += velocityInPlane(radius, Math.hypot(dy + radius * Math.cos(angle), dz + radius * Math.sin(angle)))
  }
  return sum / POINTS
}

/** Axial velocity in the plane of a ring of unit circulation, r from its centre; Lamb, Hydrodynamics, 6th ed., art. 161. */
function velocityInPlane(radius: number, r: number): number {
  const sum = radius + r
  const difference = radius - r
  const { K, E } = completeEllipticFromComplement((difference / sum) ** 2)
  return (K + (E * sum) / difference) / (2 * Math.PI * sum)
}
