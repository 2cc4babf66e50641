/** Why pinch-off is put where it is: each estimate, its source and the kind of pulse it was made for. */
import { formatFixed } from '../quantity'
import { HILL_DIMENSIONLESS_ENERGY } from '../ring'
import type { ExplanationContext, ExplanationMaker } from './explanationTypes'
import { formula, over, power, root, row, sub } from './mathml'
import type { Explanation } from './types'

type Estimate = 'energyLimit' | 'carriedVolume' | 'speedMatch'

function values({ plan, pulse }: ExplanationContext): Explanation['values'] {
  return [
    { name: 'stroke ratio L/D', value: pulse.strokeRatio, unit: '' },
    { name: 'start, in formation times', value: pulse.startFormationTime, unit: '' },
    { name: 'flow past the nozzle over peak speed', value: plan.ambient.axialFlow / pulse.peakSpeed, unit: '' },
  ]
}

function verdict(
  { pulse }: ExplanationContext,
  estimate: Estimate,
): { readonly inside: boolean; readonly verdict: string } {
  const value = pulse.formationNumber[estimate]
  const notes = pulse.formationNumber.notes.filter((candidate) => candidate.estimate === estimate)
  const note = notes.length === 0 ? undefined : notes.map(({ text }) => text).join(' ')
  if (value === null) return { inside: false, verdict: note ?? 'This estimate has no crossing for this programme.' }
  const stands = `The estimate is ${formatFixed(value)}; this stroke is ${formatFixed(pulse.strokeRatio)}.`
  return {
    inside: estimate === 'energyLimit' || pulse.quickStart,
    verdict: note === undefined ? stands : `${stands} ${note}`,
  }
}

const margin: ExplanationMaker = (context) => {
  const { adopted } = context.pulse.formationNumber
  const margin = context.pulse.margin
  return {
    title: 'Stroke left before pinch-off',
    mathml: formula('F −', over('L', 'D')),
    formula:
      'Formation number less stroke ratio, from the lowest to the highest of every estimate that has a value and the published band.',
    values: [
      ...values(context),
      ...[
        { name: 'adopted formation number', value: adopted },
        { name: 'lowest margin', value: margin?.low ?? null },
        { name: 'highest margin', value: margin?.high ?? null },
      ].flatMap(({ name, value }) => (value === null ? [] : [{ name, value, unit: '' }])),
    ],
    source:
      'The range is told, not one value: published experiments spread from 3.6 to 4.5 (Gharib, Rambod & Shariff 1998).',
    mark: 'published',
    range: 'Quick starts from a tube; other starts and nozzles by the modifiers named beside the estimates.',
    inside: adopted !== null && context.pulse.quickStart,
    verdict:
      adopted === null
        ? 'There is no adopted formation number for this plan.'
        : context.pulse.quickStart
          ? 'Inside: this is a quick start.'
          : 'Outside: the start is slow, and the published band was measured for quick starts.',
  }
}

const energyLimit: ExplanationMaker = (context) => ({
  title: 'Energy limit',
  mathml: formula(sub('E', 'n'), '=', over('E', row(root('ρ I'), power('Γ', '3/2'))), '= 0.33'),
  formula:
    'The stroke at which the dimensionless energy of the pulse has fallen to 0.33, below which a ring takes no more.',
  values: values(context),
  source:
    'Gharib, Rambod & Shariff 1998, J. Fluid Mech. 360:121 (recalled, not re-read); 0.33 is typical of steady-speed generators, de Guyon & Mulleners 2022.',
  mark: 'recalled',
  range: 'Generators with a steady speed. Rings from growing speeds were measured at 0.14 to 0.2 instead.',
  ...verdict(context, 'energyLimit'),
})

const carriedVolume: ExplanationMaker = (context) => ({
  title: 'Carried volume',
  mathml: formula(over('π', '4'), power('D', '2'), 'L =', sub('V', 'ring')),
  formula: 'The stroke at which the slug no longer fits into the fluid that the matched ring carries along.',
  values: values(context),
  source: 'After Linden & Turner 2001, J. Fluid Mech. 427:61, on the whole steady family.',
  mark: 'published',
  range: 'Quick starts only. The crossing is flat: one per cent of volume moves it by 0.2.',
  ...verdict(context, 'carriedVolume'),
})

const speedMatch: ExplanationMaker = (context) => ({
  title: 'Speed match',
  mathml: formula(sub('U', 'ring'), '=', over('U', '2')),
  formula: 'The stroke at which the matched ring moves at half the exit speed, as fast as the layer that feeds it.',
  values: values(context),
  source: 'After Mohseni & Gharib 1998, Phys. Fluids 10:2436, and Shusser & Gharib 2000.',
  mark: 'published',
  range:
    'Quick starts only. On the whole steady family it gives 3.06 for a steady speed, where the paper’s own limits of circulation, 1.77 to 2.07, bracket 3.8.',
  ...verdict(context, 'speedMatch'),
})

const published: ExplanationMaker = (context) => {
  const band = context.pulse.formationNumber.published
  const notes = context.pulse.formationNumber.notes.filter(
    ({ estimate }) => estimate === 'published' || estimate === 'modifier',
  )
  return {
    title: 'Published band',
    mathml: formula('3.6 ≤ F ≤ 4.5'),
    formula: 'Formation numbers measured for quick starts from a tube, with the modifiers of this nozzle and flow.',
    values: values(context),
    source: 'Gharib, Rambod & Shariff 1998, J. Fluid Mech. 360:121.',
    mark: 'published',
    range: 'Round tubes, quick starts, no flow past the nozzle; modifiers carry it to other nozzles and flows.',
    inside: band !== null && context.pulse.quickStart && notes.length === 0,
    verdict:
      band === null
        ? 'No ring is expected to pinch off here.'
        : [
            `The band for this plan is ${band[0].toFixed(2)} to ${band[1].toFixed(2)}.`,
            ...notes.map(({ text }) => text),
          ].join(' '),
  }
}

const dimensionlessEnergy: ExplanationMaker = (context) => ({
  title: 'Dimensionless energy',
  mathml: formula(sub('E', 'n'), '=', over('E', row(root('ρ I'), power('Γ', '3/2')))),
  formula: 'Energy over density^(1/2) impulse^(1/2) circulation^(3/2) of the slug; sqrt(pi/2) D/L at a steady speed.',
  values: [
    ...values(context),
    { name: 'slug energy E', value: context.pulse.slug.energy, unit: 'J' },
    { name: 'slug impulse I', value: context.pulse.slug.impulse, unit: 'N s' },
    { name: 'slug circulation Γ', value: context.pulse.slug.circulation, unit: 'm²/s' },
    { name: 'density ρ', value: context.water.density, unit: 'kg/m³' },
  ],
  source: 'Definition after Gharib, Rambod & Shariff 1998 (recalled, not re-read); slug identity.',
  mark: 'identity',
  range: 'Any programme; no steady ring exists below 0.160 (Hill’s vortex).',
  inside: context.pulse.dimensionlessEnergy >= HILL_DIMENSIONLESS_ENERGY,
  verdict: `The whole slug has ${formatFixed(context.pulse.dimensionlessEnergy, 3)}.`,
})

export const FORMATION_EXPLANATIONS = {
  margin,
  'formation.energyLimit': energyLimit,
  'formation.carriedVolume': carriedVolume,
  'formation.speedMatch': speedMatch,
  'formation.published': published,
  dimensionlessEnergy,
} as const
