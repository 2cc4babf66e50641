/** Planar velocity fields from CSV: a frame a file, or several frames in one file. */
import type { FieldFrame, ReadingsColumn } from '../tank'
import type { ReadingsChoices } from './readingsColumns'
import { walkReadings } from './readingsCsv'
import type { SkippedRow } from './ringCsv'

/** As for other readings; the kind is that of a field. */
export type FieldFrameChoices = Omit<ReadingsChoices, 'kind'>

export interface FieldFrames {
  readonly ok: true
  readonly frames: number
  readonly columns: readonly ReadingsColumn[]
  readonly delimiter: string
  readonly decimalComma: boolean
  readonly skipped: readonly SkippedRow[]
  readonly skippedCount: number
  readonly notes: readonly string[]
}

export type FieldFramesReading = FieldFrames | { readonly ok: false; readonly message: string }

export type FieldFrameReading =
  (FieldFrames & { readonly frame: FieldFrame }) | { readonly ok: false; readonly message: string }

/** Nodes of a frame while its lines come in. */
interface Growing {
  readonly name: string
  readonly time: number | null
  readonly x: number[]
  readonly r: number[]
  readonly u: number[]
  readonly v: number[]
}

/**
 * Every frame of a file, one at a time: a new frame begins where its time or its number changes, or after an empty line.
 *
 * @param timeOf time of a frame that tells none, by its number from 0 [s]
 * @param visit gets a frame as soon as it is whole; only that one is held
 */
export function eachFieldFrame(
  source: string,
  timeOf: (frame: number) => number,
  choices: FieldFrameChoices,
  visit: (frame: FieldFrame) => void,
): FieldFramesReading {
  let frames = 0
  let growing: Growing | null = null
  const close = (): void => {
    if (growing === null) return
    const { time, x, r, u, v } = growing
    visit({
      time: time ?? timeOf(frames),
      x: Float64Array.from(x),
      r: Float64Array.from(r),
      u: Float64Array.from(u),
      v: Float64Array.from(v),
    })
    frames++
    growing = null
  }
  const walked = walkReadings(source, { ...choices, kind: 'fields' }, (values, { run, newRun }) => {
    const [x, r] = [values.get('x') ?? null, values.get('r') ?? null]
    if (x === null || r === null) return 'the place of its node must be given.'
    const time = values.get('time') ?? null
    if (newRun || growing?.name !== run || growing.time !== time) close()
    growing ??= { name: run, time, x: [], r: [], u: [], v: [] }
    growing.x.push(x)
    growing.r.push(r)
    // A node without a vector keeps its place: it is filled, and told, by the analysis.
    growing.u.push(values.get('u') ?? Number.NaN)
    growing.v.push(values.get('v') ?? Number.NaN)
    return null
  })
  if (!walked.ok) return walked
  close()
  if (frames === 0) return { ok: false, message: walked.skipped[0]?.message ?? 'The table has a heading and no nodes.' }
  const { columns, delimiter, decimalComma, skipped, skippedCount, notes } = walked
  return { ok: true, frames, columns, delimiter, decimalComma, skipped, skippedCount, notes }
}

/**
 * The one frame of a file.
 *
 * @param time of the frame where its file does not tell one [s]
 */
export function readFieldFrame(source: string, time: number, choices: FieldFrameChoices = {}): FieldFrameReading {
  let first: FieldFrame | null = null
  const reading = eachFieldFrame(
    source,
    () => time,
    choices,
    (frame) => {
      first ??= frame
    },
  )
  if (!reading.ok) return reading
  const frame: FieldFrame | null = first
  if (frame === null || reading.frames > 1)
    return { ok: false, message: `The file holds ${reading.frames} frames where one is read at a time.` }
  return { ...reading, frame }
}
