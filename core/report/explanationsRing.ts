/** Why the ring is what it is: slug sums, over-pressure, the match to the steady family. */
import { formatFixed } from '../quantity'
import type { ExplanationContext, ExplanationMaker } from './explanationTypes'
import { formula, over, power, row, sub } from './mathml'
import type { Explanation } from './types'

type Values = Explanation['values']

const QUICK_START = 'Quick-start terms: Krueger 2005, J. Fluid Mech. 545:427, from the potential flow of a disc.'
const SLUG_RANGE =
  'Slug model: uniform exit speed, before pinch-off. Measured circulation lies above it at short strokes; the quick-start end of the range covers most of that.'
const FAMILY_SOURCE =
  'Norbury 1973, J. Fluid Mech. 57:417, family of steady rings computed afresh; thin end Fraenkel 1972, J. Fluid Mech. 51:119.'

function slugValues({ plan, water, pulse }: ExplanationContext): Values {
  return [
    { name: 'density', value: water.density, unit: 'kg/m³' },
    { name: 'exit diameter D', value: plan.nozzle.diameter, unit: 'm' },
    { name: 'stroke L', value: pulse.stroke, unit: 'm' },
    { name: 'peak exit speed U', value: pulse.peakSpeed, unit: 'm/s' },
    { name: 'duration of the pulse', value: pulse.duration, unit: 's' },
    { name: 'slug circulation', value: pulse.slug.circulation, unit: 'm²/s' },
    { name: 'slug impulse', value: pulse.slug.impulse, unit: 'N s' },
    { name: 'slug energy', value: pulse.slug.energy, unit: 'J' },
  ]
}

function slugVerdict({ pulse }: ExplanationContext): { readonly inside: boolean; readonly verdict: string } {
  const inside = pulse.pinchedOff === false
  if (pulse.pinchedOff === null)
    return { inside, verdict: 'Outside: no formation number is known for this plan, so no ring is claimed.' }
  return {
    inside,
    verdict: inside
      ? `Inside: the stroke ratio ${formatFixed(pulse.strokeRatio)} is below the adopted formation number, so the whole pulse is one ring.`
      : `Beyond it: the stroke ratio ${formatFixed(pulse.strokeRatio)} is past the adopted formation number; the ring holds what left before it.`,
  }
}

function familyVerdict({ pulse }: ExplanationContext): { readonly inside: boolean; readonly verdict: string } {
  const ring = pulse.ring
  if (ring === null) return { inside: false, verdict: 'There is no ring to match for this plan.' }
  const inside = ring.model === 'steady family'
  return {
    inside,
    verdict: inside
      ? `Inside: the matched ring has a core of ${ring.coreRatio.toFixed(2)} of its radius (the family ends at 1.41).`
      : 'Outside: the energy is below that of Hill’s vortex; the ring is held at that limit.',
  }
}

function matchValues({ water, pulse }: ExplanationContext): Values {
  const ring = pulse.ring
  return [
    { name: 'density', value: water.density, unit: 'kg/m³' },
    { name: 'ring circulation Γ', value: ring?.circulation ?? Number.NaN, unit: 'm²/s' },
    { name: 'ring impulse I', value: ring?.impulse ?? Number.NaN, unit: 'N s' },
    { name: 'ring energy E', value: ring?.energy ?? Number.NaN, unit: 'J' },
    { name: 'core ratio ε', value: ring?.coreRatio ?? Number.NaN, unit: '' },
  ].filter(({ value }) => Number.isFinite(value))
}

const circulation: ExplanationMaker = (context) => ({
  title: 'Circulation of the ring',
  mathml: formula('Γ =', over('1', '2'), '∫', power('U', '2'), 'd t', '+', over(row('U D'), 'π')),
  formula: 'Circulation = half the integral of exit speed squared; at the quick-start end plus U D / pi.',
  values: slugValues(context),
  source: `Slug model (common practice). ${QUICK_START}`,
  mark: 'published',
  range: SLUG_RANGE,
  ...slugVerdict(context),
})

const impulse: ExplanationMaker = (context) => ({
  title: 'Impulse of the ring',
  mathml: formula('I = ρ A ∫', power('U', '2'), 'd t', '+', over(row('ρ', power('D', '3'), 'U'), '6')),
  formula: 'Impulse = density x exit area x integral of speed squared; at the quick-start end plus density D^3 U / 6.',
  values: slugValues(context),
  source: `Slug model (common practice). ${QUICK_START} How much of it a tube delivers is disputed: Krueger & Gharib 2003 found up to 42 % (recalled, not re-read), Moslemi 2020 next to none.`,
  mark: 'published',
  range: SLUG_RANGE,
  ...slugVerdict(context),
})

