/**
 * The map of the open plan's thruster: computed in the worker, the newest question only, and kept while the plan moves on it.
 */
import { shallowRef, type ShallowRef } from 'vue'
import type { Plan } from '../../core/plan'
import { designOfPlan, type ThrusterMap, type ThrusterMapRequest } from '../../core/run'
import type { WorkerClient } from '../worker/client'
import { designKey } from './designKey'
import type { ResultFailure } from './results'

export interface MadeMap {
  readonly key: string
  readonly request: ThrusterMapRequest
  readonly made: ThrusterMap
}

export interface ThrustMaps {
  /** The last map; null before the first. */
  readonly made: Readonly<ShallowRef<MadeMap | null>>
  /** Why there is no newer one. */
  readonly failure: Readonly<ShallowRef<ResultFailure | null>>
  /** True while a map other than the last is on its way. */
  readonly stale: Readonly<ShallowRef<boolean>>
  /** Ask for a map; what is there already, or on its way, is not computed again. */
  ask(plan: Plan, request: ThrusterMapRequest): void
}

/** What a map depends on: what the sizing reads, the fields of the plan that its axes do not vary, and the question itself. */
function mapKey(plan: Plan, request: ThrusterMapRequest): string {
  const { x, y, pulsing } = request
  const present = Object.entries(designOfPlan(plan, pulsing)).map(([field, value]: [string, number | null]) =>
    field === x.field || field === y.field || value === null ? null : Number(value.toPrecision(9)),
  )
  // A share of the period taken by the stroke scales with neither axis.
  return JSON.stringify([designKey(plan), present, request])
}

/** @param onCrash told once a crash, with a sentence */
export function createThrustMaps(client: WorkerClient, onCrash: (sentence: string) => void): ThrustMaps {
  const made = shallowRef<MadeMap | null>(null)
  const failure = shallowRef<ResultFailure | null>(null)
  const stale = shallowRef(false)
  let wanted: { readonly key: string; readonly plan: Plan; readonly request: ThrusterMapRequest } | null = null
  let running = false

  function start(): void {
    const asked = wanted
    if (asked === null || running) return
    running = true
    void client.map(asked.plan, asked.request).outcome.then((outcome) => {
      running = false
      if (outcome.kind === 'map' && outcome.map.status === 'done') {
        made.value = { key: asked.key, request: asked.request, made: outcome.map }
        failure.value = null
      } else if (outcome.kind === 'map' && outcome.map.status === 'failed')
        failure.value = { field: outcome.map.field, message: outcome.map.message }
      else if (outcome.kind === 'crashed') {
        failure.value = { field: null, message: 'The map could not be computed.' }
        onCrash(`The map could not be computed (${outcome.message}).`)
      }
      if (wanted !== asked) start()
      else stale.value = failure.value !== null
    })
  }

  return {
    made,
    failure,
    stale,
    ask(plan, request) {
      const key = mapKey(plan, request)
      if (wanted?.key === key) return
      wanted = { key, plan, request }
      stale.value = made.value?.key !== key
      if (stale.value) start()
      else failure.value = null
    },
  }
}
