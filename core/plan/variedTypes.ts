/**
 * Results of a plan that is computed many times: rows of a sweep, samples of a spread.
 */
import type { RunStatus } from '../base'
import type { Cell } from './csvWriter'

/** One row of a sweep. */
export interface SweepRow {
  /** From 1, in the order of the whole sweep. */
  readonly row: number
  /** What was set, in the order of the fields. */
  readonly inputs: readonly number[]
  /** In the order of the results; null where there is no value. */
  readonly results: readonly Cell[]
  /** False where a limit is broken, or the row could not be computed. */
  readonly feasible: boolean
  /** Limits that are broken, by name, or why the row could not be computed; null where neither is so. */
  readonly limit: string | null
}

export interface SweepOutcome {
  /** Rows of the whole sweep. */
  readonly total: number
  /** Plan paths that are set, and summary paths that are read. */
  readonly paths: readonly string[]
  readonly results: readonly string[]
}

/** What the values of one quantity come to over the samples; null where there are too few. */
export interface SpreadFigures {
  readonly mean: number | null
  /** Of the samples: sum of squares over n - 1. */
  readonly standardDeviation: number | null
  /** Percentiles, straight between order statistics at (n - 1) p (Hyndman & Fan 1996, type 7). */
  readonly p05: number | null
  readonly p50: number | null
  readonly p95: number | null
  /** Of the plan as it stands. */
  readonly nominal: number | null
  /** Samples that have a value. */
  readonly samples: number
}

export interface SpreadQuantity extends SpreadFigures {
  /** Dotted summary path. */
  readonly path: string
  /** SI; '' for a pure number. */
  readonly unit: string
}

/** A curve with its percentiles; every array has one length. */
export interface SpreadBand {
  readonly x: readonly number[]
  readonly nominal: readonly number[]
  readonly p05: readonly number[]
  readonly p50: readonly number[]
  readonly p95: readonly number[]
}

/** Samples that no pulse, thruster or ring could be computed for, by the field that stands in the way. */
export interface SpreadRefusal {
  readonly field: string
  readonly count: number
  /** The sentence of the first of them. */
  readonly message: string
}

export interface SpreadOutcome {
  readonly status: RunStatus
  readonly message: string
  /** Asked for, computed, and refused; the rest was not come to. */
  readonly samples: number
  readonly used: number
  readonly refused: number
  readonly refusals: readonly SpreadRefusal[]
  readonly seed: number
  readonly quantities: readonly SpreadQuantity[]
  /** What was held or left out, in sentences. */
  readonly notes: readonly string[]
}
