/**
 * One train of rings from several nozzles.
 */
import { DomainError, requireRange } from '../base'
import type { CoaxialRing } from '../coaxial'
import type { WakeRing } from './types'
import { along, length, unit, type Vector } from './vector'

/** A nozzle of the wake: where its exit is, where it points, how much later than the first it fires. */
export interface WakeNozzle {
  /** [m] */
  readonly position: Vector
  readonly direction: Vector
  /** [s], >= 0 */
  readonly delay: number
}

/** The nozzle of a plan that names none: exit at the origin, along +x. */
export const PLAIN_NOZZLE: WakeNozzle = { position: [0, 0, 0], direction: [1, 0, 0], delay: 0 }

/**
 * Rings of a train as every nozzle sends them, nozzle by nozzle.
 *
 * @param train rings of one nozzle, x from its exit
 * @param nozzles empty: one at the origin along +x
 * @param axisRatio of the exit: long side towards +y for a jet along x; default 1
 * @throws {DomainError}
 */
export function ringsOfNozzles(
  train: readonly CoaxialRing[],
  nozzles: readonly WakeNozzle[],
  axisRatio = 1,
): WakeRing[] {
  const given = nozzles.length === 0 ? [PLAIN_NOZZLE] : nozzles
  return given.flatMap((nozzle, n) => {
    const field = `wake.nozzles.${n}`
    nozzle.position.forEach((value, axis) => requireRange(`${field}.position.${axis}`, value, { unit: 'm' }))
    nozzle.direction.forEach((value, axis) => requireRange(`${field}.direction.${axis}`, value, {}))
    requireRange(`${field}.delay`, nozzle.delay, { min: 0, unit: 's' })
    if (length(nozzle.direction) === 0)
      throw new DomainError(`${field}.direction`, `${field}.direction must point somewhere, got 0, 0, 0`)
    const direction = unit(nozzle.direction)
    return train.map((ring) => ({
      circulation: ring.circulation,
      radius: ring.radius,
      coreRadius: ring.coreRadius,
      core: ring.core,
      centre: along(nozzle.position, direction, ring.x),
      direction,
      axisRatio,
      startTime: ring.startTime + nozzle.delay,
    }))
  })
}
