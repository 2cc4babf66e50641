/** The tank run of a plan. */
import { at } from '../base'
import type { Plan } from '../plan'
import type { ComputedJet } from '../pulse'
import type { CombinedInput, TankRunInput, TankRunSection } from '../tank'
import { waterProperties, type WaterProperties } from '../water'
import { pulseInputOf } from './pulse'
import { variedPlan } from './variedPlan'

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
    combined: (values) => combinedInput(plan, section, values, jet),
  }
}

/** The day with the matrix's fields at these levels. @throws {DomainError} where that plan cannot be */
function combinedInput(
  plan: Plan,
  section: TankRunSection,
  values: readonly number[],
  jet: ComputedJet | null,
): CombinedInput {
  const fields = section.matrix?.fields ?? []
  const levels = values.map((value, i) => ({ path: at(fields, i).path, value }))
  const varied = variedPlan(plan, levels, (i) => `tankRun.matrix.fields.${i}.path`)
  return {
    section: varied.tankRun ?? section,
    pulse: pulseInputOf(varied, waterProperties(varied.water), jet),
    ageing: varied.wake?.ageing ?? 'auto',
  }
}
