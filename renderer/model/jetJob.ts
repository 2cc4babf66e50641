/**
 * The starting jet of the open plan: computed in a worker when it is asked for.
 *
 * A run shows how far it is and can be cancelled; what was finished by then is kept and marked. A change of what the jet depends on
 * marks the results stale; a step back to a plan whose jet is known brings that back.
 */
import type { Plan } from '../../core/plan'
import type { PulseResult } from '../../core/pulse'
import type { JetData, RunData, RunResult } from '../../core/run'
import type { WorkerClient } from '../worker/client'
import { CANCELLED_PART, createAskedJob, NO_RESULTS, type Answer, type AskedJob, type AskedResults } from './askedJob'

export interface FinishedJet extends AskedResults {
  readonly data: RunData
  readonly jet: JetData
  /** The pulse of the same plan; null where the run ended before it. */
  readonly pulse: PulseResult | null
}

export type JetJob = AskedJob<FinishedJet>

export interface JetJobOptions {
  readonly client: WorkerClient
  /** The plan as it is shown. */
  readonly open: () => Plan
  /** Told once a crash, with a sentence. */
  readonly onCrash?: (sentence: string) => void
  /** A whole jet is there: what reads it can be computed anew. */
  readonly onDone?: () => void
}

/** Jets kept in the window for steps back. */
const MOST_KEPT = 4

/** Whether two plans have the same starting jet: what it does not read may differ. */
export function sameJet(a: Plan, b: Plan): boolean {
  if (a === b) return true
  return (
    a.water === b.water &&
    a.nozzle === b.nozzle &&
    a.programme === b.programme &&
    a.ambient === b.ambient &&
    a.jet === b.jet
  )
}

export function createJetJob({
  client,
  open,
  onCrash = () => undefined,
  onDone = () => undefined,
}: JetJobOptions): JetJob {
  return createAskedJob({
    client,
    open,
    onCrash,
    onDone,
    sections: ['water', 'pulse', 'jet'],
    same: sameJet,
    answerOf,
    mostKept: MOST_KEPT,
    words: {
      nothing: NO_RESULTS,
      crashed: 'The computation stopped unexpectedly. Change a value or run it again.',
      crashNotice: 'The starting jet stopped unexpectedly and its worker was started afresh',
    },
  })
}

function answerOf(plan: Plan, { status, message, data, field }: RunResult): Answer<FinishedJet> {
  const jet = data?.jet ?? null
  const failure = status === 'failed' ? { field: field ?? null, message } : null
  if (data !== null && jet !== null && jet.own.shown.snapshots.length > 0) {
    const partial = status === 'done' ? null : status === 'cancelled' ? CANCELLED_PART : message
    return { kept: { plan, data, jet, pulse: data.pulse, partial }, failure }
  }
  return { kept: null, failure: status === 'cancelled' ? { field: null, message: NO_RESULTS } : failure }
}
