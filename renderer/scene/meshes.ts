/**
 * Bodies of revolution as triangles: the ring from its real core outline, the cut-open nozzle, the slug.
 */
import { BufferAttribute, BufferGeometry } from 'three'
import { at } from '../../core/base'
import { offAxisRuns, type SceneNozzle, type ScenePoint, type WallStation } from '../../core/report'

const RING_OUTLINE = 80
const RING_AROUND = 128
const AROUND = 72
/** The part of the nozzle's wall that is cut away, as angles from straight up toward the viewer [rad]. */
export const CUT_FROM = 0.06 * Math.PI
export const CUT_TO = 0.86 * Math.PI
/** Share of a diameter left whole at the lip. */
const LIP = 0.1

/** Points equally spaced along a line. */
export function resampled(line: readonly ScenePoint[], count: number): ScenePoint[] {
  const lengths = [0]
  for (let index = 1; index < line.length; index += 1) {
    const [a, b] = [at(line, index - 1), at(line, index)]
    lengths.push(at(lengths, index - 1) + Math.hypot(b.x - a.x, b.r - a.r))
  }
  const total = at(lengths, lengths.length - 1)
  const points: ScenePoint[] = []
  let part = 1
  for (let index = 0; index < count; index += 1) {
    const length = (total * index) / (count - 1)
    while (part < lengths.length - 1 && at(lengths, part) < length) part += 1
    const [a, b] = [at(line, part - 1), at(line, part)]
    const span = at(lengths, part) - at(lengths, part - 1)
    const share = span > 0 ? (length - at(lengths, part - 1)) / span : 0
    points.push({ x: a.x + (b.x - a.x) * share, r: a.r + (b.r - a.r) * share })
  }
  return points
}

export interface RingMesh {
  readonly geometry: BufferGeometry
  /** Give it another core outline; the buffers stay. */
  shape(core: readonly ScenePoint[]): void
}

/** A ring turned from its core outline; one that reaches the axis closes there, as Hill's vortex does. */
export function createRingMesh(): RingMesh {
  const geometry = new BufferGeometry()
  const vertices = RING_OUTLINE * (RING_AROUND + 1)
  const position = new Float32Array(vertices * 3)
  const normal = new Float32Array(vertices * 3)
  const index = new Uint16Array((RING_OUTLINE - 1) * RING_AROUND * 6)
  let next = 0
  for (let i = 0; i < RING_OUTLINE - 1; i += 1) {
    for (let j = 0; j < RING_AROUND; j += 1) {
      const a = i * (RING_AROUND + 1) + j
      const b = a + RING_AROUND + 1
      index.set([a, b, a + 1, b, b + 1, a + 1], next)
      next += 6
    }
  }
  const cosines = Float64Array.from({ length: RING_AROUND + 1 }, (_, j) => Math.cos((2 * Math.PI * j) / RING_AROUND))
  const sines = Float64Array.from({ length: RING_AROUND + 1 }, (_, j) => Math.sin((2 * Math.PI * j) / RING_AROUND))
  geometry.setAttribute('position', new BufferAttribute(position, 3))
  geometry.setAttribute('normal', new BufferAttribute(normal, 3))
  geometry.setIndex(new BufferAttribute(index, 1))
  return {
    geometry,
    shape(core) {
      const run = offAxisRuns(core)[0] ?? core
      if (run.length < 3) return
      const closed =
        Math.hypot(at(run, 0).x - at(run, run.length - 1).x, at(run, 0).r - at(run, run.length - 1).r) < 1e-12
      // One sense for all outlines, so that outside is outside for normals and faces alike.
      const line = resampled(signedArea(run) > 0 ? run : [...run].reverse(), RING_OUTLINE)
      let to = 0
      for (let i = 0; i < RING_OUTLINE; i += 1) {
        const before = at(line, i > 0 ? i - 1 : closed ? RING_OUTLINE - 2 : 0)
        const after = at(line, i < RING_OUTLINE - 1 ? i + 1 : closed ? 1 : RING_OUTLINE - 1)
        const here = at(line, i)
        const [tx, tr] = [after.x - before.x, after.r - before.r]
        const length = Math.hypot(tx, tr) || 1
        const [nx, nr] = [tr / length, -tx / length]
        for (let j = 0; j <= RING_AROUND; j += 1) {
          const [c, s] = [at(cosines, j), at(sines, j)]
          position[to] = here.x
          normal[to] = nx
          position[to + 1] = here.r * c
          normal[to + 1] = nr * c
          position[to + 2] = here.r * s
          normal[to + 2] = nr * s
          to += 3
        }
      }
      refresh(geometry)
    },
  }
}

/** Twice the area, positive when a loop turns from +x toward +r. */
function signedArea(line: readonly ScenePoint[]): number {
  let sum = 0
  line.forEach((a, index) => {
    const b = at(line, (index + 1) % line.length)
    sum += a.x * b.r - b.x * a.r
  })
  return sum
}

function refresh(geometry: BufferGeometry): void {
  for (const name of ['position', 'normal']) {
    const attribute = geometry.getAttribute(name)
    if (attribute instanceof BufferAttribute) attribute.needsUpdate = true
  }
}

