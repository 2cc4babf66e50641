/**
 * Sections of the plan around the core of it: sweep, spread and what is held.
 */
import type { JsonObject } from './json'

/** One field of the plan with the values it is to take. */
export interface SweepField {
  /** Dotted path in the plan, for instance `nozzle.diameter`. */
  readonly path: string
  readonly values: readonly number[]
  /** How the values were given, to be written back: ends and count, or the list. */
  readonly given: { readonly from: number; readonly to: number; readonly count: number } | null
}

export interface SweepSection {
  readonly fields: readonly SweepField[]
  /** Dotted paths in the summary that become columns; empty: the usual ones. */
  readonly results: readonly string[]
}

export interface SpreadSection {
  /** Relative standard deviation by plan path. */
  readonly relative: Readonly<Record<string, number>>
  /** Absolute standard deviation by plan path [SI]. */
  readonly absolute: Readonly<Record<string, number>>
  readonly samples: number
  readonly seed: number
}

/** A design kept to be held against others: its name and the sections that make it. */
export interface HeldDesign {
  readonly name: string
  readonly plan: JsonObject
}
