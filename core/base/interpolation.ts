/**
 * Monotone cubic interpolation: no overshoot between the points.
 *
 * Source: F. N. Fritsch & J. Butland 1984, SIAM J. Sci. Stat. Comput. 5:300 (weighted harmonic mean slopes);
 * end slopes by the one-sided three-point rule, limited to keep the shape.
 */
import { at, bracket } from './arrays'

/** A cubic piece by piece, as values and slopes at rising knots. */
export interface CubicCurve {
  readonly x: Float64Array
  readonly y: Float64Array
  readonly slope: Float64Array
}

/**
 * Monotone cubic through points.
 *
 * @param x strictly rising, at least 2
 * @param y same length
 */
export function monotoneCubic(x: readonly number[], y: readonly number[]): CubicCurve {
  const n = x.length
  const slope = new Float64Array(n)
  const h = Array.from({ length: n - 1 }, (_, i) => at(x, i + 1) - at(x, i))
  const d = Array.from({ length: n - 1 }, (_, i) => (at(y, i + 1) - at(y, i)) / at(h, i))
  if (n === 2) {
    slope.fill(at(d, 0))
  } else {
    for (let i = 1; i < n - 1; i++) {
      const before = at(d, i - 1)
      const after = at(d, i)
      if (before * after <= 0) continue
      const w1 = 2 * at(h, i) + at(h, i - 1)
      const w2 = at(h, i) + 2 * at(h, i - 1)
      slope[i] = (w1 + w2) / (w1 / before + w2 / after)
    }
    slope[0] = endSlope(at(h, 0), at(h, 1), at(d, 0), at(d, 1))
    slope[n - 1] = endSlope(at(h, n - 2), at(h, n - 3), at(d, n - 2), at(d, n - 3))
  }
  return { x: Float64Array.from(x), y: Float64Array.from(y), slope }
}

function endSlope(h0: number, h1: number, d0: number, d1: number): number {
  const slope = ((2 * h0 + h1) * d0 - h0 * d1) / (h0 + h1)
  if (slope * d0 <= 0) return 0
  if (d0 * d1 <= 0 && Math.abs(slope) > 3 * Math.abs(d0)) return 3 * d0
  return slope
}

/** Value and slope of a cubic curve at x; beyond the ends the end pieces are continued. */
export function evaluateCubic(curve: CubicCurve, x: number): { readonly value: number; readonly slope: number } {
  const i = bracket(curve.x, x)
  const h = at(curve.x, i + 1) - at(curve.x, i)
  const t = (x - at(curve.x, i)) / h
  const y0 = at(curve.y, i)
  const y1 = at(curve.y, i + 1)
  const m0 = at(curve.slope, i) * h
  const m1 = at(curve.slope, i + 1) * h
  const c2 = 3 * (y1 - y0) - 2 * m0 - m1
  const c3 = 2 * (y0 - y1) + m0 + m1
  return { value: y0 + t * (m0 + t * (c2 + t * c3)), slope: (m0 + t * (2 * c2 + 3 * c3 * t)) / h }
}
