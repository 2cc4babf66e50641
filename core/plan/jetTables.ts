/**
 * The starting jet written out: jet.csv, its events, its part of the summary.
 */
import { at } from '../base'
import type { JetEnsemble, WakeEvent } from '../coaxial'
import type { Wake } from '../filament'
import { writeCsv } from './csvWriter'

/** A starting jet as the tables and cautions read it. */
export interface JetOutcome {
  readonly status: JetEnsemble['status']
  readonly message: string
  /** The plan's own stroke. */
  readonly own: JetEnsemble
  /** The run that gives the formation number; `own` itself where its stroke is long enough. */
  readonly formation: JetEnsemble | null
  readonly notes: readonly string[]
}

export const JET_COLUMNS = [
  'formation time',
  'time (s)',
  'total circulation (m2/s)',
  'ring circulation (m2/s)',
  'ring x (m)',
  'ring radius (m)',
  'impulse (N s)',
  'energy (J)',
] as const

/**
 * jet.csv: the plan's own stroke at the shown smoothing length. Impulse and energy are those of everything shed, as the total circulation;
 * the columns of the ring are empty until one is cut.
 */
export function jetTable({ own }: JetOutcome): string {
  const { history } = own.shown
  const rows = history.time.map((time, i) => [
    at(history.formationTime, i),
    time,
    at(history.totalCirculation, i),
    at(history.ringCirculation, i),
    at(history.ringX, i),
    at(history.ringRadius, i),
    at(history.totalImpulse, i),
    at(history.totalEnergy, i),
  ])
  return writeCsv(JET_COLUMNS, rows)
}

/**
 * Events of a wake, a jet, or both, in the order of time; `end` is last, the wake's where there is one.
 *
 * @param ofPulse true: the wake follows the rings of the pulse, and the jet lets go of ring 1; false: its rings are given one by one, and
 *   the jet's is none of them
 */
export function eventsOf(wake: Wake | null, jet: JetOutcome | null, ofPulse: boolean): readonly WakeEvent[] {
  // A wake that starts from the jet tells every pulse's pinch-off itself.
  const told = wake?.events.some(({ event }) => event === 'pinch-off') ?? false
  const events = [...(wake?.events ?? []), ...(jet === null || told ? [] : pinchOffOf(jet.own, ofPulse))]
  const ends = events.filter(({ event }) => event === 'end')
  const last = ends.length > 0 || jet === null ? ends : [endOf(jet.own)]
  // Sorting keeps the order of events at one time.
  const others = events.filter(({ event }) => event !== 'end').sort((a, b) => a.time - b.time)
  return [...others, ...last]
}

function pinchOffOf({ shown }: JetEnsemble, ofPulse: boolean): WakeEvent[] {
  const { pinchOff, ring } = shown
  if (pinchOff === null) return []
  const formation = `formation time ${pinchOff.formationTime.toFixed(2)}`
  const holds = ring === null ? '' : `; the ring holds ${ring.circulation.toPrecision(4)} m2/s`
  return [
    {
      time: pinchOff.time,
      event: 'pinch-off',
      rings: ofPulse ? [1] : [],
      x: ring?.x ?? null,
      detail: `seen at ${formation} in the shown run (smoothing length ${shown.delta} D); cut at x = ${Number(pinchOff.cutX.toPrecision(4))} m${holds}`,
    },
  ]
}

function endOf({ shown }: JetEnsemble): WakeEvent {
  return { time: shown.time, event: 'end', rings: [], x: null, detail: shown.message }
}

/**
 * The jet section of summary.json. Ring, totals and what lies beyond the slug are those of the plan's own stroke; formation number, its
 * range, `byDelta` and the formation instant those of the run that tells it, of stroke ratio `formationStrokeRatio`. `pinchOffTime` is the
 * mean over the smoothing lengths, `pinchOffTimeShown` that of the shown one, `shownDelta`, as events.csv tells it.
 */
export function jetSummary(jet: JetOutcome): object {
  const { own, formation } = jet
  const teller = formation ?? own
  const { pinchOff, counters, strokeRatio, delta, stoppingCirculation } = own.shown
  return {
    formationNumber: formation?.formationNumber ?? null,
    formationNumberLow: formation?.formationNumberLow ?? null,
    formationNumberHigh: formation?.formationNumberHigh ?? null,
    formationStrokeRatio: formation?.shown.strokeRatio ?? null,
    byDelta: formation === null ? own.byDelta.map((row) => ({ ...row, formationNumber: null })) : teller.byDelta,
    ringByDelta: formation === null || formation === own ? undefined : own.byDelta,
    ringCirculation: own.ringCirculation,
    totalCirculation: own.totalCirculation,
    ringDimensionlessEnergy: own.ringDimensionlessEnergy,
    ringLimitingCirculation: own.ringLimitingCirculation,
    formationInstant: formation?.formationInstant ?? null,
    pinchOffTime: own.pinchOffTime,
    pinchOffTimeShown: pinchOff?.time ?? null,
    ringSpeed: own.ringSpeed,
    trailingJet: own.trailingJet,
    circulationBeyondSlug: own.circulationBeyondSlug,
    impulseBeyondSlug: own.impulseBeyondSlug,
    energyBeyondSlug: own.energyBeyondSlug,
    takenInLater: pinchOff?.takenInLater ?? null,
    stoppingCirculation,
    strokeRatio,
    shownDelta: delta,
    filaments: Math.max(own.filaments, formation?.filaments ?? 0),
    drift: own.drift,
    counters,
    status: jet.status,
    message: jet.message,
    notes: jet.notes,
  }
}
