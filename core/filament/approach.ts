/**
 * How near two closed filaments come, or two far parts of one.
 */
import { at } from '../base'
import type { CurveSums } from './closedCurve'
import { length, along } from './vector'

/** Parts of one filament nearer than this along it, in core radii and as a share of its length, are neighbours, not an approach. */
const NEIGHBOUR_CORES = 6
const NEIGHBOUR_SHARE = 1 / 8

/** Radius of the sphere about the centroid that holds every node [m]. */
export function reachOf(nodes: Float64Array, sums: CurveSums): number {
  const [cx, cy, cz] = sums.centroid
  let largest = 0
  for (let i = 0; i < nodes.length; i += 3)
    largest = Math.max(
      largest,
      (read(nodes, i) - cx) ** 2 + (read(nodes, i + 1) - cy) ** 2 + (read(nodes, i + 2) - cz) ** 2,
    )
  return Math.sqrt(largest)
}

/**
 * Least distance between two curves [m], or a smaller positive number where their spheres are already further apart than `enough`.
 */
export function distanceBetween(
  first: { readonly nodes: Float64Array; readonly sums: CurveSums; readonly reach: number },
  second: { readonly nodes: Float64Array; readonly sums: CurveSums; readonly reach: number },
  enough: number,
): number {
  const apart = length(along(first.sums.centroid, second.sums.centroid, -1)) - first.reach - second.reach
  if (apart > enough) return apart
  const { nodes: a } = first
  const { nodes: b } = second
  let least = Infinity
  let nearI = 0
  let nearJ = 0
  for (let i = 0; i < a.length; i += 3) {
    const x = read(a, i)
    const y = read(a, i + 1)
    const z = read(a, i + 2)
    for (let j = 0; j < b.length; j += 3) {
      const dx = read(b, j) - x
      const dy = read(b, j + 1) - y
      const dz = read(b, j + 2) - z
      const square = dx * dx + dy * dy + dz * dz
      if (square < least) {
        least = square
        nearI = i
        nearJ = j
      }
    }
  }
  return refined(a, nearI, b, nearJ)
}

/**
 * Least distance between parts of one curve that are far apart along it [m]; Infinity where it is too short to have any.
 *
 * @param apart least distance along the curve that counts [m]
 */
export function distanceToItself(nodes: Float64Array, sums: CurveSums, apart: number): number {
  const count = nodes.length / 3
  const skip = Math.ceil(apart / sums.shortestSegment)
  let least = Infinity
  let nearI = 0
  let nearJ = 0
  for (let i = 0; i < count; i++) {
    const x = read(nodes, 3 * i)
    const y = read(nodes, 3 * i + 1)
    const z = read(nodes, 3 * i + 2)
    for (let j = i + skip; j < count && j - i <= count - skip; j++) {
      const dx = read(nodes, 3 * j) - x
      const dy = read(nodes, 3 * j + 1) - y
      const dz = read(nodes, 3 * j + 2) - z
      const square = dx * dx + dy * dy + dz * dz
      if (square < least) {
        least = square
        nearI = 3 * i
        nearJ = 3 * j
      }
    }
  }
  return Number.isFinite(least) ? refined(nodes, nearI, nodes, nearJ) : Infinity
}

/** Distance along a curve from which two parts of it can be said to touch [m]. */
export function neighbourhood(sums: CurveSums, coreRadius: number): number {
  return Math.max(NEIGHBOUR_CORES * coreRadius, NEIGHBOUR_SHARE * sums.length)
}

/** Distance of the straight segments about a pair of nearest nodes. */
function refined(a: Float64Array, i: number, b: Float64Array, j: number): number {
  let least = Infinity
  for (const p of [i, before(a, i)])
    for (const q of [j, before(b, j)]) least = Math.min(least, segmentDistance(a, p, b, q))
  return least
}

function before(nodes: Float64Array, index: number): number {
  return index === 0 ? nodes.length - 3 : index - 3
}

/** Distance of the segments from node p of a and node q of b to the next nodes (Ericson 2005, section 5.1.9, recalled). */
function segmentDistance(a: Float64Array, p: number, b: Float64Array, q: number): number {
  const pNext = (p + 3) % a.length
  const qNext = (q + 3) % b.length
  let dd = 0
  let ee = 0
  let de = 0
  let dr = 0
  let er = 0
  for (let axis = 0; axis < 3; axis++) {
    const d = read(a, pNext + axis) - read(a, p + axis)
    const e = read(b, qNext + axis) - read(b, q + axis)
    const r = read(a, p + axis) - read(b, q + axis)
    dd += d * d
    ee += e * e
    de += d * e
    dr += d * r
    er += e * r
  }
  const denominator = dd * ee - de * de
  let s = denominator > 1e-12 * dd * ee ? clamp((de * er - dr * ee) / denominator) : 0
  const t = clamp((de * s + er) / ee)
  s = clamp((de * t - dr) / dd)
  let square = 0
  for (let axis = 0; axis < 3; axis++) {
    const from = at(a, p + axis) + s * (at(a, pNext + axis) - at(a, p + axis))
    const to = at(b, q + axis) + t * (at(b, qNext + axis) - at(b, q + axis))
    square += (to - from) ** 2
  }
  return Math.sqrt(square)
}

function clamp(share: number): number {
  return Math.min(1, Math.max(0, share))
}

function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
