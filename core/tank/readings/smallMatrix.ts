/** Symmetric matrices of a few rows: what the errors of a fit need. */
import { at } from '../../base'

/** Pivots below this share of the diagonal count as none: the columns depend on one another. */
const LEAST_PIVOT = 1e-12

/**
 * Inverse of a symmetric, positive definite matrix, by Cholesky on the matrix scaled to a unit diagonal.
 *
 * @returns null where it is singular to rounding
 */
export function inverseOf(matrix: readonly (readonly number[])[]): number[][] | null {
  const size = matrix.length
  const scale = matrix.map((row, i) => Math.sqrt(at(row, i)))
  if (!scale.every((value) => value > 0 && Number.isFinite(value))) return null
  const scaled = (i: number, j: number): number => at(at(matrix, i), j) / (at(scale, i) * at(scale, j))
  const factor = Array.from({ length: size }, () => new Array<number>(size).fill(0))
  const entry = (i: number, j: number): number => at(at(factor, i), j)
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = scaled(i, j)
      for (let k = 0; k < j; k++) sum -= entry(i, k) * entry(j, k)
      if (i !== j) at(factor, i)[j] = sum / entry(j, j)
      else if (sum > LEAST_PIVOT) at(factor, i)[i] = Math.sqrt(sum)
      else return null
    }
  }
  const columns = scale.map((_, unit) => {
    const forward = new Array<number>(size).fill(0)
    for (let i = 0; i < size; i++) {
      let sum = i === unit ? 1 : 0
      for (let k = 0; k < i; k++) sum -= entry(i, k) * at(forward, k)
      forward[i] = sum / entry(i, i)
    }
    const solved = new Array<number>(size).fill(0)
    for (let i = size - 1; i >= 0; i--) {
      let sum = at(forward, i)
      for (let k = i + 1; k < size; k++) sum -= entry(k, i) * at(solved, k)
      solved[i] = sum / entry(i, i)
    }
    return solved
  })
  return columns.map((column, j) => column.map((value, i) => value / (at(scale, i) * at(scale, j))))
}

/** Matrix times vector. */
export function times(matrix: readonly (readonly number[])[], vector: readonly number[]): number[] {
  return matrix.map((row) => dot(row, vector))
}

export function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += at(a, i) * at(b, i)
  return sum
}

/** Covariances as correlations. */
export function correlationOf(covariance: readonly (readonly number[])[]): number[][] {
  return covariance.map((row, i) =>
    row.map((value, j) => (i === j ? 1 : value / Math.sqrt(at(row, i) * at(at(covariance, j), j)))),
  )
}
