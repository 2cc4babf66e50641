/**
 * What the window has computed of the open plan, gathered for its record: each page computes its own part, and what is of another plan is
 * left out.
 */
import type { Caution } from '../../core/plan'
import type { RecordData } from '../../core/report'
import type { Workspace } from './workspace'

/** Null while the pulse is not that of the open plan. */
export function recordDataOf({ document, results, jet, wake, thrust, tank }: Workspace): RecordData | null {
  const plan = document.content.value
  const base = results.status.value === 'current' ? (results.finished.value?.data ?? null) : null
  if (base === null) return null
  const [formed, marched, quick, sized] = [
    plan.jet !== null && holds(jet.status.value) ? jet.finished.value : null,
    plan.wake !== null && holds(wake.status.value) ? wake.finished.value : null,
    plan.thruster !== null && holds(thrust.quick.status.value) ? thrust.quick.finished.value : null,
    plan.thruster !== null && holds(thrust.sizing.status.value) ? thrust.sizing.finished.value : null,
  ]
  const held = tank.planned.value
  const planned = plan.tankRun !== null && held?.plan === plan ? held : null
  const result = quick?.data.thruster?.result ?? sized?.data.thruster?.result ?? null
  const parts = [base, formed?.data, marched?.data, quick?.data, sized?.data, planned]
  return {
    ...base,
    jet: formed?.jet ?? null,
    wake: marched?.wake ?? null,
    thruster: result === null ? null : { result, sizing: sized?.sizing ?? null },
    tankRun: planned?.result ?? null,
    spread: planned === null ? null : tank.spread.value,
    cautions: once(parts.flatMap((part) => part?.cautions ?? [])),
  }
}

function holds(status: string): boolean {
  return status === 'current' || status === 'partial'
}

/** Each caution once; where a later part says it in other words, in both. */
function once(cautions: readonly Caution[]): readonly Caution[] {
  return [...new Map(cautions.map((caution) => [`${caution.id} ${caution.text}`, caution])).values()]
}
