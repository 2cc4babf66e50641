/**
 * What every march of rings gives back, coaxial or in space. SI; rings are numbered from 1.
 */
import type { RunStatus } from '../base'

export type WakeEventKind = 'pass' | 'arrival' | 'cores-touch' | 'near-wall' | 'pinch-off' | 'merge' | 'end'

export interface WakeEvent {
  readonly time: number
  readonly event: WakeEventKind
  /** Numbers of the rings concerned, from 1, rising. */
  readonly rings: readonly number[]
  /** Where along the jet axis [m]; null where there is no one place. */
  readonly x: number | null
  /** A short clause for the reader. */
  readonly detail: string
}

/** Work done by the march. */
export interface WakeCounters {
  readonly steps: number
  readonly rejected: number
  readonly evaluations: number
}

/**
 * Largest relative departure of the sums from their value at the start, or at the last appearance or merger of rings. null where the
 * quantity is not conserved: with viscosity, walls or a stream.
 */
export interface WakeDrift {
  readonly circulation: number | null
  readonly impulse: number | null
  readonly energy: number | null
}

/** What both engines report besides their trajectories. */
export interface WakeOutcome {
  readonly status: RunStatus
  /** A sentence: how it ended. */
  readonly message: string
  /** Time reached [s]. */
  readonly time: number
  /** Output times [s]: every output step and the last time. */
  readonly outputTimes: Float64Array
  readonly events: readonly WakeEvent[]
  readonly drift: WakeDrift
  readonly counters: WakeCounters
  /** Time up to which the model holds [s]. */
  readonly validUntil: number
  /** Why not longer, or that it held throughout. */
  readonly reason: string
}
