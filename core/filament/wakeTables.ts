/**
 * A wake as the rows of trajectory.csv and events.csv and as the wake section of the summary.
 */
import { at } from '../base'
import type { WakeDrift, WakeEvent } from '../coaxial'
import type { Wake } from './types'

export const TRAJECTORY_COLUMNS = [
  'time (s)',
  'ring',
  'x (m)',
  'y (m)',
  'z (m)',
  'radius (m)',
  'core radius (m)',
  'circulation (m2/s)',
  'speed (m/s)',
  'direction x',
  'direction y',
  'direction z',
] as const

/** Rows of trajectory.csv in the order of time, then ring number from 1. */
export function* trajectoryRows(wake: Wake): Generator<readonly number[]> {
  const next = wake.trajectories.map(() => 0)
  for (const time of wake.outputTimes)
    for (const [i, path] of wake.trajectories.entries()) {
      const k = at(next, i)
      if (path.time[k] !== time) continue
      next[i] = k + 1
      const { x, y, z, radius, coreRadius, circulation, speed, directionX, directionY, directionZ } = path
      const columns = [x, y, z, radius, coreRadius, circulation, speed, directionX, directionY, directionZ]
      yield [time, i + 1, ...columns.map((column) => at(column, k))]
    }
}

export const EVENT_COLUMNS = ['time (s)', 'event', 'rings', 'x (m)', 'detail'] as const

/** Rows of events.csv. */
export function eventRows(events: readonly WakeEvent[]): (readonly (number | string | null)[])[] {
  return events.map(({ time, event, rings, x, detail }) => [time, event, rings.join(' '), x, detail])
}

/** The wake section of summary.json. */
export interface WakeSummary {
  readonly model: 'coaxial' | 'filament'
  /** Every ring at its last time; a ring that never appeared is left out. */
  readonly rings: readonly {
    readonly ring: number
    readonly circulation: number
    readonly radius: number
    readonly coreRadius: number
    readonly speed: number
  }[]
  readonly passes: number
  readonly drift: WakeDrift
  readonly validUntil: number
  readonly reason: string
}

export function wakeSummary(wake: Wake): WakeSummary {
  return {
    model: wake.model,
    rings: wake.trajectories.flatMap(({ time, circulation, radius, coreRadius, speed }, i) => {
      const k = time.length - 1
      if (k < 0) return []
      return [
        {
          ring: i + 1,
          circulation: at(circulation, k),
          radius: at(radius, k),
          coreRadius: at(coreRadius, k),
          speed: at(speed, k),
        },
      ]
    }),
    passes: wake.events.filter(({ event }) => event === 'pass').length,
    drift: wake.drift,
    validUntil: wake.validUntil,
    reason: wake.reason,
  }
}
