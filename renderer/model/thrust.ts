/**
 * Everything of the Thrust page that outlives it: figures of the thruster at every change, the sizing, the map and what is held.
 */
import { computed, ref, watch, type ComputedRef, type Ref } from 'vue'
import type { Problem } from '../../core/base'
import { setDesign, type Plan } from '../../core/plan'
import { thrustMap, type MapField, type MapResult, type ThrustMapModel } from '../../core/report'
import { designOfPlan, type ThrusterMapRequest } from '../../core/run'
import type { Candidate, Span } from '../../core/thruster'
import type { WorkerClient } from '../worker/client'
import type { Burst } from './history'
import type { PlanDocument } from './document'
import { createHeldDesigns, type HeldDesigns } from './heldDesigns'
import { createResults, type Results } from './results'
import { createSizingJob, type SizingJob } from './sizingJob'
import { createThrustMaps, type ThrustMaps } from './thrustMaps'
import type { Units } from './units'

export interface ThrustView {
  readonly x: Ref<MapField>
  readonly y: Ref<MapField>
  readonly result: Ref<MapResult>
  /** How often each choice of the map pulses; asked only counts where the duty points can set it. */
  readonly pulsing: Ref<ThrusterMapRequest['pulsing']>
}

export interface Thrust {
  readonly quick: Results
  readonly sizing: SizingJob
  readonly maps: ThrustMaps
  readonly held: HeldDesigns
  readonly view: ThrustView
  /** Whether the duty points can set the frequency on the map. */
  readonly canAsk: ComputedRef<boolean>
  /** The map as it is shown; null while there is none. */
  readonly mapModel: ComputedRef<ThrustMapModel | null>
  /** Move the plan on its map: values of the two axes in base units. */
  moveTo(x: number, y: number, burst: Burst | null): void
  /** Make a candidate the plan at one of its duty points: one step of undo. */
  openCandidate(candidate: Candidate, number: number, point?: number): void
  /** Compute what the page shows, and search where the plan asks for it. */
  run(): void
}

export interface ThrustOptions {
  readonly client: WorkerClient
  readonly document: PlanDocument
  readonly problems: () => readonly Problem[]
  /** Whether the page is shown: nothing is computed at a change while it is not. */
  readonly active: () => boolean
  readonly units: () => Units
  readonly onCrash: (sentence: string) => void
}

/** Places along each axis of the map. */
const PLACES = 72

