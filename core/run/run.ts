/**
 * A plan in, results out: what is asked for, in order, with progress and cancellation.
 */
import { DomainError } from '../base'
import { cautionsFor, type Plan } from '../plan'
import { computePulse, type PulseResult } from '../pulse'
import { waterProperties, type WaterProperties } from '../water'
import { freezeDeep } from './freeze'
import { SECTIONS, type RunData, type RunResult, type Section } from './types'
import { wakeOf, type WakeData, type WakeRunOptions } from './wake'

export interface RunRequest {
  /** Sections wanted; water is always computed, and what a section depends on is computed with it. */
  readonly sections: readonly Section[]
}

/** Sections this plan holds and this version computes. */
export function availableSections(plan: Plan): readonly Section[] {
  return SECTIONS.filter((section) => {
    if (section === 'pulse') return plan.absent.length === 0
    return section !== 'wake' || plan.wake !== null
  })
}

/**
 * Compute sections of a plan.
 *
 * @returns status 'done' with frozen data; 'cancelled' with what was finished; 'failed' with a sentence where valid input
 *   cannot be computed or the plan breaks a limit the decoder does not know, with what was finished before.
 */
export async function run(plan: Plan, request: RunRequest, options: WakeRunOptions = {}): Promise<RunResult> {
  let finished: Omit<RunData, 'cautions'> | null = null
  const ended = (status: RunResult['status'], message: string): RunResult => ({
    status,
    message,
    data:
      finished === null
        ? null
        : freezeDeep({
            ...finished,
            cautions: cautionsFor({
              plan,
              ...finished,
              wake: finished.wake?.wake ?? null,
              wakeNotes: finished.wake?.notes ?? [],
            }),
          }),
  })
  if (isCancelled(options)) return ended('cancelled', 'Cancelled before it started.')
  try {
    options.onProgress?.({ share: 0, what: 'water' })
    const water = waterProperties(plan.water)
    finished = { water, pulse: null, wake: null }
    const wantsWake = request.sections.includes('wake')
    if (wantsWake && plan.wake === null)
      return ended('failed', 'The plan has no wake section: there are no rings to follow.')
    if (request.sections.includes('pulse') || (wantsWake && needsPulse(plan))) {
      if (plan.absent.length > 0)
        return ended('failed', `The plan has no ${plan.absent.join(' and no ')}: a pulse needs both.`)
      options.onProgress?.({ share: 0.01, what: 'pulse' })
      await Promise.resolve()
      if (isCancelled(options)) return ended('cancelled', 'Cancelled after water.')
      finished = { ...finished, pulse: pulseOf(plan, water) }
    }
    if (wantsWake && plan.wake !== null) {
      const wake: WakeData = await wakeOf(plan, plan.wake, water, finished.pulse, {
        ...options,
        onProgress: ({ share, what }) => options.onProgress?.({ share: 0.02 + 0.97 * share, what }),
      })
      finished = { ...finished, wake }
      if (wake.wake.status !== 'done') return ended(wake.wake.status, wake.wake.message)
      if (wake.turbulent?.status === 'cancelled') return ended('cancelled', wake.turbulent.message)
    }
    return ended('done', 'Done.')
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    return { ...ended('failed', error.message), field: error.field }
  } finally {
    options.onProgress?.({ share: 1, what: 'done' })
  }
}

/** Whether the wake follows the rings of the pulse. */
function needsPulse(plan: Plan): boolean {
  return plan.wake !== null && plan.wake.rings.length === 0
}

function isCancelled(options: WakeRunOptions): boolean {
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
