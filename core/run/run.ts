/**
 * A plan in, results out: what is asked for, in order, with progress and cancellation.
 */
import { DomainError, type RunOptions } from '../base'
import { cautionsFor, type Plan } from '../plan'
import { computePulse, type PulseResult } from '../pulse'
import { waterProperties, type WaterProperties } from '../water'
import { freezeDeep } from './freeze'
import { SECTIONS, type RunData, type RunResult, type Section } from './types'

export interface RunRequest {
  /** Sections wanted; water is always computed. */
  readonly sections: readonly Section[]
}

/** Sections this plan holds and this version computes. */
export function availableSections(plan: Plan): readonly Section[] {
  return SECTIONS.filter((section) => section !== 'pulse' || plan.absent.length === 0)
}

/**
 * Compute sections of a plan.
 *
 * @returns status 'done' with frozen data; 'cancelled' with what was finished; 'failed' with a sentence where valid input
 *   cannot be computed or the plan breaks a limit the decoder does not know.
 */
export async function run(plan: Plan, request: RunRequest, options: RunOptions = {}): Promise<RunResult> {
  if (isCancelled(options)) return { status: 'cancelled', message: 'Cancelled before it started.', data: null }
  try {
    options.onProgress?.({ share: 0, what: 'water' })
    const water = waterProperties(plan.water)
    if (!request.sections.includes('pulse')) return done(plan, water, null)
    if (plan.absent.length > 0)
      return {
        status: 'failed',
        message: `The plan has no ${plan.absent.join(' and no ')}: a pulse needs both.`,
        data: null,
      }
    options.onProgress?.({ share: 0.1, what: 'pulse' })
    await Promise.resolve()
    if (isCancelled(options))
      return { ...done(plan, water, null), status: 'cancelled', message: 'Cancelled after water.' }
    return done(plan, water, pulseOf(plan, water))
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    return { status: 'failed', message: error.message, field: error.field, data: null }
  } finally {
    options.onProgress?.({ share: 1, what: 'done' })
  }
}

function isCancelled(options: RunOptions): boolean {
  return options.signal?.aborted === true
}

/** The pulse of a plan in its water. @throws {DomainError} */
export function pulseOf(plan: Plan, water: WaterProperties): PulseResult {
  return computePulse({
    density: water.density,
    kinematicViscosity: water.kinematicViscosity,
    nozzle: plan.nozzle,
    programme: plan.programme,
    axialFlow: plan.ambient.axialFlow,
    overPressure: plan.models.overPressure,
    formationBasis: plan.models.formationNumber,
    jet: null,
  })
}

function done(plan: Plan, water: WaterProperties, pulse: PulseResult | null): RunResult {
  const data: RunData = { water, pulse, cautions: cautionsFor({ plan, water, pulse }) }
  return { status: 'done', message: 'Done.', data: freezeDeep(data) }
}