export function createThrust({ client, document, problems, active, units, onCrash }: ThrustOptions): Thrust {
  const open = (): Plan => document.content.value
  const quick = createResults(client, onCrash, () => ['water', 'thruster'])
  const sizing = createSizingJob(client, open, onCrash)
  const maps = createThrustMaps(client, onCrash)
  const view: ThrustView = {
    x: ref<MapField>('diameter'),
    y: ref<MapField>('strokeRatio'),
    result: ref<MapResult>('power'),
    pulsing: ref<ThrusterMapRequest['pulsing']>('asked'),
  }
  const canAsk = computed(() => {
    const section = open().thruster
    const searched = section?.search?.goal !== 'thrust'
    return searched && (section?.target.length ?? 0) > 0 && view.x.value !== 'frequency' && view.y.value !== 'frequency'
  })
  const ready = computed(() => isReady(open()) && problems().length === 0)
  /** Ranges of axes that no search gives, kept while the plan stays inside them. */
  const ranges = new Map<MapField, Span>()

  function requestOf(plan: Plan): ThrusterMapRequest {
    const pulsing = canAsk.value ? view.pulsing.value : 'planned'
    const present = designOfPlan(plan, 'planned')
    const axis = (field: MapField) => ({ field, span: spanOf(plan, field, present[field] ?? 1, ranges) })
    return { x: axis(view.x.value), y: axis(view.y.value), count: PLACES, pulsing }
  }

  function refresh(): void {
    if (!active() || !ready.value) {
      quick.cancel()
      return
    }
    quick.request(open())
    maps.ask(open(), requestOf(open()))
  }
  watch(
    [document.content, active, ready, view.x, view.y, view.pulsing],
    () => {
      refresh()
    },
    { immediate: true, flush: 'sync' },
  )

  const mapModel = computed(() => {
    const made = maps.made.value
    if (made === null || open().thruster === null) return null
    const { map } = made.made
    const here =
      isReady(open()) && problems().length === 0 ? designOfPlan(open(), made.request.pulsing) : made.made.present
    const result = quick.finished.value?.data.thruster?.result ?? null
    const { length, frequency, power, force, vehicleSpeed } = units()
    return thrustMap({
      map,
      result: view.result.value,
      units: { length, frequency, power, force, speed: vehicleSpeed },
      present: { ...here, frequency: here.frequency ?? null },
      candidates: shownCandidates(),
      published: result?.pulse.formationNumber.published ?? null,
      underWay: (result?.speed ?? 0) > 0,
    })
  })

  /** Candidates with the frequency of their first duty point, for maps over frequency. */
  function shownCandidates() {
    if (sizing.status.value === 'stale') return []
    return (sizing.finished.value?.sizing.candidates ?? []).map(({ design, points }) => ({
      ...design,
      frequency: points[0]?.frequency ?? design.frequency,
    }))
  }

  return {
    quick,
    sizing,
    maps,
    held: createHeldDesigns(client, document, active),
    view,
    canAsk,
    mapModel,
    moveTo(x, y, burst) {
      const plan = open()
      if (!ready.value) return
      const present = designOfPlan(plan, 'planned')
      const next = { ...present, [view.x.value]: x, [view.y.value]: y }
      const frequency = next.frequency ?? 1
      const valveLag = plan.thruster?.actuator.valveLag ?? 0
      const duration = next.ejectShare / frequency - valveLag
      if (!(duration > 0)) return
      const chosen = view.x.value === 'ejectShare' || view.y.value === 'ejectShare'
      const { diameter, strokeRatio, count } = next
      document.change(
        'design on the map',
        setDesign(plan, {
          diameter,
          strokeRatio,
          count,
          frequency,
          duration,
          ...(chosen ? { ejectShare: next.ejectShare } : {}),
        }),
        burst,
      )
    },
    openCandidate({ design, points }, number, point = 0) {
      const at = points[point]
      if (at === undefined) return
      const { diameter, count, ejectShare } = design
      const { strokeRatio, frequency, duration } = at
      const next = setDesign(open(), { diameter, strokeRatio, count, ejectShare, frequency, duration })
      document.change(`open candidate ${number}`, next)
    },
    run() {
      refresh()
      const { search = null, target = [] } = open().thruster ?? {}
      if (ready.value && search !== null && (target.length > 0 || search.goal === 'thrust')) sizing.run()
    },
  }
}

/** Whether a plan holds all that a thruster needs. */
function isReady({ thruster, train, absent }: Plan): boolean {
  return thruster !== null && train !== null && absent.length === 0
}

/** Range of an axis: that of the search, else half to twice the plan; widened where the plan lies outside. */
function spanOf({ thruster }: Plan, field: MapField, value: number, ranges: Map<MapField, Span>): Span {
  const search = thruster?.search ?? null
  const searched = search === null || field === 'ejectShare' ? (search?.ejectShare ?? null) : search[field]
  if (searched !== null && searched[1] > searched[0])
    return [Math.min(searched[0], value), Math.max(searched[1], value)]
  const kept = ranges.get(field)
  if (kept !== undefined && value >= kept[0] && value <= kept[1]) return kept
  const most = field === 'ejectShare' ? 0.95 : Infinity
  const fresh: Span = [Number((value / 2).toPrecision(2)), Math.min(most, Number((value * 2).toPrecision(2)))]
  ranges.set(field, fresh)
  return fresh
}
