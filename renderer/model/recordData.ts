/**
 * What the window has computed of the open plan, gathered for its record: each page computes its own part, and what is of another plan is
 * left out. Its cautions are taken from the open plan and these parts: a part kept from an earlier plan brings none of that plan's.
 */
import { cautionsFor, type Caution } from '../../core/plan'
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
  // A sizing stands while its designs are opened; the figures that came with it are those of the plan it began with.
  const own = [quick, sized].find((part) => part?.plan === plan) ?? null
  const result = own?.data.thruster?.result ?? null
  const sizing = result === null ? null : (sized?.sizing ?? null)
  const spread = planned === null ? null : tank.spread.value
  const cautions = cautionsFor({
    plan,
    water: base.water,
    pulse: base.pulse,
    jet: formed?.jet ?? null,
    jetMissing: null,
    wake: marched?.wake.wake ?? null,
    wakeNotes: marched?.wake.notes ?? [],
    thruster: result,
    sizing,
    tankRun: planned?.result ?? null,
    spread,
  })
  return {
    ...base,
    jet: formed?.jet ?? null,
    wake: marched?.wake ?? null,
    thruster: result === null ? null : { result, sizing },
    tankRun: planned?.result ?? null,
    spread,
    cautions: withOthers(cautions, base.cautions),
  }
}

function holds(status: string): boolean {
  return status === 'current' || status === 'partial'
}

/** Those of the pulse that the record does not say itself follow, each once: that of a starting jet that was not formed, for one. */
function withOthers(cautions: readonly Caution[], others: readonly Caution[]): readonly Caution[] {
  return [...cautions, ...others.filter(({ id }) => !cautions.some((caution) => caution.id === id))]
}
