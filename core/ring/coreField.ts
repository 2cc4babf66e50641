/**
 * Flow of a core whose vorticity is proportional to the distance from the axis, omega = r (strength 1), by contour integrals.
 *
 * The vector potential is int omega/R dV / (4 pi). As r cos phi is harmonic and 1/R is the Laplacian of R/2, Green's theorem turns the
 * volume integral into one over the boundary with a kernel no worse than d^2 ln d; the velocity follows from
 * curl(r e_phi) = 2 e_x with a kernel of order ln d. (Derived here; contour forms of this kind: Shariff, Leonard & Ferziger 1989,
 * NASA TM 102257, recalled, not re-read.)
 *
 * For a point on the boundary the integral is cut into panels that halve towards the point, Gauss-Legendre in each: the
 * logarithm is then integrated to rounding, and so is the near-axis kernel whose scale is r.
 */
import { gaussLegendre } from '../base'
import { cosineSum, emptyPoint, harmonics, pointOnContour, type ContourPoint, type CoreContour } from './coreContour'
import { read } from './read'
import { emptyKernels, evaluateKernels } from './ringKernels'

/** Stream function and velocity at one point, for omega = r inside the contour, fluid at rest far away. */
export interface FieldValue {
  psi: number
  ux: number
  ur: number
}

const PANEL_POINTS = 12
const RULE = gaussLegendre(PANEL_POINTS)
/** Smallest panel next to a boundary point, in t: what is lost there of d^2 ln d is below 1e-13, of ln d (velocity) below 1e-7. */
const SMALLEST_PANEL = 1e-6

/**
 * Ends of the panels on one side of a point of the boundary, as distances in t from it, 0 to pi.
 *
 * @param harmonicCount of the contour: panels are short enough for its highest harmonics that matter
 * @param smallest panel; take less where the velocity itself is wanted to rounding
 */
export function gradedPanels(harmonicCount: number, smallest = SMALLEST_PANEL): Float64Array {
  const widest = Math.min(Math.PI / 4, 30 / harmonicCount)
  const ends: number[] = []
  const count = Math.ceil((Math.PI - widest) / widest)
  for (let i = 0; i <= count; i++) ends.push(Math.PI - (i * (Math.PI - widest)) / count)
  for (let width = widest / 2; width > smallest; width /= 2) ends.push(width)
  ends.push(0)
  return Float64Array.from(ends.reverse())
}

/**
 * Field on the boundary at parameter t, and optionally the row int G r'|X'|/q' cos kt dt of the linearised problem.
 *
 * @param weight cosine series of r |X'| / q (q the normal gradient of the stream function), needed for `row`
 * @param row receives M + 1 values where given
 */
export function boundaryField(
  out: FieldValue,
  contour: CoreContour,
  t: number,
  panels: Float64Array,
  weight?: Float64Array,
  row?: Float64Array,
): void {
  const size = contour.radial.length
  const cosines = new Float64Array(size)
  const sines = new Float64Array(size)
  const target = emptyPoint()
  harmonics(t, cosines, sines)
  pointOnContour(target, contour, cosines, sines)
  const sum = new FieldSum(target.x, target.r)
  const source = emptyPoint()
  if (row !== undefined) row.fill(0)
  for (let side = -1; side <= 1; side += 2) {
    for (let panel = 0; panel + 1 < panels.length; panel++) {
      const low = read(panels, panel)
      const half = (read(panels, panel + 1) - low) / 2
      for (let g = 0; g < PANEL_POINTS; g++) {
        harmonics(t + side * (low + half * (1 + read(RULE.nodes, g))), cosines, sines)
        pointOnContour(source, contour, cosines, sines)
        const dt = half * read(RULE.weights, g)
        sum.add(source, dt)
        if (row === undefined || weight === undefined) continue
        const factor = sum.green() * cosineSum(weight, cosines) * dt
        for (let k = 0; k < size; k++) row[k] = (row[k] ?? NaN) + factor * (cosines[k] ?? NaN)
      }
    }
  }
  sum.finish(out)
}

/** The running contour integral for one point. */
export class FieldSum {
  private readonly kernels = emptyKernels()
  private psi = 0
  private ux = 0
  private ur = 0
  private sourceRadius = 0

  constructor(
    private readonly x: number,
    private readonly r: number,
  ) {}

  /** Add the piece dt of the contour at `source`. */
  add(source: ContourPoint, dt: number): void {
    const q = source.r
    const dx = source.x - this.x
    const dr = q - this.r
    const nx = -source.rSlope * dt
    const nr = source.xSlope * dt
    evaluateKernels(this.kernels, dx, dr, this.r, q)
    const { j0, j1, j2, j3 } = this.kernels
    this.sourceRadius = q
    this.psi += q * (q * (nx * dx * j1 + nr * (q * j1 - this.r * j2)) - nr * j3)
    this.ux += q * (nx * dx * j0 + nr * (q * j0 - this.r * j1)) - q * q * nr * j0
    this.ur += q * q * nx * j1
  }

  /** Stream function at the point of a unit ring at the piece added last. */
  green(): number {
    return (this.r * this.sourceRadius * this.kernels.j1) / (4 * Math.PI)
  }

  finish(out: FieldValue): void {
    out.psi = (this.psi * this.r) / (8 * Math.PI)
    out.ux = this.ux / (4 * Math.PI)
    out.ur = this.ur / (4 * Math.PI)
  }
}
