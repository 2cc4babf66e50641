/**
 * The formed jet on the screen: whether it is shown, its drawing, its playback and where on the formation ruler that stands. One for
 * the window, because the ruler above the pages follows it.
 */
import { computed, ref, watch, type ComputedRef, type Ref } from 'vue'
import { at } from '../../core/base'
import { jetScene, type JetSceneModel, type JetTimeline } from '../../core/report'
import type { FinishedJet, JetJob } from './jetJob'
import { createPlayback, nearestOutput, usualSpeed, type NextFrame, type Playback } from './playback'
import type { Units } from './units'

/** How the sheet is seen: cut along the axis, or in space. */
export type JetLook = 'section' | 'space'

export interface JetView {
  /** True: the Stroke page shows the jet as it forms instead of the ring. */
  readonly showing: Ref<boolean>
  readonly look: Ref<JetLook>
  readonly finished: ComputedRef<FinishedJet | null>
  readonly model: ComputedRef<JetSceneModel | null>
  readonly playback: Playback
  /** Place of the shape shown on the ruler; null where nothing is. */
  readonly place: ComputedRef<number | null>
  /** Show the shape nearest to a place on the ruler. */
  seekPlace(place: number): void
}

const NO_TIMES = new Float64Array(0)

/** @param nextFrame for tests */
export function createJetView(job: JetJob, units: () => Units, nextFrame?: NextFrame): JetView {
  const showing = ref(false)
  const look = ref<JetLook>('section')
  // Drawn anew for another run or another unit, not for each change of the plan.
  const finished = computed(() => job.finished.value)
  const lengthUnit = computed(() => units().length)
  const timeUnit = computed(() => units().time)
  const model = computed(() => {
    const held = finished.value
    if (held === null) return null
    const { programme, nozzle } = held.plan
    return jetScene(held.jet.own.shown, programme, nozzle.diameter, {
      length: lengthUnit.value,
      time: timeUnit.value,
    })
  })
  const times = computed(() => model.value?.timeline.times ?? NO_TIMES)
  const playback = createPlayback(() => times.value, nextFrame)
  watch(finished, (next) => {
    if (next === null) return
    const list = times.value
    playback.speed.value = usualSpeed(list[list.length - 1] ?? 0)
    playback.pause()
    playback.seek(telling(model.value?.timeline ?? null))
  })
  return {
    showing,
    look,
    finished,
    model,
    playback,
    place: computed(() => model.value?.timeline.places[playback.index.value] ?? null),
    seekPlace(place) {
      const timeline = model.value?.timeline
      if (timeline !== undefined) playback.seek(nearestOutput(timeline.places, place))
    },
  }
}

/** The shape that tells most at first sight: at pinch-off, else at the end of the stroke, else the last. */
function telling(timeline: JetTimeline | null): number {
  if (timeline === null || timeline.times.length === 0) return 0
  const { moments, times } = timeline
  const moment = moments.find(({ id }) => id === 'pinch-off') ?? moments.find(({ id }) => id === 'stroke-end')
  return moment === undefined ? times.length - 1 : shapeAt(times, moment.time)
}

/** Number of the first shape at or after a time, so that what happened then is seen to have happened. */
export function shapeAt(times: ArrayLike<number>, time: number): number {
  let index = nearestOutput(times, time)
  if (index < times.length - 1 && at(times, index) < time * (1 - 1e-9)) index += 1
  return index
}
