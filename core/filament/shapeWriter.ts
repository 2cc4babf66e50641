/**
 * Paths and shapes of rings in space at the output times.
 */
import { at } from '../base'
import type { FilamentFlow } from './filamentFlow'
import type { WakeFrame, WakeTrajectory } from './types'
import { dot, length, scaled, type Vector } from './vector'

/** One row of a path. */
export interface PathRow {
  readonly time: number
  readonly centre: Vector
  readonly radius: number
  readonly coreRadius: number
  readonly circulation: number
  readonly speed: number
  readonly direction: Vector
  readonly length: number
}

/** A path as columns. */
export function trajectoryOf(rows: readonly PathRow[]): WakeTrajectory {
  const column = (of: (row: PathRow) => number): Float64Array => Float64Array.from(rows, of)
  return {
    time: column((row) => row.time),
    x: column((row) => row.centre[0]),
    y: column((row) => row.centre[1]),
    z: column((row) => row.centre[2]),
    radius: column((row) => row.radius),
    coreRadius: column((row) => row.coreRadius),
    circulation: column((row) => row.circulation),
    speed: column((row) => row.speed),
    directionX: column((row) => row.direction[0]),
    directionY: column((row) => row.direction[1]),
    directionZ: column((row) => row.direction[2]),
    length: column((row) => row.length),
  }
}

export class ShapeWriter {
  private readonly times: number[] = []
  private readonly paths: PathRow[][]
  private readonly frames: WakeFrame[] = []

  constructor(rings: number) {
    this.paths = Array.from({ length: rings }, () => [])
  }

  endsAt(time: number): boolean {
    return this.times.at(-1) === time
  }

  /** An output time at which no ring has appeared. */
  emptyTime(time: number): void {
    if (this.endsAt(time)) return
    this.times.push(time)
    this.frames.push({ time, rings: [], curves: [] })
  }

  /** @param numbers number of each ring of the state, from 1 */
  write(time: number, numbers: readonly number[], flow: FilamentFlow, state: Float64Array, slope: Float64Array): void {
    if (this.endsAt(time)) {
      this.times.pop()
      this.frames.pop()
    }
    this.times.push(time)
    this.frames.push({ time, rings: [...numbers], curves: numbers.map((_, i) => flow.nodes(state, i).slice()) })
    numbers.forEach((number, i) => {
      const path = at(this.paths, number - 1)
      if (path.at(-1)?.time === time) return
      const sums = flow.sums(state, i)
      const area = length(sums.area)
      const direction = scaled(sums.area, 1 / area)
      path.push({
        time,
        centre: sums.centroid,
        radius: Math.sqrt(area / Math.PI),
        coreRadius: flow.coreRadius(state, i, sums),
        circulation: flow.circulation(i),
        speed: dot(flow.centroidVelocity(state, slope, i), direction),
        direction,
        length: sums.length,
      })
    })
  }

  result(): {
    readonly outputTimes: Float64Array
    readonly trajectories: WakeTrajectory[]
    readonly frames: WakeFrame[]
  } {
    return {
      outputTimes: Float64Array.from(this.times),
      trajectories: this.paths.map(trajectoryOf),
      frames: this.frames,
    }
  }
}
