/**
 * The limits of a thruster and how a design stands to each.
 */
import type { Budget } from './budget'
import type { ActuatorInput, BayInput, Limit, LimitName } from './types'

/** A value that must not be above a limit; nothing where no limit is set. */
export function atMost(name: LimitName, value: number, limit: number | null): Limit[] {
  // Sums that should meet exactly may differ in their last digits.
  return limit === null ? [] : [{ name, value, limit, ok: value <= limit * (1 + ROUNDING) }]
}

/** A value that must be above a limit; nothing where either is not known. */
export function above(name: LimitName, value: number | null, limit: number | null): Limit[] {
  return limit === null || value === null ? [] : [{ name, value, limit, ok: value > limit }]
}

/** A value that must not be below a limit. */
export function atLeast(name: LimitName, value: number, limit: number): Limit[] {
  return [{ name, value, limit, ok: value >= limit * (1 - ROUNDING) }]
}

/** Relative rounding that a design exactly on its limit is allowed. */
const ROUNDING = 1e-12

/**
 * Limits of actuator, period and bay. A value is Infinity where the programme's speed jumps: no actuator gives that.
 *
 * @param diameter exit diameter [m]; with the plunger's it must fit the bay
 * @param duration of the stroke [s]
 */
export function mechanicalLimits(
  budget: Budget,
  design: { readonly diameter: number; readonly pistonDiameter: number; readonly duration: number },
  actuator: ActuatorInput,
  bay: BayInput,
): Limit[] {
  return [
    ...atMost('plunger force', budget.plungerForce, actuator.maxForce),
    ...atMost('plunger speed', budget.plungerSpeed, actuator.maxSpeed),
    ...atMost('plunger acceleration', budget.plungerAcceleration, actuator.maxAcceleration),
    ...atMost('actuator power', budget.peakPower, actuator.maxPower),
    ...atMost('plunger travel', budget.plungerTravel, actuator.maxTravel),
    ...atMost('eject time', design.duration, budget.ejectTimeAllowed),
    ...above('refill time', budget.refillTime, 0),
    ...atMost('bay length', budget.cavityLength, bay.length),
    ...atMost('bay diameter', Math.max(design.diameter, design.pistonDiameter), bay.diameter),
  ]
}
