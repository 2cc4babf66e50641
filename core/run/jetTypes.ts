import type { JetEnsemble } from '../coaxial'

/** The starting jet of a plan. */
export interface JetData {
  /** 'done' where both runs came to their end; else how the first that did not ended. */
  readonly status: JetEnsemble['status']
  readonly message: string
  /** The plan's own stroke: history, shapes of the sheet, ring, what leaves beyond the slug. */
  readonly own: JetEnsemble
  /** The run that gives the formation number; `own` itself where the stroke is long enough to tell it. Null where it was not reached. */
  readonly formation: JetEnsemble | null
  /** What was left out or stood in for, in sentences. */
  readonly notes: readonly string[]
}
