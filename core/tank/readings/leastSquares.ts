/**
 * Least squares by Levenberg and Marquardt. The adapter of the library; what is fitted is decided by its callers.
 *
 * The library gets parameters shifted to 0 and scaled to 1, and residuals already over their uncertainty, so that its damping means the
 * same for every parameter and its own weights are not used. It takes a step that made things worse as its next start and does not say when it
 * has converged; so it is run in short rounds from the best point so far, and convergence is judged here, by how much the next
 * full step could still gain.
 */
import { levenbergMarquardt } from 'ml-levenberg-marquardt'
import { at } from '../../base'
import { dot, inverseOf, times } from './smallMatrix'

/** Steps of the library in one round, and rounds. */
const ROUND = 3
const MOST_ROUNDS = 60
/** Converged where a full step could gain less than this share of the sum of squares, or this much of it. */
const GAIN_SHARE = 1e-10
const GAIN = 1e-12
/** Half width of the difference that gives a slope, in scaled parameters: error 1e-10 of the curvature's own scale. */
const DIFFERENCE = 1e-5
const FIRST_DAMPING = 1e-3

export interface LeastSquaresProblem {
  /** Where the search starts. */
  readonly start: readonly number[]
  /** What a parameter changes by to matter, > 0. */
  readonly scale: readonly number[]
  /** (model - measured) / standard uncertainty of every reading. */
  readonly residuals: (parameters: readonly number[]) => Float64Array
}

export interface LeastSquaresResult {
  readonly parameters: readonly number[]
  /** For unit uncertainty of the residuals; null: some parameters cannot be told apart. */
  readonly covariance: readonly (readonly number[])[] | null
  readonly residuals: Float64Array
  readonly sumOfSquares: number
  readonly iterations: number
  readonly status: 'done' | 'failed'
  readonly message: string
}

/** Least squares from a start. Needs at least two residuals. */
export function leastSquares({ start, scale, residuals }: LeastSquaresProblem): LeastSquaresResult {
  const real = (scaled: readonly number[]): number[] => scaled.map((q, k) => at(start, k) + q * at(scale, k))
  const evaluate = (scaled: readonly number[]): Float64Array => residuals(real(scaled))
  let best = start.map(() => 0)
  let values = evaluate(best)
  let sum = dot(values, values)
  const counts = Float64Array.from(values, (_, i) => i)
  const zeros = new Float64Array(values.length)
  let iterations = 0
  let state = slopesAt(evaluate, best)
  if (!Number.isFinite(sum)) return ended('failed', 'The model has no finite value where the fit starts.')
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const gain = possibleGain(state, values)
    if (gain !== null && gain <= GAIN + GAIN_SHARE * sum) return ended('done', 'Done.')
    const before = sum
    const found = roundFrom(evaluate, best, counts, zeros)
    if (found === null)
      return ended(
        'failed',
        'The readings determine no step of the fit: they cannot tell apart what is fitted to them.',
      )
    iterations += found.iterations
    if (found.parameterError < sum) {
      best = [...found.parameterValues]
      values = evaluate(best)
      sum = dot(values, values)
      state = slopesAt(evaluate, best)
    }
    if (!(sum < before)) {
      // No step helps any more: what is left is rounding, or a direction in which nothing changes.
      return gain === null || gain <= 1e-6 * Math.max(sum, 1)
        ? ended('done', 'Done.')
        : ended('failed', 'The fit came to a stop before it had converged.')
    }
  }
  return ended('failed', `The fit had not converged after ${iterations} steps.`)

  function ended(status: 'done' | 'failed', message: string): LeastSquaresResult {
    const inverse = inverseOf(normalMatrix(state))
    const covariance = inverse?.map((row, i) => row.map((value, j) => value * at(scale, i) * at(scale, j))) ?? null
    return { parameters: real(best), covariance, residuals: values, sumOfSquares: sum, iterations, status, message }
  }
}

/** One round of the library; null where the matrix of its step is singular, which it throws as an error. */
function roundFrom(
  evaluate: (scaled: readonly number[]) => Float64Array,
  from: readonly number[],
  counts: Float64Array,
  zeros: Float64Array,
): ReturnType<typeof levenbergMarquardt> | null {
  try {
    return levenbergMarquardt({ x: counts, y: zeros }, (scaled) => readOff(evaluate(scaled)), {
      initialValues: [...from],
      maxIterations: ROUND,
      damping: FIRST_DAMPING,
      errorTolerance: 0,
      jacobianFunction: (scaled) => {
        const slopes = slopesAt(evaluate, scaled)
        return (i) => slopes.map((column) => at(column, i))
      },
    })
  } catch (error) {
    if (error instanceof Error && error.message.includes('singular')) return null
    throw error
  }
}

function readOff(values: Float64Array): (index: number) => number {
  return (index) => values[index] ?? Number.NaN
}

/** Slopes of the residuals, one list a parameter. */
function slopesAt(evaluate: (scaled: readonly number[]) => Float64Array, scaled: readonly number[]): Float64Array[] {
  return scaled.map((_, k) => {
    const moved = (by: number): Float64Array => evaluate(scaled.map((value, j) => (j === k ? value + by : value)))
    const after = moved(DIFFERENCE)
    const before = moved(-DIFFERENCE)
    return after.map((value, i) => (value - at(before, i)) / (2 * DIFFERENCE))
  })
}

function normalMatrix(slopes: readonly Float64Array[]): number[][] {
  return slopes.map((a) => slopes.map((b) => dot(a, b)))
}

/** What a full step would take off the sum of squares if the model were straight; null where the step is not determined. */
function possibleGain(slopes: readonly Float64Array[], residuals: Float64Array): number | null {
  const gradient = slopes.map((column) => dot(column, residuals))
  const inverse = inverseOf(normalMatrix(slopes))
  return inverse === null ? null : dot(gradient, times(inverse, gradient))
}
