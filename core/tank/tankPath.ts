/**
 * The ring's way through the tank with its range, for the picture.
 */
import { at, bracket } from '../base'
import type { RingPath } from './ringPath'

/** The adopted ring's way, for the picture; every array has one length. */
export interface TankPath {
  readonly time: readonly number[]
  readonly x: readonly number[]
  readonly xLow: readonly number[]
  readonly xHigh: readonly number[]
  readonly radius: readonly number[]
  readonly radiusHigh: readonly number[]
  readonly speed: readonly number[]
  readonly speedLow: readonly number[]
  readonly speedHigh: readonly number[]
}

/** The first ring at its own times up to the reach, and where the others are then. @param paths at least one */
export function tankPath(paths: readonly RingPath[], reach: number): TankPath {
  const path = at(paths, 0)
  const end = path.x.findIndex((x) => x >= reach)
  const shown = (values: readonly number[]): number[] => values.slice(0, end < 0 ? values.length : end + 1)
  const time = shown(path.time)
  const all = (key: 'x' | 'radius' | 'speed'): number[][] =>
    paths.map((one) => time.map((when) => heldAt(one, key, when)))
  const fold = (lists: readonly number[][], choose: (...values: number[]) => number): number[] =>
    time.map((_, k) => choose(...lists.map((list) => at(list, k))))
  const [x, speed] = [all('x'), all('speed')]
  return {
    time,
    x: shown(path.x),
    xLow: fold(x, Math.min),
    xHigh: fold(x, Math.max),
    radius: shown(path.radius),
    radiusHigh: fold(all('radius'), Math.max),
    speed: shown(path.speed),
    speedLow: fold(speed, Math.min),
    speedHigh: fold(speed, Math.max),
  }
}

/** Straight between outputs; held before the first and after the last. */
function heldAt(path: RingPath, key: 'x' | 'radius' | 'speed', when: number): number {
  const { time } = path
  const values = path[key]
  if (time.length < 2 || when <= at(time, 0)) return at(values, 0)
  if (when >= at(time, time.length - 1)) return at(values, values.length - 1)
  const k = bracket(time, when)
  const share = (when - at(time, k)) / (at(time, k + 1) - at(time, k))
  return at(values, k) + share * (at(values, k + 1) - at(values, k))
}
