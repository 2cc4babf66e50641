/**
 * Refusals at the door of the wake: values of the plan's rings, wall and march, whichever engine follows.
 */
import { at, DomainError, requireRange } from '../base'
import { checkMarch, MOST_RINGS } from '../coaxial'
import { curveSums, FEWEST_NODES, tangents } from './closedCurve'
import type { WakeInput, WakeRing } from './types'
import { along, dot, length, unit, type Vector } from './vector'

/** Rings whose centres and shapes differ by less than this share of their radius are one ring twice. */
const COINCIDENT = 1e-9
/** Long over short axis an ellipse may have. */
const MOST_SLENDER = 20

function checkVector(field: string, vector: Vector, unitName: string): void {
  vector.forEach((value, axis) => requireRange(`${field}.${axis}`, value, { unit: unitName }))
}

/** @throws {DomainError} with the dotted plan path of the first value that breaks its limit */
export function checkWakeInput(input: WakeInput): void {
  const { rings, wall } = input
  if (rings.length === 0) throw new DomainError('wake.rings', 'wake.rings must hold at least one ring, got none')
  requireRange('wake.rings.length', rings.length, { max: MOST_RINGS })
  rings.forEach(checkRing)
  checkMarch(input)
  requireRange('ambient.axialFlow', input.axialFlow, { unit: 'm/s' })
  requireRange('water.kinematicViscosity', input.kinematicViscosity, { min: 0, unit: 'm2/s' })
  input.stations.forEach((station, i) => requireRange(`wake.stations.${i}`, station, { unit: 'm' }))
  if (input.tube !== null) requireRange('wake.tube', input.tube, { above: 0, unit: 'm' })
  if (wall !== null) {
    checkVector('wake.wall.point', wall.point, 'm')
    checkDirection('wake.wall.normal', wall.normal)
    checkWall(input, unit(wall.normal), wall.point)
  }
  checkApart(rings)
}

function checkDirection(field: string, direction: Vector): void {
  checkVector(field, direction, '')
  if (length(direction) === 0) throw new DomainError(field, `${field} must point somewhere, got 0, 0, 0`)
}

function checkRing(ring: WakeRing, index: number): void {
  const field = (key: string): string => `wake.rings.${index}.${key}`
  requireRange(field('circulation'), ring.circulation, { unit: 'm2/s' })
  if (ring.circulation === 0)
    throw new DomainError(field('circulation'), `${field('circulation')} must not be 0: a ring without it is no ring`)
  requireRange(field('radius'), ring.radius, { above: 0, unit: 'm' })
  requireRange(field('coreRadius'), ring.coreRadius, { above: 0, max: 1.5 * ring.radius, unit: 'm' })
  checkVector(field('centre'), ring.centre, 'm')
  checkDirection(field('direction'), ring.direction)
  requireRange(field('startTime'), ring.startTime ?? 0, { min: 0, unit: 's' })
  requireRange(field('axisRatio'), ring.axisRatio ?? 1, { min: 1 / MOST_SLENDER, max: MOST_SLENDER })
  if (ring.curve !== undefined) checkCurve(field('curve'), ring.curve)
}

function checkCurve(field: string, curve: Float64Array): void {
  if (curve.length % 3 !== 0 || curve.length < 3 * FEWEST_NODES)
    throw new DomainError(
      field,
      `${field} must hold x y z of at least ${FEWEST_NODES} nodes, got ${curve.length} numbers`,
    )
  const bad = curve.findIndex((value) => !Number.isFinite(value))
  if (bad >= 0)
    throw new DomainError(
      field,
      `${field} must hold finite numbers, got ${at(curve, bad)} at node ${Math.floor(bad / 3)}`,
    )
  const tangent = new Float64Array(curve.length)
  tangents(curve, tangent)
  const { shortestSegment, longestSegment, area } = curveSums(curve, tangent)
  if (!(shortestSegment > 0.01 * longestSegment))
    throw new DomainError(
      field,
      `${field} must have nodes at equal steps of a smooth parameter, got segments from ${shortestSegment} m to ${longestSegment} m`,
    )
  if (length(area) === 0) throw new DomainError(field, `${field} must enclose an area, got a curve without one`)
}

function checkWall(input: WakeInput, normal: Vector, point: Vector): void {
  if (input.tube !== null)
    throw new DomainError('wake.wall', 'wake.wall and wake.tube cannot stand together: leave one of them out')
  if (Math.abs(normal[0]) > 1e-12 && input.axialFlow !== 0)
    throw new DomainError(
      'wake.wall',
      `wake.wall must not stand across the stream: ambient.axialFlow must be 0 with it, got ${input.axialFlow} m/s`,
    )
  const heights = input.rings.map((ring) => {
    if (ring.curve !== undefined) return curveHeight(ring.curve, normal, point)
    const height = dot(along(ring.centre, point, -1), normal)
    // A circle reaches towards the wall by its radius times the sine of the angle between direction and normal.
    const reach = ring.radius * Math.sqrt(Math.max(0, 1 - dot(unit(ring.direction), normal) ** 2))
    return { height, reach }
  })
  heights.forEach(({ height, reach }, i) => {
    if (Math.abs(height) <= reach)
      throw new DomainError(
        `wake.rings.${i}.centre`,
        `wake.rings.${i}.centre must leave the ring clear of the wall, got ${Math.abs(height)} m from it with a reach of ${reach} m`,
      )
  })
  if (new Set(heights.map(({ height }) => Math.sign(height))).size > 1)
    throw new DomainError('wake.wall', 'wake.wall must have all rings on one side, got rings on both')
}

/** Middle height of a given curve above the wall, and how far it reaches to either side. */
function curveHeight(curve: Float64Array, normal: Vector, point: Vector): { height: number; reach: number } {
  let lowest = Infinity
  let highest = -Infinity
  for (let i = 0; i < curve.length; i += 3) {
    const height = dot(along([at(curve, i), at(curve, i + 1), at(curve, i + 2)], point, -1), normal)
    lowest = Math.min(lowest, height)
    highest = Math.max(highest, height)
  }
  return { height: (lowest + highest) / 2, reach: (highest - lowest) / 2 }
}

function checkApart(rings: readonly WakeRing[]): void {
  rings.forEach((ring, i) => {
    for (let j = 0; j < i; j++) {
      const other = at(rings, j)
      if ((other.startTime ?? 0) !== (ring.startTime ?? 0) || ring.curve !== undefined || other.curve !== undefined)
        continue
      const apart =
        length(along(ring.centre, other.centre, -1)) +
        Math.abs(ring.radius - other.radius) +
        ring.radius * (1 - Math.abs(dot(unit(ring.direction), unit(other.direction))))
      if (apart > COINCIDENT * ring.radius) continue
      throw new DomainError(
        `wake.rings.${i}.centre`,
        `rings ${j + 1} and ${i + 1} must not coincide, got both at ${ring.centre.join(', ')} m with radius ${ring.radius} m`,
      )
    }
  })
}
