import type { PointTree } from './pointTree'

/**
 * Points that stand for the points of a cell: a grid of Chebyshev points over its box in x, r and delta^2, or the points
 * themselves where those are not more. A field is interpolated between them, a circulation is shared out among them, by the
 * barycentric Lagrange formula (Berrut & Trefethen 2004, SIAM Review 46:501; Wang, Tlupova & Krasny 2020, for trees).
 */
export interface ProxyGrid {
  /** Points of the cell's grid along x, r and delta^2; their product is 0 where the points stand for themselves. */
  readonly counts: Int32Array
  /** Number of the first place of each cell's stand-ins, and how many there are. */
  readonly first: Int32Array
  readonly size: Int32Array
  /** Places in all; places below the number of points are the points in the tree's order. */
  readonly places: number
}

/** Most points along one side. */
export const MOST_POINTS = 16

/** Chebyshev points of the first kind on -1..1 and their barycentric weights, for 1..MOST_POINTS of them. */
const NODES = Array.from({ length: MOST_POINTS + 1 }, (_, n) =>
  Float64Array.from({ length: n }, (_, k) => Math.cos(((k + 0.5) * Math.PI) / n)),
)
const WEIGHTS = Array.from({ length: MOST_POINTS + 1 }, (_, n) =>
  Float64Array.from({ length: n }, (_, k) => (k % 2 === 0 ? 1 : -1) * Math.sin(((k + 0.5) * Math.PI) / n)),
)

/** Coordinate of a grid point along one side. */
export function gridPoint(middle: number, half: number, count: number, k: number): number {
  return middle + half * (NODES[count]?.[k] ?? 0)
}

/** Writes the values at `x` of the `count` Lagrange polynomials of a side into basis[offset..]. */
export function lagrange(
  basis: Float64Array,
  offset: number,
  middle: number,
  half: number,
  count: number,
  x: number,
): void {
  if (count === 1) {
    basis[offset] = 1
    return
  }
  const nodes = NODES[count] ?? basis
  const weights = WEIGHTS[count] ?? basis
  const t = (x - middle) / half
  let sum = 0
  for (let k = 0; k < count; k++) {
    const distance = t - (nodes[k] ?? NaN)
    if (distance === 0) {
      basis.fill(0, offset, offset + count)
      basis[offset + k] = 1
      return
    }
    const term = (weights[k] ?? NaN) / distance
    basis[offset + k] = term
    sum += term
  }
  const scale = 1 / sum
  for (let k = offset; k < offset + count; k++) basis[k] = (basis[k] ?? NaN) * scale
}

/**
 * Chooses the grids of all cells.
 *
 * @param points along a side as long as the cell is wide; shorter sides get fewer for the same error, sides of no length one.
 * @param room cells meet only when all points of the other are that many radii away from the middle.
 * @param align stand-ins of a cell start at a multiple of this.
 */
export function proxyGrid(tree: PointTree, points: number, room: number, align: number, kept: Int32Array): ProxyGrid {
  const { cellCount } = tree
  const counts = kept.subarray(0, 3 * cellCount)
  const first = kept.subarray(3 * cellCount, 4 * cellCount)
  const size = kept.subarray(4 * cellCount, 5 * cellCount)
  let places = Math.ceil(tree.count / align) * align
  const digits = points * Math.log(2 * room)
  for (let cell = 0; cell < cellCount; cell++) {
    const radius = tree.radius[cell] ?? NaN
    // The nearest singularity is at room radius; a side of half length h converges as (2 room radius / h)^-n.
    const along = (half: number, scale: number): number =>
      half > 0 ? Math.min(points, Math.max(1, Math.ceil(digits / Math.log((2 * scale) / half)))) : 1
    const nx = along(tree.half[3 * cell] ?? 0, room * radius)
    const nr = along(tree.half[3 * cell + 1] ?? 0, room * radius)
    // In delta^2 the singularity is at -distance^2; cells with less room are not met (see `walk`).
    const spread = tree.smoothingSpread[cell] ?? 0
    const nd = along(spread, Math.max((room * radius) ** 2, room * spread))
    const ownSize = tree.size[cell] ?? 0
    const grid = nx * nr * nd
    const own = grid >= ownSize || !(grid > 0)
    counts[3 * cell] = own ? 0 : nx
    counts[3 * cell + 1] = own ? 0 : nr
    counts[3 * cell + 2] = own ? 0 : nd
    first[cell] = own ? (tree.first[cell] ?? 0) : places
    size[cell] = own ? ownSize : grid
    if (!own) places += Math.ceil(grid / align) * align
  }
  return { counts, first, size, places }
}
