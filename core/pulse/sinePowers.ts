/**
 * Running integrals of powers of the sine, accurate also where they are tiny.
 *
 * Source: Abramowitz & Stegun 1964, 4.3.127 (reduction formula); the series is the binomial series of 1/sqrt(1 - s^2)
 * integrated term by term.
 */

/** Below this sin^2 the closed form loses digits to cancellation; the series there has at most 30 terms. */
const SERIES_BELOW = 0.3

/**
 * Integral of sin^power from 0 to x.
 *
 * @param power 2, 4 or 6
 * @param x angle [rad], 0 <= x <= pi
 * @returns the integral, to about 1e-14 relative.
 */
export function sinePowerIntegral(power: 2 | 4 | 6, x: number): number {
  const sine = Math.sin(x)
  const square = sine * sine
  if (square < SERIES_BELOW && x < Math.PI / 2) return series(power, sine, square)
  const sin2 = Math.sin(2 * x)
  if (power === 2) return (2 * x - sin2) / 4
  const sin4 = Math.sin(4 * x)
  if (power === 4) return (12 * x - 8 * sin2 + sin4) / 32
  return (60 * x - 45 * sin2 + 9 * sin4 - Math.sin(6 * x)) / 192
}

/** With s = sin x: int s^n / sqrt(1 - s^2) ds = s^(n+1) sum_k [(2k-1)!!/(2k)!!] s^(2k) / (n + 1 + 2k), every term positive. */
function series(power: number, sine: number, square: number): number {
  let term = 1
  let sum = 0
  for (let k = 0; k < 60; k++) {
    const part = term / (power + 1 + 2 * k)
    sum += part
    if (part < 1e-17 * sum) break
    term *= (square * (2 * k + 1)) / (2 * k + 2)
  }
  return sine ** (power + 1) * sum
}

/** Integral of sin from 0 to x: 1 - cos x without cancellation. */
export function sineIntegral(x: number): number {
  const half = Math.sin(x / 2)
  return 2 * half * half
}

/** Integral of sin^3 from 0 to x: h^2 (3 - h)/3 with h = 1 - cos x. */
export function sineCubeIntegral(x: number): number {
  const h = sineIntegral(x)
  return (h * h * (3 - h)) / 3
}
