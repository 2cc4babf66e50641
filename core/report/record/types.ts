/** What a design record is made from. */
import type { JetOutcome, Plan, SpreadBand, SpreadOutcome, SummaryResults } from '../../plan'
import type { Wake, WakeRing } from '../../filament'
import type { DocumentBlock } from '../document/types'
import type { Show } from './show'

/** One ring at one station, with the range between the ageing laws. */
export interface RecordArrival {
  readonly station: number
  readonly ring: number
  readonly time: number
  readonly timeLow: number
  /** null where it is open: not arrived under the other law by the end of its run. */
  readonly timeHigh: number | null
}

export interface RecordWake {
  readonly wake: Wake
  /** The rings the march began with. */
  readonly rings: readonly WakeRing[]
  readonly ageing: 'laminar' | 'turbulent'
  /** The same rings under the turbulent law, where both apply; null else. */
  readonly turbulent: Wake | null
  readonly arrivals: readonly RecordArrival[]
  readonly notes: readonly string[]
}

export interface RecordSpread extends SpreadOutcome {
  readonly circulation: SpreadBand | null
  readonly position: SpreadBand | null
}

/** Results by section, as a run gives them; null where a section was not computed. */
export interface RecordData extends Omit<SummaryResults, 'jet' | 'wake' | 'spread'> {
  readonly jet: JetOutcome | null
  readonly wake: RecordWake | null
  readonly spread: RecordSpread | null
}

export interface RecordMeta {
  /** As it is to be printed. */
  readonly date: string
  readonly program: { readonly name: string; readonly version: string }
  /** Of the plan's canonical input, in hexadecimal digits. */
  readonly inputHash: string
}

/** What every part of the record is written from. */
export interface RecordContext {
  readonly plan: Plan
  readonly data: RecordData
  readonly show: Show
}

export type RecordPart = (context: RecordContext) => readonly DocumentBlock[]
