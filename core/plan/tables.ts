/**
 * Results written out as the contract's tables and summary. The window's exports and the headless runner both call these.
 */
import { at } from '../base'
import {
  EVENT_COLUMNS,
  eventRows,
  TRAJECTORY_COLUMNS,
  trajectoryRows,
  wakeFrame,
  wakePolyData,
  wakeSummary,
  type Wake,
} from '../filament'
import type { PulseResult } from '../pulse'
import type { WaterProperties } from '../water'
import { writeCsv } from './csvWriter'
import { eventsOf, jetSummary, type JetOutcome } from './jetTables'
import type { Caution } from './types'

export const PULSE_COLUMNS = [
  'time (s)',
  'exit speed (m/s)',
  'formation time',
  'circulation (m2/s)',
  'impulse (N s)',
  'energy (J)',
] as const

/** pulse.csv: slug sums at 201 equal times plus the programme's corners. */
export function pulseTable(pulse: PulseResult): string {
  const { time, exitSpeed, formationTime, circulation, impulse, energy } = pulse.history
  const rows = time.map((t, i) => [
    t,
    at(exitSpeed, i),
    at(formationTime, i),
    at(circulation, i),
    at(impulse, i),
    at(energy, i),
  ])
  return writeCsv(PULSE_COLUMNS, rows)
}

/** trajectory.csv: every ring at every output time of its life. */
export function trajectoryTable(wake: Wake): string {
  return writeCsv(TRAJECTORY_COLUMNS, trajectoryRows(wake))
}

/** events.csv of a wake, a starting jet, or both; `end` is always last. @param ofPulse whether the wake follows the rings of the pulse */
export function eventTable(wake: Wake | null, jet: JetOutcome | null = null, ofPulse = true): string {
  return writeCsv(EVENT_COLUMNS, eventRows(eventsOf(wake, jet, ofPulse)))
}

/** Name of the file with the rings at one output time, from 0. */
export function wakeFileName(index: number): string {
  return `${String(index).padStart(6, '0')}.vtp`
}

/** The rings at one output time as a PolyData file. */
export function wakeFile(wake: Wake, index: number): string {
  return wakePolyData(wakeFrame(wake, index), at(wake.outputTimes, index))
}

/** wake-times.csv: which file holds which time. */
export function wakeTimesTable(wake: Wake): string {
  return writeCsv(
    ['time (s)', 'file'],
    Array.from(wake.outputTimes, (time, index) => [time, `wake/${wakeFileName(index)}`]),
  )
}

export const SUMMARY_FORMAT = 'ringwright-summary'
export const SUMMARY_VERSION = 1

export interface SummaryInput {
  readonly water: WaterProperties
  readonly pulse: PulseResult | null
  readonly jet: JetOutcome | null
  /** The wake with what belongs beside it; null where it was not computed. */
  readonly wake: {
    readonly wake: Wake
    readonly ageing: string
    readonly arrivals: readonly object[]
    readonly notes: readonly string[]
  } | null
  readonly cautions: readonly Caution[]
  readonly title: string
  readonly files: readonly string[]
  readonly program: { readonly name: string; readonly version: string }
  readonly inputHash: string
}

/** summary.json: two-space indent, SI, null where an estimate is absent; sections not computed are left out. */
export function summaryText(input: SummaryInput): string {
  const { water, pulse } = input
  const document = {
    format: SUMMARY_FORMAT,
    version: SUMMARY_VERSION,
    title: input.title,
    program: input.program,
    inputHash: input.inputHash,
    files: input.files,
    water: {
      density: water.density,
      kinematicViscosity: water.kinematicViscosity,
      vapourPressure: water.vapourPressure ?? undefined,
      absolutePressure: water.absolutePressure,
      sources: water.sources,
      notes: water.notes,
    },
    pulse: pulse === null ? undefined : pulseSummary(pulse),
    jet: input.jet === null ? undefined : jetSummary(input.jet),
    wake: input.wake === null ? undefined : wakeSection(input.wake),
    cautions: input.cautions,
  }
  return `${JSON.stringify(document, null, 2)}\n`
}

/** The pulse section: everything but the histories, which are pulse.csv. */
function pulseSummary(pulse: PulseResult): object {
  const { history, ...rest } = pulse
  return { ...rest, samples: history.time.length }
}

function wakeSection({ wake, ageing, arrivals, notes }: NonNullable<SummaryInput['wake']>): object {
  const { status, message, time, counters, modelReason } = wake
  return {
    ...wakeSummary(wake),
    modelReason,
    ageing,
    arrivals,
    status,
    message,
    time,
    counters,
    notes: [...notes, ...wake.notes],
  }
}
