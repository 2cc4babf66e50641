/**
 * The spread of the open plan: drawn many times in a worker when it is asked for. What was drawn before a cancellation is kept and marked;
 * a change of what a sample reads marks it stale.
 */
import type { Caution, Plan } from '../../core/plan'
import type { RunResult, SpreadData } from '../../core/run'
import type { WorkerClient } from '../worker/client'
import { createAskedJob, type Answer, type AskedJob, type AskedResults } from './askedJob'

export interface FinishedSpread extends AskedResults {
  readonly spread: SpreadData
  readonly cautions: readonly Caution[]
}

export type SpreadJob = AskedJob<FinishedSpread>

const READ = [
  'water',
  'nozzle',
  'programme',
  'ambient',
  'models',
  'jet',
  'wake',
  'thruster',
  'tankRun',
  'spread',
] as const

/** Whether two plans have the same spread: what no sample reads may differ. */
export function sameSpread(a: Plan, b: Plan): boolean {
  return a === b || READ.every((section) => a[section] === b[section])
}

/** Whether the plan says what is uncertain. */
export function drawsAnything({ spread }: Plan): boolean {
  return spread !== null && Object.keys(spread.relative).length + Object.keys(spread.absolute).length > 0
}

/** @param open the plan as it is shown @param onCrash told once a crash, with a sentence */
export function createSpreadJob(
  client: WorkerClient,
  open: () => Plan,
  onCrash: (sentence: string) => void = () => undefined,
): SpreadJob {
  return createAskedJob({
    client,
    open,
    onCrash,
    sections: ['water', 'spread'],
    same: sameSpread,
    answerOf,
    failureFirst: true,
    keepsStopped: true,
    words: {
      nothing: NOTHING,
      crashed: 'The spread stopped unexpectedly. Change a value or run it again.',
      crashNotice: 'The spread stopped unexpectedly and its worker was started afresh',
    },
  })
}

function answerOf(plan: Plan, { status, message, data, field }: RunResult): Answer<FinishedSpread> {
  const spread = data?.spread ?? null
  if (data !== null && spread !== null && spread.used > 0) {
    const partial = status === 'done' ? null : message
    return { kept: { plan, spread, cautions: data.cautions, partial }, failure: null }
  }
  if (status === 'cancelled') return { kept: null, failure: { field: null, message: NOTHING } }
  const reason = status === 'done' ? 'No sample could be computed: see what is uncertain by how much.' : message
  return { kept: null, failure: { field: field ?? null, message: reason } }
}

const NOTHING = 'The spread was cancelled before its first sample.'
