/**
 * The rings of a wake as curves at one output time, whichever engine made it.
 */
import { at } from '../base'
import { sampleCurve } from './closedCurve'
import type { Wake } from './types'
import { acrossOf, along, type Vector } from './vector'

/** Nodes of a circle drawn for a coaxial ring. */
export const WAKE_CIRCLE_NODES = 96

/** One ring at one time. */
export interface RingShape {
  /** From 1. */
  readonly number: number
  /** x y z of each node of the closed curve. */
  readonly nodes: Float64Array
  readonly circulation: number
  readonly radius: number
  readonly coreRadius: number
  readonly speed: number
  readonly centre: Vector
  readonly direction: Vector
}

/** The rings that have appeared at output time number `index`. @param index 0 to outputTimes.length - 1 */
export function wakeFrame(wake: Wake, index: number): RingShape[] {
  const time = at(wake.outputTimes, index)
  return wake.trajectories.flatMap((path, i) => {
    const k = path.time.indexOf(time)
    if (k < 0) return []
    const centre: Vector = [at(path.x, k), at(path.y, k), at(path.z, k)]
    const direction: Vector = [at(path.directionX, k), at(path.directionY, k), at(path.directionZ, k)]
    const radius = at(path.radius, k)
    const frame = wake.frames[index]
    const drawn = frame === undefined ? undefined : frame.curves[frame.rings.indexOf(i + 1)]
    return [
      {
        number: i + 1,
        nodes: drawn ?? circle(centre, direction, radius),
        circulation: at(path.circulation, k),
        radius,
        coreRadius: at(path.coreRadius, k),
        speed: at(path.speed, k),
        centre,
        direction,
      },
    ]
  })
}

function circle(centre: Vector, direction: Vector, radius: number): Float64Array {
  const [first, second] = acrossOf(direction)
  const place = (angle: number): Vector =>
    along(along(centre, first, radius * Math.cos(angle)), second, radius * Math.sin(angle))
  return sampleCurve(place, WAKE_CIRCLE_NODES)
}
