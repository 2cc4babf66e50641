/**
 * The fluid a steady ring carries along: what lies inside the dividing streamline of the flow seen from the ring.
 *
 * With chi = psi - U r^2 / 2, the carried body is bounded by chi = 0 where the fluid on the axis moves faster than the ring (a
 * spheroid-like body with two stagnation points on the axis); otherwise by the level of the saddle between axis and ring, and the body is
 * a torus. The surface is taken by x as a function of u in 0..1, r^2 = y_out - (y_out - y_in) u^2, y_in = 0 for the spheroid: u = 0 is
 * the outer equator, u = 1 the axis or the saddle, and x / u is smooth.
 */
import { bracketedRoot, gaussLegendre } from '../base'
import { read } from './read'

/** Stream function per radian and velocity of an axisymmetric flow, fluid at rest far away. */
export interface FlowValue {
  psi: number
  ux: number
  ur: number
}

export type AxisymmetricFlow = (x: number, r: number, out: FlowValue) => void

export interface CarriedBody {
  readonly kind: 'spheroid' | 'torus'
  /** Outer radius in the plane of the ring. */
  readonly equator: number
  /** Radius of the hole, 0 for a spheroid. */
  readonly hole: number
  /** chi on the surface. */
  readonly level: number
  readonly flow: AxisymmetricFlow
  readonly speed: number
}

/**
 * Find the carried body.
 *
 * @param flow symmetric about x = 0
 * @param speed U of the ring
 * @param inner a radius in the plane x = 0 inside of which the fluid is outside the core on the axis side
 * @param outer the same on the outer side
 * @returns null where no dividing streamline is found
 */
export function carriedBody(flow: AxisymmetricFlow, speed: number, inner: number, outer: number): CarriedBody | null {
  const value: FlowValue = { psi: 0, ux: 0, ur: 0 }
  flow(0, 0, value)
  let hole = 0
  let level = 0
  if (value.ux <= speed) {
    const saddle = bracketedRoot(
      (r) => {
        flow(0, r, value)
        return value.ux - speed
      },
      0,
      inner,
    )
    if (saddle === null) return null
    hole = saddle
    flow(0, hole, value)
    level = value.psi - (speed * hole * hole) / 2
  }
  const chi = (r: number): number => {
    flow(0, r, value)
    return value.psi - (speed * r * r) / 2 - level
  }
  let far = outer
  for (let n = 0; n < 60 && chi(far) > 0; n++) far = 1 + (far - 1) * 2
  const equator = bracketedRoot(chi, outer, far)
  if (equator === null) return null
  return { kind: hole > 0 || level !== 0 ? 'torus' : 'spheroid', equator, hole, level, flow, speed }
}

/** Radius at u. */
export function bodyRadius(body: CarriedBody, u: number): number {
  // (1 - u)(1 + u) keeps the digits next to the hole or the axis.
  const inner = body.hole * body.hole
  return Math.sqrt(inner + (body.equator * body.equator - inner) * (1 - u) * (1 + u))
}

/**
 * x / u of the surface at u, 0 < u < 1.
 *
 * @param guess x / u at a near-by u, or 0
 */
export function bodyShape(body: CarriedBody, u: number, guess: number): number {
  const { flow, speed, level } = body
  const r = bodyRadius(body, u)
  const value: FlowValue = { psi: 0, ux: 0, ur: 0 }
  let low = 0
  let high = Infinity
  let shape = guess > 0 ? guess : 1
  for (let n = 0; n < 100; n++) {
    const x = u * shape
    flow(x, r, value)
    const chi = value.psi - (speed * r * r) / 2 - level
    if (chi > 0) low = shape
    else high = shape
    // d psi / dx = -r u_r; Newton in the square of x, in which chi is nearly straight.
    const slope = -r * value.ur * u
    const square = shape * shape - (2 * shape * chi) / slope
    const next = square > 0 ? Math.sqrt(square) : Number.NaN
    if (Math.abs(next - shape) <= 1e-13 * shape) return next
    if (next > low && next < high) shape = next
    else shape = high === Infinity ? 2 * shape : (low + high) / 2
    if (high < Infinity && high - low <= 1e-15 * high) return shape
  }
  return shape
}

const RULE = gaussLegendre(16)

/**
 * Volume of the carried body: 4 pi (y_out - y_in) int x u du, on panels that halve towards u = 1.
 *
 * @param depth number of panels; the surface next to the axis changes on the scale of the smaller of hole and axial half-length
 */
export function bodyVolume(body: CarriedBody, depth: number): number {
  const span = body.equator * body.equator - body.hole * body.hole
  let sum = 0
  let shape = 0
  for (let panel = 0; panel < depth; panel++) {
    const low = 1 - 0.5 ** panel
    const high = panel === depth - 1 ? 1 : 1 - 0.5 ** (panel + 1)
    const half = (high - low) / 2
    for (let g = 0; g < RULE.nodes.length; g++) {
      const u = low + half * (1 + read(RULE.nodes, g))
      shape = bodyShape(body, u, shape)
      sum += half * read(RULE.weights, g) * u * u * shape
    }
  }
  return 4 * Math.PI * span * sum
}
