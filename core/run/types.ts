import type { RunStatus } from '../base'
import type { Caution } from '../plan'
import type { PulseResult } from '../pulse'
import type { WaterProperties } from '../water'
import type { JetData } from './jetTypes'
import type { WakeData } from './wake'

/** Sections of results that this version computes, in the order they depend on one another. */
export const SECTIONS = ['water', 'pulse', 'jet', 'wake'] as const
export type Section = (typeof SECTIONS)[number]

/** Everything computed from one plan. A section not asked for is null. Frozen; replaced whole. */
export interface RunData {
  readonly water: WaterProperties
  readonly pulse: PulseResult | null
  /** Only where it was asked for: a jet that the pulse needed alone is in the pulse. */
  readonly jet: JetData | null
  readonly wake: WakeData | null
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
