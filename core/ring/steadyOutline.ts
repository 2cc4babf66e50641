/**
 * Meridional outlines of a steady ring for drawing: core boundary and carried fluid, in units of L, ring plane at x = 0.
 *
 * The core boundary is a trigonometric series whose coefficients are series along the family. The carried body is that of the
 * vortex line of equal impulse and speed, found when asked, times a smooth ratio that is 1 for thin rings (error eps^4).
 * Both within 1e-4 L of the solver; for sqrt 2 - eps below 1e-3 the corners of the core, which sharpen to right angles, are up to
 * 6e-3 L off.
 */
import { chebyshevSum } from './chebyshev'
import { bodyRadius, bodyShape, carriedBody, type CarriedBody } from './dividingStreamline'
import { FILAMENT, lineStagnationPoint } from './filamentFlow'
import { read } from './read'
import { familyRatios, innerRadiusRatio, placeOf, seriesArgument, type FamilyPlace } from './steadyFamily'
import { BODY_EQUATOR, BODY_SHAPE, OUTLINE_AXIAL, OUTLINE_RADIAL } from './steadyOutlineTable'

/** Points of a curve in the half plane r >= 0. */
export interface MeridionalCurve {
  readonly x: Float64Array
  readonly r: Float64Array
}

export interface SteadyRingOutline {
  /** Closed: the last point is the first. Starts at the outer equator and runs by the front (+x). */
  readonly core: MeridionalCurve
  /**
   * `spheroid`: from the front stagnation point on the axis over the equator to the rear one. `torus`: closed, from the stagnation circle
   * between axis and ring by the front, over the equator and back.
   */
  readonly carried: MeridionalCurve
  readonly carriedKind: 'spheroid' | 'torus'
}

const CORE_POINTS = 256
const CARRIED_POINTS = 96

const axialSeries = OUTLINE_AXIAL.map((series) => Float64Array.from(series))
const radialSeries = OUTLINE_RADIAL.map((series) => Float64Array.from(series))
const equatorSeries = Float64Array.from(BODY_EQUATOR)
const shapeSeries = BODY_SHAPE.map((series) => Float64Array.from(series))

/**
 * Outlines of the core and of the fluid carried along.
 *
 * @param coreRatio eps, 0 < eps <= sqrt 2
 * @returns curves in units of L; carried fluid is a torus for thin rings (R/a above 86), else a body that reaches the axis
 * @throws {DomainError} for a core ratio outside its range
 */
export function steadyRingOutline(coreRatio: number): SteadyRingOutline {
  const place = placeOf(coreRatio)
  if (place.delta === 0) return hillOutline()
  // Beyond its ends the table's first and last shapes are kept.
  const s = Math.max(-1, Math.min(1, seriesArgument(place)))
  const { curve, kind } = carriedOutline(place, s)
  return { core: coreOutline(place, s), carried: curve, carriedKind: kind }
}

function coreOutline(place: FamilyPlace, s: number): MeridionalCurve {
  const axial = axialSeries.map((series) => chebyshevSum(series, s))
  const radial = radialSeries.map((series) => chebyshevSum(series, s))
  const x = new Float64Array(CORE_POINTS + 1)
  const r = new Float64Array(CORE_POINTS + 1)
  for (let i = 0; i <= CORE_POINTS; i++) {
    const t = (2 * Math.PI * (i % CORE_POINTS)) / CORE_POINTS
    x[i] = place.eps * axial.reduce((sum, value, k) => sum + value * Math.sin((k + 1) * t), 0)
    r[i] = 1 + place.eps * radial.reduce((sum, value, k) => sum + value * Math.cos(k * t), 0)
  }
  // The inner edge near the axis is known better than the drawing's series: meet it exactly.
  const inner = innerRadiusRatio(place)
  const middle = CORE_POINTS / 2
  const shift = inner - read(r, middle)
  for (let i = 0; i <= CORE_POINTS; i++) {
    const share = (1 - Math.cos((2 * Math.PI * i) / CORE_POINTS)) / 2
    r[i] = Math.max(read(r, i) + shift * share, 0)
  }
  return { x, r }
}

function carriedOutline(place: FamilyPlace, s: number): { curve: MeridionalCurve; kind: 'spheroid' | 'torus' } {
  const ratios = familyRatios(place)
  const lineRadius = Math.sqrt(ratios.impulse)
  const speed = ratios.speed * lineRadius
  const near = 0.01 / speed
  const line = carriedBody(FILAMENT, speed / (4 * Math.PI), 1 - near, 1 + near)
  if (line === null) return { curve: { x: new Float64Array(0), r: new Float64Array(0) }, kind: 'spheroid' }
  const shape = Float64Array.from(shapeSeries, (series) => chebyshevSum(series, s))
  const body = { ...line, equator: line.equator * chebyshevSum(equatorSeries, s) }
  return { curve: halfToWhole(line, body, shape, lineRadius), kind: line.kind }
}

function halfToWhole(line: CarriedBody, body: CarriedBody, shapeRatio: Float64Array, scale: number): MeridionalCurve {
  const half = CARRIED_POINTS / 2
  const x = new Float64Array(CARRIED_POINTS + 1)
  const r = new Float64Array(CARRIED_POINTS + 1)
  let guess = 0
  for (let i = 0; i <= half; i++) {
    // i = 0 the equator, i = half the axis or the stagnation circle.
    const u = Math.sin((Math.PI * i) / CARRIED_POINTS)
    const end = i === half
    // The last point is a limit: the stagnation point on the axis, or x = 0 at the stagnation circle.
    if (end) guess = line.kind === 'torus' ? 0 : lineStagnationPoint(line.speed)
    else if (i > 0) guess = bodyShape(line, u, guess)
    const front = i === 0 ? 0 : scale * u * guess * chebyshevSum(shapeRatio, 2 * u * u - 1)
    const radius = scale * (end ? body.hole : bodyRadius(body, u))
    x[half - i] = front
    r[half - i] = radius
    x[half + i] = -front
    r[half + i] = radius
  }
  return { x, r }
}

/** The core of Hill's vortex is the sphere it carries: a half disc of radius 2. */
function hillOutline(): SteadyRingOutline {
  const angles = Float64Array.from({ length: CARRIED_POINTS + 1 }, (_, i) => (Math.PI * i) / CARRIED_POINTS)
  const carried = { x: angles.map((a) => 2 * Math.cos(a)), r: angles.map((a) => 2 * Math.sin(a)) }
  carried.r[CARRIED_POINTS] = 0
  const half = CARRIED_POINTS / 2
  const order = Array.from(
    { length: CARRIED_POINTS + 1 },
    (_, i) => (half - i + CARRIED_POINTS + 1) % (CARRIED_POINTS + 1),
  )
  const core = {
    x: Float64Array.from([...order, half], (i) => read(carried.x, i)),
    r: Float64Array.from([...order, half], (i) => read(carried.r, i)),
  }
  return { core, carried, carriedKind: 'spheroid' }
}
