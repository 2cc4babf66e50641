/**
 * Closed curves as rings of nodes: tangents, length, centroid, vector area, even spacing.
 *
 * Nodes are samples of a smooth periodic curve at equal steps of its parameter. A node carries the piece of filament about it,
 * dl = dx/dparameter by central differences of sixth order; sums over nodes are then the trapezoidal rule, whose own error on a smooth
 * closed curve falls exponentially with the node count. The differences are skew, which makes the impulse of the discrete filament a
 * constant of its motion wherever that of the filament is.
 */
import type { Vector } from './vector'

/** Central difference of sixth order for the first derivative at unit spacing (Fornberg 1988, Math. Comput. 51:699). */
const DIFFERENCE = [3 / 4, -3 / 20, 1 / 60] as const
/** Fewest nodes a curve may have: the differences must not reach round it. */
export const FEWEST_NODES = 16
/** Points of the Lagrange interpolation between nodes. */
const INTERPOLATION_POINTS = 8

/** dl of every node [m]: writes 3 numbers a node. @param nodes x y z of each node */
export function tangents(nodes: Float64Array, out: Float64Array): void {
  const size = nodes.length
  for (let i = 0; i < size; i++) {
    let sum = 0
    for (let k = 1; k <= 3; k++) {
      const ahead = i + 3 * k
      const behind = i - 3 * k
      sum +=
        (DIFFERENCE[k - 1] ?? 0) *
        (read(nodes, ahead < size ? ahead : ahead - size) - read(nodes, behind >= 0 ? behind : behind + size))
    }
    out[i] = sum
  }
}

/** Central difference of sixth order for the second derivative: the node itself, then its neighbours. */
const SECOND_DIFFERENCE = [-49 / 18, 3 / 2, -3 / 20, 1 / 90] as const

/**
 * Curvature times binormal of every node [1/m]: x' cross x'' / |x'|^3, whatever the parameter. Writes 3 numbers a node.
 *
 * @param tangent as `tangents` gives it
 */
export function curvatures(nodes: Float64Array, tangent: Float64Array, out: Float64Array): void {
  const size = nodes.length
  const second = [0, 0, 0]
  for (let i = 0; i < size; i += 3) {
    for (let axis = 0; axis < 3; axis++) {
      const here = i + axis
      let sum = SECOND_DIFFERENCE[0] * read(nodes, here)
      for (let k = 1; k <= 3; k++) {
        const ahead = here + 3 * k
        const behind = here - 3 * k
        sum +=
          (SECOND_DIFFERENCE[k] ?? 0) *
          (read(nodes, ahead < size ? ahead : ahead - size) + read(nodes, behind >= 0 ? behind : behind + size))
      }
      second[axis] = sum
    }
    const [sx = NaN, sy = NaN, sz = NaN] = second
    const tx = read(tangent, i)
    const ty = read(tangent, i + 1)
    const tz = read(tangent, i + 2)
    const cube = (tx * tx + ty * ty + tz * tz) ** 1.5
    out[i] = (ty * sz - tz * sy) / cube
    out[i + 1] = (tz * sx - tx * sz) / cube
    out[i + 2] = (tx * sy - ty * sx) / cube
  }
}

/**
 * Add to a velocity the sliding along the curve that keeps the nodes evenly spaced: the filament moves the same, its nodes do not crowd.
 *
 * With T the sliding, |x'| changes by t.u' + T'; T' is chosen so that this is the mean everywhere, T so that its mean is 0 (after
 * Hou, Lowengrub & Shelley 1994, J. Comput. Phys. 114:312, recalled, not re-read).
 *
 * @param tangent as `tangents` gives it
 * @param scratch as long as velocity
 */
export function keepSpacing(velocity: Float64Array, tangent: Float64Array, scratch: Float64Array): void {
  const count = velocity.length / 3
  tangents(velocity, scratch)
  // Growth of each segment, put where its first component was read.
  let mean = 0
  for (let i = 0; i < count; i++) {
    const tx = read(tangent, 3 * i)
    const ty = read(tangent, 3 * i + 1)
    const tz = read(tangent, 3 * i + 2)
    const growth =
      (tx * read(scratch, 3 * i) + ty * read(scratch, 3 * i + 1) + tz * read(scratch, 3 * i + 2)) /
      Math.sqrt(tx * tx + ty * ty + tz * tz)
    scratch[i] = growth
    mean += growth / count
  }
  // Sliding at each node: the integral of what the mean exceeds the growth by, by the six-point rule, into the second third.
  const excess = (i: number): number => mean - read(scratch, i < 0 ? i + count : i >= count ? i - count : i)
  let sliding = 0
  let average = 0
  for (let i = 0; i < count; i++) {
    scratch[count + i] = sliding
    average += sliding / count
    sliding +=
      (802 * (excess(i) + excess(i + 1)) -
        93 * (excess(i - 1) + excess(i + 2)) +
        11 * (excess(i - 2) + excess(i + 3))) /
      1440
  }
  for (let i = 0; i < count; i++) {
    const tx = read(tangent, 3 * i)
    const ty = read(tangent, 3 * i + 1)
    const tz = read(tangent, 3 * i + 2)
    const factor = (read(scratch, count + i) - average) / Math.sqrt(tx * tx + ty * ty + tz * tz)
    velocity[3 * i] = read(velocity, 3 * i) + factor * tx
    velocity[3 * i + 1] = read(velocity, 3 * i + 1) + factor * ty
    velocity[3 * i + 2] = read(velocity, 3 * i + 2) + factor * tz
  }
}

