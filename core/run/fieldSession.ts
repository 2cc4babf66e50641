/**
 * Velocity fields of a plan, frame by frame: window and runner hand over one file after another, and only its numbers and, where it is
 * looked at, its picture are kept.
 */
import { at, bracket, DomainError } from '../base'
import { readFieldFrame, READINGS_DEFAULTS, type FieldFrameChoices, type Plan } from '../plan'
import type { PulseHistory } from '../pulse'
import { createFieldAnalysis, type FieldNumbers, type FieldOptions, type FieldResult } from '../tank'
import { waterProperties } from '../water'
import { fieldPicture, type FieldPicture } from './fieldPicture'
import { pulseOf } from './pulse'

export type FrameOutcome =
  | { readonly ok: true; readonly numbers: FieldNumbers; readonly picture: FieldPicture | null }
  | { readonly ok: false; readonly message: string }

export interface FieldSession {
  /** Take in one file. @param time of the frame where its file does not tell one [s] */
  add(text: string, time: number, choices: FieldFrameChoices): FrameOutcome
  result(): FieldResult
}

/** @param pictures whether frames are to be looked at @throws {DomainError} where the plan has no pulse to compare with */
export function fieldSession(plan: Plan, pictures: boolean): FieldSession {
  const calibration = plan.readings?.calibration ?? READINGS_DEFAULTS.calibration
  const options = fieldOptionsOf(plan)
  const analysis = createFieldAnalysis(options)
  return {
    add(text, time, choices) {
      const reading = readFieldFrame(text, time, choices)
      if (!reading.ok) return reading
      try {
        const numbers = analysis.add(reading.frame)
        const picture = pictures ? fieldPicture(reading.frame, options.diameter, calibration) : null
        return { ok: true, numbers, picture }
      } catch (error) {
        if (error instanceof DomainError) return { ok: false, message: error.message }
        throw error
      }
    },
    result: () => analysis.result(),
  }
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
