/**
 * Quadrature: Gauss-Legendre nodes of any order, and an adaptive Gauss-Kronrod rule.
 *
 * Sources: Abramowitz & Stegun 1964, 25.4.29 (Gauss-Legendre by Newton on P_n);
 * 7-15 point pair: QUADPACK, Piessens et al. 1983 (recalled, not re-read; tested on exact integrals).
 */
import { at } from './arrays'

export interface GaussRule {
  /** Nodes in (-1, 1), rising. */
  readonly nodes: Float64Array
  /** Weights, sum 2. */
  readonly weights: Float64Array
}

/** Gauss-Legendre rule with n >= 1 points on [-1, 1]; exact for polynomials of degree 2n - 1. */
export function gaussLegendre(n: number): GaussRule {
  const nodes = new Float64Array(n)
  const weights = new Float64Array(n)
  for (let i = 0; i < (n + 1) >> 1; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5))
    for (let iteration = 0; iteration < 60; iteration++) {
      const { value, slope } = legendre(n, x)
      const step = value / slope
      x -= step
      if (Math.abs(step) < 1e-15) break
    }
    // The slope at the final node: that of the step before costs the weight several units of its last digit.
    const { slope } = legendre(n, x)
    const weight = 2 / ((1 - x * x) * slope * slope)
    nodes[i] = -x
    nodes[n - 1 - i] = x
    weights[i] = weight
    weights[n - 1 - i] = weight
  }
  return { nodes, weights }
}

/** P_n and its derivative at -1 < x < 1, by the three-term recurrence. */
function legendre(n: number, x: number): { readonly value: number; readonly slope: number } {
  let value = 1
  let before = 0
  for (let k = 1; k <= n; k++) {
    const next = ((2 * k - 1) * x * value - (k - 1) * before) / k
    before = value
    value = next
  }
  return { value, slope: (n * (x * value - before)) / (x * x - 1) }
}

const KRONROD_NODES = [
  0.991455371120812639206854697526329, 0.949107912342758524526189684047851, 0.864864423359769072789712788640926,
  0.741531185599394439863864773280788, 0.58608723546769113029414469370139, 0.405845151377397166906606412076961,
  0.207784955007898467600689403773245, 0,
] as const
const KRONROD_WEIGHTS = [
  0.02293532201052922496373200805897, 0.063092092629978553290700663189204, 0.104790010322250183839876322541518,
  0.140653259715525918745189590510238, 0.16900472663926790282829526598265, 0.190350578064785409913256402421014,
  0.204432940075298892414161999234649, 0.209482141084727828012999174891714,
] as const
const GAUSS_WEIGHTS = [
  0.129484966168869693270611432679082, 0.27970539148927666790146777142378, 0.381830050505118944950369775488975,
  0.417959183673469387755102040816327,
] as const

/** Depth at which an interval is no longer halved: 2^-40 of the whole. */
const DEEPEST = 40

/** Below this share of an interval's own sum an error estimate is rounding, and halving would never end (QUADPACK's 50 eps). */
const ROUNDING = 50 * Number.EPSILON

/**
 * Integral of f from a to b to a relative tolerance, by recursive halving of a 7-15 point Gauss-Kronrod pair.
 *
 * @param f smooth on [a, b] save for isolated corners; put corners at interval ends for speed
 * @param tolerance relative to the integral of |f|, default 1e-12
 */
export function integrate(f: (x: number) => number, a: number, b: number, tolerance = 1e-12): number {
  if (a === b) return 0
  const whole = kronrod(f, a, b)
  return refine(f, a, b, whole, tolerance * Math.max(whole.absolute, Number.MIN_VALUE), 0)
}

interface Estimate {
  readonly value: number
  readonly error: number
  readonly absolute: number
}

function kronrod(f: (x: number) => number, a: number, b: number): Estimate {
  const middle = (a + b) / 2
  const half = (b - a) / 2
  let fine = 0
  let coarse = 0
  let absolute = 0
  for (let i = 0; i < 8; i++) {
    const dx = half * at(KRONROD_NODES, i)
    const centre = i === 7
    const up = f(middle + dx)
    const down = centre ? 0 : f(middle - dx)
    fine += at(KRONROD_WEIGHTS, i) * (up + down)
    absolute += at(KRONROD_WEIGHTS, i) * (Math.abs(up) + Math.abs(down))
    if (i % 2 === 1) coarse += at(GAUSS_WEIGHTS, (i - 1) / 2) * (up + down)
  }
  return { value: fine * half, error: Math.abs((fine - coarse) * half), absolute: Math.abs(absolute * half) }
}

function refine(
  f: (x: number) => number,
  a: number,
  b: number,
  estimate: Estimate,
  allowed: number,
  depth: number,
): number {
  if (estimate.error <= allowed || depth >= DEEPEST) return estimate.value
  const middle = (a + b) / 2
  const left = kronrod(f, a, middle)
  const right = kronrod(f, middle, b)
  return (
    refine(f, a, middle, left, Math.max(allowed / 2, ROUNDING * estimate.absolute), depth + 1) +
    refine(f, middle, b, right, Math.max(allowed / 2, ROUNDING * estimate.absolute), depth + 1)
  )
}
