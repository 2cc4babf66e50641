/**
 * Several answers instead of one: the best, then the best that stands apart from all before it, and so on.
 */
import { at } from '../base'
import { searchLeast, type SearchOptions, type SearchOutcome, type SearchProblem } from './search'
import { choiceAt, choices, type Variable } from './searchSpace'

export interface DistinctOptions extends SearchOptions {
  /** Most answers. */
  readonly count: number
  /** Share of its range by which at least one variable must differ; another whole number always does. */
  readonly apart: number
  /** How far two answers stand apart by their values, where the places of the variables do not say it. */
  readonly distance?: (a: Float64Array, b: Float64Array) => number
  /** Evaluations for each answer after the first. */
  readonly laterBudget?: number
}

export interface DistinctOutcome {
  readonly status: 'done' | 'cancelled'
  /** Best first; the first alone, with a violation, where nothing inside the limits was found. */
  readonly found: readonly SearchOutcome[]
  readonly evaluations: number
}

const LATER_BUDGET = 8_000

/**
 * Distinct answers, best first.
 *
 * @throws {DomainError} on `seed`
 */
export async function searchDistinct(problem: SearchProblem, options: DistinctOptions): Promise<DistinctOutcome> {
  const { count, laterBudget = LATER_BUDGET, onProgress } = options
  const share = (k: number) => (inner: number) => onProgress?.((k + inner) / count)
  const first = await searchLeast(problem, { ...options, onProgress: share(0) })
  const found = [first]
  let evaluations = first.evaluations
  let status = first.status
  for (let k = 1; k < count && status === 'done' && first.best.violation === 0; k++) {
    const next = await searchLeast(standingApart(problem, found, options), {
      ...options,
      seed: options.seed + k,
      restarts: 0,
      budget: laterBudget,
      onProgress: share(k),
    })
    evaluations += next.evaluations
    status = next.status
    if (next.best.violation > 0) break
    found.push(next)
  }
  // A later search, hemmed in by the ones before, may come out better than the one just before it.
  const ordered = [...found].sort((a, b) => a.best.value - b.best.value)
  return { status, found: first.best.violation === 0 ? ordered : found, evaluations }
}

/** The same problem with room around what was found already: the missing distance counts as a violation. */
function standingApart(
  problem: SearchProblem,
  found: readonly SearchOutcome[],
  { apart, distance: between }: Pick<DistinctOptions, 'apart' | 'distance'>,
): SearchProblem {
  const { variables } = problem
  const away = (before: SearchOutcome, values: Float64Array, point: Float64Array): number =>
    between === undefined ? distance(variables, before.best.point, point) : between(before.values, values)
  return {
    variables,
    score: (values, point) => {
      const { value, violation } = problem.score(values, point)
      let missing = 0
      for (const before of found) missing += Math.max(0, 1 - away(before, values, point) / apart)
      return { value, violation: violation + missing }
    },
  }
}

/** Largest difference in any variable, in shares of its range; another whole number stands fully apart. */
export function distance(variables: readonly Variable[], a: ArrayLike<number>, b: ArrayLike<number>): number {
  let most = 0
  for (let i = 0; i < variables.length; i++) {
    const variable = at(variables, i)
    const count = choices(variable)
    if (count === 1) continue
    if (count === 0) {
      most = Math.max(most, Math.abs(at(a, i) - at(b, i)))
      continue
    }
    const steps = Math.abs(choiceAt(variable, at(a, i)) - choiceAt(variable, at(b, i)))
    if (variable.kind === 'whole') most = Math.max(most, Math.min(1, steps))
    else most = Math.max(most, steps / (count - 1))
  }
  return most
}
