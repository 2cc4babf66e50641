/**
 * Plans to start from. They open as untitled copies.
 */
import { readPlan } from './decodePlan'
import { PULSE_EXAMPLES } from './examplesPulse'
import { READINGS_EXAMPLES } from './examplesReadings'
import { MEASURED_EXAMPLE } from './measuredPulse'
import { TANK_EXAMPLES } from './examplesTank'
import { VEHICLE_EXAMPLES } from './examplesVehicle'
import { WAKE_EXAMPLES } from './examplesWake'
import type { Example } from './exampleTypes'
import type { Plan } from './types'

export const EXAMPLES: readonly Example[] = [
  ...PULSE_EXAMPLES,
  ...WAKE_EXAMPLES,
  ...VEHICLE_EXAMPLES,
  ...TANK_EXAMPLES,
  ...READINGS_EXAMPLES,
  MEASURED_EXAMPLE,
]

/**
 * Plan of an example.
 *
 * @throws {RangeError} if there is no such example, or it does not decode: an internal mistake, tested against
 */
export function examplePlan(id: string): Plan {
  const found = EXAMPLES.find((candidate) => candidate.id === id)
  if (found === undefined) throw new RangeError(`there is no example ${id}`)
  const reading = readPlan(found.text)
  if (!reading.ok) throw new RangeError(reading.problems.map((problem) => problem.message).join(' '))
  return reading.plan
}

/** The plan an empty window opens with. */
export function defaultPlan(): Plan {
  return { ...examplePlan('bench-generator'), title: '', notes: '' }
}
