/**
 * Which files a run writes, in the order they are written.
 */
import {
  eventTable,
  fieldsTable,
  jetTable,
  profileReadFirst,
  profileTable,
  pulseTable,
  readingsTable,
  runMatrixTable,
  spreadTable,
  sweepFileNames,
  trajectoryTable,
  wakeFile,
  wakeFileName,
  wakeTimesTable,
  type Plan,
} from '../../core/plan'
import type { RunData, Section } from '../../core/run'
import { makesRecord } from './recordFile'
import { RECORD_NAME } from './resultFolder'

/** Names that a run of these sections writes, folders among them. */
export function fileNames(sections: readonly Section[]): readonly string[] {
  const has = (section: Section): boolean => sections.includes(section)
  return [
    ...(has('pulse') ? ['pulse.csv'] : []),
    ...(has('jet') ? ['jet.csv'] : []),
    ...(has('wake') ? ['trajectory.csv', 'wake', 'wake-times.csv'] : []),
    ...(has('jet') || has('wake') ? ['events.csv'] : []),
    ...(has('tankRun') ? ['profile.csv', 'profile-read-first.txt', 'run-matrix.csv'] : []),
    ...(has('readings') ? ['readings.csv', 'readings-fields.csv'] : []),
    ...(has('spread') ? ['spread.csv'] : []),
    ...(has('sweep') ? [sweepFileNames(null).table] : []),
    ...(makesRecord(sections) ? [RECORD_NAME] : []),
  ]
}

/** A file's name and what it holds. */
export type ResultFile = readonly [name: string, content: string]

/**
 * Files of the finished sections in the order they are written, each made when its turn comes. The sweep is not among them: its rows are
 * written as they come.
 */
export function* resultFiles(plan: Plan, data: RunData): Generator<ResultFile> {
  const { pulse, jet, wake, tankRun, readings, spread, cautions } = data
  const ofPulse = plan.wake === null || plan.wake.rings.length === 0
  if (pulse !== null) yield ['pulse.csv', pulseTable(pulse)]
  if (jet !== null) yield ['jet.csv', jetTable(jet)]
  if (wake !== null) yield ['trajectory.csv', trajectoryTable(wake.wake)]
  if (jet !== null || wake !== null) yield ['events.csv', eventTable(wake?.wake ?? null, jet, ofPulse)]
  if (wake !== null) {
    for (let index = 0; index < wake.wake.outputTimes.length; index++)
      yield [`wake/${wakeFileName(index)}`, wakeFile(wake.wake, index)]
    yield ['wake-times.csv', wakeTimesTable(wake.wake)]
  }
  if (tankRun !== null) {
    // What must be read first is there before the file that moves a machine.
    yield ['profile-read-first.txt', profileReadFirst(tankRun.profile, cautions)]
    yield ['profile.csv', profileTable(tankRun.profile)]
    if (tankRun.matrix !== null) yield ['run-matrix.csv', runMatrixTable(tankRun.matrix)]
  }
  if (readings !== null) {
    yield ['readings.csv', readingsTable(readings)]
    if (readings.fields !== null) yield ['readings-fields.csv', fieldsTable(readings)]
  }
  if (spread !== null) yield ['spread.csv', spreadTable(spread)]
}

/** What was asked for: a section computed only because another needs it is not written. */
export function wanted(data: RunData, sections: readonly Section[]): RunData {
  return sections.includes('pulse') ? data : { ...data, pulse: null }
}
