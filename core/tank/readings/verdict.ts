/**
 * What the readings say of the prediction, in words: inside the band, or outside by how much, and what would explain it.
 */
import { formatQuantity, formatRange } from '../../quantity'
import type { ComparedQuantity, PredictedValue } from './predicted'
import type { Cause, Sensitivity } from './sensitivities'
import { NORMAL_95 } from './student'

/** A measured value to be held against the band. */
export interface ComparedValue {
  readonly value: number
  /** null: not told. */
  readonly standardError: number | null
  /** Half width of its 95 % interval over the standard error, where it is not 1.96. */
  readonly intervalFactor?: number
}

export interface Explanation {
  readonly cause: Cause
  /** Relative change, or kelvins, that brings the adopted prediction to what was measured. */
  readonly change: number
  readonly text: string
}

export interface Verdict {
  readonly quantity: ComparedQuantity
  readonly measured: ComparedValue
  readonly predicted: PredictedValue
  /** `touching`: outside, and its 95 % interval reaches into the band. */
  readonly state: 'inside' | 'touching' | 'outside'
  /** Measured less the nearest end of the band; 0 inside. */
  readonly outsideBy: number
  /** The same over that end. */
  readonly outsideShare: number
  /** Likely ones first; empty inside the band. */
  readonly explanations: readonly Explanation[]
  readonly text: string
}

export const QUANTITY_WORDS: Readonly<Record<ComparedQuantity, { readonly name: string; readonly unit: string }>> = {
  circulation: { name: 'Circulation', unit: 'cm²/s' },
  radius: { name: 'Ring radius', unit: 'mm' },
  speed: { name: 'Mean ring speed', unit: 'mm/s' },
  formationNumber: { name: 'Formation number', unit: '' },
  meanForce: { name: 'Mean force', unit: 'mN' },
}

/** What is still believable, and the size of an everyday error that makes one cause likelier than another. */
const BELIEVABLE: Readonly<Record<Cause, { readonly most: number; readonly usual: number }>> = {
  stroke: { most: 0.15, usual: 0.02 },
  leak: { most: 0.3, usual: 0.05 },
  temperature: { most: 15, usual: 2 },
  diameter: { most: 0.05, usual: 0.01 },
}
/** A cause that changes the quantity by less than this, relative, over a relative change or a kelvin, does not reach it. */
const LEAST_EFFECT = 1e-4

export function verdictOf(
  quantity: ComparedQuantity,
  measured: ComparedValue,
  predicted: PredictedValue,
  sensitivities: readonly Sensitivity[],
): Verdict {
  const { low, high } = predicted
  const { value } = measured
  const end = value < low ? low : value > high ? high : value
  const outsideBy = value - end
  const reach = (measured.standardError ?? 0) * (measured.intervalFactor ?? NORMAL_95)
  const state = outsideBy === 0 ? 'inside' : Math.abs(outsideBy) <= reach ? 'touching' : 'outside'
  const outsideShare = end === 0 ? 0 : outsideBy / end
  const explanations = state === 'outside' ? explained(quantity, value / predicted.value, sensitivities) : []
  return {
    quantity,
    measured,
    predicted,
    state,
    outsideBy,
    outsideShare,
    explanations,
    text: sentence(quantity, measured, predicted, { state, outsideShare, explanations }),
  }
}

function explained(
  quantity: ComparedQuantity,
  ratio: number,
  sensitivities: readonly Sensitivity[],
): readonly Explanation[] {
  if (!(ratio > 0)) return []
  return sensitivities
    .flatMap(({ cause, change }): Explanation[] => {
      const effect = change[quantity] ?? 0
      if (Math.abs(effect) < LEAST_EFFECT) return []
      const needed = cause === 'temperature' ? Math.log(ratio) / effect : Math.expm1(Math.log(ratio) / effect)
      const possible = Math.abs(needed) <= BELIEVABLE[cause].most && (cause !== 'leak' || needed > 0)
      return possible ? [{ cause, change: needed, text: causeInWords(cause, needed) }] : []
    })
    .toSorted((a, b) => Math.abs(a.change) / BELIEVABLE[a.cause].usual - Math.abs(b.change) / BELIEVABLE[b.cause].usual)
}

function causeInWords(cause: Cause, change: number): string {
  const size = Math.abs(change)
  if (cause === 'temperature') return `water ${size.toFixed(1)} °C ${change > 0 ? 'warmer' : 'colder'}`
  const share = `${(100 * size).toFixed(1)} %`
  if (cause === 'leak') return `a leak of ${share} past the piston`
  if (cause === 'stroke') return `a stroke ${share} ${change > 0 ? 'longer and faster' : 'shorter and slower'}`
  return `an exit ${share} ${change > 0 ? 'wider' : 'narrower'} at the same flow`
}

function sentence(
  quantity: ComparedQuantity,
  { value, standardError, intervalFactor }: ComparedValue,
  { low, high }: PredictedValue,
  { state, outsideShare, explanations }: Pick<Verdict, 'state' | 'outsideShare' | 'explanations'>,
): string {
  const { name, unit } = QUANTITY_WORDS[quantity]
  const show = (one: number): string => formatQuantity(one, unit, 3)
  // As in every other place a verdict stands in: half the 95 % interval.
  const half = (standardError ?? 0) * (intervalFactor ?? NORMAL_95)
  const error = half > 0 ? ` ± ${formatQuantity(half, unit, 2)} (95 %)` : ''
  const range = formatRange(low, high, unit)
  const band = low === high ? `the prediction, ${show(low)}` : `the predicted band, ${withUnit(range)}`
  const start = `${name} ${show(value)}${error}`
  if (state === 'inside') return `${start} lies ${low === high ? 'at' : 'inside'} ${band}.`
  const by = `${(100 * Math.abs(outsideShare)).toFixed(1)} % ${outsideShare < 0 ? 'below' : 'above'} ${band}`
  if (state === 'touching') {
    const where = low === high ? '' : 'at the edge of the band: '
    return `${start} lies ${where}${by}, and its 95 % interval reaches ${low === high ? 'it' : 'into it'}.`
  }
  const [first, ...others] = explanations.map(({ text }) => text)
  if (first === undefined)
    return `${start} lies ${by}. No believable error of stroke, leak, water or exit explains it alone.`
  return `${start} lies ${by}. It would be explained by ${[first, ...others].join(', or by ')}.`
}

function withUnit({ text, unit }: { readonly text: string; readonly unit: string }): string {
  return unit === '' ? text : `${text}\u00a0${unit}`
}
