/** One measured figure, and the goal it stands beside. */
export interface Figure {
  readonly name: string
  readonly value: number
  readonly unit: string
  /** Samples behind the value. */
  readonly n: number
  /** What to reach: `at most` or `at least` a number; null where it is only told. */
  readonly goal: { readonly atMost: number } | { readonly atLeast: number } | null
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const middle = sorted.length >> 1
  const high = sorted[middle] ?? Number.NaN
  return sorted.length % 2 === 1 ? high : ((sorted[middle - 1] ?? Number.NaN) + high) / 2
}
