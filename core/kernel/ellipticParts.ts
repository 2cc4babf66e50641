/*
 * The three functions that sums over coaxial rings need. With K and E the complete elliptic integrals of parameter m, and
 * m1 = 1 - m:
 *
 *   e = (E - 1) / m1,   f = (F - 1) / m1 with F = (E (1 + m1) - 2 m1 K) / m^2,   C = ((1 + m1) K - 2 E) / m^2.
 *
 * F and C cancel in these forms, so that series are summed instead; a test compares them with the forms at 320 bits:
 *
 *   E = pi/2 2F1(-1/2, 1/2; 1; m),   F = 3 pi/16 2F1(1/2, 3/2; 3; m),   C = pi/16 2F1(3/2, 3/2; 3; m).
 *
 * The formulas that transform them are of Abramowitz & Stegun 1964, chapter 15; numbers recalled, not re-read.
 * Only + - * / and the square root are used, which every engine rounds alike: all compute the same bits.
 */

/** From this m1 on the series about m1 = 1 are taken, below those about m1 = 0: each then loses at most 2e-15. */
export const NEAR_ONE = 1 / 4

/** For x^2 up to 1/9: 9^-16 is 5e-16, and the coefficients of that term are below a twentieth of the first. */
const TERMS_NEAR_ONE = 16

/** Terms are summed down to m1^n = 2^-BITS: at m1 = 1/4 that is half as many. */
const BITS = 60
const TERMS_NEAR_ZERO = BITS / 2

/** Coefficients (a)_n (b)_n / ((c)_n n!) of x^n, times a factor. */
function hypergeometric(a: number, b: number, c: number, factor: number, terms: number): Float64Array {
  const coefficients = new Float64Array(terms)
  let value = factor
  for (let n = 0; n < terms; n++) {
    coefficients[n] = value
    value *= ((a + n) * (b + n)) / ((c + n) * (1 + n))
  }
  return coefficients
}

/**
 * The functions for 1/4 <= m1 <= 9/8. With q = sqrt(m1) and x = (1 - q) / (1 + q), by the quadratic transformation 15.3.17,
 *
 *   2F1(a, b; 2 b; m) = ((1 + q) / 2)^(-2 a) 2F1(a, a - b + 1/2; b + 1/2; x^2).
 *
 * @returns what writes e, f and C to the first three places of `out`.
 */
export function partsNearOne(): (m1: number, out: Float64Array) => void {
  const aE = hypergeometric(-0.5, -0.5, 1, Math.PI / 4, TERMS_NEAR_ONE)
  const aF = hypergeometric(0.5, -0.5, 2, (3 * Math.PI) / 8, TERMS_NEAR_ONE)
  const aC = hypergeometric(1.5, 0.5, 2, Math.PI / 2, TERMS_NEAR_ONE)
  return (m1, out) => {
    const q = Math.sqrt(m1)
    const sum = 1 + q
    const x = (1 - q) / sum
    const square = x * x
    let E = 0
    let F = 0
    let C = 0
    for (let n = TERMS_NEAR_ONE - 1; n >= 0; n--) {
      E = E * square + (aE[n] ?? NaN)
      F = F * square + (aF[n] ?? NaN)
      C = C * square + (aC[n] ?? NaN)
    }
    out[0] = (E * sum - 1) / m1
    out[1] = (F / sum - 1) / m1
    out[2] = C / (sum * sum * sum)
  }
}

/**
 * The functions for m1 < 1/4. With L = ln(16 / m1) / 2, by 15.3.10 and 15.3.11, each is the sum of a_n m1^n (L - s_n), where
 * s_n tends to 2 ln 2, which is L at m1 = 1.
 *
 * @returns what writes e, f and C to the first three places of `out`; m1 < 2^-octaves, octaves >= 2, says how many terms
 * are needed.
 */
export function partsNearZero(): (m1: number, L: number, octaves: number, out: Float64Array) => void {
  const aE = hypergeometric(0.5, 1.5, 2, 0.5, TERMS_NEAR_ZERO)
  const aF = hypergeometric(1.5, 2.5, 2, -1.5, TERMS_NEAR_ZERO)
  const aC = hypergeometric(1.5, 1.5, 1, 1, TERMS_NEAR_ZERO)
  const sE = new Float64Array(TERMS_NEAR_ZERO)
  const sF = new Float64Array(TERMS_NEAR_ZERO)
  const sC = new Float64Array(TERMS_NEAR_ZERO)
  sE[0] = 1 / 2
  sF[0] = 11 / 6
  sC[0] = 2
  // Halves of sums of four digamma functions, each from the one before.
  for (let n = 1; n < TERMS_NEAR_ZERO; n++) {
    sE[n] = (sE[n - 1] ?? NaN) + 1 / ((2 * n - 1) * (2 * n)) + 1 / ((2 * n + 1) * (2 * n + 2))
    sF[n] = (sF[n - 1] ?? NaN) - 0.5 / ((2 * n + 1) * n) - 0.5 / ((2 * n + 3) * (n + 1))
    sC[n] = (sC[n - 1] ?? NaN) - 1 / ((2 * n + 1) * n)
  }
  return (m1, L, octaves, out) => {
    let e = 0
    let f = 0
    let c = 0
    for (let n = Math.ceil(BITS / octaves) - 1; n >= 0; n--) {
      e = e * m1 + (aE[n] ?? NaN) * (L - (sE[n] ?? NaN))
      f = f * m1 + (aF[n] ?? NaN) * (L - (sF[n] ?? NaN))
      c = c * m1 + (aC[n] ?? NaN) * (L - (sC[n] ?? NaN))
    }
    out[0] = e
    out[1] = f
    out[2] = c
  }
}

/** Natural logarithm of y, 1 <= y <= 2, to a unit of its last digit: 2 artanh((y - 1) / (y + 1)). */
export function logarithm(y: number): number {
  const z = (y - 1) / (y + 1)
  const square = z * z
  let sum = 0
  // z is at most 1/3: the first term left out is 3^-37 / 37.
  for (let k = 35; k >= 3; k -= 2) sum = (sum + 1 / k) * square
  return 2 * (z + z * sum)
}
