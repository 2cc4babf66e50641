/**
 * The three functions of the coaxial kernel at 320 bits of fixed point, straight from their definitions: there the
 * cancellation in them does no harm. K and E by the arithmetic-geometric mean (Abramowitz & Stegun 1964, 17.6).
 */

const BITS = 320n
const ONE = 1n << BITS

function multiply(a: bigint, b: bigint): bigint {
  return (a * b) >> BITS
}

function divide(a: bigint, b: bigint): bigint {
  return (a << BITS) / b
}

/** Newton's method from above. */
function squareRoot(value: bigint): bigint {
  const target = value << BITS
  let root = 1n << BigInt(Math.ceil(target.toString(2).length / 2))
  for (;;) {
    const next = (root + target / root) >> 1n
    if (next >= root) return root
    root = next
  }
}

/** arctan(1/n). */
function arctanInverse(n: bigint): bigint {
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

/** A double of 1 to 2 as it is: it is a multiple of 2^-60. */
function fixed(value: number): bigint {
  return BigInt(value * 2 ** 60) << (BITS - 60n)
}

/** Nearest double, to within its own rounding. */
function toNumber(value: bigint): number {
  const negative = value < 0n
  const size = negative ? -value : value
  const shift = BigInt(Math.max(0, size.toString(2).length - 64))
  const number = Number(size >> shift) * 2 ** Number(shift - BITS)
  return negative ? -number : number
}

/** e = (E - 1) / m1, f = (F - 1) / m1 and C at m1 = y 2^-octaves, 1 <= y < 2, but not at m1 = 1, where all are 0 / 0. */
export function preciseParts(y: number, octaves: number): readonly [e: number, f: number, c: number] {
  const m1 = fixed(y) >> BigInt(octaves)
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
