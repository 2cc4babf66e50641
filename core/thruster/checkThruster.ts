/**
 * The door of the room: what a thruster section must hold.
 */
import { DomainError, requireRange } from '../base'
import type { ActuatorInput, BayInput, IntakeInput, ThrusterSection, VehicleInput } from './types'

/** More thrusters than this are a mistake of the input. */
export const MOST_THRUSTERS = 100

/**
 * Refuse a section that cannot be computed.
 *
 * @throws {DomainError} with the plan path, thruster.…
 */
export function requireThruster(section: ThrusterSection): void {
  requireRange('thruster.count', section.count, { min: 1, max: MOST_THRUSTERS })
  if (!Number.isInteger(section.count))
    throw new DomainError('thruster.count', `thruster.count must be a whole number, got ${section.count}`)
  positive('thruster.spacing', section.spacing, 'm')
  if (!(Math.abs(section.cant) < Math.PI / 2))
    throw new DomainError(
      'thruster.cant',
      `thruster.cant must lie between -${(Math.PI / 2).toFixed(4)} and ${(Math.PI / 2).toFixed(4)} rad, a quarter turn, got ${section.cant} rad`,
    )
  positive('thruster.arm', section.arm, 'm')
  positive('thruster.energyStore', section.energyStore, 'J')
  requireActuator(section.actuator)
  requireIntake(section.intake)
  requireBay(section.bay)
  if (section.vehicle !== null) requireVehicle(section.vehicle)
  section.target.forEach((duty, i) => {
    const path = `thruster.target.${i}`
    if ('speed' in duty) requireRange(`${path}.speed`, duty.speed, { min: 0, unit: 'm/s' })
    else requireRange(`${path}.thrust`, duty.thrust, { min: 0, unit: 'N' })
    requireRange(`${path}.share`, duty.share, { min: 0 })
    if ('speed' in duty && (section.vehicle === null || section.vehicle.drag === null))
      throw new DomainError(
        'thruster.vehicle.drag',
        'thruster.vehicle.drag must be given where a speed is aimed at; it is missing',
      )
  })
}

function requireActuator(actuator: ActuatorInput): void {
  const path = 'thruster.actuator'
  positive(`${path}.maxForce`, actuator.maxForce, 'N')
  positive(`${path}.maxSpeed`, actuator.maxSpeed, 'm/s')
  positive(`${path}.maxAcceleration`, actuator.maxAcceleration, 'm/s2')
  positive(`${path}.maxPower`, actuator.maxPower, 'W')
  positive(`${path}.maxTravel`, actuator.maxTravel, 'm')
  requireRange(`${path}.efficiency`, actuator.efficiency, { above: 0, max: 1 })
  requireRange(`${path}.ejectShare`, actuator.ejectShare, { above: 0, max: 1 })
  requireRange(`${path}.valveLag`, actuator.valveLag, { min: 0, unit: 's' })
}

function requireIntake(intake: IntakeInput): void {
  positive('thruster.intake.area', intake.area, 'm2')
  requireRange('thruster.intake.recoveredShare', intake.recoveredShare, { min: 0, max: 1 })
  requireRange('thruster.intake.lossCoefficient', intake.lossCoefficient, { min: 0 })
}

function requireBay(bay: BayInput): void {
  positive('thruster.bay.length', bay.length, 'm')
  positive('thruster.bay.diameter', bay.diameter, 'm')
}

function requireVehicle(vehicle: VehicleInput): void {
  const path = 'thruster.vehicle'
  if (vehicle.speed !== null) requireRange(`${path}.speed`, vehicle.speed, { min: 0, unit: 'm/s' })
  positive(`${path}.mass`, vehicle.mass, 'kg')
  if (vehicle.addedMass !== null) requireRange(`${path}.addedMass`, vehicle.addedMass, { min: 0, unit: 'kg' })
  positive(`${path}.length`, vehicle.length, 'm')
  if (vehicle.speed === null && vehicle.drag === null)
    throw new DomainError(
      `${path}.drag`,
      `${path}.drag must be given where the speed is to be found from thrust and drag; it is missing`,
    )
}

function positive(field: string, value: number | null, unit: string): void {
  if (value !== null) requireRange(field, value, { above: 0, unit })
}

/**
 * Refuse a pulse that does not fit its period: the stroke, two turns of the valve and some time to refill.
 *
 * @throws {DomainError} on train.period
 */
export function requireFit(duration: number, frequency: number, valveLag: number): void {
  const needed = duration + 2 * valveLag
  if (1 / frequency > needed) return
  throw new DomainError(
    'train.period',
    `train.period must be above the stroke's ${duration} s and two valve lags together, ${needed} s, to leave time to refill, got ${1 / frequency} s`,
  )
}
