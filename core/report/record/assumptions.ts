/** Adopted models with their sources, and what the adopted values leave out. */
import { CHOICES } from '../../plan'
import { LAMINAR_BELOW, TURBULENT_ABOVE } from '../../ring'
import type { DocumentBlock } from '../document/types'
import { adoptedBasisInWords } from '../explanations'
import type { RecordContext } from './types'

type Adopted = readonly [subject: string, adopted: string, source: string]

/** Models this plan rests on. */
export function adoptedModels({ plan, data }: RecordContext): readonly Adopted[] {
  const { pulse, jet, wake, thruster, tankRun } = data
  const basis = adoptedBasisInWords(plan)
  const rows: Adopted[] = [['Water', CHOICES['water.kind'][plan.water.kind], data.water.sources.join(' ')]]
  if (pulse !== null)
    rows.push(
      [
        'Circulation, impulse and energy of a pulse',
        `${basis.overPressure}; ${plan.nozzle.exitProfile} exit profile`,
        'Slug model (common practice). Quick-start terms: Krueger 2005, J. Fluid Mech. 545:427.',
      ],
      [
        'Ring of the pulse',
        pulse.ring === null ? 'none expected' : pulse.ring.model,
        'Norbury 1973, J. Fluid Mech. 57:417, family of steady rings computed afresh; thin end Fraenkel 1972, J. Fluid Mech. 51:119.',
      ],
      [
        'Formation number',
        basis.formationNumber,
        'Gharib, Rambod & Shariff 1998, J. Fluid Mech. 360:121 (recalled, not re-read); each estimate under its own formula.',
      ],
    )
  if (plan.nozzle.shape === 'orifice' && pulse !== null)
    rows.push([
      'Contraction of the jet',
      plan.nozzle.contraction === null ? 'from the area ratio' : 'as given',
      '0.63 + 0.37 (area ratio)^3 unless given (recalled, not re-read); Limbourg & Nedic 2021, J. Fluid Mech.',
    ])
  if (jet !== null || plan.models.overPressure === 'computed' || plan.models.formationNumber === 'computed')
    rows.push([
      'Starting jet',
      plan.jet?.ensemble === false ? 'vortex sheet, one smoothing length' : 'vortex sheet, usual smoothing lengths',
      'Method after Nitsche & Krasny 1994, J. Fluid Mech. 276:139; lip constant by Krueger 2005, J. Fluid Mech. 545:427.',
    ])
  if (wake !== null)
    rows.push([
      'Motion of rings',
      wake.wake.model === 'coaxial'
        ? `one axis, ${CHOICES['wake.law'][plan.wake?.law ?? 'thin']} law`
        : 'filaments in space, regularised',
      'Lamb, Hydrodynamics, art. 163; Rosenhead 1930 and Moore 1972 for the regularised kernel.',
    ])
  if (wake !== null || tankRun !== null) rows.push(['Ageing of rings', ageing({ plan, data }), AGEING_SOURCES])
  if (thruster !== null)
    rows.push(
      [
        'Thrust and power',
        'momentum and energy over one period, pulses that do not disturb one another',
        'Momentum balance; close neighbours: Athanassiadis & Hart 2016, arXiv 1604.05382.',
      ],
      ...dragModel(plan.thruster?.vehicle?.drag?.kind ?? null),
    )
  return rows
}

const AGEING_SOURCES = [
  'Laminar: Saffman 1970, Stud. Appl. Math. 49:371; later life Fukumoto & Kaplanski 2008, Phys. Fluids 20:053103 (recalled, not re-read).',
  'Turbulent: Maxworthy 1974, J. Fluid Mech. 64:227; Glezer & Coles 1990, J. Fluid Mech. 211:243 (recalled, not re-read).',
].join(' ')

function ageing({ plan, data }: Pick<RecordContext, 'plan' | 'data'>): string {
  const asked = plan.wake?.ageing ?? 'auto'
  if (plan.wake !== null && !plan.wake.viscous && data.tankRun === null) return 'left out: inviscid rings'
  if (asked !== 'auto') return asked
  const followed = [
    ...(data.wake === null ? [] : [data.wake.turbulent === null ? data.wake.ageing : 'both']),
    ...new Set((data.tankRun?.rings ?? []).map((ring) => ring.ageing)),
  ]
  const words = [...new Set(followed)].join(' and ')
  return `by ring Reynolds number (laminar below ${LAMINAR_BELOW}, turbulent above ${TURBULENT_ABOVE}, both between: common practice)${words === '' ? '' : `; here ${words}`}`
}

function dragModel(kind: 'area' | 'hull' | 'table' | null): Adopted[] {
  if (kind === null) return []
  const words = CHOICES['thruster.vehicle.drag.kind'][kind]
  const source = kind === 'hull' ? 'ITTC 1957 friction line with form factor.' : 'As given in the plan.'
  return [['Drag of the vehicle', words, source]]
}

/** What the adopted values leave out, beyond what the cautions tell of this plan. */
export function leftOut({ plan, data }: RecordContext): readonly string[] {
  const { pulse } = data
  return [
    ...(pulse !== null && plan.models.overPressure === 'off'
      ? [
          'Circulation, impulse and energy beyond the slug: the adopted values are those of the slug, the ranges show the quick start.',
        ]
      : []),
    ...(pulse !== null && data.jet === null && plan.models.formationNumber !== 'computed'
      ? ['The starting jet: this record has none computed.']
      : []),
    ...(pulse === null
      ? []
      : ['Viscosity while the ring forms, the boundary layer in the nozzle, waves round the ring.']),
    ...(data.wake !== null && plan.wake?.viscous === false ? ['Viscosity in the wake: rings keep their cores.'] : []),
    ...(data.thruster === null ? [] : ['What one pulse does to the next, and what the hull does to intake and jet.']),
    ...(data.tankRun === null ? [] : ['Vorticity that tank walls shed, motion left over from earlier runs.']),
    ...data.water.notes,
  ]
}

export function assumptionBlocks(context: RecordContext): readonly DocumentBlock[] {
  const items = leftOut(context)
  return [
    { kind: 'heading', text: 'Assumptions' },
    {
      kind: 'table',
      caption: 'Adopted models',
      columns: [{ title: 'Subject' }, { title: 'Adopted' }, { title: 'Source' }],
      rows: adoptedModels(context).map((row) => [...row]),
      flows: true,
    },
    ...(items.length === 0
      ? []
      : ([
          { kind: 'subheading', text: 'Left out' },
          { kind: 'list', items },
        ] as const)),
  ]
}
