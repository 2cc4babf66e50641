/**
 * Pareto front of a value against a size, both to be small: the least value under each of a row of caps on the size.
 *
 * Caps rise in equal proportion from the smallest size inside the limits to the size of the least value: beyond that more
 * size buys nothing. Each cap begins with the answer of the cap before, which it contains, so the front cannot turn back.
 */
import { at, last } from '../base'
import { searchLeast, type SearchOptions, type SearchOutcome, type SearchProblem } from './search'
import { excess } from './searchCompare'

export interface FrontPoint {
  readonly size: number
  readonly value: number
  /** Values of the variables. */
  readonly values: Float64Array
}

export interface FrontOptions extends Omit<SearchOptions, 'starts' | 'restarts' | 'budget'> {
  /** Most points. */
  readonly count: number
  /** Answer of the search for the least value, inside the limits. */
  readonly least: SearchOutcome
}

export interface FrontOutcome {
  readonly status: 'done' | 'cancelled'
  /** By rising size and falling value; none is dominated. */
  readonly points: readonly FrontPoint[]
  readonly evaluations: number
}

const SMALLEST_BUDGET = 6_000
const CAP_BUDGET = 1_200
/** Sizes closer than this, relative, are one. */
const SAME_SIZE = 1e-6
/** Points this close in size or value, relative, differ by rounding only: which of them rounding favours must not be told. */
const ALIKE = 1e-9

/**
 * The front.
 *
 * @param sizeOf size of the values of the variables, > 0
 */
export async function paretoFront(
  problem: SearchProblem,
  sizeOf: (values: Float64Array) => number,
  options: FrontOptions,
): Promise<FrontOutcome> {
  const { count, least, onProgress } = options
  const shared = { ...options, restarts: 0, starts: [least.best.point] }
  const part = (k: number) => (inner: number) => onProgress?.((k + inner) / (count + 1))
  const bySize: SearchProblem = {
    variables: problem.variables,
    score: (values, point) => ({ value: sizeOf(values), violation: problem.score(values, point).violation }),
  }
  const smallest = await searchLeast(bySize, { ...shared, budget: SMALLEST_BUDGET, onProgress: part(0) })
  let evaluations = smallest.evaluations
  let status = smallest.status
  const largestSize = sizeOf(least.values)
  const smallestSize = Math.min(largestSize, sizeOf(smallest.values))
  const caps = capsBetween(smallestSize, largestSize, count)
  const answers: SearchOutcome[] = []
  let before = smallest.best.point
  for (let k = 0; k < caps.length - 1 && status === 'done'; k++) {
    const cap = at(caps, k)
    const capped: SearchProblem = {
      variables: problem.variables,
      score: (values, point) => {
        const { value, violation } = problem.score(values, point)
        return { value, violation: violation + excess(sizeOf(values), cap) }
      },
    }
    const answer = await searchLeast(capped, {
      ...shared,
      seed: options.seed + 1 + k,
      starts: [before, smallest.best.point],
      budget: CAP_BUDGET,
      onProgress: part(k + 1),
    })
    evaluations += answer.evaluations
    status = answer.status
    if (answer.best.violation > 0) continue
    answers.push(answer)
    before = answer.best.point
  }
  const points = [...answers, least].map(({ best, values }) => ({ size: sizeOf(values), value: best.value, values }))
  return { status, points: nonDominated(points), evaluations }
}

function capsBetween(low: number, high: number, count: number): number[] {
  if (!(high > low * (1 + SAME_SIZE))) return [high]
  // A hair above the smallest: at the size itself only one design fits.
  const from = low * (1 + SAME_SIZE)
  return Array.from({ length: count }, (_, k) => from * (high / from) ** (k / (count - 1)))
}

/** Points that no other beats in size without losing in value, by rising size; those alike to 1e-9 once. */
export function nonDominated<T extends { readonly size: number; readonly value: number }>(points: readonly T[]): T[] {
  const kept: T[] = []
  for (const point of [...points].sort((a, b) => a.size - b.size || a.value - b.value)) {
    if (kept.length === 0) kept.push(point)
    else if (point.value < last(kept).value - ALIKE * Math.abs(last(kept).value)) {
      // Of one size to rounding, the better one stands for both.
      if (point.size <= last(kept).size * (1 + ALIKE)) kept.pop()
      kept.push(point)
    }
  }
  return kept
}
