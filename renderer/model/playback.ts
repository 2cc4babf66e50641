/**
 * Playing a wake back: which output time is shown, and how it moves. Frames come from outside, so that tests can hand them in.
 */
import { bracket } from '../../core/base'
import { computed, ref, watch, type ComputedRef, type Ref } from 'vue'

export interface Playback {
  /** Time on the way, between the outputs while it plays [s]. */
  readonly time: Readonly<Ref<number>>
  /** Number of the output shown. */
  readonly index: ComputedRef<number>
  readonly count: ComputedRef<number>
  readonly playing: Readonly<Ref<boolean>>
  /** Seconds of the wake in a second. */
  readonly speed: Ref<number>
  readonly loop: Ref<boolean>
  play(): void
  pause(): void
  toggle(): void
  /** Some outputs on or back; pauses. */
  step(by: number): void
  /** An output by its number; goes on playing if it does. */
  seek(index: number): void
  /** The output nearest to a time. */
  seekTime(time: number): void
}

/** Calls back before the next frame with the time [ms]; returns what takes that back. */
export type NextFrame = (callback: (now: number) => void) => () => void

export const browserFrames: NextFrame = (callback) => {
  const id = requestAnimationFrame(callback)
  return () => cancelAnimationFrame(id)
}

/** A frame that comes later than this was held up: the wake does not jump over it [s]. */
const LONGEST_FRAME = 0.25

/** Number of the output nearest to a time; 0 where there is none. */
export function nearestOutput(times: ArrayLike<number>, time: number): number {
  if (times.length < 2) return 0
  const low = bracket(times, time)
  const [before = 0, after = before] = [times[low], times[low + 1]]
  return Math.abs(time - before) <= Math.abs(after - time) ? low : low + 1
}

/** Where a time lies among the outputs, from 0 at the first to 1 at the last: as a slider over their numbers shows it. */
export function outputShare(times: ArrayLike<number>, time: number): number {
  const end = times.length - 1
  if (end < 1) return 0
  const low = bracket(times, time)
  const [before = 0, after = before] = [times[low], times[low + 1]]
  const part = after > before ? (time - before) / (after - before) : 0
  return (low + Math.min(1, Math.max(0, part))) / end
}

/** Number of the last output at or before a time. */
export function outputAt(times: ArrayLike<number>, time: number): number {
  if (times.length < 2) return 0
  const end = times.length - 1
  return time >= (times[end] ?? 0) ? end : bracket(times, time)
}

/**
 * Speed at which a wake is first played: real time where that takes between 3 and 60 s, else a round multiple of it that takes
 * about 10 s.
 */
export function usualSpeed(duration: number): number {
  if (!(duration > 0) || (duration >= 3 && duration <= 60)) return 1
  const wanted = duration / 10
  const decade = 10 ** Math.floor(Math.log10(wanted))
  const step = [5, 2, 1].find((candidate) => candidate * decade <= wanted * (1 + 1e-9)) ?? 1
  return Number((step * decade).toPrecision(1))
}

/** @param times output times of the wake shown, rising */
export function createPlayback(times: () => ArrayLike<number>, nextFrame: NextFrame = browserFrames): Playback {
  const time = ref(0)
  const playing = ref(false)
  const speed = ref(1)
  const loop = ref(false)
  let stop = (): void => undefined
  let before: number | null = null

  const end = (): number => times()[times().length - 1] ?? 0
  const index = computed(() => outputAt(times(), time.value))

  function frame(now: number): void {
    const elapsed = before === null ? 0 : Math.min(LONGEST_FRAME, (now - before) / 1000)
    before = now
    const next = time.value + elapsed * speed.value
    if (next < end()) time.value = next
    else if (loop.value && end() > 0) time.value = next % end()
    else {
      time.value = end()
      pause()
      return
    }
    stop = nextFrame(frame)
  }

  function pause(): void {
    playing.value = false
    stop()
    before = null
  }

  function play(): void {
    if (playing.value || times().length < 2) return
    if (time.value >= end()) time.value = times()[0] ?? 0
    playing.value = true
    before = null
    stop = nextFrame(frame)
  }

  function seek(wanted: number): void {
    const list = times()
    time.value = list[Math.max(0, Math.min(list.length - 1, wanted))] ?? 0
  }

  // Another run may be shorter.
  watch(times, (list) => {
    if (list.length < 2) pause()
    if (time.value > end()) time.value = end()
  })

  return {
    time,
    index,
    count: computed(() => times().length),
    playing,
    speed,
    loop,
    play,
    pause,
    toggle: () => (playing.value ? pause() : play()),
    step(by) {
      pause()
      seek(index.value + by)
    },
    seek,
    seekTime: (wanted) => seek(nearestOutput(times(), wanted)),
  }
}
