/**
 * A small dense matrix factored once and solved for many right-hand sides: Gaussian elimination with partial pivoting.
 *
 * Source: Golub & Van Loan, Matrix Computations, section 3.4 (recalled, not re-read; tested on known solutions).
 */
import { at } from '../../base'

export class FactoredMatrix {
  private readonly size: number
  private readonly factors: Float64Array
  private readonly order: Int32Array

  /**
   * @param rows n n values, row after row; not changed
   * @throws {RangeError} where the matrix is singular to working accuracy: an internal mistake, never a user's
   */
  constructor(rows: Float64Array) {
    const n = Math.round(Math.sqrt(rows.length))
    this.size = n
    this.factors = rows.slice()
    this.order = Int32Array.from({ length: n }, (_, i) => i)
    const { factors, order } = this
    for (let column = 0; column < n; column++) {
      let pivot = column
      for (let row = column + 1; row < n; row++)
        if (Math.abs(at(factors, row * n + column)) > Math.abs(at(factors, pivot * n + column))) pivot = row
      const head = at(factors, pivot * n + column)
      if (!(Math.abs(head) > 0)) throw new RangeError(`the matrix is singular at column ${column}`)
      if (pivot !== column) this.swap(pivot, column)
      for (let row = column + 1; row < n; row++) {
        const factor = at(factors, row * n + column) / head
        factors[row * n + column] = factor
        for (let k = column + 1; k < n; k++)
          factors[row * n + k] = at(factors, row * n + k) - factor * at(factors, column * n + k)
      }
    }
    this.order = order
  }

  /** Writes the solution x of A x = b to `out`, which may not be `b`. */
  solve(b: Float64Array, out: Float64Array): void {
    const { size: n, factors, order } = this
    for (let row = 0; row < n; row++) {
      let sum = b[order[row] ?? 0] ?? NaN
      for (let k = 0; k < row; k++) sum -= (factors[row * n + k] ?? NaN) * (out[k] ?? NaN)
      out[row] = sum
    }
    for (let row = n - 1; row >= 0; row--) {
      let sum = out[row] ?? NaN
      for (let k = row + 1; k < n; k++) sum -= (factors[row * n + k] ?? NaN) * (out[k] ?? NaN)
      out[row] = sum / (factors[row * n + row] ?? NaN)
    }
  }

  private swap(i: number, j: number): void {
    const { size: n, factors, order } = this
    for (let k = 0; k < n; k++) {
      const held = at(factors, i * n + k)
      factors[i * n + k] = at(factors, j * n + k)
      factors[j * n + k] = held
    }
    const held = at(order, i)
    order[i] = at(order, j)
    order[j] = held
  }
}
