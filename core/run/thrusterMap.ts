/**
 * The map of a plan's thruster: every choice of two of its fields around the plan as it stands.
 */
import { DomainError } from '../base'
import type { Plan } from '../plan'
import { compileProgramme } from '../pulse'
import { compileDesigns, designMap, type Design, type DesignField, type DesignMap, type Span } from '../thruster'
import { waterProperties } from '../water'
import { adoptsJet, knownJetOf } from './jet'
import type { JetCache } from './jetCache'
import { thrusterInputOf } from './thruster'

export interface ThrusterMapRequest {
  readonly x: { readonly field: DesignField; readonly span: Span }
  readonly y: { readonly field: DesignField; readonly span: Span }
  /** Places along each axis. */
  readonly count: number
  /** planned: every choice pulses as often as the plan. asked: as often as the duty points need. */
  readonly pulsing: 'planned' | 'asked'
}

export interface ThrusterMap {
  readonly map: DesignMap
  /** The plan as a design: its frequency null where the duty points set it. */
  readonly present: Design
}

export type ThrusterMapResult =
  | ({ readonly status: 'done' } & ThrusterMap)
  | { readonly status: 'failed'; readonly message: string; readonly field: string }

/**
 * The plan as a design of its own map. Pulsing as planned, the eject share is what its stroke takes, so that the map is the plan's own
 * where it stands; pulsing as asked, it is the actuator's, as for the candidates of a sizing.
 *
 * @throws {DomainError} on a programme that is refused, or train.period
 */
export function designOfPlan(plan: Plan, pulsing: ThrusterMapRequest['pulsing']): Design {
  const { thruster, nozzle, train } = plan
  if (thruster === null || train === null)
    throw new DomainError('train.period', 'train.period must be given for a thruster: the plan has no train')
  const { stroke, duration } = compileProgramme(plan.programme)
  const { valveLag, ejectShare } = thruster.actuator
  return {
    diameter: nozzle.diameter,
    strokeRatio: stroke / nozzle.diameter,
    count: thruster.count,
    ejectShare: pulsing === 'planned' ? (duration + valveLag) / train.period : ejectShare,
    frequency: pulsing === 'planned' ? 1 / train.period : null,
  }
}

/**
 * Compute a map: some thousand designs, a fraction of a second.
 *
 * @param cache where a computed jet that the plan adopts is looked for; without one the map does without
 * @returns a sentence and the field it belongs to where the plan gives no map
 */
export function thrusterMap(plan: Plan, request: ThrusterMapRequest, cache: JetCache): ThrusterMapResult {
  try {
    const water = waterProperties(plan.water)
    if (plan.thruster === null)
      throw new DomainError('thruster', 'thruster must be given for a map: the plan has no such section')
    const jet = adoptsJet(plan) ? knownJetOf(plan, water, cache).computed : null
    const designs = compileDesigns(thrusterInputOf(plan, plan.thruster, water, jet))
    const present = designOfPlan(plan, request.pulsing)
    const axis = ({ field, span }: ThrusterMapRequest['x']) => ({ field, span, count: request.count })
    const map = designMap(designs, present, axis(request.x), axis(request.y))
    return { status: 'done', map, present }
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    return { status: 'failed', message: error.message, field: error.field }
  }
}
