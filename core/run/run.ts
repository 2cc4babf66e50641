/**
 * A plan in, results out: what is asked for, in order, with progress and cancellation.
 */
import { DomainError } from '../base'
import { cautionsFor, startsFromJet, type Plan } from '../plan'
import { computePulse, type ComputedJet, type PulseResult } from '../pulse'
import { waterProperties, type WaterProperties } from '../water'
import { freezeDeep } from './freeze'
import { adoptsJet, computedJet, jetOf, knownJetOf, type JetRunOptions } from './jet'
import { createJetCache } from './jetCache'
import type { JetData } from './jetTypes'
import { SECTIONS, type RunData, type RunResult, type Section } from './types'
import { wakeOf, type WakeData } from './wake'
import { wakeJetRun } from './wakeJet'

export interface RunRequest {
  /** Sections wanted; water is always computed, and what a section depends on is computed with it. */
  readonly sections: readonly Section[]
  /**
   * run (as it is where it is not given): a starting jet that is wanted or depended on is computed. cached: it is only looked for among
   * the finished ones of `jetCache`; where it is not there, the pulse does without, and a caution says so. For runs at every change.
   */
  readonly jet?: 'run' | 'cached'
}

/** Sections this plan holds and this version computes. */
export function availableSections(plan: Plan): readonly Section[] {
  return SECTIONS.filter((section) => {
    if (section === 'pulse') return plan.absent.length === 0
    if (section === 'jet') return plan.jet !== null && plan.absent.length === 0
    return section !== 'wake' || plan.wake !== null
  })
}

/** What a run has come to. */
type RunState = Omit<RunData, 'cautions'> & {
  /** The jet that the pulse read, asked for or not. */
  readonly formed: JetData | null
  readonly jetMissing: string | null
}

/**
 * Compute sections of a plan.
 *
 * @returns status 'done' with frozen data; 'cancelled' with what was finished; 'failed' with a sentence where valid input
 *   cannot be computed or the plan breaks a limit the decoder does not know, with what was finished before.
 */
export async function run(plan: Plan, request: RunRequest, options: JetRunOptions = {}): Promise<RunResult> {
  let state: RunState | null = null
  const ended = (status: RunResult['status'], message: string): RunResult => ({
    status,
    message,
    data: state === null ? null : finishedData(plan, state),
  })
  if (isCancelled(options)) return ended('cancelled', 'Cancelled before it started.')
  try {
    options.onProgress?.({ share: 0, what: 'water' })
    const water = waterProperties(plan.water)
    state = { water, pulse: null, jet: null, wake: null, formed: null, jetMissing: null }
    const wantsWake = request.sections.includes('wake')
    const wantsJet = request.sections.includes('jet')
    if (wantsWake && plan.wake === null)
      return ended('failed', 'The plan has no wake section: there are no rings to follow.')
    if (wantsJet && plan.jet === null && !adoptsJet(plan))
      return ended('failed', 'The plan has no jet section: there is no starting jet to compute.')
    const wantsPulse = request.sections.includes('pulse') || (wantsWake && needsPulse(plan))
    if ((wantsPulse || wantsJet) && plan.absent.length > 0)
      return ended('failed', `The plan has no ${plan.absent.join(' and no ')}: a pulse needs both.`)
    const readsJet = wantsJet || needsJet(plan, request.sections, wantsPulse)
    if (wantsPulse || readsJet) {
      options.onProgress?.({ share: 0.01, what: 'pulse' })
      await Promise.resolve()
      if (isCancelled(options)) return ended('cancelled', 'Cancelled after water.')
    }
    if (readsJet && request.jet === 'cached') {
      const known = knownJetOf(plan, water, options.jetCache ?? createJetCache())
      state = { ...state, jet: wantsJet ? known.jet : null, formed: known.jet, jetMissing: known.missing }
      if (wantsPulse) state = { ...state, pulse: pulseOf(plan, water, known.computed) }
    } else {
      if (readsJet) {
        const jet = await jetOf(plan, water, within(options, 0.02, wantsWake ? 0.6 : 0.97))
        state = { ...state, jet: wantsJet ? jet : null, formed: jet }
        if (jet.status !== 'done') return ended(jet.status, jet.message)
      }
      if (wantsPulse)
        state = { ...state, pulse: pulseOf(plan, water, state.formed === null ? null : computedJet(state.formed)) }
    }
    if (wantsWake && plan.wake !== null) {
      const from = readsJet || startsFromJet(plan.wake) ? 0.62 : 0.02
      const start = startsFromJet(plan.wake)
        ? await wakeJetRun(plan, plan.wake, water, state.formed, within(options, 0.02, from - 0.02))
        : null
      if (start !== null && start.status !== 'done') return ended(start.status, start.message)
      const marching = within(options, from, 0.99 - from)
      const wake: WakeData = await wakeOf(plan, plan.wake, water, state.pulse, marching, start)
      state = { ...state, wake }
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

function finishedData(plan: Plan, state: RunState): RunData {
  const { formed, jetMissing, ...data } = state
  const { water, pulse, wake } = data
  const cautions = cautionsFor({
    plan,
    water,
    pulse,
    jet: formed,
    jetMissing,
    wake: wake?.wake ?? null,
    wakeNotes: wake?.notes ?? [],
  })
  return freezeDeep({ ...data, cautions })
}

/** Options of a part of the run, whose progress is a part of the whole. It never falls: a jet learns on its way how long it will be. */
function within(options: JetRunOptions, from: number, share: number): JetRunOptions {
  let most = 0
  return {
    ...options,
    onProgress: ({ share: done, what }) => {
      most = Math.max(most, done)
      options.onProgress?.({ share: from + share * most, what })
    },
  }
}

/** Whether the wake follows the rings of the pulse. */
function needsPulse(plan: Plan): boolean {
  return plan.wake !== null && plan.wake.rings.length === 0
}

/**
 * Whether the pulse reads the computed jet: where the plan adopts it, and where the plan has one and the pulse itself is asked for, whose
 * formation numbers show it beside the others.
 */
function needsJet(plan: Plan, sections: readonly Section[], wantsPulse: boolean): boolean {
  return (wantsPulse && adoptsJet(plan)) || (sections.includes('pulse') && plan.jet !== null)
}

function isCancelled(options: JetRunOptions): boolean {
  return options.signal?.aborted === true
}

/**
 * The pulse of a plan in its water.
 *
 * @param jet what the computed jet hands on; needed where the plan adopts it
 * @throws {DomainError}
 */
export function pulseOf(plan: Plan, water: WaterProperties, jet: ComputedJet | null = null): PulseResult {
  return computePulse({
    density: water.density,
    kinematicViscosity: water.kinematicViscosity,
    nozzle: plan.nozzle,
    programme: plan.programme,
    axialFlow: plan.ambient.axialFlow,
    overPressure: plan.models.overPressure,
    formationBasis: plan.models.formationNumber,
    jet,
  })
}
