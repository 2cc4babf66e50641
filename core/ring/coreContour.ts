/**
 * Meridional boundary of a core that is symmetric about the plane x = 0, as two trigonometric series
 *
 *     x(t) = sum X_k sin kt,   r(t) = sum R_k cos kt,   0 <= t < 2 pi,
 *
 * t = 0 at the outer equator, t = pi at the inner one, running towards +x first. The outward normal times ds is (-r', x') dt.
 */
import { at } from '../base'

export interface CoreContour {
  /** X_0..X_M; X_0 and X_M are 0. */
  readonly axial: Float64Array
  /** R_0..R_M. */
  readonly radial: Float64Array
}

/** A point of the contour with its derivatives in t; filled by `pointOnContour`. */
export interface ContourPoint {
  x: number
  r: number
  xSlope: number
  rSlope: number
}

export function emptyPoint(): ContourPoint {
  return { x: 0, r: 0, xSlope: 0, rSlope: 0 }
}

/** Series through M + 1 nodes at t = pi i / M. */
export function contourThrough(x: ArrayLike<number>, r: ArrayLike<number>): CoreContour {
  return { axial: sineSeries(x), radial: cosineSeries(r) }
}

/** Coefficients of sum c_k cos kt, k = 0..M, through values at t = pi i / M. */
export function cosineSeries(values: ArrayLike<number>): Float64Array {
  const M = values.length - 1
  const out = new Float64Array(M + 1)
  for (let k = 0; k <= M; k++) {
    let sum = 0
    for (let i = 0; i <= M; i++) {
      const half = i === 0 || i === M ? 0.5 : 1
      sum += half * at(values, i) * Math.cos((Math.PI * ((k * i) % (2 * M))) / M)
    }
    out[k] = (sum * (k === 0 || k === M ? 1 : 2)) / M
  }
  return out
}

function sineSeries(values: ArrayLike<number>): Float64Array {
  const M = values.length - 1
  const out = new Float64Array(M + 1)
  for (let k = 1; k < M; k++) {
    let sum = 0
    for (let i = 1; i < M; i++) sum += at(values, i) * Math.sin((Math.PI * ((k * i) % (2 * M))) / M)
    out[k] = (2 * sum) / M
  }
  return out
}

/** Fill cosines[k], sines[k] with cos kt, sin kt for k = 0..length - 1. */
export function harmonics(t: number, cosines: Float64Array, sines: Float64Array): void {
  const c1 = Math.cos(t)
  const s1 = Math.sin(t)
  let c = 1
  let s = 0
  for (let k = 0; k < cosines.length; k++) {
    cosines[k] = c
    sines[k] = s
    const next = c * c1 - s * s1
    s = s * c1 + c * s1
    c = next
  }
}

/** Fill `out` with the point of given harmonics. */
export function pointOnContour(
  out: ContourPoint,
  contour: CoreContour,
  cosines: Float64Array,
  sines: Float64Array,
): void {
  const { axial, radial } = contour
  let x = 0
  let r = 0
  let xSlope = 0
  let rSlope = 0
  for (let k = 0; k < radial.length; k++) {
    const c = cosines[k] ?? NaN
    const s = sines[k] ?? NaN
    x += (axial[k] ?? NaN) * s
    xSlope += k * (axial[k] ?? NaN) * c
    r += (radial[k] ?? NaN) * c
    rSlope -= k * (radial[k] ?? NaN) * s
  }
  out.x = x
  out.r = r
  out.xSlope = xSlope
  out.rSlope = rSlope
}

/** Value of sum c_k cos kt. */
export function cosineSum(coefficients: Float64Array, cosines: Float64Array): number {
  let sum = 0
  for (let k = 0; k < coefficients.length; k++) sum += (coefficients[k] ?? NaN) * (cosines[k] ?? NaN)
  return sum
}

/** Integrals over the inside, per radian of azimuth; spectrally accurate sums over 4 M points. */
export interface ContourMoments {
  /** int dx dr */
  readonly area: number
  /** int r dx dr */
  readonly first: number
  /** int r^3 dx dr */
  readonly third: number
  /** int r^5 dx dr */
  readonly fifth: number
}

export function contourMoments(contour: CoreContour): ContourMoments {
  const M = contour.radial.length - 1
  const N = 8 * M
  const cosines = new Float64Array(M + 1)
  const sines = new Float64Array(M + 1)
  const point = emptyPoint()
  let area = 0
  let first = 0
  let third = 0
  let fifth = 0
  for (let i = 0; i < N; i++) {
    harmonics((2 * Math.PI * i) / N, cosines, sines)
    pointOnContour(point, contour, cosines, sines)
    const { r, xSlope } = point
    area += r * xSlope
    first += (r * r * xSlope) / 2
    third += (r ** 4 * xSlope) / 4
    fifth += (r ** 6 * xSlope) / 6
  }
  const h = (2 * Math.PI) / N
  return { area: area * h, first: first * h, third: third * h, fifth: fifth * h }
}
