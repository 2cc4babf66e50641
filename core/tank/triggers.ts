/**
 * When each device acts, on the clock of the piston's first motion and on that of the command that starts it.
 */
import { requireRange } from '../base'
import type { TankArrival } from './arrivals'
import type { TriggerInput } from './types'

export interface TriggerRow {
  readonly device: string
  /** After the first motion of the piston [s]; negative: before it. */
  readonly time: number
  /** After the command to the drive, which comes a lag before the motion [s]. */
  readonly afterCommand: number
  /** Earliest and latest time, for what depends on the ring [s]; null else. */
  readonly early: number | null
  readonly late: number | null
  readonly text: string
}

export interface TriggerTableInput {
  readonly trigger: TriggerInput
  /** From command to motion [s]. */
  readonly lag: number
  /** Of the rounded motion behind the planned one [s]. */
  readonly delay: number
  /** Duration of the rounded motion [s]. */
  readonly duration: number
  readonly arrivals: readonly TankArrival[]
  readonly pairInterval: number | null
  /** Time from the first to the last frame [s]; null where frames are not known. */
  readonly recording: number | null
}

export interface TriggerTable {
  /** In the order of time. */
  readonly rows: readonly TriggerRow[]
  readonly notes: readonly string[]
}

/** @throws {DomainError} on tankRun.trigger… */
export function triggerTable(input: TriggerTableInput): TriggerTable {
  const { trigger, lag, delay, arrivals, recording } = input
  requireRange('tankRun.trigger.camera', trigger.camera, { unit: 's' })
  requireRange('tankRun.trigger.laser', trigger.laser, { unit: 's' })
  const row = (
    device: string,
    time: number,
    text: string,
    range: readonly [number, number] | null = null,
  ): TriggerRow => ({
    device,
    time,
    afterCommand: time + lag,
    early: range?.[0] ?? null,
    late: range?.[1] ?? null,
    text,
  })
  const seen = arrivals.flatMap((arrival) => {
    const { station, time, timeLow, timeHigh } = arrival
    return time === null || timeLow === null || timeHigh === null ? [] : [{ station, time, timeLow, timeHigh }]
  })
  const half = (input.pairInterval ?? 0) / 2
  const rows = [
    row('piston command', 0 - lag, 'The profile is started.'),
    row('piston', 0, 'First motion.'),
    row('piston stops', input.duration, 'End of the rounded motion.'),
    row('laser', trigger.laser, 'Light on.'),
    row('camera', trigger.camera, 'First frame.'),
    ...seen.map(({ station, time, timeLow, timeHigh }) =>
      row(
        `pair at ${short(station)} m`,
        time + delay - half,
        `First frame of the pair about the passage at ${short(time + delay)} s${delay > 0 ? `, the rounded motion's ${short(delay)} s included` : ''}.`,
        [timeLow + delay - half, timeHigh + delay - half],
      ),
    ),
  ]
  // Stable for equal times: the order above is that of cause.
  return { rows: rows.toSorted((a, b) => a.time - b.time), notes: notesOf(input, seen, recording) }
}

function notesOf(
  { trigger, delay }: TriggerTableInput,
  seen: readonly { readonly timeLow: number; readonly timeHigh: number }[],
  recording: number | null,
): string[] {
  const notes: string[] = []
  const first = Math.min(...seen.map(({ timeLow }) => timeLow)) + delay
  const last = Math.max(...seen.map(({ timeHigh }) => timeHigh)) + delay
  if (trigger.laser > trigger.camera)
    notes.push('The light comes on after the first frame: the frames before it are dark.')
  if (seen.length === 0) return notes
  if (trigger.camera > first)
    notes.push(
      `The first frame at ${short(trigger.camera)} s comes after the ring may pass the first station, ${short(first)} s.`,
    )
  if (recording !== null && trigger.camera + recording < last)
    notes.push(
      `The last frame at ${short(trigger.camera + recording)} s comes before the ring may pass the last station, ${short(last)} s: start the camera at about ${short(first)} s or take more pairs.`,
    )
  return notes
}

function short(value: number): number {
  return Number(value.toPrecision(4))
}
