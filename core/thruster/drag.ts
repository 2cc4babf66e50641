/**
 * Drag of a vehicle against its speed.
 *
 * Source: ITTC 1957 model-ship correlation line, 8th International Towing Tank Conference, Madrid: C_F = 0.075/(log10 Re - 2)^2.
 */
import { DomainError, at, evaluateCubic, last, monotoneCubic, requireRange } from '../base'
import type { DragInput } from './types'

/** Below this Reynolds number the line bends up towards its pole at 100: it is held there. */
export const FRICTION_HELD_BELOW = 1e4
/** Below this Reynolds number a hull is partly laminar and the line is a stand-in: common practice. */
export const FRICTION_LINE_FROM = 1e5

/** A drag law ready to be read. */
export interface DragLaw {
  /** Drag [N] at a speed [m/s] >= 0. @throws {DomainError} on thruster.vehicle.drag beyond the end of a table */
  readonly dragAt: (speed: number) => number
  /** Last speed of a table [m/s]; Infinity for a formula. */
  readonly highestSpeed: number
  /** Speeds between which a table bends [m/s]; empty for a formula. */
  readonly knots: readonly number[]
}

/** Friction coefficient of the ITTC 1957 line, held below Reynolds number 1e4. @param reynolds V length / nu, >= 0 */
export function ittcFriction(reynolds: number): number {
  return 0.075 / (Math.log10(Math.max(reynolds, FRICTION_HELD_BELOW)) - 2) ** 2
}

/**
 * Check a drag input and make it readable.
 *
 * A hull has (1 + form factor) C_F on its wetted area. A table is a monotone cubic through its rows, from no drag at rest where
 * its first speed is above 0.
 *
 * @param length of the vehicle [m]; needed for a hull
 * @throws {DomainError} on thruster.vehicle.…
 */
export function compileDrag(
  drag: DragInput,
  density: number,
  kinematicViscosity: number,
  length: number | null,
): DragLaw {
  const path = 'thruster.vehicle.drag'
  const formula = (coefficientTimesArea: (speed: number) => number): DragLaw => ({
    dragAt: (speed) => 0.5 * density * speed * speed * coefficientTimesArea(speed),
    highestSpeed: Infinity,
    knots: [],
  })
  switch (drag.kind) {
    case 'area':
      requireRange(`${path}.dragArea`, drag.dragArea, { above: 0, unit: 'm2' })
      return formula(() => drag.dragArea)
    case 'hull': {
      requireRange(`${path}.wettedArea`, drag.wettedArea, { above: 0, unit: 'm2' })
      requireRange(`${path}.formFactor`, drag.formFactor, { min: 0 })
      if (length === null)
        throw new DomainError(
          'thruster.vehicle.length',
          'thruster.vehicle.length must be given in m for the drag of a hull; it is missing',
        )
      requireRange('thruster.vehicle.length', length, { above: 0, unit: 'm' })
      const area = (1 + drag.formFactor) * drag.wettedArea
      return formula((speed) => area * ittcFriction((speed * length) / kinematicViscosity))
    }
    case 'table':
      return tableLaw(drag.rows, path)
  }
}

function tableLaw(rows: readonly { readonly speed: number; readonly drag: number }[], path: string): DragLaw {
  if (rows.length < 2)
    throw new DomainError(
      `${path}.rows`,
      `${path}.rows must hold at least 2 rows of speed and drag, got ${rows.length}`,
    )
  rows.forEach((row, i) => {
    requireRange(`${path}.rows.${i}.drag`, row.drag, { min: 0, unit: 'N' })
    requireRange(`${path}.rows.${i}.speed`, row.speed, { min: 0, unit: 'm/s' })
    if (i === 0) return
    const before = at(rows, i - 1).speed
    if (!(row.speed > before))
      throw new DomainError(
        `${path}.rows.${i}.speed`,
        `${path}.rows must have rising speeds: row ${i + 1} has ${row.speed} m/s after ${before} m/s`,
      )
  })
  const points = at(rows, 0).speed > 0 ? [{ speed: 0, drag: 0 }, ...rows] : rows
  const speeds = points.map((row) => row.speed)
  const curve = monotoneCubic(
    speeds,
    points.map((row) => row.drag),
  )
  const highestSpeed = last(speeds)
  return {
    dragAt: (speed) => {
      if (speed > highestSpeed)
        throw new DomainError(
          path,
          `${path} must reach the speed asked for: its last row is at ${highestSpeed} m/s, got ${speed} m/s`,
        )
      return evaluateCubic(curve, speed).value
    },
    highestSpeed,
    knots: speeds,
  }
}
