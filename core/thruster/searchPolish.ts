/**
 * Local polish of a trial: a simplex that only compares, so that limits need no penalty, and one step to each side in every
 * variable with single values.
 *
 * Source: J. A. Nelder & R. Mead 1965, Comput. J. 7:308; the simplex is started again about its best corner, which frees one
 * that lies flat along a limit.
 */
import { at } from '../base'
import { isBetter, type Trial } from './searchCompare'
import { choices, choiceAt, type Variable } from './searchSpace'

/** Sizes of the simplex at its starts, in the unit cube; the list is gone through again as long as it pays. */
const SIZES = [0.02, 0.002, 2e-4, 2e-5]
/** Stop where the simplex is smaller than this share of its first size. */
const SMALLEST = 1e-4
const ROUNDS = 4
/** A round that gains less than this, relative, is the last. */
const GAIN = 1e-9

export interface Polish {
  readonly best: Trial
  readonly evaluations: number
}

/**
 * Best trial near one.
 *
 * @param score worth of a point of the unit cube; it must not keep the array
 * @param goOn awaited every few hundred evaluations with their number so far; false ends the polish with what it has
 */
export async function polish(
  variables: readonly Variable[],
  score: (point: Float64Array) => Trial,
  start: Trial,
  goOn: (evaluations: number) => Promise<boolean>,
): Promise<Polish> {
  let evaluations = 0
  let ended = false
  const counted = (point: Float64Array) => {
    evaluations++
    return score(point)
  }
  const going = async (): Promise<boolean> => {
    ended ||= !(await goOn(evaluations))
    return !ended
  }
  let best = await slide(variables, counted, start, going)
  // One step in a choice, then everything continuous again; as long as a step is better.
  for (let moved = true; moved;) {
    moved = false
    for (const neighbour of neighbours(variables, best.point)) {
      if (ended) return { best, evaluations }
      const trial = await slide(variables, counted, counted(neighbour), going)
      if (isBetter(trial, best)) {
        best = trial
        moved = true
        break
      }
    }
  }
  return { best, evaluations }
}

/** One choice up or down in each variable with single values. */
function neighbours(variables: readonly Variable[], point: Float64Array): Float64Array[] {
  const list: Float64Array[] = []
  variables.forEach((variable, i) => {
    const count = choices(variable)
    if (count < 2) return
    const now = choiceAt(variable, at(point, i))
    for (const next of [now - 1, now + 1]) {
      if (next < 0 || next >= count) continue
      const moved = point.slice()
      moved[i] = (next + 0.5) / count
      list.push(moved)
    }
  })
  return list
}

/** The continuous variables only, at fixed choices. */
async function slide(
  variables: readonly Variable[],
  score: (point: Float64Array) => Trial,
  start: Trial,
  goOn: () => Promise<boolean>,
): Promise<Trial> {
  const free = variables.flatMap((variable, i) => (choices(variable) === 0 ? [i] : []))
  if (free.length === 0) return start
  let best = start
  for (let round = 0; round < ROUNDS; round++) {
    const before = best
    for (const size of SIZES) {
      best = simplex(free, score, best, size)
      if (!(await goOn())) return best
    }
    const gain = before.violation > best.violation ? 1 : before.value - best.value
    if (!(gain > GAIN * Math.abs(before.value))) break
  }
  return best
}

function simplex(free: readonly number[], score: (point: Float64Array) => Trial, start: Trial, size: number): Trial {
  const n = free.length
  const corners: Trial[] = [start]
  for (const i of free) {
    const point = start.point.slice()
    const here = at(point, i)
    point[i] = here + size <= 1 ? here + size : here - size
    corners.push(score(point))
  }
  const centre = new Float64Array(start.point.length)
  const along = (factor: number, from: Trial): Trial => {
    const point = start.point.slice()
    for (const i of free) {
      const middle = at(centre, i)
      point[i] = Math.min(1, Math.max(0, middle + factor * (at(from.point, i) - middle)))
    }
    return score(point)
  }
  for (let step = 0; step < 120 * n; step++) {
    corners.sort((a, b) => (isBetter(a, b) ? -1 : isBetter(b, a) ? 1 : 0))
    const best = at(corners, 0)
    const worst = at(corners, n)
    if (width(corners, free) < SMALLEST * size) break
    centre.fill(0)
    for (let k = 0; k < n; k++) for (const i of free) centre[i] = at(centre, i) + at(at(corners, k).point, i) / n
    const mirrored = along(-1, worst)
    if (isBetter(mirrored, best)) {
      const further = along(-2, worst)
      corners[n] = isBetter(further, mirrored) ? further : mirrored
    } else if (isBetter(mirrored, at(corners, n - 1))) {
      corners[n] = mirrored
    } else {
      const outside = isBetter(mirrored, worst)
      const nearer = along(outside ? -0.5 : 0.5, worst)
      if (isBetter(nearer, outside ? mirrored : worst)) corners[n] = nearer
      else {
        for (let k = 1; k <= n; k++) {
          const point = at(corners, k).point.slice()
          for (const i of free) point[i] = (at(point, i) + at(best.point, i)) / 2
          corners[k] = score(point)
        }
      }
    }
  }
  return corners.reduce((a, b) => (isBetter(b, a) ? b : a))
}

function width(corners: readonly Trial[], free: readonly number[]): number {
  let most = 0
  const first = at(corners, 0).point
  for (const corner of corners)
    for (const i of free) most = Math.max(most, Math.abs(at(corner.point, i) - at(first, i)))
  return most
}