/** Triangles collected one quad at a time. */
class Quads {
  readonly positions: number[] = []
  readonly normals: number[] = []

  /** Corners run anticlockwise as seen from outside, clockwise where `turned`. */
  add(corners: readonly (readonly number[])[], normals: readonly (readonly number[])[], turned: boolean): void {
    for (const corner of turned ? [0, 2, 1, 0, 3, 2] : [0, 1, 2, 0, 2, 3]) {
      this.positions.push(...at(corners, corner))
      this.normals.push(...at(normals, corner))
    }
  }

  fill(geometry: BufferGeometry): void {
    // What the graphics processor holds of the old shape is given back at once.
    geometry.dispose()
    geometry.setAttribute('position', new BufferAttribute(new Float32Array(this.positions), 3))
    geometry.setAttribute('normal', new BufferAttribute(new Float32Array(this.normals), 3))
  }
}

function around(x: number, r: number, angle: number): readonly number[] {
  return [x, r * Math.cos(angle), r * Math.sin(angle)]
}

/** Surface swept by a straight piece of meridian between two angles. */
function sweep(quads: Quads, a: ScenePoint, b: ScenePoint, from: number, to: number, side: 1 | -1): void {
  const length = Math.hypot(b.x - a.x, b.r - a.r)
  if (length === 0) return
  const nx = (-side * (b.r - a.r)) / length
  const nr = (side * (b.x - a.x)) / length
  const parts = Math.max(2, Math.ceil((AROUND * (to - from)) / (2 * Math.PI)))
  for (let part = 0; part < parts; part += 1) {
    const p = from + ((to - from) * part) / parts
    const q = from + ((to - from) * (part + 1)) / parts
    const [n, m] = [around(nx, nr, p), around(nx, nr, q)]
    quads.add(
      [around(a.x, a.r, p), around(b.x, b.r, p), around(b.x, b.r, q), around(a.x, a.r, q)],
      [n, n, m, m],
      side === 1,
    )
  }
}

/** Wall between stations from one angle to another, with its two end faces and, where it is cut, its section faces. */
function wallPart(quads: Quads, stations: readonly WallStation[], from: number, to: number): void {
  for (let index = 1; index < stations.length; index += 1) {
    const [a, b] = [at(stations, index - 1), at(stations, index)]
    sweep(quads, a.inner, b.inner, from, to, -1)
    sweep(quads, a.outer, b.outer, from, to, 1)
    // A whole turn has no section, a step at one station no section of its own.
    if (to - from > 2 * Math.PI - 1e-6 || a.inner.x === b.inner.x) continue
    for (const [angle, sign] of [
      [from, -1],
      [to, 1],
    ] as const) {
      const n = [0, -sign * Math.sin(angle), sign * Math.cos(angle)]
      const corners = [a.inner, b.inner, b.outer, a.outer].map(({ x, r }) => around(x, r, angle))
      quads.add(corners, [n, n, n, n], sign < 0)
    }
  }
  const [rear, front] = [at(stations, 0), at(stations, stations.length - 1)]
  sweep(quads, rear.inner, rear.outer, from, to, 1)
  sweep(quads, front.outer, front.inner, from, to, 1)
}

/** The nozzle with its near side cut away up to the lip, which stays a whole ring. */
export function fillNozzle(geometry: BufferGeometry, nozzle: SceneNozzle): void {
  const quads = new Quads()
  const final = at(nozzle.stations, nozzle.stations.length - 1)
  const before = at(nozzle.stations, nozzle.stations.length - 2)
  const span = final.inner.x - before.inner.x
  const lip = Math.min(LIP * nozzle.diameter, span * 0.6)
  const share = span > 0 ? 1 - lip / span : 0
  const between = (a: ScenePoint, b: ScenePoint): ScenePoint => ({
    x: a.x + (b.x - a.x) * share,
    r: a.r + (b.r - a.r) * share,
  })
  const cut: WallStation = { inner: between(before.inner, final.inner), outer: between(before.outer, final.outer) }
  wallPart(quads, [...nozzle.stations.slice(0, -1), cut], CUT_TO, CUT_FROM + 2 * Math.PI)
  wallPart(quads, [cut, final], 0, 2 * Math.PI)
  quads.fill(geometry)
}

/** A closed body turned from an open meridian, a hair inside what surrounds it. */
export function fillBody(geometry: BufferGeometry, meridian: readonly ScenePoint[], shrink = 0.985): void {
  const quads = new Quads()
  const line = meridian.map(({ x, r }) => ({ x, r: r * shrink }))
  for (let index = 1; index < line.length; index += 1)
    sweep(quads, at(line, index - 1), at(line, index), 0, 2 * Math.PI, 1)
  const [rear, front] = [at(line, 0), at(line, line.length - 1)]
  sweep(quads, { x: rear.x, r: 0 }, rear, 0, 2 * Math.PI, 1)
  sweep(quads, front, { x: front.x, r: 0 }, 0, 2 * Math.PI, 1)
  quads.fill(geometry)
}
