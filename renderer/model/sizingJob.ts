/**
 * The sizing of the open plan: searched in a worker when it is asked for.
 *
 * A run shows how far it is and can be cancelled; what was found by then is kept and marked. A change of what the search reads marks
 * the candidates stale; opening one of them does not, since a search does not depend on the design it starts from.
 */
import type { Plan } from '../../core/plan'
import type { RunData, RunResult } from '../../core/run'
import type { SizingResult } from '../../core/thruster'
import type { WorkerClient } from '../worker/client'
import { createAskedJob, type Answer, type AskedJob, type AskedResults } from './askedJob'
import { designKey } from './designKey'

export interface FinishedSizing extends AskedResults {
  readonly data: RunData
  readonly sizing: SizingResult
}

export type SizingJob = AskedJob<FinishedSizing>

/** Whether two plans have the same sizing; the key of a plan is computed once. */
function sameSizing(): (a: Plan, b: Plan) => boolean {
  const known = new WeakMap<Plan, string>()
  const keyOf = (plan: Plan): string => {
    const key = known.get(plan) ?? designKey(plan)
    known.set(plan, key)
    return key
  }
  return (a, b) => a === b || keyOf(a) === keyOf(b)
}

/**
 * @param open the plan as it is shown
 * @param onCrash told once a crash, with a sentence
 */
export function createSizingJob(
  client: WorkerClient,
  open: () => Plan,
  onCrash: (sentence: string) => void = () => undefined,
): SizingJob {
  return createAskedJob({
    client,
    open,
    onCrash,
    sections: ['water', 'thruster'],
    same: sameSizing(),
    answerOf,
    failureFirst: true,
    words: {
      nothing: NOTHING,
      crashed: 'The search stopped unexpectedly. Change a value or size it again.',
      crashNotice: 'The sizing stopped unexpectedly and its worker was started afresh',
    },
  })
}

function answerOf(plan: Plan, { status, message, data, field }: RunResult): Answer<FinishedSizing> {
  const sizing = data?.thruster?.sizing ?? null
  const found = sizing !== null && (sizing.candidates.length > 0 || sizing.nearest !== null)
  if (data !== null && sizing !== null && found)
    return { kept: { plan, data, sizing, partial: status === 'done' ? null : message }, failure: null }
  const failure = status === 'cancelled' ? { field: null, message: NOTHING } : { field: field ?? null, message }
  return { kept: null, failure }
}

const NOTHING = 'The search was cancelled before it had found anything.'
