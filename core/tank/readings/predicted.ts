/**
 * What the plan says of the rings that were seen: their starts with the range of them, and the quantities readings are held against.
 */
import { at } from '../../base'
import { trainRings, type WakeAgeing } from '../../coaxial'
import { computePulse, type PulseInput, type PulseResult, type PulseRing } from '../../pulse'
import { ageingLaws } from '../arrivals'
import { wallSlowing, type TankWalls } from '../walls'
import { ringAt, type RingStart, type RingSurroundings } from './pathModel'

export interface PredictedRing {
  readonly basis: 'adopted' | 'slug' | 'quick start'
  readonly start: RingStart
  readonly around: RingSurroundings
}

/** Quantities of readings and prediction alike. */
export type ComparedQuantity = 'circulation' | 'radius' | 'speed' | 'formationNumber' | 'meanForce'

export const COMPARED: readonly ComparedQuantity[] = ['circulation', 'radius', 'speed', 'formationNumber', 'meanForce']

export interface PredictedValue {
  /** By the adopted model. */
  readonly value: number
  readonly low: number
  readonly high: number
}

export type Prediction = Readonly<Partial<Record<ComparedQuantity, PredictedValue>>>

export interface PredictionInput {
  readonly pulse: PulseInput
  /** Of `pulse`, where it is at hand. */
  readonly computed?: PulseResult
  readonly ageing: 'auto' | WakeAgeing
  readonly walls: TankWalls
  /** The stretch of time over which rings were seen [s]; null: no mean speed is told. */
  readonly seen: readonly [number, number] | null
  /** From pulse to pulse [s]; null: no mean force is told, unless it is given. */
  readonly period: number | null
  /** Mean thrust as computed elsewhere [N]; null: the impulse of a pulse over the period. */
  readonly meanForce: number | null
}

/** Rings of a pulse that readings may be of, the adopted one under its own law first. */
export function predictedRings(input: PredictionInput, computed: PulseResult): readonly PredictedRing[] {
  const { pulse, walls } = input
  const bases = [
    { basis: 'adopted' as const, ring: computed.ring },
    { basis: 'slug' as const, ring: computed.ringFromSlug },
    { basis: 'quick start' as const, ring: computed.ringWithOverPressure },
  ]
  const known: PulseRing[] = []
  return bases.flatMap(({ basis, ring }) => {
    if (ring === null || known.some((one) => one.circulation === ring.circulation && one.impulse === ring.impulse))
      return []
    known.push(ring)
    const { duration } = computed
    const born = at(trainRings({ density: pulse.density, ring, duration, pulses: 1, period: 1 }).rings, 0)
    const slowing = wallSlowing(walls, 1, born.radius) / (born.radius * born.radius)
    const { circulation, radius, coreRadius, x } = born
    return ageingLaws(ring, pulse.kinematicViscosity, input.ageing).map((ageing): PredictedRing => ({
      basis,
      start: { circulation, radius, coreRadius, x, time: duration },
      around: {
        ageing,
        kinematicViscosity: pulse.kinematicViscosity,
        axialFlow: pulse.axialFlow,
        wallSlowing: slowing,
      },
    }))
  })
}

/** The quantities with their ranges: from the rings, the formation number's own range, and slug to quick start for the force. */
export function predictionOf(input: PredictionInput): {
  readonly prediction: Prediction
  readonly rings: readonly PredictedRing[]
  readonly computed: PulseResult
} {
  const computed = input.computed ?? computePulse(input.pulse)
  const rings = predictedRings(input, computed)
  const { adopted, low, high } = computed.formationNumber
  const range = (values: readonly number[]): PredictedValue | null =>
    values.length === 0 ? null : { value: at(values, 0), low: Math.min(...values), high: Math.max(...values) }
  const { seen } = input
  const found: Partial<Record<ComparedQuantity, PredictedValue | null>> = {
    circulation: range(rings.map(({ start }) => start.circulation)),
    radius: range(rings.map(({ start }) => start.radius)),
    speed: seen === null || !(seen[1] > seen[0]) ? null : range(rings.map((ring) => meanSpeed(ring, seen))),
    formationNumber: adopted === null ? null : { value: adopted, low: low ?? adopted, high: high ?? adopted },
    meanForce: range(forces(input, computed)),
  }
  const prediction: Partial<Record<ComparedQuantity, PredictedValue>> = {}
  for (const name of COMPARED) {
    const value = found[name]
    if (value !== null && value !== undefined) prediction[name] = value
  }
  return { prediction, rings, computed }
}

/** Way over time between two instants [m/s]. */
export function meanSpeed(
  { start, around }: Pick<PredictedRing, 'start' | 'around'>,
  seen: readonly [number, number],
): number {
  const [from, to] = seen
  return (ringAt(start, around, to).x - ringAt(start, around, from).x) / (to - from)
}

/** The adopted mean force first; then slug and, for a quick start, slug and quick start. */
function forces({ period, meanForce }: PredictionInput, computed: PulseResult): number[] {
  if (meanForce !== null) return [meanForce]
  if (period === null) return []
  const most = computed.quickStart ? [computed.slug.impulse + computed.overPressure.impulse] : []
  return [computed.total.impulse, computed.slug.impulse, ...most].map((impulse) => impulse / period)
}