const energy: ExplanationMaker = (context) => ({
  title: 'Kinetic energy of the ring',
  mathml: formula(
    'E =',
    over('1', '2'),
    'ρ A ∫',
    power('U', '3'),
    'd t',
    '+',
    over(row('ρ', power('D', '3'), power('U', '2')), '12'),
  ),
  formula:
    'Energy = half density x exit area x integral of speed cubed; at the quick-start end plus density D^3 U^2 / 12.',
  values: slugValues(context),
  source: `Slug model (common practice). ${QUICK_START}`,
  mark: 'published',
  range: SLUG_RANGE,
  ...slugVerdict(context),
})

const speed: ExplanationMaker = (context) => ({
  title: 'Speed of the ring',
  mathml: formula(
    sub('U', 'ring'),
    '=',
    over('Γ', row('4 π', 'R')),
    'u ( ε ) ,',
    sub('E', 'n'),
    '( ε ) =',
    over('E', row(power('ρ', '½'), power('I', '½'), power('Γ', '3/2'))),
  ),
  formula:
    'The steady ring with the same circulation, impulse and energy: its dimensionless energy gives the core ratio, the family gives speed and radius.',
  values: matchValues(context),
  source: FAMILY_SOURCE,
  mark: 'published',
  range:
    'Steady, laminar, inviscid rings from thin cores to Hill’s vortex (dimensionless energy 0.160); just after forming, before it ages.',
  ...familyVerdict(context),
})

const radius: ExplanationMaker = (context) => ({
  ...speed(context),
  title: 'Radius and core of the ring',
  mathml: formula('I = ρ π Γ', power('R', '2'), 'i ( ε )'),
  formula:
    'Radius R, the mean of the core’s inner and outer radius, from the impulse of the matched steady ring; the core radius is that of a circle of the core’s area.',
})

const corePressure: ExplanationMaker = (context) => ({
  title: 'Pressure drop in the core',
  mathml: formula('Δ p =', over(row('ρ', power('Γ', '2')), row('4', power('π', '2'), power('a', '2')))),
  formula:
    'Pressure drop = density x circulation squared / (4 pi^2 a^2), a Rankine core of the mean core radius, or of sqrt(4 nu t) where viscosity makes it wider during the stroke.',
  values: [
    ...matchValues(context),
    { name: 'mean core radius a', value: context.pulse.ring?.meanCoreRadius ?? 0, unit: 'm' },
  ],
  source: 'Rankine vortex, derived; textbook identity.',
  mark: 'identity',
  range: 'Thin cores; for a thick one a scale, not a value. A flow pressure only, no pressure-vessel calculation.',
  inside: (context.pulse.ring?.coreRatio ?? 1) <= 0.3,
  verdict: `The core is ${(context.pulse.ring?.coreRatio ?? 0).toFixed(2)} of the radius; the formula is sharp below 0.3.`,
})

const waveNumber: ExplanationMaker = (context) => ({
  title: 'Most unstable number of waves',
  mathml: formula('n ≈', over(row('2.5', 'R'), 'a')),
  formula: 'About 2.5 ring radii over core radii waves around the ring grow fastest (uniform core).',
  values: matchValues(context),
  source: 'Widnall, Bliss & Tsai 1974 (recalled, not re-read).',
  mark: 'recalled',
  range: 'Thin cores with uniform vorticity.',
  inside: (context.pulse.ring?.coreRatio ?? 1) <= 0.3,
  verdict: `The core is ${(context.pulse.ring?.coreRatio ?? 0).toFixed(2)} of the radius; the formula is meant for thin cores.`,
})

const trailingJet: ExplanationMaker = (context) => ({
  title: 'Impulse left behind',
  mathml: formula(
    sub('I', 'jet'),
    '=',
    sub('I', 'total'),
    '−',
    sub('I', 'ring'),
    ',',
    sub('Γ', 'jet'),
    '=',
    sub('Γ', 'total'),
    '−',
    sub('Γ', 'ring'),
  ),
  formula: 'What the whole pulse has beyond the ring that the same programme makes at the adopted formation number.',
  values: [
    { name: 'trailing impulse', value: context.pulse.trailingJet.impulse, unit: 'N s' },
    { name: 'trailing circulation', value: context.pulse.trailingJet.circulation, unit: 'm²/s' },
    { name: 'stroke ratio', value: context.pulse.strokeRatio, unit: '' },
  ],
  source: 'Gharib, Rambod & Shariff 1998, J. Fluid Mech. 360:121 (recalled, not re-read).',
  mark: 'recalled',
  range: 'Strokes past the formation number. The ring may swallow some of the trailing jet later.',
  inside: context.pulse.pinchedOff === true,
  verdict:
    context.pulse.pinchedOff === true
      ? 'This stroke is past the adopted formation number.'
      : 'This stroke is below the adopted formation number: nothing trails.',
})

export const RING_EXPLANATIONS = {
  'ring.circulation': circulation,
  'ring.speed': speed,
  'ring.radius': radius,
  'ring.impulse': impulse,
  'ring.energy': energy,
  'ring.corePressure': corePressure,
  'ring.waveNumber': waveNumber,
  trailingJet,
} as const
