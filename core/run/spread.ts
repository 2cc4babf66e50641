/**
 * A spread: the plan drawn many times about its own values (Monte Carlo), and what its headline results come to.
 *
 * Each sample computes the pulse, and the thruster and the arrivals of the tank run where the plan has them. Samples that cannot be
 * computed are counted and told, never put in by something else.
 */
import { DomainError, equallySpaced, type RunStatus } from '../base'
import {
  summaryNumber,
  type Plan,
  type SpreadBand,
  type SpreadOutcome,
  type SpreadRefusal,
  type SpreadSection,
} from '../plan'
import type { ComputedJet } from '../pulse'
import type { WaterProperties } from '../water'
import { drawing, drawnFields, type DrawnField } from './spreadDraw'
import { figuresOf, gatherBand, type BandGatherer } from './spreadFigures'
import { circulationAt, positionAt, sampleOf, sampleSetting, type Sample } from './spreadSample'
import { variedPlan } from './variedPlan'
import type { WakeRunOptions } from './options'

export interface SpreadData extends SpreadOutcome {
  /** What was drawn. */
  readonly fields: readonly DrawnField[]
  /** Circulation of the slug [m2/s] over formation time; null before the first sample. */
  readonly circulation: SpreadBand | null
  /** x of the ring in the tank [m] over time [s]; null without a tank run or a ring. */
  readonly position: SpreadBand | null
}

/** Points of a band, and how far past the plan's own stroke that of the circulation goes. */
const BAND_POINTS = 51
const PAST_STROKE = 1.1

const PULSE: readonly (readonly [path: string, unit: string])[] = [
  ['pulse.strokeRatio', ''],
  ['pulse.duration', 's'],
  ['pulse.dimensionlessEnergy', ''],
  ['pulse.formationNumber.adopted', ''],
  ['pulse.total.circulation', 'm2/s'],
  ['pulse.total.impulse', 'N s'],
  ['pulse.total.energy', 'J'],
  ['pulse.ring.circulation', 'm2/s'],
  ['pulse.ring.impulse', 'N s'],
  ['pulse.ring.radius', 'm'],
  ['pulse.ring.coreRatio', ''],
  ['pulse.ring.speed', 'm/s'],
  ['pulse.ring.reynolds', ''],
]

const THRUSTER: readonly (readonly [path: string, unit: string])[] = [
  ['thruster.meanThrust', 'N'],
  ['thruster.peakThrust', 'N'],
  ['thruster.power.total', 'W'],
  ['thruster.speed', 'm/s'],
  ['thruster.froudeEfficiency', ''],
  ['thruster.overallEfficiency', ''],
]

const AT_STATION: readonly (readonly [key: string, unit: string])[] = [
  ['time', 's'],
  ['speed', 'm/s'],
  ['radius', 'm'],
]

/** Quantities whose spread is told, with their SI units. */
function headlines(plan: Plan): readonly (readonly [path: string, unit: string])[] {
  const stations = plan.tankRun?.stations ?? []
  return [
    ...PULSE,
    ...(plan.thruster === null ? [] : THRUSTER),
    ...stations.flatMap((_, i) => AT_STATION.map(([key, unit]) => [`tankRun.arrivals.${i}.${key}`, unit] as const)),
  ]
}

/** @throws {DomainError} on spread.relative or spread.absolute where there is nothing to draw, or a path that sets nothing */
export function checkSpread(plan: Plan, section: SpreadSection): readonly DrawnField[] {
  const fields = drawnFields(plan, section)
  variedPlan(plan, fields, (i) => fields[i]?.field ?? 'spread')
  return fields
}

/**
 * Compute the spread of a plan.
 *
 * @param jet what the computed jet hands on, where the plan adopts it; null else
 * @returns status 'cancelled' with the figures of the samples that were come to
 * @throws {DomainError} as `checkSpread`, and where the plan itself cannot be computed
 */
