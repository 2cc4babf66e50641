/**
 * How many nodes of one ring serve for the velocity at another.
 *
 * The trapezoidal rule over a closed curve at distance d with nodes h apart errs by about exp(-2 pi d / h): from far away every second,
 * fourth, eighth or sixteenth node gives the same to more digits than a step is asked for.
 */
import { at } from '../base'
import type { WakeWall } from './types'
import { dot } from './vector'

/** Node counts are multiples of this, so that every stride divides them. */
export const LARGEST_STRIDE = 16
/** Exponent kept: exp(-25) is 1e-11, and rings may come a little nearer within a step. */
const EXPONENT = 25
/** Nodes of each ring looked at for the distance. */
const LOOKED_AT = 24

interface Outline {
  /** x y z of some nodes of a ring. */
  readonly points: Float64Array
  /** Furthest a node may lie from the nearest of them [m]. */
  readonly slack: number
  /** Longest distance between neighbouring nodes [m]. */
  readonly segment: number
}

/** Strides from every ring, and from its image behind a wall, to every ring. */
export class SourceStrides {
  private readonly direct: Uint8Array
  private readonly image: Uint8Array

  constructor(
    private readonly count: number,
    private readonly wall: WakeWall | null,
  ) {
    this.direct = new Uint8Array(count * count).fill(1)
    this.image = new Uint8Array(count * count).fill(1)
  }

  /** Every how many nodes of the source serve at the target. */
  between(target: number, source: number): number {
    return at(this.direct, target * this.count + source)
  }

  /** The same for the source's image. */
  toImage(target: number, source: number): number {
    return at(this.image, target * this.count + source)
  }

  /** @param rings nodes of each ring, multiples of LARGEST_STRIDE; others keep all their nodes */
  update(rings: readonly Float64Array[]): void {
    const outlines = rings.map(outlineOf)
    const images = this.wall === null ? [] : outlines.map((outline) => mirrored(outline, this.wall))
    for (let target = 0; target < this.count; target++)
      for (let source = 0; source < this.count; source++) {
        const place = target * this.count + source
        const divides = at(rings, source).length % (3 * LARGEST_STRIDE) === 0
        const here = at(outlines, target)
        if (source !== target && divides) this.direct[place] = stride(here, at(outlines, source))
        const image = images[source]
        if (image !== undefined && divides) this.image[place] = stride(here, image)
      }
  }
}

function outlineOf(nodes: Float64Array): Outline {
  const count = nodes.length / 3
  const every = Math.max(1, Math.floor(count / LOOKED_AT))
  const points: number[] = []
  for (let node = 0; node < count; node += every)
    points.push(at(nodes, 3 * node), at(nodes, 3 * node + 1), at(nodes, 3 * node + 2))
  let longest = 0
  for (let node = 0; node < count; node++) {
    const next = (node + 1) % count
    longest = Math.max(
      longest,
      Math.hypot(
        at(nodes, 3 * next) - at(nodes, 3 * node),
        at(nodes, 3 * next + 1) - at(nodes, 3 * node + 1),
        at(nodes, 3 * next + 2) - at(nodes, 3 * node + 2),
      ),
    )
  }
  return { points: Float64Array.from(points), slack: (every * longest) / 2, segment: longest }
}

function mirrored(outline: Outline, wall: WakeWall | null): Outline {
  if (wall === null) return outline
  const points = outline.points.slice()
  const level = dot(wall.point, wall.normal)
  for (let i = 0; i < points.length; i += 3) {
    const height = dot([at(points, i), at(points, i + 1), at(points, i + 2)], wall.normal) - level
    for (const axis of [0, 1, 2] as const) points[i + axis] = at(points, i + axis) - 2 * height * wall.normal[axis]
  }
  return { ...outline, points }
}

/** Largest stride of the source whose error at the target stays below the exponent. */
function stride(target: Outline, source: Outline): number {
  const a = target.points
  const b = source.points
  let least = Infinity
  for (let i = 0; i < a.length; i += 3)
    for (let j = 0; j < b.length; j += 3) {
      const dx = read(a, i) - read(b, j)
      const dy = read(a, i + 1) - read(b, j + 1)
      const dz = read(a, i + 2) - read(b, j + 2)
      least = Math.min(least, dx * dx + dy * dy + dz * dz)
    }
  const distance = Math.sqrt(least) - target.slack - source.slack
  const most = (2 * Math.PI * distance) / (EXPONENT * source.segment)
  for (let candidate = LARGEST_STRIDE; candidate > 1; candidate /= 2) if (candidate <= most) return candidate
  return 1
}

function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
