/**
 * What is known of the starting jet of a plan, and what the pulse takes from it. Computing one is in `formJet`, which is loaded when a jet is
 * asked for.
 */
import { DomainError } from '../base'
import {
  FORMATION_STROKE,
  checkJetInput,
  formationInput,
  SHOWN_DELTA,
  type JetEnsemble,
  type JetEnsembleInput,
} from '../coaxial'
import { JET_DEFAULTS, type Plan } from '../plan'
import type { ComputedJet } from '../pulse'
import type { WaterProperties } from '../water'
import type { JetCache } from './jetCache'
import type { JetData } from './jetTypes'
import type { WakeRunOptions } from './options'

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

/** The jet of a plan from its finished runs. */
export function jetData(
  plan: Plan,
  own: JetEnsemble,
  formation: JetEnsemble | null,
  status: JetData['status'],
  message: string,
): JetData {
  const notes: string[] = []
  if (formation !== null && formation !== own)
    notes.push(
      `The formation number is that of the same start${plan.programme.shape === 'table' ? ', the table stretched in time,' : ' and peak speed'} with a stroke of ${FORMATION_STROKE} D: the plan's own stroke of ${own.shown.strokeRatio.toFixed(2)} D is too short to tell it, for its end cuts the ring short, pinched off or not.`,
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

/** The jet of a plan whose longer stroke cannot be run. */
export function withoutFormation(plan: Plan, own: JetEnsemble, refused: DomainError): JetData {
  const data = jetData(plan, own, null, own.status, own.message)
  return {
    ...data,
    notes: [`No formation number: the longer stroke that it needs breaks a limit (${refused.message}).`, ...data.notes],
  }
}
