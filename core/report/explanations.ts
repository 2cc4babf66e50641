/**
 * The answer to "why?" beside every found value: formula, the plan's numbers in it, source, range, and whether this plan is
 * inside it. The numbers are those of the results; nothing is computed anew.
 */
import { CHOICES, type Plan } from '../plan'
import type { ExplanationContext, ExplanationMaker } from './explanationTypes'
import { FORMATION_EXPLANATIONS } from './explanationsFormation'
import { RING_EXPLANATIONS } from './explanationsRing'
import { WATER_EXPLANATIONS } from './explanationsWater'
import type { Explanation } from './types'

const EXPLANATIONS = { ...RING_EXPLANATIONS, ...FORMATION_EXPLANATIONS, ...WATER_EXPLANATIONS }
export type ExplanationId = keyof typeof EXPLANATIONS

/** Every value that answers "why?". */
export const EXPLANATION_IDS: readonly ExplanationId[] = Object.keys(EXPLANATIONS).filter(
  (id): id is ExplanationId => id in EXPLANATIONS,
)

/** The explanation of one found value for this plan. */
export function explain(id: ExplanationId, context: ExplanationContext): Explanation {
  const make: ExplanationMaker = EXPLANATIONS[id]
  return { id, ...make(context) }
}

/** Words for the basis the user adopted, as shown beside results. */
export function adoptedBasisInWords(plan: Plan): { readonly overPressure: string; readonly formationNumber: string } {
  return {
    overPressure: CHOICES['models.overPressure'][plan.models.overPressure],
    formationNumber: CHOICES['models.formationNumber'][plan.models.formationNumber],
  }
}
