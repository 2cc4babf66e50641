/**
 * Steady vortex rings with vorticity proportional to the distance from the axis: the free-boundary problem of Norbury 1973
 * (J. Fluid Mech. 57:417) solved by Newton's method.
 *
 * Lengths in units of L (mean of inner and outer radius) and vorticity = r inside the core. On the core boundary
 * psi - U r^2 / 2 = c; core area pi eps^2. The unknown of a Newton step is not the displacement but the shift of level
 * zeta = q eta, q = -d(psi - U r^2/2)/dn, and the parameter of the boundary is the time a particle takes along it. Then the linearised
 * problem is -zeta + int G zeta' dt' with a constant factor, well conditioned for every eps, and the corners that
 * form at the stagnation points as eps approaches sqrt 2 are resolved by themselves: particles are slow there, and the solution is
 * analytic in the time.
 */
import {
  contourMoments,
  contourThrough,
  cosineSeries,
  cosineSum,
  emptyPoint,
  harmonics,
  pointOnContour,
  type CoreContour,
} from './coreContour'
import { boundaryField, gradedPanels, type FieldValue } from './coreField'
import { solveLinear } from './linearSolver'
import { read } from './read'

/** One solved ring, vorticity r, mean radius 1. */
export interface SolvedRing {
  readonly coreRatio: number
  /** Speed U. */
  readonly speed: number
  /** c of psi - U r^2 / 2 = c on the boundary. */
  readonly level: number
  readonly contour: CoreContour
  /** Cosine series of r |X'| / q along the boundary. */
  readonly weight: Float64Array
  /** Largest |psi - U r^2/2 - c| at the nodes over U / 2. */
  readonly residual: number
  readonly iterations: number
}

const MOST_ITERATIONS = 30
/** Residual at which Newton has reached rounding. */
const FINISHED = 1e-13

/** A thin ring to start from: a circle. */
export function circularCore(coreRatio: number, harmonicCount: number): SolvedRing {
  const nodes = Array.from({ length: harmonicCount + 1 }, (_, i) => (Math.PI * i) / harmonicCount)
  const contour = contourThrough(
    nodes.map((t) => coreRatio * Math.sin(t)),
    nodes.map((t) => 1 + coreRatio * Math.cos(t)),
  )
  const speed = (coreRatio ** 2 / 4) * (Math.log(8 / coreRatio) - 0.25)
  return {
    coreRatio,
    speed,
    level: 0,
    contour,
    weight: Float64Array.from({ length: harmonicCount + 1 }, (_, k) => (k === 0 ? 2 : 0)),
    residual: Infinity,
    iterations: 0,
  }
}

/**
 * Solve for one core ratio from a near-by ring.
 *
 * @param enough residual to stop at
 * @returns the best ring found, or null where Newton breaks down at once: look at its residual
 */
