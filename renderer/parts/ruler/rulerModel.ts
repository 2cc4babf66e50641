/**
 * What the ruler shows of a plan and its results: estimates as ticks, the band, the outline. Pure.
 */
import type { JetEnsemble } from '../../../core/coaxial'
import { formatFixed, formatQuantity } from '../../../core/quantity'
import type { Plan } from '../../../core/plan'
import type { FormationNumbers, PulseResult } from '../../../core/pulse'
import { outlinePoints } from './scale'

/** One model's estimate of where the ring is full. */
export interface RulerEstimate {
  readonly id: string
  readonly value: number
  /** Ends of its own uncertainty, where it has one. */
  readonly low: number | null
  readonly high: number | null
  readonly text: string
  readonly adopted: boolean
}

export interface RulerModel {
  readonly strokeRatio: number
  readonly band: readonly [number, number] | null
  readonly estimates: readonly RulerEstimate[]
  /** Exit speed over its peak against formation time. */
  readonly outline: readonly (readonly [number, number])[]
  /** Said in the ruler's place for labels where no estimate exists. */
  readonly absence: string | null
}

/** Names as they stand on the ruler; the order is that of the legend. */
const ESTIMATES = [
  ['speedMatch', 'speed match'],
  ['energyLimit', 'energy limit'],
  ['carriedVolume', 'carried volume'],
  ['computed', 'computed'],
] as const satisfies readonly (readonly [keyof FormationNumbers, string])[]

/** Stroke in exit diameters as the plan has it now, before it is computed. */
export function planStrokeRatio(plan: Plan): number {
  return plan.programme.stroke / plan.nozzle.diameter
}

/**
 * The ruler of a plan.
 *
 * @param pulse null before the first result
 * @param formation the runs behind the computed formation number, for its range; null where they are not at hand
 */
export function rulerModel(plan: Plan, pulse: PulseResult | null, formation: JetEnsemble | null = null): RulerModel {
  const strokeRatio = planStrokeRatio(plan)
  if (pulse === null) return { strokeRatio, band: null, estimates: [], outline: [], absence: null }
  const { formationNumber } = pulse
  const estimates = ESTIMATES.flatMap(([id, name]): RulerEstimate[] => {
    const value = formationNumber[id]
    if (value === null) return []
    const adopted = plan.models.formationNumber === id
    if (id === 'computed') return [{ ...computedEstimate(value, formation), adopted }]
    return [{ id, value, low: null, high: null, text: `${name} ${formatFixed(value)}`, adopted }]
  })
  return {
    strokeRatio,
    band: formationNumber.published,
    estimates,
    outline: outlinePoints(pulse.history.formationTime, pulse.history.exitSpeed),
    absence: estimates.length > 0 ? null : absenceOf(formationNumber),
  }
}

/** The computed jet's number is a range: what modifies its mean for this nozzle modifies its ends alike. */
function computedEstimate(value: number, formation: JetEnsemble | null): Omit<RulerEstimate, 'adopted'> {
  const base = { id: 'computed', value }
  const { formationNumber: mean, formationNumberLow: low, formationNumberHigh: high } = formation ?? NO_RANGE
  if (mean === null || low === null || high === null || high - low < 0.005)
    return { ...base, low: null, high: null, text: `computed ${value.toFixed(1)}` }
  const [from, to] = [(low * value) / mean, (high * value) / mean]
  return { ...base, low: from, high: to, text: `computed ${value.toFixed(1)} (${from.toFixed(1)} to ${to.toFixed(1)})` }
}

const NO_RANGE = { formationNumber: null, formationNumberLow: null, formationNumberHigh: null }

function absenceOf(formationNumber: FormationNumbers): string {
  return formationNumber.published === null
    ? 'no pinch-off expected: see the cautions'
    : 'no model has an estimate for this programme'
}

/** The stroke in words, for the handle: `stroke ratio 3.20, stroke 96 mm`. */
export function strokeInWords(plan: Plan, lengthUnit: string): string {
  return `stroke ratio ${formatFixed(planStrokeRatio(plan))}, stroke ${formatQuantity(plan.programme.stroke, lengthUnit)}`
}
