import type { Wake } from '../filament'
import type { PulseResult } from '../pulse'
import type { TankRunResult } from '../tank'
import type { SizingResult, ThrusterResult } from '../thruster'
import type { WaterProperties } from '../water'
import type { JetOutcome } from './jetTables'
import type { Plan } from './types'
import type { SpreadOutcome } from './variedTypes'

/** What a caution's trigger may look at. */
export interface CautionContext {
  readonly plan: Plan
  readonly water: WaterProperties | null
  readonly pulse: PulseResult | null
  /** The starting jet the pulse read or that was asked for; null where none was computed. */
  readonly jet: JetOutcome | null
  /** Why a starting jet that belongs to these results is not in them, in a sentence; null where none is missing. */
  readonly jetMissing: string | null
  readonly wake: Wake | null
  /** What had to be said about where the rings of the wake come from. */
  readonly wakeNotes: readonly string[]
  readonly thruster: ThrusterResult | null
  /** The sizing of the thruster; null where none was made. */
  readonly sizing: SizingResult | null
  readonly tankRun: TankRunResult | null
  readonly spread: SpreadOutcome | null
}

/** Where a caution belongs: beside a result, a moving machine, a laboratory run, or a vehicle and its bench. */
export type CautionGroup = 'model' | 'machine' | 'laboratory' | 'vehicle'

export interface CautionDefinition {
  readonly id: string
  readonly group: CautionGroup
  /** A publication, or "common practice". */
  readonly source: string
  /** The sentence for this plan, or null where the caution does not hold. */
  readonly text: (context: CautionContext) => string | null
}
