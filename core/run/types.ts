import type { RunStatus } from '../base'
import type { Caution } from '../plan'
import type { PulseResult } from '../pulse'
import type { FieldResult, ReadingsResult, TankRunResult } from '../tank'
import type { WaterProperties } from '../water'
import type { JetData } from './jetTypes'
import type { SpreadData } from './spread'
import type { SweepData } from './sweepData'
import type { ThrusterData } from './thruster'
import type { WakeData } from './wake'

/** Sections of results that this version computes, in the order they depend on one another. */
export const SECTIONS = ['water', 'pulse', 'jet', 'wake', 'thruster', 'tankRun', 'readings', 'sweep', 'spread'] as const
export type Section = (typeof SECTIONS)[number]

export interface RunRequest {
  /** Sections wanted; water is always computed, and what a section depends on is computed with it. */
  readonly sections: readonly Section[]
  /**
   * run (as it is where it is not given): a starting jet that is wanted or depended on is computed. cached: it is only looked for among
   * the finished ones of `jetCache`; where it is not there, the pulse does without, and a caution says so. For runs at every change.
   */
  readonly jet?: 'run' | 'cached'
  /**
   * run (as it is where it is not given): the search of a thruster is made where the plan asks for one. off: only the thruster as it
   * stands is computed. For runs at every change.
   */
  readonly sizing?: 'run' | 'off'
  /**
   * judged (as it is where it is not given): every combination of a tank run's matrix is held against drive and tank. plain: the order
   * only. For sweeps, whose rows do not read it.
   */
  readonly order?: 'judged' | 'plain'
  /** What the velocity fields that belong to the readings gave; absent or null: none were read. */
  readonly fields?: FieldResult | null
}

/** Everything computed from one plan. A section not asked for is null. Frozen; replaced whole. */
export interface RunData {
  readonly water: WaterProperties
  readonly pulse: PulseResult | null
  /** Only where it was asked for: a jet that the pulse needed alone is in the pulse. */
  readonly jet: JetData | null
  readonly wake: WakeData | null
  readonly thruster: ThrusterData | null
  readonly tankRun: TankRunResult | null
  readonly readings: ReadingsResult | null
  readonly sweep: SweepData | null
  readonly spread: SpreadData | null
  readonly cautions: readonly Caution[]
}

export interface RunResult {
  readonly status: RunStatus
  readonly message: string
  /** Plan path a failure belongs to, where it has one. */
  readonly field?: string
  /** What was finished; null where nothing was. */
  readonly data: RunData | null
}
