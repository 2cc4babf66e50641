/** Runs made up for tests and measurements of the drawing: shapes that move, not solutions. */
import type { Wake, WakeRing, WakeTrajectory } from '../../core/filament'

const RINGS = 20
const NODES = 256
export const PLAYED_FRAMES = 120
const STEP = 0.02

/** 20 rings in a row, every fourth turning the other way. */
export function manyRings(): WakeRing[] {
  return Array.from({ length: RINGS }, (_, i) => ({
    circulation: i % 4 === 3 ? -0.004 : 0.006,
    radius: 0.02 + 0.004 * Math.sin(1.7 * i),
    coreRadius: 0.003,
    core: 'uniform',
    centre: [0.03 * i, 0, 0],
    direction: [1, 0, 0],
  }))
}

/** The rings moving along x while they wave, with a shape of their own at every output time. */
export function manyRingsWake(rings: readonly WakeRing[]): Wake {
  const times = Float64Array.from({ length: PLAYED_FRAMES }, (_, k) => k * STEP)
  const place = (ring: WakeRing, k: number): number =>
    ring.centre[0] + 0.0015 * k * (1 + 0.1 * Math.sin(ring.centre[0] * 90))
  const curve = (ring: WakeRing, k: number): Float64Array => {
    const nodes = new Float64Array(3 * NODES)
    for (let n = 0; n < NODES; n += 1) {
      const angle = (2 * Math.PI * n) / NODES
      const radius = ring.radius * (1 + 0.1 * Math.sin(0.1 * k) * Math.cos(3 * angle))
      nodes[3 * n] = place(ring, k) + 0.1 * ring.radius * Math.cos(0.1 * k) * Math.sin(3 * angle)
      nodes[3 * n + 1] = radius * Math.cos(angle)
      nodes[3 * n + 2] = radius * Math.sin(angle)
    }
    return nodes
  }
  const numbers = rings.map((_, i) => i + 1)
  return wakeOfPaths(
    times,
    rings.map((ring) => straightPath(ring, times, (k) => place(ring, k))),
    Array.from(times, (time, k) => ({ time, rings: numbers, curves: rings.map((ring) => curve(ring, k)) })),
  )
}

/** A path along x of a ring that keeps its size. */
export function straightPath(ring: WakeRing, times: Float64Array, place: (k: number) => number): WakeTrajectory {
  const column = (of: (k: number) => number): Float64Array => Float64Array.from(times, (_, k) => of(k))
  return {
    time: times,
    x: column(place),
    y: column(() => ring.centre[1]),
    z: column(() => ring.centre[2]),
    radius: column(() => ring.radius),
    coreRadius: column(() => ring.coreRadius),
    circulation: column(() => ring.circulation),
    speed: column((k) => (place(k + 1) - place(k)) / (times.length > 1 ? (times[1] ?? 1) - (times[0] ?? 0) : 1)),
    directionX: column(() => ring.direction[0]),
    directionY: column(() => ring.direction[1]),
    directionZ: column(() => ring.direction[2]),
    length: column(() => 2 * Math.PI * ring.radius),
  }
}

/** A finished run of given paths and shapes. */
export function wakeOfPaths(
  outputTimes: Float64Array,
  trajectories: readonly WakeTrajectory[],
  frames: Wake['frames'] = [],
): Wake {
  const time = outputTimes.at(-1) ?? 0
  return {
    status: 'done',
    message: 'Done.',
    time,
    outputTimes,
    events: [],
    drift: { circulation: 0, impulse: 0, energy: 0 },
    counters: { steps: 1, rejected: 0, evaluations: 7 },
    validUntil: time,
    reason: 'It held throughout.',
    model: frames.length > 0 ? 'filament' : 'coaxial',
    modelReason: 'Made up.',
    trajectories,
    frames,
    notes: [],
  }
}

/** Nodes of a circle about x, right-handed about +x. */
export function circleNodes(centre: readonly [number, number, number], radius: number, count: number): Float64Array {
  return Float64Array.from({ length: 3 * count }, (_, i) => {
    const angle = (2 * Math.PI * Math.floor(i / 3)) / count
    return [centre[0], centre[1] + radius * Math.cos(angle), centre[2] + radius * Math.sin(angle)][i % 3] ?? 0
  })
}
