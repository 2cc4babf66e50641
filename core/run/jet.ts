/**
 * The starting jet of a plan: its own stroke for what leaves the tube, a long enough one for the formation number, and what the pulse
 * takes from both.
 */
import { DomainError } from '../base'
import {
  FORMATION_STROKE,
  checkJetInput,
  formationInput,
  SHOWN_DELTA,
  startingJetEnsemble,
  type JetEnsemble,
  type JetEnsembleInput,
} from '../coaxial'
import { loadKernel } from '../kernel'
import { JET_DEFAULTS, type Plan } from '../plan'
import { compileProgramme, type ComputedJet } from '../pulse'
import type { WaterProperties } from '../water'
import { createJetCache, type JetCache } from './jetCache'
import type { JetData } from './jetTypes'
import type { WakeRunOptions } from './wake'

/** Time between two shapes of the sheet in D / U_peak: close enough to play them one after another. */
const SHAPE_STEP = 0.05

export interface JetRunOptions extends WakeRunOptions {
  /** Finished jets; without one every run computes its own. */
  readonly jetCache?: JetCache
}

/** What is known of a jet without computing one. */
export interface KnownJet {
  /** The whole of it, where both its runs are known. */
  readonly jet: JetData | null
  /** What a pulse can take: nothing beyond the slug, and no formation number, while that is not known. */
  readonly computed: ComputedJet
  /** A sentence on what is missing and what to do; null where nothing is. */
  readonly missing: string | null
}

/** What a pulse takes from a jet that has not been computed: nothing. */
export const NO_JET: ComputedJet = {
  formationNumber: null,
  formationNumberLow: null,
  formationNumberHigh: null,
  circulationBeyondSlug: 0,
  impulseBeyondSlug: 0,
  energyBeyondSlug: 0,
}

/** Whether the plan adopts a value of the computed jet. */
export function adoptsJet({ models }: Plan): boolean {
  return models.overPressure === 'computed' || models.formationNumber === 'computed'
}

/**
 * Compute the starting jet of a plan, with defaults where it has no such section.
 *
 * The plan's own stroke comes first. Where it is too short to tell the formation number, the same start with a longer stroke is run for
 * that alone.
 *
 * @returns status 'cancelled' or 'failed' with what had been computed
 * @throws {DomainError} with the plan path of a value that no starting jet can be computed for
 */
export async function jetOf(plan: Plan, water: WaterProperties, options: JetRunOptions = {}): Promise<JetData> {
  const input = jetInput(plan, water)
  const longer = formationInput(input)
  const cache = options.jetCache ?? createJetCache()
  const twoRuns = longer !== input
  const share = twoRuns ? shareOfOwn(input, longer, cache) : 1
  const own = await ensembleOf(input, cache, options, 0, share)
  if (!twoRuns || own.status !== 'done')
    return jetData(plan, own, own.status === 'done' ? own : null, own.status, own.message)
  try {
    const formation = await ensembleOf(longer, cache, options, share, 1 - share)
    return jetData(
      plan,
      own,
      formation,
      formation.status,
      formation.status === 'done' ? own.message : formation.message,
    )
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    return withoutFormation(plan, own, error)
  }
}

/** What the finished jets kept so far tell of a plan. Computes nothing and refuses nothing. */
export function knownJetOf(plan: Plan, water: WaterProperties, cache: JetCache): KnownJet {
  const input = jetInput(plan, water)
  const refused = refusalOf(input)
  if (refused !== null)
    return { jet: null, computed: NO_JET, missing: `The starting jet cannot be computed: ${refused.message}.` }
  const own = cache.find(input)
  const longer = formationInput(input)
  const refusedLonger = longer === input ? null : refusalOf(longer)
  const formation = longer === input ? own : refusedLonger === null ? cache.find(longer) : null
  if (own !== null && (formation !== null || refusedLonger !== null)) {
    const jet =
      refusedLonger === null
        ? jetData(plan, own, formation, 'done', own.message)
        : withoutFormation(plan, own, refusedLonger)
    return { jet, computed: computedJet(jet), missing: null }
  }
  const computed = { ...NO_JET, ...(formation === null ? {} : formationPart(formation)) }
  return { jet: null, computed, missing: missingSentence(plan, formation !== null) }
}

function missingSentence(plan: Plan, formationKnown: boolean): string {
  const { overPressure, formationNumber } = plan.models
  const without = [
    ...(overPressure === 'computed' ? ['nothing is added to the slug'] : []),
    ...(formationNumber === 'computed' && !formationKnown ? ['no formation number is adopted'] : []),
  ]
  const meanwhile = without.length === 0 ? '' : `: until then ${without.join(' and ')}`
  return `The starting jet of this plan has not been computed yet${meanwhile}. Form it to see it.`
}

