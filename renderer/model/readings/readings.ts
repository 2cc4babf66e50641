/**
 * Everything of the Readings page that outlives it: the comparison, made anew at every change while the page is shown, and the velocity
 * fields that were read beside it.
 */
import { computed, ref, shallowRef, watch, type ComputedRef, type Ref, type ShallowRef } from 'vue'
import type { Problem } from '../../../core/base'
import type { Plan } from '../../../core/plan'
import { holdsReadings, type RunData } from '../../../core/run'
import type { ReadingsResult } from '../../../core/tank'
import type { ChosenFile } from '../../host/types'
import type { WorkerClient } from '../../worker/client'
import type { PlanDocument } from '../document'
import { createResults, type Results } from '../results'
import { shownUnit, type Units } from '../units'
import { createFieldJob, type FieldJob } from './fieldJob'

export type ReadingsPane = 'tracks' | 'residuals' | 'force' | 'fields' | 'rows'

export interface Comparison {
  readonly plan: Plan
  readonly data: RunData
  readonly result: ReadingsResult
}

export interface Readings {
  readonly quick: Results
  /** The last comparison; null before the first. */
  readonly compared: ComputedRef<Comparison | null>
  /** As shown, with the force in a unit of its size. */
  readonly units: ComputedRef<Units>
  readonly fields: FieldJob
  /** True where the fields were analysed for another nozzle, programme, water or calibration. */
  readonly fieldsStale: ComputedRef<boolean>
  /** Whether the plan holds anything to compare. */
  readonly begun: ComputedRef<boolean>
  readonly pane: Ref<ReadingsPane>
  /** Run that is looked at alone; null: all. */
  readonly run: Ref<string | null>
  /** Files dropped on the window while the page is shown, waiting to be looked at. */
  readonly dropped: ShallowRef<readonly ChosenFile[]>
  refresh(): void
}

export interface ReadingsOptions {
  /** Compares; the worker that keeps finished jets, which the prediction may adopt. */
  readonly client: WorkerClient
  readonly fieldClient: WorkerClient
  readonly document: PlanDocument
  readonly problems: () => readonly Problem[]
  /** Whether the page, or what prints it, is shown. */
  readonly active: () => boolean
  readonly units: () => Units
  readonly onCrash: (sentence: string) => void
}

export function createReadings({
  client,
  fieldClient,
  document,
  problems,
  active,
  units,
  onCrash,
}: ReadingsOptions): Readings {
  const open = (): Plan => document.content.value
  const fields = createFieldJob(fieldClient, open)
  const begun = computed(() => holdsReadings(open()))
  const withFields: WorkerClient = {
    ...client,
    run: (plan, sections, onProgress, jet) =>
      client.run(
        plan,
        sections,
        onProgress,
        jet,
        plan.readings?.fields === null ? null : (fields.finished.value?.result ?? null),
      ),
  }
  const quick = createResults(withFields, onCrash, () => ['water', 'pulse', 'readings'])
  const ready = computed(() => begun.value && open().absent.length === 0 && problems().length === 0)

  function refresh(): void {
    if (active() && ready.value) quick.request(open())
    else quick.cancel()
  }
  watch([document.content, active, ready, fields.finished], refresh, { immediate: true, flush: 'sync' })

  const compared = computed(() => {
    const held = quick.finished.value
    if (held === null || held.data.readings === null || !begun.value) return null
    return { plan: held.plan, data: held.data, result: held.data.readings }
  })

  return {
    quick,
    fields,
    begun,
    compared,
    units: computed(() => {
      const size = compared.value?.result.force?.peak ?? null
      return size === null ? units() : { ...units(), force: shownUnit('force', document.units.value, Math.abs(size)) }
    }),
    fieldsStale: computed(() => {
      const held = fields.finished.value?.plan ?? null
      if (held === null) return false
      const now = open()
      return (
        held.nozzle !== now.nozzle ||
        held.programme !== now.programme ||
        held.water !== now.water ||
        (held.readings?.calibration ?? null) !== (now.readings?.calibration ?? null)
      )
    }),
    pane: ref<ReadingsPane>('tracks'),
    run: ref<string | null>(null),
    dropped: shallowRef<readonly ChosenFile[]>([]),
    refresh,
  }
}
