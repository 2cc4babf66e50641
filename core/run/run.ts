/**
 * A plan in, results out: what is asked for, in order, with progress and cancellation.
 *
 * Sections that most runs do without are imported when they are asked for, so that the page opens without them.
 */
import { DomainError } from '../base'
import { cautionsFor, startsFromJet, type Plan, type SpreadSection } from '../plan'
import type { ComputedJet } from '../pulse'
import { analyseThruster } from '../thruster'
import { waterProperties } from '../water'
import { freezeDeep } from './freeze'
import { adoptsJet, computedJet, knownJetOf, type JetRunOptions } from './jet'
import { createJetCache } from './jetCache'
import type { JetData } from './jetTypes'
import { pulseOf } from './pulse'
import { holdsReadings, readingsInputOf } from './readings'
import { sharesOf, type CostlyPart, type Share } from './shares'
import { sweepDesign, sweepRows, type SweepOptions } from './sweep'
import type { SweepData } from './sweepData'
import { tankRunInputOf } from './tankRun'
import { asksForSizing, requirePeriod, sizingOf, thrusterInputOf } from './thruster'
import { SECTIONS, type RunData, type RunRequest, type RunResult, type Section } from './types'
import type { WakeData } from './wake'

/** Sections this plan holds and this version computes. */
export function availableSections(plan: Plan): readonly Section[] {
  const pulsed = plan.absent.length === 0
  const holds: Readonly<Record<Section, boolean>> = {
    water: true,
    pulse: pulsed,
    jet: pulsed && plan.jet !== null,
    wake: plan.wake !== null,
    thruster: pulsed && plan.thruster !== null,
    tankRun: pulsed && plan.tankRun !== null,
    readings: pulsed && holdsReadings(plan),
    sweep: plan.sweep !== null && plan.sweep.fields.length > 0,
    spread: pulsed && plan.spread !== null && drawsAnything(plan.spread),
  }
  return SECTIONS.filter((section) => holds[section])
}

function drawsAnything({ relative, absolute }: SpreadSection): boolean {
  return Object.keys(relative).length + Object.keys(absolute).length > 0
}

/** What a run has come to. */
type RunState = Omit<RunData, 'cautions'> & {
  /** The jet that the pulse read, asked for or not. */
  readonly formed: JetData | null
  readonly jetMissing: string | null
}

