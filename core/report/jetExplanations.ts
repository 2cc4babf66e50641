/** The answer to "why?" beside every value of the computed starting jet. */
import { FORMATION_STROKE, LIP_AVERAGE, type JetEnsemble } from '../coaxial'
import type { Plan } from '../plan'
import { formula, over, power, root, row, sub, words } from './mathml'
import { PUBLISHED_RING_ENERGY } from './jetPlots'
import type { Explanation } from './types'

export interface JetExplanationContext {
  readonly plan: Plan
  /** The plan's own stroke. */
  readonly own: JetEnsemble
  /** The runs that give the formation number; null where it was not reached. */
  readonly formation: JetEnsemble | null
}

type Maker = (context: JetExplanationContext) => Omit<Explanation, 'id'>
type Values = Explanation['values']

const METHOD =
  'Vortex sheet after Nitsche & Krasny 1994, J. Fluid Mech. 276:139: rings shed at the lip move one another and the bound rings of the tube, by a smoothed kernel.'
const RANGE =
  'A round tube whose rim is sharp. Not in the model: waves around the ring, turbulence, the boundary layer in the tube, cancellation of opposite vorticity.'

function present(entries: readonly { readonly name: string; readonly value: number | null; readonly unit: string }[]) {
  return entries.flatMap(({ name, value, unit }) => (value === null ? [] : [{ name, value, unit }]))
}

function perDelta(jet: JetEnsemble | null, read: (one: JetEnsemble['byDelta'][number]) => number | null, unit: string) {
  return present((jet?.byDelta ?? []).map((one) => ({ name: `at smoothing ${one.delta} D`, value: read(one), unit })))
}

/** Whether the model is meant for this exit, and why not. */
function exit({ plan, own }: JetExplanationContext): { readonly inside: boolean; readonly words: string } {
  if (plan.nozzle.shape !== 'tube')
    return { inside: false, words: 'Outside: this exit is no tube, and the computed jet leaves one.' }
  if (plan.nozzle.axisRatio !== 1) return { inside: false, words: 'Outside: this exit is not round.' }
  if (own.status !== 'done') return { inside: false, words: 'The run did not come to its end.' }
  return { inside: true, words: 'Inside: a round tube.' }
}

function judged(context: JetExplanationContext, sentence = ''): { readonly inside: boolean; readonly verdict: string } {
  const { inside, words } = exit(context)
  return { inside, verdict: sentence === '' ? words : `${words} ${sentence}` }
}

const formationNumber: Maker = (context) => {
  const { formation, own } = context
  const number = formation?.formationNumber ?? null
  const values: Values = [
    { name: 'stroke ratio of this plan', value: own.shown.strokeRatio, unit: '' },
    ...perDelta(formation, (one) => one.formationNumber, ''),
  ]
  return {
    title: 'Formation number, computed',
    mathml: formula('F =', over('1', 'D'), '∫ U d t', words('at'), sub('Γ', 'all'), '=', sub('Γ', 'ring')),
    formula:
      'The stroke ratio at which everything shed so far had the circulation that the ring keeps once it has pinched off.',
    values,
    source: `${METHOD} The rule for F is that of Gharib, Rambod & Shariff 1998, J. Fluid Mech. 360:121.`,
    mark: 'own study',
    range: `${RANGE} Where the ring is cut depends on the smoothing, for the cut falls between billows: the range over the smoothing lengths is the answer, not its mean.`,
    ...judged(
      context,
      number === null
        ? 'No ring pinched off, so there is no number.'
        : formation === own
          ? ''
          : `It was read from the same start with a stroke of ${FORMATION_STROKE} D.`,
    ),
  }
}

const ringCirculation: Maker = (context) => ({
  title: 'Circulation of the computed ring',
  mathml: formula(sub('Γ', 'ring'), '=', '∑', sub('Γ', 'i'), 'beyond', sub('x', 'cut')),
  formula:
    'Sum over the filaments beyond the cut, which lies at the least circulation along the axis behind the leading peak; mean over its first plateau.',
  values: [
    ...perDelta(context.own, (one) => one.ringCirculation, 'm²/s'),
    ...present([{ name: 'everything shed when the stroke ends', value: context.own.totalCirculation, unit: 'm²/s' }]),
  ],
  source: `${METHOD} Shedding averaged over ${LIP_AVERAGE} smoothing lengths of the wall, a choice made to agree with the over-pressure circulation of Krueger 2005, J. Fluid Mech. 545:427.`,
  mark: 'own study',
  range: RANGE,
  ...judged(context),
})

