/**
 * Where the rings of a run ever are: points that outline them, for fitting the view and for framing what stands around.
 */
import { at } from '../base'
import { acrossOf, type Vector, type Wake, type WakeRing } from '../filament'

export interface Hull {
  /** x y z [m], one after another. */
  readonly points: readonly number[]
  readonly min: Vector
  readonly max: Vector
  readonly middle: Vector
  /** Largest ring radius at its start [m]. */
  readonly radius: number
}

/** Times looked at, and points around a ring at each. */
const TIMES = 48
const AROUND = 12

/** Outline of every ring at times spread over its life; of rings that have not moved, where they start. */
export function hullOfRings(wake: Wake, rings: readonly WakeRing[]): Hull {
  const points: number[] = []
  const radius = rings.reduce((most, ring) => Math.max(most, ring.radius), 0) || 1
  const circle = (centre: Vector, direction: Vector, reach: number): void => {
    const [first, second] = acrossOf(direction)
    for (let part = 0; part < AROUND; part += 1) {
      const angle = (2 * Math.PI * part) / AROUND
      const [c, s] = [reach * Math.cos(angle), reach * Math.sin(angle)]
      for (const axis of [0, 1, 2] as const) points.push(centre[axis] + c * first[axis] + s * second[axis])
    }
  }
  wake.trajectories.forEach((path, ring) => {
    const count = path.time.length
    const samples = Math.min(TIMES, count)
    for (let sample = 0; sample < samples; sample += 1) {
      const k = samples === 1 ? 0 : Math.round((sample * (count - 1)) / (samples - 1))
      const thick = at(path.coreRadius, k)
      const shape = curveAt(wake, ring, at(path.time, k))
      if (shape === undefined) {
        const direction: Vector = [at(path.directionX, k), at(path.directionY, k), at(path.directionZ, k)]
        circle([at(path.x, k), at(path.y, k), at(path.z, k)], direction, at(path.radius, k) + thick)
      } else {
        const stride = Math.max(1, Math.floor(shape.length / 3 / (2 * AROUND)))
        for (let node = 0; node < shape.length / 3; node += stride)
          points.push(at(shape, 3 * node), at(shape, 3 * node + 1), at(shape, 3 * node + 2))
      }
    }
  })
  if (points.length === 0)
    for (const ring of rings) {
      const length = Math.hypot(...ring.direction)
      const [dx, dy, dz] = ring.direction
      circle(ring.centre, [dx / length, dy / length, dz / length], ring.radius + ring.coreRadius)
    }
  if (points.length === 0) points.push(0, 0, 0)
  return { points, radius, ...bounds(points) }
}

function curveAt(wake: Wake, ring: number, time: number): Float64Array | undefined {
  const frame = wake.frames[wake.outputTimes.indexOf(time)]
  return frame?.curves[frame.rings.indexOf(ring + 1)]
}

function bounds(points: readonly number[]): Pick<Hull, 'min' | 'max' | 'middle'> {
  const low = [Infinity, Infinity, Infinity]
  const high = [-Infinity, -Infinity, -Infinity]
  points.forEach((value, index) => {
    const axis = index % 3
    low[axis] = Math.min(at(low, axis), value)
    high[axis] = Math.max(at(high, axis), value)
  })
  const vector = (of: (axis: number) => number): Vector => [of(0), of(1), of(2)]
  return {
    min: vector((axis) => at(low, axis)),
    max: vector((axis) => at(high, axis)),
    middle: vector((axis) => (at(low, axis) + at(high, axis)) / 2),
  }
}