export function solveSteadyRing(coreRatio: number, guess: SolvedRing, enough = FINISHED): SolvedRing | null {
  const M = guess.contour.radial.length - 1
  const size = M + 3
  const panels = gradedPanels(M)
  const cosines = new Float64Array(M + 1)
  const sines = new Float64Array(M + 1)
  const point = emptyPoint()
  const field: FieldValue = { psi: 0, ux: 0, ur: 0 }
  const row = new Float64Array(M + 1)
  let contour = guess.contour
  let weight = guess.weight
  let speed = guess.speed
  let level = guess.level
  let best: SolvedRing | null = null
  for (let iteration = 1; iteration <= MOST_ITERATIONS; iteration++) {
    const matrix = new Float64Array(size * size)
    const rightSide = new Float64Array(size)
    const x = new Float64Array(M + 1)
    const r = new Float64Array(M + 1)
    const nx = new Float64Array(M + 1)
    const nr = new Float64Array(M + 1)
    const gradient = new Float64Array(M + 1)
    const newWeight = new Float64Array(M + 1)
    const psi = new Float64Array(M + 1)
    for (let i = 0; i <= M; i++) {
      const t = (Math.PI * i) / M
      boundaryField(field, contour, t, panels, weight, row)
      harmonics(t, cosines, sines)
      pointOnContour(point, contour, cosines, sines)
      const stretch = Math.hypot(point.xSlope, point.rSlope)
      x[i] = point.x
      r[i] = point.r
      nx[i] = -point.rSlope / stretch
      nr[i] = point.xSlope / stretch
      psi[i] = field.psi
      gradient[i] = -point.r * (read(nr, i) * (field.ux - speed) - read(nx, i) * field.ur)
      newWeight[i] = (point.r * stretch) / read(gradient, i)
      for (let k = 0; k <= M; k++) matrix[i * size + k] = read(row, k) - read(cosines, k)
      matrix[i * size + M + 1] = (-point.r * point.r) / 2
      matrix[i * size + M + 2] = -1
      rightSide[i] = (speed * point.r * point.r) / 2 + level - field.psi
    }
    const q0 = read(gradient, 0)
    const qM = read(gradient, M)
    weight = cosineSeries(newWeight)
    // int eta ds = int zeta weight / r dt over the whole boundary
    const overRadius = cosineSeries(newWeight.map((w, i) => w / read(r, i)))
    for (let k = 0; k <= M; k++) {
      matrix[(M + 1) * size + k] = 1 / q0 - (k % 2 === 0 ? 1 : -1) / qM
      matrix[(M + 2) * size + k] = Math.PI * read(overRadius, k) * (k === 0 ? 2 : 1)
    }
    rightSide[M + 1] = 2 - (read(r, 0) + read(r, M))
    rightSide[M + 2] = Math.PI * coreRatio * coreRatio - contourMoments(contour).area
    let residual = Math.max(Math.abs(read(rightSide, M + 1)), Math.abs(read(rightSide, M + 2)))
    for (let i = 0; i <= M; i++) residual = Math.max(residual, (2 * Math.abs(read(rightSide, i))) / speed)
    if (!Number.isFinite(residual)) return best
    if (best === null || residual < best.residual)
      best = { coreRatio, speed, level, contour, weight, residual, iterations: iteration }
    else if (residual < 1e-10) return best
    if (residual < enough) return best
    const step = solveLinear(matrix, rightSide)
    if (step === null) return best
    const eta = new Float64Array(M + 1)
    let share = 1
    for (let i = 0; i <= M; i++) {
      harmonics((Math.PI * i) / M, cosines, sines)
      eta[i] = cosineSum(step.subarray(0, M + 1), cosines) / read(gradient, i)
      // A step may not take more than half of the radius: the contour must not cross the axis.
      share = Math.min(share, (0.5 * read(r, i)) / Math.max(Math.abs(read(eta, i)), 1e-300))
    }
    speed += share * read(step, M + 1)
    level += share * read(step, M + 2)
    contour = contourThrough(
      x.map((value, i) => (i === 0 || i === M ? 0 : value + share * read(eta, i) * read(nx, i))),
      r.map((value, i) => value + share * read(eta, i) * read(nr, i)),
    )
  }
  return best
}

/**
 * The same ring with the particle time as parameter, on `harmonicCount` harmonics.
 *
 * The new series are projections from twice as many points: what a coarse step has left in the highest harmonics, a jagged parameter
 * along an accurate curve, is taken off and not folded back.
 */
export function byParticleTime(ring: SolvedRing, harmonicCount: number): SolvedRing {
  const { contour, weight } = ring
  const size = contour.radial.length
  const cosines = new Float64Array(size)
  const sines = new Float64Array(size)
  const mean = read(weight, 0)
  const points = 2 * Math.max(harmonicCount, size - 1)
  const x = new Float64Array(points + 1)
  const r = new Float64Array(points + 1)
  const point = emptyPoint()
  for (let i = 0; i <= points; i++) {
    const time = (Math.PI * i) / points
    let t = time
    for (let iteration = 0; iteration < 50 && i > 0 && i < points; iteration++) {
      harmonics(t, cosines, sines)
      let elapsed = t
      let rate = 1
      for (let k = 1; k < size; k++) {
        const share = (weight[k] ?? NaN) / mean
        elapsed += (share * (sines[k] ?? NaN)) / k
        rate += share * (cosines[k] ?? NaN)
      }
      const step = (elapsed - time) / Math.max(rate, 0.2)
      t -= step
      if (Math.abs(step) < 1e-15) break
    }
    harmonics(t, cosines, sines)
    pointOnContour(point, contour, cosines, sines)
    x[i] = i === 0 || i === points ? 0 : point.x
    r[i] = point.r
  }
  const full = contourThrough(x, r)
  return {
    ...ring,
    contour: {
      axial: full.axial.slice(0, harmonicCount + 1),
      radial: full.radial.slice(0, harmonicCount + 1),
    },
    weight: Float64Array.from({ length: harmonicCount + 1 }, (_, k) => (k === 0 ? mean : 0)),
  }
}
