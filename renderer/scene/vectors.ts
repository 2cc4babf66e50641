/** Vectors of the drawing: x along the jet, y up, z toward someone who looks from the side. */
export type Vector = readonly [number, number, number]

export function add(a: Vector, b: Vector, scale = 1): Vector {
  return [a[0] + b[0] * scale, a[1] + b[1] * scale, a[2] + b[2] * scale]
}

export function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

export function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]
}

/** Unit vector; the zero vector stays zero. */
export function unit(a: Vector): Vector {
  const length = Math.hypot(a[0], a[1], a[2])
  return length === 0 ? a : [a[0] / length, a[1] / length, a[2] / length]
}
