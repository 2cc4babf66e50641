/**
 * A planar velocity field put on its grid, and the vorticity on it.
 *
 * A frame is a list of nodes in any order; they must fill a regular grid. Half planes are analysed one by one in (x, r): below the
 * axis r = -y and the radial velocity is turned round.
 */
import { at, DomainError } from '../../base'

/** One frame: nodes in any order, all lists of one length. r may be y, with nodes on both sides of the axis. */
export interface FieldFrame {
  /** [s] */
  readonly time: number
  /** [m] */
  readonly x: ArrayLike<number>
  /** From the axis, or across it with both signs [m]. */
  readonly r: ArrayLike<number>
  /** Along x and r [m/s]; not a number where there is no vector. */
  readonly u: ArrayLike<number>
  readonly v: ArrayLike<number>
}

/** Where each node of a frame lies on its grid. */
export interface FieldGrid {
  readonly x: Float64Array
  /** With its sign. */
  readonly y: Float64Array
  /** Place in the grid, row by row along x, of each node of the list. */
  readonly place: Int32Array
}

/** A half plane; values row by row along x, r rising. */
export interface HalfPlane {
  readonly x: Float64Array
  readonly r: Float64Array
  readonly u: Float64Array
  readonly v: Float64Array
}

/** Most nodes of a frame, and shares of a spacing and of all nodes by which a grid may fail: places are rounded in files. */
export const LARGEST_FRAME = 1_000_000
const LARGEST_UNEVENNESS = 0.1
const LARGEST_MISSING = 0.2
/** Rows and columns a half plane needs for second-order slopes. */
const FEWEST_LINES = 4

/** @throws {DomainError} where the nodes fill no regular grid */
export function fieldGrid({ x, r }: FieldFrame): FieldGrid {
  if (x.length !== r.length || x.length === 0 || x.length > LARGEST_FRAME)
    throw new DomainError(
      'frame',
      `a frame must have as many x as r and at most ${LARGEST_FRAME} nodes, got ${x.length} and ${r.length}`,
    )
  const columns = lines(x, 'x')
  const rows = lines(r, 'r')
  const [dx, dy] = [spacing(columns), spacing(rows)]
  const place = Int32Array.from({ length: x.length }, (_, k) => {
    const i = Math.round((at(x, k) - at(columns, 0)) / dx)
    const j = Math.round((at(r, k) - at(rows, 0)) / dy)
    return j * columns.length + i
  })
  const missing = columns.length * rows.length - new Set(place).size
  if (missing > LARGEST_MISSING * columns.length * rows.length)
    throw new DomainError(
      'frame',
      `a frame must fill its grid of ${columns.length} x ${rows.length} nodes, ${missing} of them are not there`,
    )
  return { x: columns, y: rows, place }
}

/** Whether a frame has the nodes of another in the same order. */
export function sameNodes(a: FieldFrame, b: FieldFrame): boolean {
  if (a.x.length !== b.x.length) return false
  for (let k = 0; k < a.x.length; k++) if (a.x[k] !== b.x[k] || a.r[k] !== b.r[k]) return false
  return true
}

/** Values closer than this share of their span are one line: a plane has at most some thousand. */
const SAME_LINE = 1e-4

/** Different values of a coordinate, rising. */
function lines(values: ArrayLike<number>, name: string): Float64Array {
  const sorted = Float64Array.from(values).sort()
  const [low, high] = [at(sorted, 0), at(sorted, sorted.length - 1)]
  if (!Number.isFinite(high) || !Number.isFinite(low))
    throw new DomainError('frame', `a frame must have a finite ${name} at every node`)
  const apart = SAME_LINE * (high - low)
  const found: number[] = []
  let first = low
  for (const value of sorted) {
    if (found.length > 0 && value - first <= apart) continue
    found.push(value)
    first = value
  }
  const list = Float64Array.from(found)
  if (list.length < FEWEST_LINES)
    throw new DomainError('frame', `a frame needs at least ${FEWEST_LINES} different ${name}, got ${list.length}`)
  const step = spacing(list)
  list.forEach((value, k) => {
    const off = Math.abs(value - low - k * step) / step
    if (off > LARGEST_UNEVENNESS)
      throw new DomainError(
        'frame',
        `a frame must have equal spacing in ${name}; ${value} m is off by ${off.toFixed(2)} of ${step} m`,
      )
  })
  return list
}

function spacing(list: Float64Array): number {
  return (at(list, list.length - 1) - at(list, 0)) / (list.length - 1)
}

/**
 * The half planes of a frame about the axis y = `axis`: one where all nodes are on one side, two where they are on both.
 *
 * @returns the halves, and how many vectors were missing and filled by the mean of their neighbours
 * @throws {DomainError} where too many vectors are missing
 */
