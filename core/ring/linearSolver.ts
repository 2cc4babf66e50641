/**
 * Dense linear systems by Gaussian elimination with partial pivoting.
 *
 * Source: Golub & Van Loan, Matrix Computations, section 3.4 (recalled, not re-read; tested on known solutions).
 */
import { read } from './read'

/**
 * Solve A x = b for a small dense matrix.
 *
 * @param matrix rows one after another, n * n values; overwritten
 * @param rightSide n values; overwritten
 * @returns x, or null where the matrix is singular to working accuracy
 */
export function solveLinear(matrix: Float64Array, rightSide: Float64Array): Float64Array | null {
  const n = rightSide.length
  for (let column = 0; column < n; column++) {
    let pivot = column
    for (let row = column + 1; row < n; row++)
      if (Math.abs(read(matrix, row * n + column)) > Math.abs(read(matrix, pivot * n + column))) pivot = row
    const head = read(matrix, pivot * n + column)
    if (head === 0 || !Number.isFinite(head)) return null
    if (pivot !== column) swapRows(matrix, rightSide, pivot, column)
    for (let row = column + 1; row < n; row++) {
      const factor = read(matrix, row * n + column) / head
      if (factor === 0) continue
      for (let k = column; k < n; k++)
        matrix[row * n + k] = (matrix[row * n + k] ?? NaN) - factor * (matrix[column * n + k] ?? NaN)
      rightSide[row] = read(rightSide, row) - factor * read(rightSide, column)
    }
  }
  const x = new Float64Array(n)
  for (let row = n - 1; row >= 0; row--) {
    let sum = read(rightSide, row)
    for (let k = row + 1; k < n; k++) sum -= read(matrix, row * n + k) * read(x, k)
    x[row] = sum / read(matrix, row * n + row)
  }
  return x
}

function swapRows(matrix: Float64Array, rightSide: Float64Array, i: number, j: number): void {
  const n = rightSide.length
  for (let k = 0; k < n; k++) {
    const held = read(matrix, i * n + k)
    matrix[i * n + k] = read(matrix, j * n + k)
    matrix[j * n + k] = held
  }
  const held = read(rightSide, i)
  rightSide[i] = read(rightSide, j)
  rightSide[j] = held
}
