/** The tank run of a plan. */
import type { Plan } from '../plan'
import type { ComputedJet } from '../pulse'
import type { TankRunInput, TankRunSection } from '../tank'
import type { WaterProperties } from '../water'
import { pulseInputOf } from './pulse'

/** What the tank's room takes from a plan. @param jet what the computed jet hands on, where the plan adopts it; null else */
export function tankRunInputOf(
  plan: Plan,
  section: TankRunSection,
  water: WaterProperties,
  jet: ComputedJet | null,
): TankRunInput {
  return {
    section,
    pulse: pulseInputOf(plan, water, jet),
    ageing: plan.wake?.ageing ?? 'auto',
    water: plan.water.kind,
  }
}