export function halfPlanes(
  frame: FieldFrame,
  grid: FieldGrid,
  axis: number,
): { readonly halves: readonly HalfPlane[]; readonly filled: number } {
  const width = grid.x.length
  const height = grid.y.length
  const u = new Float64Array(width * height).fill(Number.NaN)
  const v = new Float64Array(width * height).fill(Number.NaN)
  for (let k = 0; k < grid.place.length; k++) {
    const place = at(grid.place, k)
    u[place] = frame.u[k] ?? Number.NaN
    v[place] = frame.v[k] ?? Number.NaN
  }
  const filled = fillGaps(u, v, width, height)
  const slack = 1e-6 * spacing(grid.y)
  const halves: HalfPlane[] = []
  for (const side of [1, -1]) {
    const rows = Array.from(grid.y, (y, j) => ({ r: side * (y - axis), j })).filter(({ r }) => r >= -slack)
    if (rows.length < FEWEST_LINES) continue
    rows.sort((a, b) => a.r - b.r)
    const half = {
      x: grid.x,
      r: Float64Array.from(rows, ({ r }) => Math.max(0, r)),
      u: new Float64Array(rows.length * width),
      v: new Float64Array(rows.length * width),
    }
    rows.forEach(({ j }, row) => {
      half.u.set(u.subarray(j * width, (j + 1) * width), row * width)
      for (let i = 0; i < width; i++) half.v[row * width + i] = side * at(v, j * width + i)
    })
    halves.push(half)
  }
  if (halves.length === 0)
    throw new DomainError('frame', `a frame must have at least ${FEWEST_LINES} rows on one side of the axis`)
  return { halves, filled }
}

/** Missing vectors become the mean of their neighbours, from the edges of a gap inwards. */
function fillGaps(u: Float64Array, v: Float64Array, width: number, height: number): number {
  let gaps: number[] = []
  for (let k = 0; k < u.length; k++) if (!Number.isFinite(u[k]) || !Number.isFinite(v[k])) gaps.push(k)
  const filled = gaps.length
  if (filled > LARGEST_MISSING * u.length)
    throw new DomainError(
      'frame',
      `a frame may miss at most ${100 * LARGEST_MISSING} % of its vectors, ${filled} of ${u.length} are missing`,
    )
  while (gaps.length > 0) {
    const open = new Set(gaps)
    const found = gaps.flatMap((k) => {
      const near = neighbours(k, width, height).filter((n) => !open.has(n))
      if (near.length === 0) return []
      const meanOf = (list: Float64Array): number => near.reduce((sum, n) => sum + at(list, n), 0) / near.length
      return [{ k, u: meanOf(u), v: meanOf(v) }]
    })
    for (const one of found) {
      u[one.k] = one.u
      v[one.k] = one.v
    }
    gaps = gaps.filter((k) => !Number.isFinite(at(u, k)) || !Number.isFinite(at(v, k)))
  }
  return filled
}

function neighbours(k: number, width: number, height: number): number[] {
  const [i, j] = [k % width, Math.floor(k / width)]
  const near: number[] = []
  if (i > 0) near.push(k - 1)
  if (i < width - 1) near.push(k + 1)
  if (j > 0) near.push(k - width)
  if (j < height - 1) near.push(k + width)
  return near
}

/**
 * Vorticity about the azimuth, dv/dx - du/dr [1/s]: positive in the ring of a jet along +x. Second order everywhere: central inside,
 * one-sided at the edges.
 */
export function vorticityOf({ x, r, u, v }: HalfPlane): Float64Array {
  const width = x.length
  const height = r.length
  const alongX = 1 / (2 * spacing(x))
  const alongR = 1 / (2 * spacing(r))
  const out = new Float64Array(width * height)
  for (let j = 0; j < height; j++) {
    const row = j * width
    const edgeR = edge(j, height)
    for (let i = 0; i < width; i++) {
      const k = row + i
      const edgeX = edge(i, width)
      const dv = edgeX === 0 ? read(v, k + 1) - read(v, k - 1) : oneSided(v, k, edgeX)
      const du = edgeR === 0 ? read(u, k + width) - read(u, k - width) : oneSided(u, k, edgeR * width)
      out[k] = dv * alongX - du * alongR
    }
  }
  return out
}

/** 1 at the first line, -1 at the last: the way inwards. */
function edge(index: number, count: number): number {
  return index === 0 ? 1 : index === count - 1 ? -1 : 0
}

/** Twice the spacing times the slope at an edge; `step` leads inwards. */
function oneSided(list: Float64Array, k: number, step: number): number {
  return Math.sign(step) * (-3 * read(list, k) + 4 * read(list, k + step) - read(list, k + 2 * step))
}

function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