/**
 * What a pulse takes from a computed jet.
 *
 * The smoothing takes energy from the sheet, often more than the jet has beyond the slug. The excess pressure that gives impulse beyond
 * the slug does work on what leaves and can only add energy, so a negative value is an artefact, and 0 is handed on instead: taken as it
 * stands it would make the ring thicker and slower than either end of the range.
 */
export function computedJet({ own, formation }: JetData): ComputedJet {
  return {
    ...NO_JET,
    ...(formation === null ? {} : formationPart(formation)),
    circulationBeyondSlug: own.circulationBeyondSlug,
    impulseBeyondSlug: own.impulseBeyondSlug,
    energyBeyondSlug: Math.max(0, own.energyBeyondSlug),
  }
}

function formationPart({
  formationNumber,
  formationNumberLow,
  formationNumberHigh,
}: JetEnsemble): Pick<ComputedJet, 'formationNumber' | 'formationNumberLow' | 'formationNumberHigh'> {
  return { formationNumber, formationNumberLow, formationNumberHigh }
}

/** The jet a plan asks for, with defaults where it has no such section. */
export function jetInput(plan: Plan, water: WaterProperties): JetEnsembleInput {
  return {
    density: water.density,
    kinematicViscosity: water.kinematicViscosity,
    diameter: plan.nozzle.diameter,
    programme: plan.programme,
    axialFlow: plan.ambient.axialFlow,
    ...(plan.jet ?? JET_DEFAULTS),
    settings: { snapshotStep: SHAPE_STEP },
  }
}

/** Why no jet can be computed for this input, or null. */
function refusalOf(input: JetEnsembleInput): DomainError | null {
  try {
    checkJetInput({ ...input, delta: input.delta ?? SHOWN_DELTA })
    return null
  } catch (error) {
    if (error instanceof DomainError) return error
    throw error
  }
}

async function ensembleOf(
  input: JetEnsembleInput,
  cache: JetCache,
  options: JetRunOptions,
  from: number,
  share: number,
): Promise<JetEnsemble> {
  const known = cache.find(input)
  if (known !== null) return known
  const jet = slim(
    await startingJetEnsemble(input, {
      kernel: options.kernel ?? (await loadKernel()),
      ...(options.pause === undefined ? {} : { pause: options.pause }),
      ...(options.signal === undefined ? {} : { signal: options.signal }),
      onProgress: ({ share: done, what }) => options.onProgress?.({ share: from + share * done, what }),
    }),
  )
  if (jet.status === 'done') cache.keep(input, jet)
  return jet
}

/** The same with the shapes of the shown member only: the others are read for their numbers. */
function slim(jet: JetEnsemble): JetEnsemble {
  return { ...jet, runs: jet.runs.map((run) => (run === jet.shown ? run : { ...run, snapshots: [] })) }
}

/** Share of the work that the plan's own stroke takes: it grows with the cube of what has been shed. */
function shareOfOwn(input: JetEnsembleInput, longer: JetEnsembleInput, cache: JetCache): number {
  const work = (one: JetEnsembleInput): number =>
    cache.find(one) === null ? (compileProgramme(one.programme).stroke / one.diameter + 2) ** 3 : 0
  const own = work(input)
  const all = own + work(longer)
  return all === 0 ? 1 : own / all
}

function jetData(
  plan: Plan,
  own: JetEnsemble,
  formation: JetEnsemble | null,
  status: JetData['status'],
  message: string,
): JetData {
  const notes: string[] = []
  if (formation !== null && formation !== own)
    notes.push(
      `The formation number is that of the same start${plan.programme.shape === 'table' ? ', the table stretched in time,' : ' and peak speed'} with a stroke of ${FORMATION_STROKE} D: the plan's own stroke of ${own.shown.strokeRatio.toFixed(2)} D ends before a ring is full.`,
    )
  const { atStrokeEnd, beyondSlug } = own.shown
  if (atStrokeEnd !== null && beyondSlug !== null && own.energyBeyondSlug < 0) {
    const share = own.energyBeyondSlug / (atStrokeEnd.energy - beyondSlug.energy)
    notes.push(
      `The smoothing takes more energy from the computed jet than it has beyond the slug: ${(-100 * share).toFixed(0)} % of the slug's are missing. Where the computed jet is adopted, 0 is taken for the energy beyond the slug.`,
    )
  }
  return { status, message, own, formation, notes }
}

function withoutFormation(plan: Plan, own: JetEnsemble, refused: DomainError): JetData {
  const data = jetData(plan, own, null, own.status, own.message)
  return {
    ...data,
    notes: [`No formation number: the longer stroke that it needs breaks a limit (${refused.message}).`, ...data.notes],
  }
}
