/**
 * The piecewise polynomials the coaxial kernel looks up instead of computing elliptic integrals.
 *
 * With K and E the complete elliptic integrals of parameter m and m1 = 1 - m:
 *   e = (E - 1) / m1,   f = (F - 1) / m1 with F = (E (1 + m1) - 2 m1 K) / m^2,   C = ((1 + m1) K - 2 E) / m^2.
 * All three are smooth in ln m1, so that eight intervals an octave and degree 7 reach 1e-14. The values are computed in
 * fixed point of 320 bits, where the cancellation in the three definitions does no harm.
 */

const BITS = 320n
const ONE = 1n << BITS

/** Octaves below m1 = 1 that the table covers; one interval above 1 follows for an m1 rounded past it. */
export const OCTAVES = 44
export const INTERVALS_AN_OCTAVE = 8
const DEGREE = 7
const POINTS = DEGREE + 1

/** @param {bigint} a @param {bigint} b */
const multiply = (a, b) => (a * b) >> BITS
/** @param {bigint} a @param {bigint} b */
const divide = (a, b) => (a << BITS) / b

/** Square root of a fixed-point number. @param {bigint} value */
function squareRoot(value) {
  const target = value << BITS
  let root = 1n << BigInt(Math.ceil(target.toString(2).length / 2))
  for (;;) {
    const next = (root + target / root) >> 1n
    if (next >= root) return root
    root = next
  }
}

/** arctan(1/n). @param {bigint} n */
function arctanInverse(n) {
  let term = ONE / n
  let sum = term
  for (let k = 1n; term !== 0n; k++) {
    term = -term / (n * n)
    sum += term / (2n * k + 1n)
  }
  return sum
}

/** Machin 1706. */
const PI = 4n * (4n * arctanInverse(5n) - arctanInverse(239n))

/** Fixed point of a double. @param {number} value */
function fixed(value) {
  // 2^60 keeps every bit of the values used here: all are multiples of 2^-60 below 2.
  return BigInt(Math.round(value * 2 ** 60)) << (BITS - 60n)
}

/** Nearest double, to within its own rounding. @param {bigint} value */
function toNumber(value) {
  const negative = value < 0n
  const size = negative ? -value : value
  const shift = BigInt(Math.max(0, size.toString(2).length - 64))
  const number = Number(size >> shift) * 2 ** Number(shift - BITS)
  return negative ? -number : number
}

/** e, f, C at a fixed-point m1. @param {bigint} m1 @returns {readonly [number, number, number]} */
function functions(m1) {
  const m = ONE - m1
  let a = ONE
  let b = squareRoot(m1)
  let sum = m / 2n
  for (let n = 0n; ; n++) {
    const c = (a - b) / 2n
    if (c === 0n) break
    const mean = (a + b) / 2n
    b = squareRoot(multiply(a, b))
    a = mean
    sum += multiply(c, c) << n
  }
  const K = divide(PI, 2n * a)
  const E = multiply(K, ONE - sum)
  const m2 = multiply(m, m)
  const F = divide(multiply(E, ONE + m1) - 2n * multiply(m1, K), m2)
  const C = divide(multiply(K, ONE + m1) - 2n * E, m2)
  return [toNumber(divide(E - ONE, m1)), toNumber(divide(F - ONE, m1)), toNumber(C)]
}

/** Powers of x of the Chebyshev polynomials T_0..T_7. */
const CHEBYSHEV = (() => {
  const rows = [[1], [0, 1]]
  for (let n = 2; n < POINTS; n++) {
    const row = Array.from({ length: n + 1 }, () => 0)
    rows[n - 1]?.forEach((value, k) => (row[k + 1] = (row[k + 1] ?? 0) + 2 * value))
    rows[n - 2]?.forEach((value, k) => (row[k] = (row[k] ?? 0) - value))
    rows.push(row)
  }
  return rows
})()

/**
 * Coefficients c_0..c_7 in t = v - centre, |t| <= 1/16, of the polynomial through values at the Chebyshev points.
 *
 * @param {readonly number[]} values at cos((i + 1/2) pi / 8) / 16
 */
function coefficients(values) {
  const power = Array.from({ length: POINTS }, () => 0)
  for (let n = 0; n < POINTS; n++) {
    let c = 0
    values.forEach((value, i) => (c += value * Math.cos((n * (i + 0.5) * Math.PI) / POINTS)))
    c *= (n === 0 ? 1 : 2) / POINTS
    CHEBYSHEV[n]?.forEach((factor, k) => (power[k] = (power[k] ?? 0) + c * factor))
  }
  return power.map((value, k) => value * 16 ** k)
}

/**
 * The table: OCTAVES * 8 + 1 intervals of m1 from 2^-OCTAVES.
 *
 * @returns {{ velocity: Float64Array, stream: Float64Array }} velocity: 16 numbers an interval, e_7 f_7 .. e_0 f_0;
 * stream: 8 numbers an interval, c_7 .. c_0.
 */
export function kernelTable() {
  const intervals = OCTAVES * INTERVALS_AN_OCTAVE + 1
  const velocity = new Float64Array(intervals * 2 * POINTS)
  const stream = new Float64Array(intervals * POINTS)
  const nodes = Array.from(
    { length: POINTS },
    (_, i) => Math.round((Math.cos(((i + 0.5) * Math.PI) / POINTS) / 16) * 2 ** 56) / 2 ** 56,
  )
  for (let index = 0; index < intervals; index++) {
    const octave = Math.floor(index / INTERVALS_AN_OCTAVE) - OCTAVES
    const centre = 1 + ((index % INTERVALS_AN_OCTAVE) + 0.5) / INTERVALS_AN_OCTAVE
    const values = nodes.map((t) => functions((fixed(centre) + fixed(t)) >> BigInt(-octave)))
    const e = coefficients(values.map((value) => value[0]))
    const f = coefficients(values.map((value) => value[1]))
    const c = coefficients(values.map((value) => value[2]))
    for (let k = 0; k < POINTS; k++) {
      velocity[(index * POINTS + k) * 2] = e[DEGREE - k] ?? NaN
      velocity[(index * POINTS + k) * 2 + 1] = f[DEGREE - k] ?? NaN
      stream[index * POINTS + k] = c[DEGREE - k] ?? NaN
    }
  }
  return { velocity, stream }
}
