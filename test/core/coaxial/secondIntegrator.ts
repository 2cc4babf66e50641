import { createRequire } from 'node:module'

/** What the test uses of odex: its own typing file does not pass this project's compiler flags, so it is loaded untyped. */
interface ExtrapolationSolver {
  absoluteTolerance: number
  relativeTolerance: number
  solve: (
    slope: (time: number, values: number[]) => number[],
    start: number,
    values: number[],
    end: number,
  ) => { y: number[] }
}

const odex: { Solver: new (size: number) => ExtrapolationSolver } = createRequire(import.meta.url)('odex')

/** Values at the end of a span by extrapolation of the midpoint rule (Hairer, Norsett & Wanner 1993, section II.9). */
export function extrapolated(
  slope: (time: number, values: Float64Array, out: Float64Array) => void,
  values: Float64Array,
  end: number,
  tolerance: number,
): number[] {
  const solver = new odex.Solver(values.length)
  solver.absoluteTolerance = tolerance
  solver.relativeTolerance = tolerance
  const out = new Float64Array(values.length)
  const right = (time: number, now: number[]): number[] => {
    slope(time, Float64Array.from(now), out)
    return [...out]
  }
  return solver.solve(right, 0, [...values], end).y
}