const NOTHING_YET = {
  pulse: null,
  jet: null,
  wake: null,
  thruster: null,
  tankRun: null,
  readings: null,
  sweep: null,
  spread: null,
  formed: null,
  jetMissing: null,
} as const

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
    state = { water, ...NOTHING_YET }
    const wants = (section: Section): boolean => request.sections.includes(section)
    const wantsPulse = wants('pulse') || (wants('wake') && needsPulse(plan))
    const missing = missingPart(plan, request.sections, wantsPulse)
    if (missing !== null) return ended('failed', missing)
    await refuseEarly(plan, request.sections)
    const readsJet = wants('jet') || needsJet(plan, request.sections, wantsPulse)
    const progress = sharesOf(costlyParts(plan, request, readsJet))
    const part = (name: CostlyPart): JetRunOptions => within(options, progress(name))
    if (wantsPulse || readsJet) {
      options.onProgress?.({ share: 0.01, what: 'pulse' })
      await Promise.resolve()
      if (isCancelled(options)) return ended('cancelled', 'Cancelled after water.')
    }
    let known: ComputedJet | null = null
    if (readsJet && request.jet === 'cached') {
      const found = knownJetOf(plan, water, options.jetCache ?? createJetCache())
      state = { ...state, jet: wants('jet') ? found.jet : null, formed: found.jet, jetMissing: found.missing }
      known = found.computed
    } else if (readsJet) {
      const { jetOf } = await import('./formJet')
      const jet = await jetOf(plan, water, part('jet'))
      state = { ...state, jet: wants('jet') ? jet : null, formed: jet }
      if (jet.status !== 'done') return ended(jet.status, jet.message)
      known = computedJet(jet)
    }
    if (wantsPulse) state = { ...state, pulse: pulseOf(plan, water, known) }
    // Other sections than the pulse read the jet only where the plan adopts it, so that they do not depend on what else is asked for.
    const adopted = adoptsJet(plan) ? known : null
    if (wants('wake') && plan.wake !== null) {
      const [{ wakeOf }, { wakeJetRun }] = await Promise.all([import('./wake'), import('./wakeJet')])
      const start = startsFromJet(plan.wake)
        ? await wakeJetRun(plan, plan.wake, water, state.formed, part('start'))
        : null
      if (start !== null && start.status !== 'done') return ended(start.status, start.message)
      const wake: WakeData = await wakeOf(plan, plan.wake, water, state.pulse, part('wake'), start)
      state = { ...state, wake }
      if (wake.wake.status !== 'done') return ended(wake.wake.status, wake.wake.message)
      if (wake.turbulent?.status === 'cancelled') return ended('cancelled', wake.turbulent.message)
    }
    if (wants('thruster') && plan.thruster !== null) {
      options.onProgress?.({ share: progress('thruster').from, what: 'thruster' })
      const input = thrusterInputOf(plan, plan.thruster, water, adopted)
      const result = analyseThruster(input)
      state = { ...state, thruster: { result, sizing: null } }
      if (makesSizing(plan, request)) {
        const sizing = await sizingOf(input, part('sizing'))
        state = { ...state, thruster: { result, sizing } }
        if (sizing.status !== 'done') return ended(sizing.status, sizing.message)
      }
    }
    if (wants('tankRun') && plan.tankRun !== null) {
      const { planTankRun } = await import('./planTankRun')
      const { combined, ...day } = tankRunInputOf(plan, plan.tankRun, water, adopted)
      const judged = request.order === 'plain' || combined === undefined ? {} : { combined }
      const tankRun = await planTankRun({ ...day, ...judged }, part('tankRun'))
      state = { ...state, tankRun }
      if (tankRun.status !== 'done') return ended(tankRun.status, tankRun.message)
    }
    if (wants('readings')) {
      const { from } = progress('readings')
      options.onProgress?.({ share: from, what: 'readings' })
      const { compareReadings } = await import('./compareReadings')
      const readings = compareReadings(
        readingsInputOf(plan, {
          water,
          jet: adopted,
          // A pulse that was asked for may read a jet that the plan does not adopt.
          pulse: null,
          thruster: state.thruster?.result ?? null,
          fields: request.fields ?? null,
        }),
      )
      state = { ...state, readings }
    }
    if (wants('sweep')) {
      const sweep = await sweepRows(plan, run, part('sweep'))
      state = { ...state, sweep }
      if (sweep.status !== 'done') return ended(sweep.status, sweep.message)
    }
    if (wants('spread') && plan.spread !== null) {
      const { spreadOf } = await import('./spread')
      const spread = await spreadOf(plan, plan.spread, water, adopted, part('spread'))
      state = { ...state, spread }
      if (spread.status !== 'done') return ended(spread.status, spread.message)
    }
    return ended('done', 'Done.')
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    return { ...ended('failed', error.message), field: error.field }
  } finally {
    options.onProgress?.({ share: 1, what: 'done' })
  }
}

/**
 * Compute the sweep of a plan, or a part of it, row by row.
 *
 * @throws {DomainError} on sweep.fields or sweep.results
 */
export function sweepOf(plan: Plan, options: SweepOptions = {}): Promise<SweepData> {
  return sweepRows(plan, run, options)
}

/** What stands against computing these sections, in a sentence; null where nothing does. */
function missingPart(plan: Plan, sections: readonly Section[], wantsPulse: boolean): string | null {
  if (sections.includes('wake') && plan.wake === null)
    return 'The plan has no wake section: there are no rings to follow.'
  if (sections.includes('jet') && plan.jet === null && !adoptsJet(plan))
    return 'The plan has no jet section: there is no starting jet to compute.'
  if (sections.includes('thruster') && plan.thruster === null)
    return 'The plan has no thruster section: there is no thruster to compute.'
  if (sections.includes('tankRun') && plan.tankRun === null)
    return 'The plan has no tankRun section: there is no day to plan.'
  if (sections.includes('readings') && !holdsReadings(plan))
    return 'The plan holds no readings: there is nothing to compare.'
  if (sections.includes('sweep') && plan.sweep === null)
    return 'The plan has no sweep section: there are no rows to compute.'
  if (sections.includes('spread') && plan.spread === null)
    return 'The plan has no spread section: there is nothing to draw.'
  const pulsed = wantsPulse || sections.some((section) => NEED_PULSE.includes(section))
  return pulsed && plan.absent.length > 0
    ? `The plan has no ${plan.absent.join(' and no ')}: a pulse needs both.`
    : null
}

