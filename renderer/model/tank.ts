/**
 * Everything of the Tank run page that outlives it: the run planned at every change, the spread, and how they are shown.
 */
import { computed, ref, watch, type ComputedRef, type Ref } from 'vue'
import type { Problem } from '../../core/base'
import type { Caution, Plan } from '../../core/plan'
import { tankScene, type TankExtentName, type TankSceneModel } from '../../core/report'
import type { SpreadData } from '../../core/run'
import type { TankRunResult } from '../../core/tank'
import type { WaterProperties } from '../../core/water'
import type { WorkerClient } from '../worker/client'
import type { PlanDocument } from './document'
import { createResults, type Results } from './results'
import { createSpreadJob, drawsAnything, type SpreadJob } from './spreadJob'
import type { Units } from './units'

export type TankPane = 'plots' | 'tables' | 'matrix' | 'profile' | 'target'

/** A planned run with the plan it belongs to. */
export interface PlannedTank {
  readonly plan: Plan
  readonly result: TankRunResult
  readonly water: WaterProperties
  /** Those of the plan and its run, and those of the spread where it is that of this plan. */
  readonly cautions: readonly Caution[]
}

export interface Tank {
  readonly quick: Results
  readonly spreads: SpreadJob
  /** The last run that was planned; null before the first. */
  readonly planned: ComputedRef<PlannedTank | null>
  /** The spread of the plan as it is; null where there is none. */
  readonly spread: ComputedRef<SpreadData | null>
  readonly scene: ComputedRef<TankSceneModel | null>
  readonly part: Ref<TankExtentName>
  readonly pane: Ref<TankPane>
  /** Whether the plan says what is uncertain. */
  readonly canSpread: ComputedRef<boolean>
  /** Plan the run of the open plan. */
  refresh(): void
}

export interface TankOptions {
  readonly client: WorkerClient
  /** Draws samples; not that of the results, so that a long spread keeps nothing waiting. */
  readonly spreadClient: WorkerClient
  readonly document: PlanDocument
  readonly problems: () => readonly Problem[]
  /** Whether the page, or what prints it, is shown: nothing is computed at a change while it is not. */
  readonly active: () => boolean
  readonly units: () => Units
  readonly onCrash: (sentence: string) => void
}

export function createTank({ client, spreadClient, document, problems, active, units, onCrash }: TankOptions): Tank {
  const open = (): Plan => document.content.value
  // A run takes tens of milliseconds, with a target sought up to a second: it follows the pulse on its worker.
  const quick = createResults(client, onCrash, () => ['water', 'pulse', 'tankRun'])
  const spreads = createSpreadJob(spreadClient, open, onCrash)
  const ready = computed(() => open().tankRun !== null && open().absent.length === 0 && problems().length === 0)

  function refresh(): void {
    if (active() && ready.value) quick.request(open())
    else quick.cancel()
  }
  watch([document.content, active, ready], refresh, { immediate: true, flush: 'sync' })

  const spread = computed(() => {
    const held = spreads.finished.value
    return held !== null && ['current', 'partial'].includes(spreads.status.value) ? held.spread : null
  })
  const planned = computed((): PlannedTank | null => {
    const held = quick.finished.value
    if (held === null || held.data.tankRun === null || open().tankRun === null) return null
    const { plan, data } = held
    const drawn = spread.value === null ? [] : (spreads.finished.value?.cautions ?? [])
    const further = drawn.filter(({ id }) => id.startsWith('spread-'))
    return { plan, result: held.data.tankRun, water: data.water, cautions: [...data.cautions, ...further] }
  })
  return {
    quick,
    spreads,
    planned,
    spread,
    scene: computed(() => {
      const held = planned.value
      if (held === null || held.plan.tankRun === null) return null
      const { plan, result } = held
      return tankScene(
        { section: held.plan.tankRun, nozzle: plan.nozzle, stroke: plan.programme.stroke, result },
        units(),
      )
    }),
    part: ref<TankExtentName>('whole'),
    pane: ref<TankPane>('plots'),
    canSpread: computed(() => drawsAnything(open())),
    refresh,
  }
}
