/**
 * Refusals at the door of the coaxial room.
 */
import { at, DomainError, requireRange } from '../base'
import { LARGEST_TUBE_SHARE } from './roundTube'
import type { CoaxialRing, CoaxialWakeInput } from './types'

/** More output times than this, and more of them times rings, would fill the memory without telling more. */
export const MOST_OUTPUTS = 200_000
const MOST_ROWS = 1_000_000
/** Every pair of rings is watched for passes and touches. */
export const MOST_RINGS = 400
/** Core ratio beyond which no ring of the steady family lies (Hill's vortex has sqrt 2). */
export const THICKEST_CORE = 1.5
/** Rings closer than this share of their radius are one place: their mutual speed has no value. */
const COINCIDENT = 1e-9

/** Field of a ring in the plan, numbered from 0 as its list is. */
export function ringField(index: number, key: string): string {
  return `wake.rings.${index}.${key}`
}

/** @throws {DomainError} with the dotted plan path of the first value that breaks its limit */
export function checkCoaxialInput(input: CoaxialWakeInput): void {
  if (input.rings.length === 0) throw new DomainError('wake.rings', 'wake.rings must hold at least one ring, got none')
  requireRange('wake.rings.length', input.rings.length, { max: MOST_RINGS })
  input.rings.forEach(checkRing)
  checkMarch(input)
  requireRange('ambient.axialFlow', input.axialFlow, { unit: 'm/s' })
  requireRange('water.kinematicViscosity', input.kinematicViscosity, { min: 0, unit: 'm2/s' })
  input.stations.forEach((station, i) => requireRange(`wake.stations.${i}`, station, { unit: 'm' }))
  if (input.wall !== null) checkWall(input, input.wall)
  if (input.tubeRadius !== null) checkTube(input, input.tubeRadius)
  checkApart(input.rings)
}

/** Duration, output step and tolerance, as both engines read them. @throws {DomainError} */
export function checkMarch(input: {
  readonly duration: number
  readonly outputStep: number
  readonly tolerance: number
  readonly rings: readonly unknown[]
}): void {
  requireRange('wake.duration', input.duration, { above: 0, unit: 's' })
  requireRange('wake.outputStep', input.outputStep, { above: 0, unit: 's' })
  requireRange('wake.tolerance', input.tolerance, { min: 1e-13, max: 1e-2 })
  const outputs = input.duration / input.outputStep
  const most = Math.min(MOST_OUTPUTS, Math.floor(MOST_ROWS / Math.max(1, input.rings.length)))
  if (outputs > most)
    throw new DomainError(
      'wake.outputStep',
      `wake.outputStep must leave at most ${most} outputs of ${input.rings.length} rings in wake.duration, got ${Math.floor(outputs)}: a step of ${Number((input.duration / most).toPrecision(2))} s or more does`,
    )
}

function checkRing(ring: CoaxialRing, index: number): void {
  const field = (key: string): string => ringField(index, key)
  requireRange(field('circulation'), ring.circulation, { unit: 'm2/s' })
  if (ring.circulation === 0)
    throw new DomainError(field('circulation'), `${field('circulation')} must not be 0: a ring without it is no ring`)
  requireRange(field('radius'), ring.radius, { above: 0, unit: 'm' })
  requireRange(field('coreRadius'), ring.coreRadius, { above: 0, unit: 'm' })
  if (ring.coreRadius > THICKEST_CORE * ring.radius)
    throw new DomainError(
      field('coreRadius'),
      `${field('coreRadius')} must be at most ${THICKEST_CORE} of the ring's radius ${ring.radius} m (no steady ring is thicker), got ${ring.coreRadius} m`,
    )
  requireRange(field('centre'), ring.x, { unit: 'm' })
  requireRange(field('startTime'), ring.startTime, { min: 0, unit: 's' })
}

function checkWall(input: CoaxialWakeInput, wall: number): void {
  requireRange('wake.wall', wall, { unit: 'm' })
  if (input.tubeRadius !== null)
    throw new DomainError('wake.wall', 'wake.wall and wake.tube cannot stand together: leave one of them out')
  if (input.axialFlow !== 0)
    throw new DomainError(
      'wake.wall',
      `wake.wall must not stand across the stream: ambient.axialFlow must be 0 with it, got ${input.axialFlow} m/s`,
    )
  const sides = new Set(input.rings.map((ring) => Math.sign(ring.x - wall)))
  input.rings.forEach((ring, i) => {
    if (ring.x === wall)
      throw new DomainError(ringField(i, 'centre'), `${ringField(i, 'centre')} must not lie in the wall at ${wall} m`)
  })
  if (sides.size > 1)
    throw new DomainError(
      'wake.wall',
      `wake.wall must have all rings on one side, got rings on both sides of ${wall} m`,
    )
}

function checkTube(input: CoaxialWakeInput, tubeRadius: number): void {
  requireRange('wake.tube', tubeRadius, { above: 0, unit: 'm' })
  input.rings.forEach((ring, i) => {
    const limit = LARGEST_TUBE_SHARE * tubeRadius
    if (ring.radius > limit)
      throw new DomainError(
        ringField(i, 'radius'),
        `${ringField(i, 'radius')} must be at most ${LARGEST_TUBE_SHARE} of the tube's radius (${sixDigits(limit)} m), got ${sixDigits(ring.radius)} m`,
      )
  })
}

function sixDigits(value: number): number {
  return Number(value.toPrecision(6))
}

function checkApart(rings: readonly CoaxialRing[]): void {
  rings.forEach((ring, i) => {
    for (let j = 0; j < i; j++) {
      const other = at(rings, j)
      if (other.startTime !== ring.startTime) continue
      const distance = Math.hypot(ring.x - other.x, ring.radius - other.radius)
      if (distance > COINCIDENT * ring.radius) continue
      throw new DomainError(
        ringField(i, 'centre'),
        `rings ${j + 1} and ${i + 1} must not coincide, got both at ${ring.x} m with radius ${ring.radius} m`,
      )
    }
  })
}