const NEED_PULSE: readonly Section[] = ['jet', 'thruster', 'tankRun', 'readings', 'spread']

/** Refusals that need no computation, told before a long one begins. @throws {DomainError} */
async function refuseEarly(plan: Plan, sections: readonly Section[]): Promise<void> {
  const readsThruster = sections.includes('thruster') || (sections.includes('spread') && plan.thruster !== null)
  if (readsThruster) requirePeriod(plan)
  if (sections.includes('sweep')) sweepDesign(plan)
  if (sections.includes('spread') && plan.spread !== null) {
    const { checkSpread } = await import('./spread')
    checkSpread(plan, plan.spread)
  }
}

/** What of a run takes long, in the order it is computed. */
function costlyParts(plan: Plan, request: RunRequest, readsJet: boolean): readonly CostlyPart[] {
  const wants = (section: Section): boolean => request.sections.includes(section)
  const runsJet = readsJet && request.jet !== 'cached'
  // A jet that is there already is what a wake starts from.
  const starts = wants('wake') && plan.wake !== null && startsFromJet(plan.wake) && !runsJet
  const all: readonly (readonly [part: CostlyPart, isComputed: boolean])[] = [
    ['jet', runsJet],
    ['start', starts],
    ['wake', wants('wake')],
    ['thruster', wants('thruster')],
    ['sizing', wants('thruster') && makesSizing(plan, request)],
    ['tankRun', wants('tankRun')],
    ['readings', wants('readings')],
    ['sweep', wants('sweep')],
    ['spread', wants('spread')],
  ]
  return all.flatMap(([part, isComputed]) => (isComputed ? [part] : []))
}

function makesSizing({ thruster }: Plan, request: RunRequest): boolean {
  return request.sizing !== 'off' && thruster !== null && asksForSizing(thruster)
}

function finishedData(plan: Plan, state: RunState): RunData {
  const { formed, jetMissing, ...data } = state
  const { water, pulse, wake, thruster, tankRun, spread } = data
  const cautions = cautionsFor({
    plan,
    water,
    pulse,
    jet: formed,
    jetMissing,
    wake: wake?.wake ?? null,
    wakeNotes: wake?.notes ?? [],
    thruster: thruster?.result ?? null,
    sizing: thruster?.sizing ?? null,
    tankRun,
    spread,
  })
  return freezeDeep({ ...data, cautions })
}

/** Options of a part of the run, whose progress is a part of the whole. It never falls: a jet learns on its way how long it will be. */
function within(options: JetRunOptions, { from, share }: Share): JetRunOptions {
  let most = 0
  return {
    ...options,
    onProgress: ({ share: done, what }) => {
      most = Math.max(most, done)
      options.onProgress?.({ share: from + share * most, what })
    },
  }
}

/** Sections with a pulse of their own, which reads the jet where the plan adopts it. */
const ADOPT_JET: readonly Section[] = ['thruster', 'tankRun', 'readings', 'spread']

/** Whether the wake follows the rings of the pulse. */
function needsPulse(plan: Plan): boolean {
  return plan.wake !== null && plan.wake.rings.length === 0
}

/**
 * Whether the pulse reads the computed jet: where the plan adopts it, and where the plan has one and the pulse itself is asked for, whose
 * formation numbers show it beside the others.
 */
function needsJet(plan: Plan, sections: readonly Section[], wantsPulse: boolean): boolean {
  const adopted = wantsPulse || sections.some((section) => ADOPT_JET.includes(section))
  return (adopted && adoptsJet(plan)) || (sections.includes('pulse') && plan.jet !== null)
}

function isCancelled(options: JetRunOptions): boolean {
  return options.signal?.aborted === true
}
