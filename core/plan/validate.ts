/**
 * What a plan being edited breaks. The same decoder that reads files judges it, so that a plan the window accepts is a plan
 * the runner accepts.
 */
import type { Problem } from '../base'
import { decodePlan } from './decodePlan'
import type { Plan } from './types'
import { planDocument } from './writePlan'

/** Every refusal of a plan; empty when it can be computed. */
export function validatePlan(plan: Plan): readonly Problem[] {
  const reading = decodePlan(planDocument(plan))
  return reading.ok ? [] : reading.problems
}
