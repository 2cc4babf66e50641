/** Three numbers: a place [m] or a direction. */
export type Vector = readonly [number, number, number]

export function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

export function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]
}

export function length(a: Vector): number {
  return Math.hypot(a[0], a[1], a[2])
}

/** a + factor b */
export function along(a: Vector, b: Vector, factor = 1): Vector {
  return [a[0] + factor * b[0], a[1] + factor * b[1], a[2] + factor * b[2]]
}

export function scaled(a: Vector, factor: number): Vector {
  return [factor * a[0], factor * a[1], factor * a[2]]
}

/** a over its length; a must not be zero. */
export function unit(a: Vector): Vector {
  return scaled(a, 1 / length(a))
}

/**
 * Two unit vectors across a direction, right-handed with it: the first as near to +y as can be (to +z where the direction is y), so
 * that for a jet along +x they are +y and +z.
 *
 * @param direction unit vector
 */
export function acrossOf(direction: Vector): readonly [Vector, Vector] {
  const nearest: Vector = Math.abs(direction[1]) > 1 - 1e-9 ? [0, 0, 1] : [0, 1, 0]
  const first = unit(along(nearest, direction, -dot(nearest, direction)))
  return [first, cross(direction, first)]
}
