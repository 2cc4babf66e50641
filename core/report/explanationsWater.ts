/** Why density, viscosity and the Reynolds numbers are what they are. */
import { LAMINAR_BELOW, TURBULENT_ABOVE } from '../ring'
import type { ExplanationContext, ExplanationMaker } from './explanationTypes'
import { formula, over, row, sub } from './mathml'

function rangeOfWater({ plan }: ExplanationContext): {
  readonly range: string
  readonly inside: boolean
  readonly verdict: string
} {
  if (plan.water.kind === 'given')
    return { range: 'As given; not checked.', inside: true, verdict: 'The values were typed in.' }
  return {
    range: '0 to 40 °C, salinity 0 to 42; density at surface pressure.',
    inside: true,
    verdict: `Inside: ${plan.water.temperatureCelsius} °C${plan.water.kind === 'sea' ? `, salinity ${plan.water.salinity}` : ''}.`,
  }
}

const density: ExplanationMaker = (context) => ({
  title: 'Density and viscosity of the water',
  mathml: formula('ν =', over('μ', 'ρ')),
  formula: 'Density and viscosity from the published formulations named below; kinematic viscosity is their ratio.',
  values: [
    { name: 'density', value: context.water.density, unit: 'kg/m³' },
    { name: 'kinematic viscosity', value: context.water.kinematicViscosity, unit: 'm²/s' },
  ],
  source: context.water.sources.join(' '),
  mark: 'published',
  ...rangeOfWater(context),
})

const jetReynolds: ExplanationMaker = (context) => ({
  title: 'Jet Reynolds number',
  mathml: formula('Re =', over(row('U D'), 'ν')),
  formula: 'Peak exit speed x exit diameter / kinematic viscosity.',
  values: [
    { name: 'peak exit speed', value: context.pulse.peakSpeed, unit: 'm/s' },
    { name: 'exit diameter', value: context.plan.nozzle.diameter, unit: 'm' },
    { name: 'kinematic viscosity', value: context.water.kinematicViscosity, unit: 'm²/s' },
  ],
  source: 'Definition.',
  mark: 'identity',
  range: 'Any pulse.',
  inside: true,
  verdict: `It is ${Math.round(context.pulse.jetReynolds)} here.`,
})

const ringReynolds: ExplanationMaker = (context) => {
  const reynolds = context.pulse.ring?.reynolds ?? 0
  return {
    title: 'Ring Reynolds number',
    mathml: formula(sub('Re', 'Γ'), '=', over('Γ', 'ν')),
    formula: 'Circulation of the ring / kinematic viscosity.',
    values: [{ name: 'kinematic viscosity', value: context.water.kinematicViscosity, unit: 'm²/s' }],
    source: `Definition; laminar below ${LAMINAR_BELOW} and turbulent above ${TURBULENT_ABOVE}: common practice.`,
    mark: 'common practice',
    range: `The laminar laws of one ring hold below about ${LAMINAR_BELOW}.`,
    inside: reynolds <= LAMINAR_BELOW,
    verdict: `It is ${Math.round(reynolds)} here.`,
  }
}

export const WATER_EXPLANATIONS = { water: density, jetReynolds, ringReynolds } as const
