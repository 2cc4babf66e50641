/** What the explanations of a thruster share. */
import type { Plan } from '../plan'
import { CLOSE_RINGS, type ThrusterResult, type ThrusterSection } from '../thruster'
import type { WaterProperties } from '../water'
import type { Explanation } from './types'

export interface ThrusterExplanationContext {
  readonly plan: Plan
  readonly section: ThrusterSection
  readonly water: WaterProperties
  readonly thruster: ThrusterResult
}

export type ThrusterExplanationMaker = (context: ThrusterExplanationContext) => Omit<Explanation, 'id'>

interface Given {
  readonly name: string
  readonly value: number | null
  readonly unit: string
}

/** Values that exist and have a bound. */
export function present(...entries: readonly Given[]): Explanation['values'] {
  return entries.flatMap(({ name, value, unit }) =>
    value === null || !Number.isFinite(value) ? [] : [{ name, value, unit }],
  )
}

export function value(name: string, number: number | null, unit = ''): Given {
  return { name, value: number, unit }
}

export const SLUG_PULSES =
  'Pulses that do not disturb one another: the jet of each leaves into water at rest but for the vehicle’s own speed.'
export const figure = (number: number): string => String(Number(number.toPrecision(3)))

/** Whether the mean figures hold here, and why not. */
export function pulseVerdict(
  { thruster }: ThrusterExplanationContext,
  sentence: string,
): Pick<Explanation, 'inside' | 'verdict'> {
  if (thruster.ringSpacing?.close === true)
    return {
      inside: false,
      verdict: `Outside: rings follow each other ${figure(thruster.ringSpacing.ratio)} radii apart, nearer than ${CLOSE_RINGS}, and move one another. ${sentence}`,
    }
  return { inside: true, verdict: `Inside. ${sentence}` }
}
