/**
 * Bessel functions as the round tube needs them: I0, I1 and K1 without their exponential growth, J0 and J1, zeros of J1.
 *
 * Source: Abramowitz & Stegun 1964, 9.6.10 and 9.7.1 (I), 9.6.24 (K), 9.1.27 and 9.1.46 (J), 9.5.12 (zeros).
 */

/** I0 and I1 times exp(-x). */
export interface ScaledI {
  readonly zero: number
  readonly one: number
}

/** Above this the asymptotic series has terms below 1e-17; below it the power series has at most about 50. */
const ASYMPTOTIC_FROM = 20

/** exp(-x) I0(x) and exp(-x) I1(x) for x >= 0, to a few units of the last place. */
export function scaledI(x: number): ScaledI {
  return x < ASYMPTOTIC_FROM ? powerSeries(x) : asymptoticSeries(x)
}

function powerSeries(x: number): ScaledI {
  const q = (x * x) / 4
  let term = 1
  let zero = 1
  let one = 1
  for (let k = 1; k < 80; k++) {
    term *= q / (k * k)
    zero += term
    one += term / (k + 1)
    if (term < 1e-18 * zero) break
  }
  const scale = Math.exp(-x)
  return { zero: zero * scale, one: (x / 2) * one * scale }
}

function asymptoticSeries(x: number): ScaledI {
  let termZero = 1
  let termOne = 1
  let zero = 1
  let one = 1
  for (let k = 1; k < 40; k++) {
    const odd = (2 * k - 1) ** 2
    termZero *= odd / (8 * k * x)
    termOne *= (odd - 4) / (8 * k * x)
    zero += termZero
    one += termOne
    if (termZero < 1e-18) break
  }
  const scale = 1 / Math.sqrt(2 * Math.PI * x)
  return { zero: zero * scale, one: one * scale }
}

/**
 * Spacing h of the trapezoidal rule for K1. Its error falls as exp(-pi^2 / h) at small x and as exp(-2 pi^2 / (h^2 x)) at large x,
 * here below 1e-17.
 */
const LARGEST_SPACING = 0.2
const SPACING_AT_ONE = 0.7

/** exp(x) K1(x) for x > 0, the integral of exp(-x (cosh t - 1)) cosh t over t from 0. */
export function scaledK1(x: number): number {
  const spacing = Math.min(LARGEST_SPACING, SPACING_AT_ONE / Math.sqrt(x))
  let sum = 0.5
  for (let k = 1; ; k++) {
    const cosh = Math.cosh(k * spacing)
    const exponent = x * (cosh - 1)
    const term = cosh * Math.exp(-exponent)
    sum += term
    if (exponent > 1 && term < 1e-18 * sum) return sum * spacing
  }
}

/** J0 and J1 at x >= 0 by downward recurrence, absolute error about 1e-16. */
export function besselJ(x: number): { readonly zero: number; readonly one: number } {
  if (x < 1e-8) return { zero: 1 - (x * x) / 4, one: x / 2 }
  const start = 2 * Math.ceil((x + 20 + 4 * Math.cbrt(x)) / 2)
  let above = 0
  let here = 1e-200
  let even = 0
  for (let k = start; k > 0; k--) {
    const below = ((2 * k) / x) * here - above
    above = here
    here = below
    if (k % 2 === 1 && k > 1) even += here
  }
  // J0 + 2 (J2 + J4 + ...) = 1
  const norm = here + 2 * even
  return { zero: here / norm, one: above / norm }
}

/** The first zeros of J1, by Newton's rule from McMahon's expansion. */
export function zerosOfJ1(count: number): number[] {
  return Array.from({ length: count }, (_, i) => {
    const beta = (i + 1.25) * Math.PI
    let x = beta - 3 / (8 * beta)
    for (let iteration = 0; iteration < 8; iteration++) {
      const { zero, one } = besselJ(x)
      x -= one / (zero - one / x)
    }
    return x
  })
}
