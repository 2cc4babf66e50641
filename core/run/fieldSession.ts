/**
 * Velocity fields of a plan, frame by frame: window and runner hand over one file after another, and only its numbers and, where it is
 * looked at, its picture are kept.
 */
import { at, bracket, DomainError } from '../base'
import { eachFieldFrame, READINGS_DEFAULTS, type FieldFrameChoices, type Plan } from '../plan'
import type { PulseHistory } from '../pulse'
import {
  createFieldAnalysis,
  type FieldNumbers,
  type FieldOptions,
  type FieldResult,
  type ReadingsColumn,
} from '../tank'
import { waterProperties } from '../water'
import { fieldPicture, type FieldPicture } from './fieldPicture'
import { pulseOf } from './pulse'

/** One frame as it was analysed. */
export interface AnalysedField {
  readonly numbers: FieldNumbers
  /** null where it is not to be looked at. */
  readonly picture: FieldPicture | null
}

export type FileOutcome =
  | {
      readonly ok: true
      readonly frames: readonly AnalysedField[]
      /** Columns as they were read, to be kept. */
      readonly columns: readonly ReadingsColumn[]
      /** Frames and rows that were left out, a sentence each. */
      readonly skipped: readonly string[]
    }
  | { readonly ok: false; readonly message: string }

export interface FieldSession {
  /** Take in one file of one or several frames. @param timeOf time of a frame that tells none, by its number in the file from 0 [s] */
  add(text: string, timeOf: (frame: number) => number, choices: FieldFrameChoices): FileOutcome
  result(): FieldResult
}

/** @param pictures whether frames are to be looked at @throws {DomainError} where the plan has no pulse to compare with */
export function fieldSession(plan: Plan, pictures: boolean): FieldSession {
  const calibration = plan.readings?.calibration ?? READINGS_DEFAULTS.calibration
  const options = fieldOptionsOf(plan)
  const analysis = createFieldAnalysis(options)
  return {
    add(text, timeOf, choices) {
      const frames: AnalysedField[] = []
      const skipped: string[] = []
      const reading = eachFieldFrame(text, timeOf, choices, (frame) => {
        try {
          const numbers = analysis.add(frame)
          frames.push({ numbers, picture: pictures ? fieldPicture(frame, options.diameter, calibration) : null })
        } catch (error) {
          if (!(error instanceof DomainError)) throw error
          skipped.push(sentenceOf(error.message))
        }
      })
      if (!reading.ok) return reading
      if (frames.length === 0) return { ok: false, message: skipped[0] ?? 'it holds no frame' }
      if (reading.skippedCount > 0)
        skipped.push(`${reading.skippedCount} rows were skipped. ${reading.skipped[0]?.message ?? ''}`)
      return { ok: true, frames, columns: reading.columns, skipped }
    },
    result: () => analysis.result(),
  }
}

function sentenceOf(text: string): string {
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`
}

function fieldOptionsOf(plan: Plan): FieldOptions {
  if (plan.absent.length > 0)
    throw new DomainError(
      'readings.fields',
      `Velocity fields need a pulse: the plan has no ${plan.absent.join(' and no ')}.`,
    )
  const water = waterProperties(plan.water)
  const { history, peakSpeed } = pulseOf(plan, water)
  return {
    diameter: plan.nozzle.diameter,
    peakSpeed,
    density: water.density,
    formationTime: formationTimeOf(history),
    calibration: plan.readings?.calibration ?? READINGS_DEFAULTS.calibration,
  }
}

/** Formation time of the programme at a time, straight between its samples. */
function formationTimeOf({ time, formationTime }: PulseHistory): (now: number) => number {
  const end = time.length - 1
  return (now) => {
    if (now <= at(time, 0)) return 0
    if (now >= at(time, end)) return at(formationTime, end)
    const i = bracket(time, now)
    const span = at(time, i + 1) - at(time, i)
    const share = span > 0 ? (now - at(time, i)) / span : 0
    return at(formationTime, i) + share * (at(formationTime, i + 1) - at(formationTime, i))
  }
}
