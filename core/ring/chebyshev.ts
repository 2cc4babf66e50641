/** Chebyshev series on [-1, 1]: evaluation by Clenshaw's recurrence (Clenshaw 1955, MTAC 9:118). */

/** Sum of c_k T_k(s). */
export function chebyshevSum(coefficients: Float64Array, s: number): number {
  const twice = 2 * s
  let b1 = 0
  let b2 = 0
  for (let k = coefficients.length - 1; k > 0; k--) {
    const b0 = (coefficients[k] ?? NaN) + twice * b1 - b2
    b2 = b1
    b1 = b0
  }
  return (coefficients[0] ?? NaN) + s * b1 - b2
}

/** Derivative in s of the sum of c_k T_k(s). */
export function chebyshevSlope(coefficients: Float64Array, s: number): number {
  // T_k' = k U_(k-1), summed by the same recurrence for U.
  const twice = 2 * s
  let b1 = 0
  let b2 = 0
  for (let k = coefficients.length - 1; k > 0; k--) {
    const b0 = k * (coefficients[k] ?? NaN) + twice * b1 - b2
    b2 = b1
    b1 = b0
  }
  return b1
}
