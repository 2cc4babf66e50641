/**
 * Whether rings share an axis, so that the coaxial engine can march them.
 */
import { at } from '../base'
import type { WakeInput } from './types'
import { along, cross, dot, length, scaled, unit, type Vector } from './vector'

/** Departure, in radians and in radii, that still counts as one axis: rounding of typed numbers. */
const SAME = 1e-9

/** An axis: the point of it nearest to the origin, and its direction towards +x (or +y, or +z, where it is across x). */
export interface Axis {
  readonly origin: Vector
  readonly direction: Vector
}

export type AxisFinding = { readonly axis: Axis } | { readonly axis: null; readonly why: string }

/** The axis that all rings share, with wall, tube and stream along it; or why there is none. */
export function sharedAxis(input: WakeInput): AxisFinding {
  const { rings, wall, axialFlow } = input
  const first = at(rings, 0)
  const direction = upright(unit(first.direction))
  const origin = along(first.centre, direction, -dot(first.centre, direction))
  for (const [i, ring] of rings.entries()) {
    if (ring.curve !== undefined) return { axis: null, why: `ring ${i + 1} has a shape of its own` }
    if ((ring.axisRatio ?? 1) !== 1) return { axis: null, why: `ring ${i + 1} is not round` }
    if (length(cross(unit(ring.direction), direction)) > SAME)
      return { axis: null, why: `rings 1 and ${i + 1} point in different directions` }
    const aside = along(ring.centre, origin, -1)
    if (length(along(aside, direction, -dot(aside, direction))) > SAME * ring.radius)
      return { axis: null, why: `rings 1 and ${i + 1} lie side by side` }
  }
  if (wall !== null && length(cross(unit(wall.normal), direction)) > SAME)
    return { axis: null, why: 'the wall is not square to the axis' }
  if (axialFlow !== 0 && Math.hypot(direction[1], direction[2]) > SAME)
    return { axis: null, why: 'the stream does not run along the axis' }
  return { axis: { origin, direction } }
}

/** The same line pointing the other way where its first component that is not 0 is negative. */
function upright(direction: Vector): Vector {
  const leading = direction.find((value) => Math.abs(value) > SAME) ?? 1
  return leading < 0 ? scaled(direction, -1) : direction
}
