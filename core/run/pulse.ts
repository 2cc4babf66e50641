/** The pulse of a plan. */
import type { Plan } from '../plan'
import { computePulse, type ComputedJet, type PulseInput, type PulseResult } from '../pulse'
import type { WaterProperties } from '../water'

/** What the rooms take of one pulse of a plan. @param jet what the computed jet hands on; needed where the plan adopts it */
export function pulseInputOf(plan: Plan, water: WaterProperties, jet: ComputedJet | null): PulseInput {
  return {
    density: water.density,
    kinematicViscosity: water.kinematicViscosity,
    nozzle: plan.nozzle,
    programme: plan.programme,
    axialFlow: plan.ambient.axialFlow,
    overPressure: plan.models.overPressure,
    formationBasis: plan.models.formationNumber,
    jet,
  }
}

/**
 * The pulse of a plan in its water.
 *
 * @param jet what the computed jet hands on; needed where the plan adopts it
 * @throws {DomainError}
 */
export function pulseOf(plan: Plan, water: WaterProperties, jet: ComputedJet | null = null): PulseResult {
  return computePulse(pulseInputOf(plan, water, jet))
}
