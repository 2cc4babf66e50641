/**
 * Paths of coaxial rings at the output times.
 */
import { at } from '../base'
import type { CoaxialTrajectory } from './types'

/** Two times closer than this share of an output step are one. */
const SAME_TIME = 1e-9

/** Whole multiples of the output step strictly inside a span, with the rounding of the product taken off: 0.15, not 0.15000000000000002. */
export function outputTimesInside(from: number, until: number, step: number): number[] {
  const times: number[] = []
  for (let k = Math.floor(from / step); ; k++) {
    const time = Number((k * step).toPrecision(15))
    if (time > until - SAME_TIME * step) return times
    if (time > from + SAME_TIME * step) times.push(time)
  }
}

/** True where a time is a whole number of output steps. */
export function fallsOnOutput(time: number, step: number): boolean {
  return Math.abs(time / step - Math.round(time / step)) < SAME_TIME
}

interface GrowingPath {
  readonly time: number[]
  readonly x: number[]
  readonly radius: number[]
  readonly coreRadius: number[]
  readonly circulation: number[]
  readonly speed: number[]
}

/** Collects what the march writes. */
export class TrajectoryWriter {
  private readonly times: number[] = []
  private readonly paths: readonly GrowingPath[]

  constructor(rings: number) {
    this.paths = Array.from({ length: rings }, () => ({
      time: [],
      x: [],
      radius: [],
      coreRadius: [],
      circulation: [],
      speed: [],
    }))
  }

  /** An output time, with or without rings. */
  time(time: number): void {
    if (!this.endsAt(time)) this.times.push(time)
  }

  endsAt(time: number): boolean {
    return this.times.at(-1) === time
  }

  /**
   * @param active index of each ring in the state
   * @param state [x, R, a^2 R, Gamma] of the active rings
   * @param slope its slopes
   */
  write(time: number, active: readonly number[], state: Float64Array, slope: Float64Array): void {
    this.time(time)
    const count = active.length
    active.forEach((ring, i) => {
      const path = at(this.paths, ring)
      if (path.time.at(-1) === time) return
      const radius = at(state, count + i)
      path.time.push(time)
      path.x.push(at(state, i))
      path.radius.push(radius)
      path.coreRadius.push(Math.sqrt(at(state, 2 * count + i) / radius))
      path.circulation.push(at(state, 3 * count + i))
      path.speed.push(at(slope, i))
    })
  }

  outputTimes(): Float64Array {
    return Float64Array.from(this.times)
  }

  trajectories(): CoaxialTrajectory[] {
    return this.paths.map((path) => ({
      time: Float64Array.from(path.time),
      x: Float64Array.from(path.x),
      radius: Float64Array.from(path.radius),
      coreRadius: Float64Array.from(path.coreRadius),
      circulation: Float64Array.from(path.circulation),
      speed: Float64Array.from(path.speed),
    }))
  }
}
