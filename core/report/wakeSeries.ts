/**
 * What is read off the paths of a wake together: gaps between neighbours, the nearest pair, the impulse of all rings. SI.
 */
import { at } from '../base'
import type { Wake, WakeRing, WakeTrajectory } from '../filament'

export interface WakeSeries {
  readonly time: ArrayLike<number>
  readonly values: ArrayLike<number>
}

export interface NeighbourSeparation {
  /** Numbers of the rings from 1; the first is the earlier one. */
  readonly first: number
  readonly second: number
  /** x of the first less x of the second for rings on one axis, else the distance of their centres [m]. */
  readonly separation: WakeSeries
}

/**
 * Index in each path of an output time: a path's times are a run of the output times, so only its beginning is looked up.
 */
export function pathOffsets(wake: Wake): readonly number[] {
  return wake.trajectories.map(({ time }) => (time.length === 0 ? -1 : wake.outputTimes.indexOf(at(time, 0))))
}

/** Index into a path at output number `index`; null where the ring is not there. */
export function pathIndex(path: WakeTrajectory, offset: number, index: number): number | null {
  const k = index - offset
  return offset < 0 || k < 0 || k >= path.time.length ? null : k
}

/** Every ring with the one of the next number, over the time both are there. */
export function neighbourSeparations(wake: Wake): readonly NeighbourSeparation[] {
  const offsets = pathOffsets(wake)
  return wake.trajectories.flatMap((path, i) => {
    const next = wake.trajectories[i + 1]
    if (next === undefined) return []
    const time: number[] = []
    const values: number[] = []
    wake.outputTimes.forEach((now, index) => {
      const [k, m] = [pathIndex(path, at(offsets, i), index), pathIndex(next, at(offsets, i + 1), index)]
      if (k === null || m === null) return
      time.push(now)
      values.push(wake.model === 'coaxial' ? alongAxis(path, next, k, m) : distance(path, next, k, m))
    })
    return time.length === 0 ? [] : [{ first: i + 1, second: i + 2, separation: { time, values } }]
  })
}

/** Smallest distance between two centres at each output time at which there are two rings. */
export function nearestPair(wake: Wake): WakeSeries {
  const offsets = pathOffsets(wake)
  const time: number[] = []
  const values: number[] = []
  wake.outputTimes.forEach((now, index) => {
    const there = wake.trajectories.flatMap((path, i) => {
      const k = pathIndex(path, at(offsets, i), index)
      return k === null ? [] : [[at(path.x, k), at(path.y, k), at(path.z, k)] as const]
    })
    // Sorted along x, a pair further apart in x than the nearest so far ends its row.
    there.sort((a, b) => a[0] - b[0])
    let nearest = Infinity
    for (const [i, a] of there.entries())
      for (let j = i + 1; j < there.length; j++) {
        const b = at(there, j)
        if (b[0] - a[0] >= nearest) break
        nearest = Math.min(nearest, Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]))
      }
    if (!Number.isFinite(nearest)) return
    time.push(now)
    values.push(nearest)
  })
  return { time, values }
}

/**
 * Component along x of rho pi Gamma R^2 summed over the rings there, and the same sum with every ring as it was when it appeared.
 *
 * @param rings the rings the march began with
 * @param density rho [kg/m3]
 */
export function totalImpulse(
  wake: Wake,
  rings: readonly WakeRing[],
  density: number,
): { readonly now: WakeSeries; readonly born: WakeSeries } {
  const offsets = pathOffsets(wake)
  const now = new Float64Array(wake.outputTimes.length)
  const born = new Float64Array(wake.outputTimes.length)
  wake.trajectories.forEach((path, i) => {
    const impulse = (k: number): number =>
      density * Math.PI * at(path.circulation, k) * at(path.radius, k) ** 2 * at(path.directionX, k)
    const ring = rings[i]
    const first = ring === undefined || ring.curve !== undefined ? null : density * impulseOf(ring)
    const from = at(offsets, i)
    wake.outputTimes.forEach((_, index) => {
      // A ring that another has swallowed is still one of those that appeared.
      if (from >= 0 && index >= from) born[index] = at(born, index) + (first ?? impulse(0))
      const k = pathIndex(path, from, index)
      if (k !== null) now[index] = at(now, index) + impulse(k)
    })
  })
  return { now: { time: wake.outputTimes, values: now }, born: { time: wake.outputTimes, values: born } }
}

/** Gamma pi R^2 along x of a circle or an ellipse of equal area. */
function impulseOf({ circulation, radius, direction }: WakeRing): number {
  return (circulation * Math.PI * radius ** 2 * direction[0]) / Math.hypot(...direction)
}

function alongAxis(path: WakeTrajectory, next: WakeTrajectory, k: number, m: number): number {
  const { directionX, directionY, directionZ } = path
  // The axis is the first ring's, pointing downstream of x where it has an x at all.
  const sense = Math.sign(at(directionX, k)) || 1
  const gap = [at(path.x, k) - at(next.x, m), at(path.y, k) - at(next.y, m), at(path.z, k) - at(next.z, m)]
  return sense * (at(gap, 0) * at(directionX, k) + at(gap, 1) * at(directionY, k) + at(gap, 2) * at(directionZ, k))
}

function distance(path: WakeTrajectory, next: WakeTrajectory, k: number, m: number): number {
  return Math.hypot(at(path.x, k) - at(next.x, m), at(path.y, k) - at(next.y, m), at(path.z, k) - at(next.z, m))
}
