import { writeSegmentRecords, type CoaxialInput, type SegmentInput } from '../../../core/kernel'
import { at } from '../../../core/base'
import { filled, uniform } from './rings'

type Vector = readonly [number, number, number]

/**
 * Rings of radius 0.7 to 1.3 at random places and directions that do not touch each other, in a box of side 3 times the cube
 * root of their number; targets are their nodes. delta is 0.1, or differs from ring to ring (and counts for the targets).
 */
export function ringScene(ringCount: number, perRing: number, varied: boolean, seed: number): SegmentInput {
  const random = uniform(seed)
  const count = ringCount * perRing
  const targets = new Float64Array(3 * count)
  const segments = new Float64Array(8 * count)
  const targetDeltaSquared = new Float64Array(count)
  const side = 3 * Math.cbrt(ringCount)
  const placed: { centre: Vector; radius: number }[] = []
  while (placed.length < ringCount) {
    const radius = 0.7 + 0.6 * random()
    const centre: Vector = [side * random(), side * random(), side * random()]
    const apart = (other: { centre: Vector; radius: number }): boolean =>
      Math.hypot(...centre.map((x, i) => x - at(other.centre, i))) > radius + other.radius + 0.1
    if (!placed.every(apart)) continue
    const first = placed.length * perRing
    placed.push({ centre, radius })
    const [e, f] = frame([random() - 0.5, random() - 0.5, random() - 0.5])
    const nodes = targets.subarray(3 * first, 3 * (first + perRing))
    for (let k = 0; k < perRing; k++) {
      const [c, s] = [Math.cos((2 * Math.PI * k) / perRing), Math.sin((2 * Math.PI * k) / perRing)]
      for (let i = 0; i < 3; i++) nodes[3 * k + i] = at(centre, i) + radius * (c * at(e, i) + s * at(f, i))
    }
    const deltaSquared = varied ? 0.0025 + 0.02 * random() : 0.01
    targetDeltaSquared.fill(deltaSquared, first, first + perRing)
    const circulation = random() < 0.5 ? -1 : 1
    writeSegmentRecords({ nodeCount: perRing, nodes, circulation, deltaSquared }, segments, first)
  }
  const own = varied ? targetDeltaSquared : null
  return { targetCount: count, targets, targetDeltaSquared: own, segmentCount: count, segments }
}

/** Two unit vectors across a direction. */
function frame([x, y, z]: Vector): readonly [Vector, Vector] {
  const length = Math.hypot(x, y, z)
  const n: Vector = [x / length, y / length, z / length]
  const helper: Vector = Math.abs(n[0]) < 0.9 ? [1, 0, 0] : [0, 1, 0]
  const e = cross(n, helper)
  const size = Math.hypot(...e)
  const unit: Vector = [e[0] / size, e[1] / size, e[2] / size]
  return [unit, cross(n, unit)]
}

function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]
}

/** Relative root mean square difference. */
export function relativeError(got: Float64Array, expected: Float64Array): number {
  let [difference, size] = [0, 0]
  expected.forEach((value, i) => {
    difference += (at(got, i) - value) ** 2
    size += value * value
  })
  return Math.sqrt(difference / size)
}

/** A sheet of rings from a lip at (0, 0.5) into a spiral of six turns about (1.2, 0.55), like a starting jet's. */
export function rolledSheet(count: number, varied: boolean): CoaxialInput {
  const place = (i: number): readonly [number, number] => {
    const s = i / (count - 1)
    if (s < 0.25) return [3.4452 * s, 0.5 + 0.2 * s]
    const inward = (s - 0.25) / 0.75
    const angle = 12 * Math.PI * inward
    const radius = 0.02 + 0.33 * (1 - inward)
    return [1.2 - radius * Math.cos(angle), 0.55 + radius * Math.sin(angle)]
  }
  const rings = {
    count,
    x: filled(count, (i) => place(i)[0]),
    r: filled(count, (i) => place(i)[1]),
    circulation: filled(count, (i) => (1 + 0.3 * Math.sin((9 * i) / count)) / count),
    deltaSquared: filled(count, (i) => (varied ? 0.0004 + (0.004 * i) / count : 0.0025)),
  }
  return {
    targetCount: count,
    targetX: rings.x,
    targetR: rings.r,
    targetDeltaSquared: varied ? rings.deltaSquared : null,
    rings,
    skipSelf: false,
  }
}
