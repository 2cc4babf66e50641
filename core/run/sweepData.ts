import type { RunStatus } from '../base'
import type { SweepOutcome, SweepPart, SweepRow } from '../plan'

/** What a sweep has come to. */
export interface SweepData extends SweepOutcome {
  readonly status: RunStatus
  readonly message: string
  readonly part: SweepPart
  /** The finished rows of the part; of a cancelled sweep those it came to. */
  readonly rows: readonly SweepRow[]
}
