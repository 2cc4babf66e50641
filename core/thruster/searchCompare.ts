/**
 * What a trial is worth, and which of two is better.
 *
 * Source of the order: K. Deb 2000, Comput. Methods Appl. Mech. Eng. 186:311 (feasible before infeasible, the less violated
 * before the more violated, then the value); recalled, not re-read.
 */

/** Worth of one trial. */
export interface Score {
  /** To be made least. */
  readonly value: number
  /** Sum of the violations, each over its limit; 0 where every limit holds. */
  readonly violation: number
}

/** A place in the unit cube with what it is worth. */
export interface Trial extends Score {
  readonly point: Float64Array
}

export const WORST: Score = { value: Number.POSITIVE_INFINITY, violation: Number.POSITIVE_INFINITY }

/** True where a is better than b; what is not a number is worse than anything. */
export function isBetter(a: Score, b: Score): boolean {
  if (Number.isNaN(a.violation) || Number.isNaN(a.value)) return false
  if (Number.isNaN(b.violation) || Number.isNaN(b.value)) return true
  return a.violation === b.violation ? a.value < b.value : a.violation < b.violation
}

/** How far a value lies beyond a limit that it must not pass, over the limit; 0 inside. */
export function excess(value: number, limit: number): number {
  return value > limit ? (value - limit) / Math.max(Math.abs(limit), 1e-12) : 0
}
