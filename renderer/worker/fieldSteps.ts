/**
 * Velocity fields in the worker: one session at a time, one file a step. The window hands the bytes over, so that reading, analysis and
 * hashing cost it nothing.
 */
import { DomainError } from '../../core/base'
import {
  readReadings,
  type FieldFrameChoices,
  type Plan,
  type ReadingsChoices,
  type ReadingsReading,
} from '../../core/plan'
import { fieldSession, type AnalysedField, type FieldSession } from '../../core/run'
import type { FieldResult, ReadingsColumn } from '../../core/tank'
import { decodeText, hashOf, NO_TEXT } from './fileText'

export type FieldStep =
  | { readonly do: 'begin'; readonly plan: Plan }
  | {
      readonly do: 'file'
      readonly bytes: ArrayBuffer
      /** Of the file's first frame where it tells no time, and from frame to frame [s]. */
      readonly time: number
      readonly step: number
      readonly choices: FieldFrameChoices
    }
  | { readonly do: 'end' }
  /** Nothing of the session: a table of readings, which may be long. */
  | { readonly do: 'table'; readonly text: string; readonly choices: ReadingsChoices }

export interface AnalysedFile {
  /** SHA-256 of the file, in hexadecimal figures. */
  readonly hash: string
  readonly frames: readonly AnalysedField[]
  readonly columns: readonly ReadingsColumn[]
  readonly skipped: readonly string[]
}

export type FieldAnswer =
  | {
      readonly ok: true
      readonly file: AnalysedFile | null
      readonly result: FieldResult | null
      readonly table: ReadingsReading | null
    }
  | { readonly ok: false; readonly message: string }

const BEGUN = { ok: true, file: null, result: null, table: null } as const

export function createFieldSteps(): (step: FieldStep) => Promise<FieldAnswer> {
  let session: FieldSession | null = null
  return async (step) => {
    try {
      if (step.do === 'table') return { ...BEGUN, table: readReadings(step.text, step.choices) }
      if (step.do === 'begin') {
        session = fieldSession(step.plan, true)
        return BEGUN
      }
      if (session === null) return { ok: false, message: 'The analysis was stopped: begin it again.' }
      if (step.do === 'end') return { ok: true, file: null, result: session.result(), table: null }
      const text = decodeText(step.bytes)
      if (text === null) return { ok: false, message: NO_TEXT }
      const outcome = session.add(text, (frame) => step.time + frame * step.step, step.choices)
      if (!outcome.ok) return outcome
      const { frames, columns, skipped } = outcome
      return { ok: true, file: { hash: await hashOf(step.bytes), frames, columns, skipped }, result: null, table: null }
    } catch (error) {
      if (error instanceof DomainError) return { ok: false, message: error.message }
      throw error
    }
  }
}
