import type { Plan } from '../plan'
import type { PulseResult } from '../pulse'
import type { WaterProperties } from '../water'
import type { Explanation } from './types'

/** What an explanation may look at. */
export interface ExplanationContext {
  readonly plan: Plan
  readonly water: WaterProperties
  readonly pulse: PulseResult
}

export type ExplanationMaker = (context: ExplanationContext) => Omit<Explanation, 'id'>
