/** Sums of places and directions in space. */
import type { Vector } from '../filament'

/** a + factor b */
export function plus(a: Vector, b: Vector, factor = 1): Vector {
  return [a[0] + factor * b[0], a[1] + factor * b[1], a[2] + factor * b[2]]
}

export function inner(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

/** a over its length; a must not be zero. */
export function unitVector(a: Vector): Vector {
  const length = Math.hypot(...a)
  return [a[0] / length, a[1] / length, a[2] / length]
}
