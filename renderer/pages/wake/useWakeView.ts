/** What the parts of the Wake page share: the shown run, the playback, the picked ring. */
import {
  computed,
  inject,
  onBeforeUnmount,
  provide,
  ref,
  watch,
  type ComputedRef,
  type InjectionKey,
  type Ref,
} from 'vue'
import type { Wake } from '../../../core/filament'
import { createPlayback, usualSpeed, type Playback } from '../../model/playback'
import type { FinishedWake } from '../../model/wakeJob'
import { useWorkspace } from '../../model/workspace'
import { useAfterPaint } from '../../parts/useAfterPaint'

export interface WakeView {
  readonly finished: ComputedRef<FinishedWake | null>
  readonly wake: ComputedRef<Wake | null>
  readonly playback: Playback
  /** Number of the picked ring, from 1; null: none. */
  readonly picked: Ref<number | null>
  readonly follow: Ref<boolean>
  /** What stands under the picture. */
  readonly under: Ref<'plots' | 'table'>
}

const KEY: InjectionKey<WakeView> = Symbol('wake view')
const NO_TIMES = new Float64Array(0)

export function provideWakeView(): WakeView {
  const { wake: job } = useWorkspace()
  // Drawn after what is said of the run is on the screen, so that a cancel shows at once.
  const followed = useAfterPaint(() => job.finished.value)
  const finished = computed(() => followed.value)
  const wake = computed(() => finished.value?.wake.wake ?? null)
  const playback = createPlayback(() => wake.value?.outputTimes ?? NO_TIMES)
  const picked = ref<number | null>(null)
  const view: WakeView = { finished, wake, playback, picked, follow: ref(false), under: ref('plots') }
  watch(
    wake,
    (next, before) => {
      // A train's first ring appears after its stroke: begin where there is one to see.
      if (next === null || (before ?? null) !== null) return
      const jet = finished.value?.wake.jet ?? null
      const first = Math.min(...next.trajectories.map(({ time }) => time[0] ?? Infinity), next.time)
      // The sheet of a jet is to be seen while it forms.
      playback.seekTime(jet === null ? first : Math.min(next.time, jet.release.time / 2))
    },
    { immediate: true },
  )
  watch(wake, (next) => {
    if (next === null || (picked.value ?? 0) > next.trajectories.length) picked.value = null
  })
  const duration = computed(() => wake.value?.time ?? 0)
  watch(duration, (next) => (playback.speed.value = usualSpeed(next)), { immediate: true })
  onBeforeUnmount(() => playback.pause())
  provide(KEY, view)
  return view
}

/** @throws {Error} outside the Wake page */
export function useWakeView(): WakeView {
  const view = inject(KEY)
  if (view === undefined) throw new Error('useWakeView needs the Wake page around it')
  return view
}

export { KEY as WAKE_VIEW_KEY }
