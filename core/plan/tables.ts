/**
 * Results written out as the contract's tables. The window's exports and the headless runner both call these.
 */
import { at } from '../base'
import {
  EVENT_COLUMNS,
  eventRows,
  TRAJECTORY_COLUMNS,
  trajectoryRows,
  wakeFrame,
  wakePolyData,
  type Wake,
} from '../filament'
import type { PulseResult } from '../pulse'
import { writeCsv } from './csvWriter'
import { eventsOf, type JetOutcome } from './jetTables'

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
