import { logarithm, NEAR_ONE, partsNearOne, partsNearZero } from './ellipticParts'

/*
 * The piecewise polynomials the coaxial sums look up instead of computing elliptic integrals: e, f and C of
 * ellipticParts.ts. All three are smooth in ln m1, so that with eight intervals an octave and degree 7 they are off by
 * 6e-14, 1.7e-13 and 1.1e-13 at most, at the lower ends of octaves.
 *
 * They are computed when a kernel starts, in a few milliseconds, since stored they would be a fifteenth of the page's
 * weight; by + - * / and square roots of numbers written here, so that every engine gets the same bits.
 */

/** The tables of the coaxial kernel: coefficients in t = m1 / 2^octave less the middle of the interval, |t| <= 1/16. */
export interface KernelTables {
  /** 16 doubles an interval: e_7 f_7 .. e_0 f_0. */
  readonly velocity: Float64Array<ArrayBuffer>
  /** 8 doubles an interval: c_7 .. c_0. */
  readonly stream: Float64Array<ArrayBuffer>
}

/** The tables start at m1 = 2^-OCTAVES, have eight intervals an octave and one more above m1 = 1 (assembly/layout.ts). */
const OCTAVES = 44
const INTERVALS_AN_OCTAVE = 8
const INTERVALS = OCTAVES * INTERVALS_AN_OCTAVE + 1
/** Coefficients of a polynomial, and points it goes through. */
const POINTS = 8
const HALF = POINTS / 2

/** Smallest m1 the tables cover; below it e, f and C follow their logarithm. */
export const SMALLEST_M1 = 2 ** -OCTAVES

/** The top 15 bits of SMALLEST_M1, sign, exponent and three of the mantissa: the number of the first interval. */
export const FIRST_INTERVAL = (1023 - OCTAVES) * INTERVALS_AN_OCTAVE

/** Largest m1 looked up: the last interval ends at 1.125, and rounding takes m1 past 1 by a few units at most. */
export const LARGEST_M1 = 1.0625

let computed: KernelTables | undefined

/** The tables, computed on first use: once a thread. */
export function kernelTables(): KernelTables {
  computed ??= computeTables()
  return computed
}

function computeTables(): KernelTables {
  const velocity = new Float64Array(INTERVALS * 2 * POINTS)
  const stream = new Float64Array(INTERVALS * POINTS)
  const nearOne = partsNearOne()
  const nearZero = partsNearZero()
  const weights = interpolation()
  const parts = new Float64Array(3)
  const e = new Float64Array(POINTS)
  const f = new Float64Array(POINTS)
  const c = new Float64Array(POINTS)
  for (let eighth = 0; eighth < INTERVALS_AN_OCTAVE; eighth++) {
    const middle = 1 + (eighth + 0.5) / INTERVALS_AN_OCTAVE
    const places = Float64Array.from({ length: POINTS }, (_, i) => middle + cosine(2 * i + 1) / 16)
    const logarithms = places.map(logarithm)
    let scale = 1
    for (let octaves = 0; octaves <= OCTAVES; octaves++, scale /= 2) {
      const index = (OCTAVES - octaves) * INTERVALS_AN_OCTAVE + eighth
      if (index >= INTERVALS) continue
      for (let i = 0; i < POINTS; i++) {
        const m1 = scale * (places[i] ?? NaN)
        if (scale >= NEAR_ONE) nearOne(m1, parts)
        else nearZero(m1, 0.5 * ((4 + octaves) * Math.LN2 - (logarithms[i] ?? NaN)), octaves - 1, parts)
        e[i] = parts[0] ?? NaN
        f[i] = parts[1] ?? NaN
        c[i] = parts[2] ?? NaN
      }
      interpolate(weights, e, velocity, 2 * POINTS * index, 2)
      interpolate(weights, f, velocity, 2 * POINTS * index + 1, 2)
      interpolate(weights, c, stream, POINTS * index, 1)
    }
  }
  return { velocity, stream }
}

/** Writes the coefficients of the polynomial through `values`, c_7 first, to every `step`th place of `out`; spoils `values`. */
function interpolate(
  weights: Float64Array,
  values: Float64Array,
  out: Float64Array,
  start: number,
  step: number,
): void {
  // Less one of them, the values are small, and so is the rounding in what follows.
  const one = values[HALF] ?? NaN
  for (let i = 0; i < HALF; i++) {
    const before = (values[i] ?? NaN) - one
    const after = (values[POINTS - 1 - i] ?? NaN) - one
    values[i] = before + after
    values[POINTS - 1 - i] = before - after
  }
  for (let k = 0; k < POINTS; k++) {
    let sum = k === 0 ? one : 0
    const from = k % 2 === 0 ? 0 : POINTS - 1
    const by = k % 2 === 0 ? 1 : -1
    for (let i = 0; i < HALF; i++) sum += (weights[k * HALF + i] ?? NaN) * (values[from + by * i] ?? NaN)
    out[start + (POINTS - 1 - k) * step] = sum
  }
}

/** cos(k pi / 16), k = 0..8. */
const COSINES = [
  1, 0.98078528040323044913, 0.92387953251128675613, 0.83146961230254523708, 0.7071067811865475244,
  0.55557023301960222474, 0.38268343236508977173, 0.19509032201612826785, 0,
]

/** cos(k pi / 16) for whole k of 0 or more. */
function cosine(k: number): number {
  const turn = k % 32
  const half = turn > 16 ? 32 - turn : turn
  return half > 8 ? -(COSINES[16 - half] ?? NaN) : (COSINES[half] ?? NaN)
}

/**
 * What gives c_k from the values at t_i = cos((2 i + 1) pi / 16) / 16: the polynomial is the sum of the Chebyshev polynomials
 * T_n(16 t), each times 1/8 (n = 0) or 1/4 and the sum of value i times cos(n (2 i + 1) pi / 16).
 *
 * @returns four weights of each c_k, for the values i = 0..3 plus (even k) or less (odd k) those at the opposite points.
 */
function interpolation(): Float64Array {
  const weights = new Float64Array(POINTS * HALF)
  let polynomial: readonly number[] = [1]
  let before: readonly number[] = []
  for (let n = 0; n < POINTS; n++) {
    let share = n === 0 ? 1 / POINTS : 2 / POINTS
    for (let k = 0; k <= n; k++, share *= 16) {
      const factor = share * (polynomial[k] ?? NaN)
      for (let i = 0; i < HALF; i++) {
        weights[k * HALF + i] = (weights[k * HALF + i] ?? NaN) + factor * cosine(n * (2 * i + 1))
      }
    }
    const next = chebyshevAfter(polynomial, before)
    before = polynomial
    polynomial = next
  }
  return weights
}

/** Coefficients of T_n+1 = 2 x T_n - T_n-1 (T_1 = x T_0). */
function chebyshevAfter(polynomial: readonly number[], before: readonly number[]): readonly number[] {
  const twice = polynomial.length === 1 ? 1 : 2
  return [0, ...polynomial].map((_, k) => twice * (polynomial[k - 1] ?? 0) - (before[k] ?? 0))
}
