/**
 * A profile summed up again, as the controller that follows it does.
 */
import { at } from '../base'
import type { ProfileRows } from './profile'

/** What rows of a profile come to when they are summed up again, as a controller does. */
export interface ProfileCheck {
  /** Sum of the speeds by the trapezium rule [m]. */
  readonly travel: number
  /** Last position [m]. */
  readonly lastPosition: number
  /** Largest misfit of a position against speeds and accelerations of its step, over the last position. */
  readonly positionMisfit: number
  /** Largest misfit of a speed against the accelerations of its step, over the highest speed. */
  readonly speedMisfit: number
  readonly restsAtEnds: boolean
}

/** Integrate the rows of a profile. */
export function integrateProfile({ time, position, speed, acceleration }: ProfileRows): ProfileCheck {
  let travel = 0
  let positionMisfit = 0
  let speedMisfit = 0
  for (let k = 1; k < time.length; k++) {
    const h = at(time, k) - at(time, k - 1)
    const trapezium = (h * (at(speed, k) + at(speed, k - 1))) / 2
    travel += trapezium
    const bend = (h * h * (at(acceleration, k) - at(acceleration, k - 1))) / 12
    const gained = at(position, k) - at(position, k - 1)
    positionMisfit = Math.max(positionMisfit, Math.abs(gained - trapezium + bend))
    const quickened = (h * (at(acceleration, k) + at(acceleration, k - 1))) / 2
    speedMisfit = Math.max(speedMisfit, Math.abs(at(speed, k) - at(speed, k - 1) - quickened))
  }
  const lastPosition = position.at(-1) ?? 0
  const peak = speed.reduce((a, b) => Math.max(a, b), 0)
  const ends = [speed[0], speed.at(-1), acceleration[0], acceleration.at(-1)]
  return {
    travel,
    lastPosition,
    positionMisfit: positionMisfit / lastPosition,
    speedMisfit: speedMisfit / peak,
    restsAtEnds: ends.every((value) => value === 0),
  }
}
