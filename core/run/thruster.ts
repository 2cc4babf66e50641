/**
 * The thruster of a plan: its figures as it stands, and the sizing where a search is asked for.
 */
import { DomainError } from '../base'
import type { Plan } from '../plan'
import type { ComputedJet } from '../pulse'
import type { SizingResult, ThrusterInput, ThrusterResult, ThrusterSection } from '../thruster'
import type { WaterProperties } from '../water'
import { pulseInputOf } from './pulse'
import type { WakeRunOptions } from './options'

export interface ThrusterData {
  readonly result: ThrusterResult
  /** Null where the plan has no search with something to aim at, or none was wanted. */
  readonly sizing: SizingResult | null
}

/**
 * What `analyseThruster` takes from a plan.
 *
 * @param jet what the computed jet hands on, where the plan adopts it; null else
 * @throws {DomainError} on train.period where the plan has no train
 */
export function thrusterInputOf(
  plan: Plan,
  section: ThrusterSection,
  water: WaterProperties,
  jet: ComputedJet | null,
): ThrusterInput {
  return {
    section,
    pulse: pulseInputOf(plan, water, jet),
    vapourPressure: water.vapourPressure,
    absolutePressure: water.absolutePressure,
    frequency: 1 / requirePeriod(plan),
  }
}

/** @throws {DomainError} on train.period */
export function requirePeriod({ train }: Plan): number {
  if (train !== null) return train.period
  throw new DomainError(
    'train.period',
    'train.period must be given: one over it is how often a thruster pulses, and the plan has no train',
  )
}

/** Whether a section asks for a sizing: ranges to search, and something to aim at. */
export function asksForSizing({ search, target }: ThrusterSection): boolean {
  return search !== null && (target.length > 0 || search.goal === 'thrust')
}

/** Search for designs. @throws {DomainError} as `sizeThruster` */
export async function sizingOf(input: ThrusterInput, options: WakeRunOptions): Promise<SizingResult> {
  const { sizeThruster } = await import('./sizeThruster')
  return sizeThruster(input, {
    ...(options.signal === undefined ? {} : { signal: options.signal }),
    ...(options.pause === undefined ? {} : { pause: options.pause }),
    ...(options.onProgress === undefined ? {} : { onProgress: options.onProgress }),
  })
}