export async function spreadOf(
  plan: Plan,
  section: SpreadSection,
  water: WaterProperties,
  jet: ComputedJet | null,
  options: WakeRunOptions,
): Promise<SpreadData> {
  const fields = checkSpread(plan, section)
  const { samples, seed } = section
  const { signal, pause, onProgress } = options
  const inSample: WakeRunOptions = {
    ...(signal === undefined ? {} : { signal }),
    ...(pause === undefined ? {} : { pause }),
  }
  const setting = await sampleSetting(plan, water, jet, options)
  const nominal = await sampleOf(plan, setting, inSample)
  const quantities = headlines(plan).map(([path, unit]) => ({
    path,
    unit,
    nominal: nominal === null ? null : summaryNumber(nominal.document, path),
    values: new Float64Array(samples).fill(Number.NaN),
  }))
  const bands = nominal === null ? null : bandsAbout(nominal, samples)
  const refusals = new Map<string, SpreadRefusal>()
  let used = 0
  let refused = 0
  const ended = (status: RunStatus, message: string): SpreadData => ({
    status,
    message,
    samples,
    used,
    refused,
    refusals: [...refusals.values()].toSorted((a, b) => b.count - a.count),
    seed,
    quantities: quantities
      .map(({ path, unit, nominal: own, values }) => ({ path, unit, ...figuresOf(values.subarray(0, used), own) }))
      .filter(({ nominal: own, samples: count }) => own !== null || count > 0),
    fields,
    circulation: bands?.circulation.band() ?? null,
    position: bands?.position?.band() ?? null,
    notes: notesOf(plan, jet),
  })
  const cut = (): SpreadData => ended('cancelled', `Cancelled: the spread is that of ${used} of ${samples} samples.`)

  if (nominal === null) return cut()
  const draw = drawing(fields, seed)
  for (let k = 0; k < samples; k++) {
    await pause?.()
    if (signal?.aborted === true) return cut()
    onProgress?.({ share: k / samples, what: `sample ${k + 1} of ${samples}` })
    const { values, refused: outside } = draw()
    try {
      if (outside !== null) throw outside
      const drawn = variedPlan(plan, values, (i) => fields[i]?.field ?? 'spread')
      const sample = await sampleOf(drawn, setting, inSample)
      if (sample === null) return cut()
      for (const quantity of quantities)
        quantity.values[used] = summaryNumber(sample.document, quantity.path) ?? Number.NaN
      bands?.circulation.add((x) => circulationAt(sample.pulse, x))
      if (sample.path !== null) addPosition(bands?.position ?? null, sample)
      used++
    } catch (error) {
      if (!(error instanceof DomainError)) throw error
      refused++
      const { field, message } = error
      const before = refusals.get(field)
      refusals.set(field, { field, message: before?.message ?? message, count: (before?.count ?? 0) + 1 })
    }
  }
  return ended(
    'done',
    refused === 0 ? 'Done.' : `Done: ${refused} of ${samples} samples were refused and do not count.`,
  )
}

function addPosition(position: BandGatherer | null, { path }: Sample): void {
  if (path !== null) position?.add((time) => positionAt(path, time))
}

function bandsAbout(
  { pulse, path }: Sample,
  samples: number,
): { readonly circulation: BandGatherer; readonly position: BandGatherer | null } {
  const end = pulse.strokeRatio * PAST_STROKE
  const circulation = gatherBand(equallySpaced(0, end, BAND_POINTS), (x) => circulationAt(pulse, x), samples)
  if (path === null) return { circulation, position: null }
  const [from, to] = [path.time[0] ?? 0, path.time.at(-1) ?? 0]
  return {
    circulation,
    position: gatherBand(equallySpaced(from, to, BAND_POINTS), (time) => positionAt(path, time), samples),
  }
}

function notesOf(plan: Plan, jet: ComputedJet | null): readonly string[] {
  return [
    ...(jet === null
      ? []
      : [
          "The computed jet is run once: in the samples of the spread its formation number is held and what lies beyond the slug is scaled by the jet's size and speed.",
        ]),
    ...(plan.tankRun === null
      ? []
      : [
          'Arrivals scatter about the adopted ring under the ageing law of the plan itself; what the laws and the over-pressure leave open stands beside them in the tank run.',
        ]),
  ]
}