const ringEnergy: Maker = (context) => ({
  title: 'Dimensionless energy of the computed ring',
  mathml: formula(sub('E', 'n'), '=', over('E', row(root('ρ I'), power('Γ', '3/2')))),
  formula: 'Energy over the square root of density times impulse and over circulation to the power of 3/2.',
  values: [
    ...perDelta(context.own, (one) => one.ringDimensionlessEnergy, ''),
    { name: 'published for pinched rings, about', value: PUBLISHED_RING_ENERGY, unit: '' },
  ],
  source: 'About 0.3: Mohseni, Ran & Colonius 2001, J. Fluid Mech. 430:267 (recalled, not re-read).',
  mark: 'recalled',
  range: `${RANGE} The smoothing takes energy away: half of a young ring's at 0.1 D.`,
  ...judged(context),
})

const beyondSlug: Maker = (context) => ({
  title: 'Impulse beyond the slug',
  mathml: formula(
    'I −',
    sub('I', 'slug'),
    '=',
    'ρ π ∑',
    row(sub('Γ', 'i'), power(sub('r', 'i'), '2')),
    '−',
    sub('I', 'slug'),
  ),
  formula: 'Impulse of everything shed when the stroke ends, less that of the slug.',
  values: [
    { name: 'circulation beyond the slug', value: context.own.circulationBeyondSlug, unit: 'm²/s' },
    { name: 'impulse beyond the slug', value: context.own.impulseBeyondSlug, unit: 'N·s' },
    { name: 'energy beyond the slug', value: context.own.energyBeyondSlug, unit: 'J' },
  ],
  source: METHOD,
  mark: 'own study',
  range: `${RANGE} Energy beyond the slug is low, often negative, from the smoothing.`,
  ...judged(context),
})

const stoppingVortex: Maker = (context) => ({
  title: 'Stopping vortex',
  mathml: formula(sub('Γ', 'stop'), '=', '∑', sub('Γ', 'i'), '< 0'),
  formula:
    'Sum of the negative circulations: what the lip sheds when the stroke ends and the fluid outside flows past it.',
  values: [{ name: 'stopping circulation', value: context.own.shown.stoppingCirculation, unit: 'm²/s' }],
  source: METHOD,
  mark: 'own study',
  range: `${RANGE} It goes on growing slowly while the run does.`,
  ...judged(context),
})

const drift: Maker = (context) => ({
  title: 'Drift',
  mathml: formula(over('Δ I', 'I'), ',', over('Δ E', 'E')),
  formula:
    'Change of impulse and energy of the sheet, over their values, in a short flight without tube and core growth, in which both are conserved.',
  values: present([
    { name: 'impulse', value: context.own.drift?.impulse ?? null, unit: '' },
    { name: 'energy', value: context.own.drift?.energy ?? null, unit: '' },
  ]),
  source: 'An identity: without walls and viscosity the equations of motion conserve both.',
  mark: 'identity',
  range: 'Impulse below 0.001 and energy below 0.005 are meant to hold.',
  inside: context.own.drift !== null && context.own.drift.impulse < 1e-3 && context.own.drift.energy < 5e-3,
  verdict:
    context.own.drift === null
      ? 'Not measured: the run did not come to its end.'
      : context.own.drift.impulse < 1e-3 && context.own.drift.energy < 5e-3
        ? 'Both hold.'
        : 'Larger than meant: read the numbers with care.',
})

const EXPLANATIONS = {
  'jet.formationNumber': formationNumber,
  'jet.ringCirculation': ringCirculation,
  'jet.ringEnergy': ringEnergy,
  'jet.beyondSlug': beyondSlug,
  'jet.stoppingVortex': stoppingVortex,
  'jet.drift': drift,
} as const satisfies Readonly<Record<string, Maker>>

export type JetExplanationId = keyof typeof EXPLANATIONS

/** Every value of the computed jet that answers "why?". */
export const JET_EXPLANATION_IDS: readonly JetExplanationId[] = Object.keys(EXPLANATIONS).filter(
  (id): id is JetExplanationId => id in EXPLANATIONS,
)

/** The explanation of one value of the computed jet. */
export function explainJet(id: JetExplanationId, context: JetExplanationContext): Explanation {
  return { id, ...EXPLANATIONS[id](context) }
}
