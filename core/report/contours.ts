/**
 * Lines of equal value and regions above a value on a grid of places, by marching squares with straight interpolation.
 */
import { at } from '../base'
import type { Pixel } from './boxes'

/** Values at every place of two rising axes; value j x.length + i is at x[i], y[j]. Not a number: no value there. */
export interface ContourGrid {
  readonly x: readonly number[]
  readonly y: readonly number[]
  readonly values: ArrayLike<number>
}

export type ContourLine = readonly Pixel[]

/** Sides of a cell from which a line comes and to which it goes, the higher values on its left: bottom 0, right 1, top 2, left 3. */
const COURSES: readonly (readonly (readonly [number, number])[])[] = [
  [],
  [[0, 3]],
  [[1, 0]],
  [[1, 3]],
  [[2, 1]],
  [],
  [[2, 0]],
  [[2, 3]],
  [[3, 2]],
  [[0, 2]],
  [],
  [[1, 2]],
  [[3, 1]],
  [[0, 1]],
  [[3, 0]],
  [],
]
/** The two cells whose high corners lie across: joined where the middle is high, apart where it is low. */
const JOINED: Readonly<Record<number, readonly (readonly [number, number])[]>> = {
  5: [
    [0, 1],
    [2, 3],
  ],
  10: [
    [3, 0],
    [1, 2],
  ],
}
const APART: Readonly<Record<number, readonly (readonly [number, number])[]>> = {
  5: [
    [0, 3],
    [2, 1],
  ],
  10: [
    [1, 0],
    [3, 2],
  ],
}

/** Lines along which the values are `level`, the higher values on their left where y runs upward; closed lines end where they begin. */
export function contourLines(grid: ContourGrid, level: number): readonly ContourLine[] {
  const { x, y, values } = grid
  const width = x.length
  const value = (i: number, j: number): number => values[j * width + i] ?? NaN
  /** Sides are numbered by the node they start from: along x even, along y odd. */
  const next = new Map<number, number>()
  const entered = new Set<number>()
  for (let j = 0; j + 1 < y.length; j++) {
    for (let i = 0; i + 1 < width; i++) {
      const [a, b, c, d] = [value(i, j), value(i + 1, j), value(i + 1, j + 1), value(i, j + 1)]
      const middle = (a + b + c + d) / 4
      if (Number.isNaN(middle)) continue
      const bits = (a >= level ? 1 : 0) | (b >= level ? 2 : 0) | (c >= level ? 4 : 0) | (d >= level ? 8 : 0)
      const sides = [
        2 * (j * width + i),
        2 * (j * width + i + 1) + 1,
        2 * ((j + 1) * width + i),
        2 * (j * width + i) + 1,
      ]
      const crossed = (middle >= level ? JOINED : APART)[bits] ?? at(COURSES, bits)
      for (const [from, to] of crossed) {
        next.set(at(sides, from), at(sides, to))
        entered.add(at(sides, to))
      }
    }
  }
  const pointOn = (side: number): Pixel => {
    const node = Math.floor(side / 2)
    const [i, j] = [node % width, Math.floor(node / width)]
    const [i2, j2] = side % 2 === 0 ? [i + 1, j] : [i, j + 1]
    const [from, to] = [value(i, j), value(i2, j2)]
    const share = (level - from) / (to - from)
    const between = (axis: readonly number[], low: number, high: number): number =>
      at(axis, low) + (at(axis, high) - at(axis, low)) * share
    return { x: between(x, i, i2), y: between(y, j, j2) }
  }
  const lines: Pixel[][] = []
  const follow = (start: number): void => {
    const line = [pointOn(start)]
    let side = start
    for (let to = next.get(side); to !== undefined; to = next.get(side)) {
      next.delete(side)
      line.push(pointOn(to))
      side = to
    }
    lines.push(line)
  }
  for (const start of [...next.keys()]) if (!entered.has(start)) follow(start)
  for (const start of [...next.keys()]) if (next.has(start)) follow(start)
  return lines
}

/** Closed outlines of where the values are `level` or more, the rim of the grid included; to be filled by the even-odd rule. */
export function regionAbove({ x, y, values }: ContourGrid, level: number): readonly ContourLine[] {
  // A frame of low values on the rim itself closes what would run out of the grid.
  const rimmed = (axis: readonly number[]): number[] => [at(axis, 0), ...axis, at(axis, axis.length - 1)]
  const width = x.length + 2
  const framed = new Float64Array(width * (y.length + 2)).fill(level - 1)
  for (let j = 0; j < y.length; j++)
    for (let i = 0; i < x.length; i++) {
      const value = values[j * x.length + i] ?? NaN
      framed[(j + 1) * width + i + 1] = Number.isNaN(value) ? level - 1 : value
    }
  return contourLines({ x: rimmed(x), y: rimmed(y), values: framed }, level)
}

/** Value between the places of a grid, straight along each axis; not a number outside or beside a place without a value. */
export function valueBetween({ x, y, values }: ContourGrid, place: Pixel): number {
  const [i, s] = pieceOf(x, place.x)
  const [j, t] = pieceOf(y, place.y)
  const value = (k: number, l: number): number => values[l * x.length + k] ?? NaN
  const low = value(i, j) * (1 - s) + value(i + 1, j) * s
  const high = value(i, j + 1) * (1 - s) + value(i + 1, j + 1) * s
  return low * (1 - t) + high * t
}

/** The piece of an axis a place lies in and its share of it; the last piece for its end, not a number outside. */
function pieceOf(axis: readonly number[], place: number): readonly [number, number] {
  let index = 0
  while (index + 2 < axis.length && place >= at(axis, index + 1)) index += 1
  const [from, to] = [at(axis, index), at(axis, index + 1)]
  const share = (place - from) / (to - from)
  return [index, share >= -1e-9 && share <= 1 + 1e-9 ? share : NaN]
}
