/**
 * What was measured at the tank or on the stand, as the plan keeps it. SI after calibration; x along the jet from the exit plane, time
 * from the first motion of the piston.
 */
import type { ProgrammeRow } from '../../pulse'

/** What a fit may change. */
export type FitName = 'circulation' | 'startTime' | 'startPosition' | 'coreRadius' | 'radius'

/** Every name, in the order in which results list them. */
export const FIT_NAMES: readonly FitName[] = ['circulation', 'startTime', 'startPosition', 'radius', 'coreRadius']

/** One look at a ring, as it was read off: before the calibration. null: not measured. */
export interface ReadingRow {
  /** Which run it belongs to; repeats have one name each. */
  readonly run: string
  /** [s] */
  readonly time: number
  /** Place of the core's centre along the axis [m]. */
  readonly x: number | null
  /** Radius of the core's centre [m]. */
  readonly radius: number | null
  /** [m2/s] */
  readonly circulation: number | null
  /** Standard uncertainties of the three; null: not told. */
  readonly sigmaX: number | null
  readonly sigmaRadius: number | null
  readonly sigmaCirculation: number | null
}

/** A log of the force on the stand; both lists have one length, times rise. */
export interface ForceLog {
  /** [s] */
  readonly time: Float64Array
  /** Along the thrust [N]. */
  readonly force: Float64Array
}

/** From what was read off to SI from the piston's start: time + timeOffset, lengthScale x length + lengthOffset. */
export interface ReadingsCalibration {
  /** [s] */
  readonly timeOffset: number
  /** [m] */
  readonly lengthOffset: number
  /** Metres for each unit of length in the rows; 1 where they are in metres. Scales places, radii and their uncertainties. */
  readonly lengthScale: number
}

export type ReadingsKind = 'rows' | 'force' | 'piston' | 'fields'

/** How one column of a file was read. */
export interface ReadingsColumn {
  /** As it stands in the file; the column's number where there was no heading. */
  readonly heading: string
  /** What it was taken for; null: not used. */
  readonly role: string | null
  readonly unit: string
}

/** A file that readings came from. */
export interface ReadingsSource {
  readonly name: string
  /** SHA-256 of its bytes, in hexadecimal figures; empty where nothing was hashed (pasted cells). */
  readonly hash: string
  readonly kind: ReadingsKind
  readonly columns: readonly ReadingsColumn[]
}

/** Velocity fields are too large for a plan: it keeps what tells whether the files are those analysed. */
export interface FieldFiles {
  readonly frames: readonly { readonly name: string; readonly time: number }[]
  /** Of all frames, in their order. */
  readonly hash: string
}

export interface ReadingsSection {
  readonly rows: readonly ReadingRow[]
  readonly force: ForceLog
  /** As-run log of the piston itself, not of the exit. */
  readonly piston: readonly ProgrammeRow[]
  readonly fit: readonly FitName[]
  readonly calibration: ReadingsCalibration
  readonly sources: readonly ReadingsSource[]
  readonly fields: FieldFiles | null
  /** Lowest resonance of the force stand [Hz]; null: not told. */
  readonly standResonance: number | null
}

/** A force log from its two lists. */
export function forceLog(time: ArrayLike<number>, force: ArrayLike<number>): ForceLog {
  return { time: Float64Array.from(time), force: Float64Array.from(force) }
}

/** Rows with the calibration put in. */
export function calibrated(
  rows: readonly ReadingRow[],
  { timeOffset, lengthOffset, lengthScale }: ReadingsCalibration,
): readonly ReadingRow[] {
  const scaled = (value: number | null): number | null => (value === null ? null : lengthScale * value)
  return rows.map((row) => ({
    ...row,
    time: row.time + timeOffset,
    x: row.x === null ? null : lengthScale * row.x + lengthOffset,
    radius: scaled(row.radius),
    sigmaX: scaled(row.sigmaX),
    sigmaRadius: scaled(row.sigmaRadius),
  }))
}