/** Sums over a curve with its tangents. */
export interface CurveSums {
  /** [m] */
  readonly length: number
  /** Mean place by arc length [m]. */
  readonly centroid: Vector
  /** 1/2 sum x cross dl [m2]: the impulse over rho Gamma. */
  readonly area: Vector
  readonly longestSegment: number
  readonly shortestSegment: number
}

export function curveSums(nodes: Float64Array, tangent: Float64Array): CurveSums {
  let total = 0
  let longest = 0
  let shortest = Infinity
  let cx = 0
  let cy = 0
  let cz = 0
  let ax = 0
  let ay = 0
  let az = 0
  for (let i = 0; i < nodes.length; i += 3) {
    const x = read(nodes, i)
    const y = read(nodes, i + 1)
    const z = read(nodes, i + 2)
    const tx = read(tangent, i)
    const ty = read(tangent, i + 1)
    const tz = read(tangent, i + 2)
    const piece = Math.sqrt(tx * tx + ty * ty + tz * tz)
    total += piece
    longest = Math.max(longest, piece)
    shortest = Math.min(shortest, piece)
    cx += x * piece
    cy += y * piece
    cz += z * piece
    ax += y * tz - z * ty
    ay += z * tx - x * tz
    az += x * ty - y * tx
  }
  return {
    length: total,
    centroid: [cx / total, cy / total, cz / total],
    area: [ax / 2, ay / 2, az / 2],
    longestSegment: longest,
    shortestSegment: shortest,
  }
}

/** Nodes of a curve given as a function of its parameter, 0 to 2 pi. */
export function sampleCurve(place: (parameter: number) => Vector, count: number): Float64Array {
  const nodes = new Float64Array(3 * count)
  for (let i = 0; i < count; i++) nodes.set(place((2 * Math.PI * i) / count), 3 * i)
  return nodes
}

/**
 * The same curve with `count` nodes at equal arc length, the first kept. Error of a node's place: of eighth order in the old spacing.
 */
export function evenlySpaced(nodes: Float64Array, count: number): Float64Array {
  const old = nodes.length / 3
  const tangent = new Float64Array(nodes.length)
  tangents(nodes, tangent)
  const { arc, total } = arcLengths(tangent)
  const mean = total / old
  // Arc length less its mean growth is periodic, and smooth where the curve is.
  const excess = Float64Array.from({ length: old }, (_, i) => read(arc, i) - i * mean)
  const out = new Float64Array(3 * count)
  for (let k = 0; k < count; k++) {
    const target = (k * total) / count
    let parameter = target / mean
    for (let iteration = 0; iteration < 50; iteration++) {
      const step = (target - parameter * mean - interpolate(excess, 1, 0, parameter)) / mean
      parameter += step
      if (Math.abs(step) < 1e-13 * old) break
    }
    for (let axis = 0; axis < 3; axis++) out[3 * k + axis] = interpolate(nodes, 3, axis, parameter)
  }
  return out
}

/** Arc length from node 0 to every node by the six-point rule on each interval, and the whole. */
function arcLengths(tangent: Float64Array): { readonly arc: Float64Array; readonly total: number } {
  const count = tangent.length / 3
  const size = (i: number): number => {
    const at = 3 * ((i + count) % count)
    return Math.hypot(read(tangent, at), read(tangent, at + 1), read(tangent, at + 2))
  }
  const arc = new Float64Array(count)
  let total = 0
  for (let i = 0; i < count; i++) {
    arc[i] = total
    const near = 802 * (size(i) + size(i + 1))
    const next = -93 * (size(i - 1) + size(i + 2))
    const far = 11 * (size(i - 2) + size(i + 3))
    total += (near + next + far) / 1440
  }
  return { arc, total }
}

/** Periodic Lagrange interpolation of one of `stride` interleaved lists at a parameter in units of the spacing. */
function interpolate(values: Float64Array, stride: number, offset: number, parameter: number): number {
  const count = values.length / stride
  const base = Math.floor(parameter)
  const share = parameter - base
  const first = 1 - INTERPOLATION_POINTS / 2
  if (share === 0) return read(values, stride * (((base % count) + count) % count) + offset)
  // Barycentric form on integers: weights (-1)^j binomial(7, j).
  let weight = 1
  let top = 0
  let bottom = 0
  for (let j = 0; j < INTERPOLATION_POINTS; j++) {
    const node = first + j
    const index = (((base + node) % count) + count) % count
    const term = weight / (share - node)
    top += term * read(values, stride * index + offset)
    bottom += term
    weight *= -(INTERPOLATION_POINTS - 1 - j) / (j + 1)
  }
  return top / bottom
}

function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
