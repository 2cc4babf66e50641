/**
 * Search for the least value of a function of mixed variables under limits: evolution with restarts, then a local polish.
 *
 * Deterministic for a seed. Nothing here knows of thrusters.
 */
import { randomSource, type CancelSignal } from '../base'
import { WORST, isBetter, type Score, type Trial } from './searchCompare'
import { Evolution } from './searchEvolve'
import { polish } from './searchPolish'
import { tidyPoint, writeValues, type Variable } from './searchSpace'

export interface SearchProblem {
  readonly variables: readonly Variable[]
  /** Worth of the values of the variables, in their order, and of their point in the unit cube; must not keep the arrays. */
  readonly score: (values: Float64Array, point: Float64Array) => Score
}

export interface SearchOptions {
  readonly seed: number
  /** Populations from different first members, after the first. */
  readonly restarts?: number
  /** Evaluations after which no new generation is begun. */
  readonly budget?: number
  /** Points of the unit cube to begin with. */
  readonly starts?: readonly Float64Array[]
  readonly signal?: CancelSignal
  /** Share of the budget that is spent, 0..1. */
  readonly onProgress?: (share: number) => void
  /** Awaited between generations: lets messages in. */
  readonly pause?: () => Promise<void>
}

export interface SearchOutcome {
  readonly status: 'done' | 'cancelled'
  /** Best trial found; `violation` above 0 where none inside the limits was found. */
  readonly best: Trial
  /** Values of the variables there. */
  readonly values: Float64Array
  readonly evaluations: number
  readonly generations: number
}

const RESTARTS = 1
const BUDGET = 40_000
/** Evaluations between two pauses: a few milliseconds of work. */
const BETWEEN_PAUSES = 500

/**
 * Search the whole range of the variables.
 *
 * @throws {DomainError} on `seed`
 */
export async function searchLeast(problem: SearchProblem, options: SearchOptions): Promise<SearchOutcome> {
  const { variables } = problem
  const { restarts = RESTARTS, budget = BUDGET, starts = [], signal, onProgress, pause } = options
  const random = randomSource(options.seed)
  const values = new Float64Array(variables.length)
  const score = (point: Float64Array): Trial => {
    writeValues(variables, point, values)
    const { value, violation } = problem.score(values, point)
    return { point, value, violation }
  }
  let best: Trial = { ...WORST, point: new Float64Array(variables.length).fill(0.5) }
  let evaluations = 0
  let generations = 0
  let paused = 0
  let cancelled = false
  /** Lets messages in now and then; false once cancelled. */
  const goOn = async (spent: number): Promise<boolean> => {
    if (cancelled || spent - paused < BETWEEN_PAUSES) return !cancelled
    paused = spent
    onProgress?.(Math.min(1, spent / budget))
    await pause?.()
    cancelled = signal?.aborted === true
    return !cancelled
  }
  for (let run = 0; run <= restarts && !cancelled; run++) {
    const most = (budget * (run + 1)) / (restarts + 1)
    const population = new Evolution(variables.length, score, random, starts)
    const before = evaluations
    while (!population.settled && before + population.evaluations < most) {
      population.advance()
      generations++
      if (!(await goOn(before + population.evaluations))) break
    }
    evaluations = before + population.evaluations
    if (isBetter(population.best, best)) best = population.best
    if (cancelled) break
    const near = await polish(variables, score, population.best, (spent) => goOn(evaluations + spent))
    evaluations += near.evaluations
    if (isBetter(near.best, best)) best = near.best
  }
  const tidy = { ...best, point: tidyPoint(variables, best.point) }
  writeValues(variables, tidy.point, values)
  return { status: cancelled ? 'cancelled' : 'done', best: tidy, values: values.slice(), evaluations, generations }
}
