/** Formulas of the main figures, with where each holds and whether this plan is inside. */
import type { DocumentBlock } from '../document/types'
import { explain, type ExplanationId } from '../explanations'
import { explainThruster, type ThrusterExplanationId } from '../explanationsThruster'
import { explainJet, type JetExplanationId } from '../jetExplanations'
import type { Explanation } from '../types'
import type { RecordContext } from './types'

const PULSE: readonly ExplanationId[] = [
  'ring.circulation',
  'ring.impulse',
  'ring.energy',
  'ring.speed',
  'ring.radius',
  'dimensionlessEnergy',
  'formation.energyLimit',
  'formation.carriedVolume',
  'formation.speedMatch',
  'formation.published',
  'margin',
  'jetReynolds',
  'ringReynolds',
  'ring.corePressure',
]
const JET: readonly JetExplanationId[] = [
  'jet.formationNumber',
  'jet.ringCirculation',
  'jet.ringEnergy',
  'jet.beyondSlug',
]
const THRUSTER: readonly ThrusterExplanationId[] = [
  'meanThrust',
  'speed',
  'totalPower',
  'froude',
  'overall',
  'thrustRatio',
  'cavity',
  'cavitationMargin',
  'ringSpacing',
  'costOfTransport',
  'endurance',
]

/** Explanations of the figures that were computed, in the order of the record. */
export function recordExplanations({ plan, data }: RecordContext): readonly Explanation[] {
  const { water, pulse, jet, thruster } = data
  const section = plan.thruster
  return [
    ...(pulse === null
      ? []
      : PULSE.filter((id) => pulse.ring !== null || !id.startsWith('ring')).map((id) =>
          explain(id, { plan, water, pulse }),
        )),
    ...(pulse === null || pulse.pinchedOff !== true ? [] : [explain('trailingJet', { plan, water, pulse })]),
    ...(jet === null ? [] : JET.map((id) => explainJet(id, { plan, own: jet.own, formation: jet.formation }))),
    ...(thruster === null || section === null
      ? []
      : THRUSTER.filter((id) => concerns(id, thruster.result)).map((id) =>
          explainThruster(id, { plan, section, water, thruster: thruster.result }),
        )),
  ]
}

type Result = NonNullable<RecordContext['data']['thruster']>['result']

/** Formulas of figures this thruster does not have are left out. */
function concerns(id: ThrusterExplanationId, { speed, costOfTransport, endurance, ringSpacing }: Result): boolean {
  if (id === 'speed' || id === 'froude' || id === 'overall') return speed > 0
  if (id === 'costOfTransport') return costOfTransport !== null
  if (id === 'endurance') return endurance !== null
  return id !== 'ringSpacing' || ringSpacing !== null
}

/** Stands for what the formula before has too. */
const AS_ABOVE = 'as above'

export function formulaBlocks(context: RecordContext): readonly DocumentBlock[] {
  const explanations = recordExplanations(context)
  if (explanations.length === 0) return []
  return [
    { kind: 'heading', text: 'Formulas' },
    ...explanations.map(({ title, mathml, formula, source, mark, range, inside, verdict }, i): DocumentBlock => ({
      kind: 'derivation',
      title,
      mathml,
      rows: [
        ['In words', formula],
        ['Source', explanations[i - 1]?.source === source ? AS_ABOVE : `${source} Mark: ${mark}.`],
        ['Holds for', explanations[i - 1]?.range === range ? AS_ABOVE : range],
        [inside ? 'This plan' : 'Take care', verdict],
      ],
    })),
  ]
}
