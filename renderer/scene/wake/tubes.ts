/**
 * Rings as tubes of their core radius, all in one buffer that is refilled in place: round ones, or strips that face the eye where
 * round ones cost too much.
 */
import { BufferAttribute, BufferGeometry, DynamicDrawUsage } from 'three'
import type { Vector } from '../vectors'
import { writeStrip, stripIndices, stripVertices, writeStripIndex } from './strips'

export interface TubeRing {
  /** x y z of the nodes of a closed curve. */
  readonly nodes: Float64Array
  readonly coreRadius: number
  /** Linear red, green, blue. */
  readonly paint: readonly [number, number, number]
}

export interface TubeLook {
  /** Corners of the section; 0: strips that face the eye. */
  readonly sides: number
  /** Thinnest radius drawn [m]. */
  readonly least: number
  /** From the drawing to the eye; read by strips. */
  readonly toward: Vector
}

export interface Tubes {
  readonly geometry: BufferGeometry
  draw(rings: readonly TubeRing[], look: TubeLook): void
}

/** Corners tried, best first: as many as a budget of vertices allows. */
const SIDES = [24, 16, 12, 8, 6]

/** Corners of the section for so many nodes. @param budget vertices to draw at most, as far as six corners allow it */
export function sidesFor(nodes: number, budget: number): number {
  return SIDES.find((sides) => nodes * sides <= budget) ?? 6
}

/** One buffer for all rings; it grows where rings need more nodes than ever before, and never shrinks. */
export function createTubes(): Tubes {
  const geometry = new BufferGeometry()
  let positions = new Float32Array(0)
  let normals = new Float32Array(0)
  let paints = new Float32Array(0)
  let index = new Uint32Array(0)
  /** What the index and the colours were written for. */
  let layout = ''

  function grow(vertices: number, indices: number): void {
    if (vertices * 3 <= positions.length && indices <= index.length) return
    const room = Math.ceil(Math.max(vertices * 1.2, positions.length / 3))
    geometry.dispose()
    positions = new Float32Array(room * 3)
    normals = new Float32Array(room * 3)
    paints = new Float32Array(room * 3)
    index = new Uint32Array(Math.ceil(Math.max(indices * 1.2, index.length)))
    geometry.setAttribute('position', new BufferAttribute(positions, 3).setUsage(DynamicDrawUsage))
    geometry.setAttribute('normal', new BufferAttribute(normals, 3).setUsage(DynamicDrawUsage))
    geometry.setAttribute('color', new BufferAttribute(paints, 3))
    geometry.setIndex(new BufferAttribute(index, 1))
    layout = ''
  }

  function lay(rings: readonly TubeRing[], sides: number): number {
    let [vertex, next] = [0, 0]
    for (const { nodes, paint } of rings) {
      const count = nodes.length / 3
      const vertices = sides === 0 ? stripVertices(count) : count * sides
      for (let i = vertex; i < vertex + vertices; i += 1) paints.set(paint, 3 * i)
      next =
        sides === 0 ? writeStripIndex(index, next, vertex, count) : writeTubeIndex(index, next, vertex, count, sides)
      vertex += vertices
    }
    for (const attribute of [geometry.getIndex(), geometry.getAttribute('color')])
      if (attribute instanceof BufferAttribute) attribute.needsUpdate = true
    return next
  }

  let drawn = 0
  return {
    geometry,
    draw(rings, { sides, least, toward }) {
      let [vertices, indices] = [0, 0]
      let wanted = `${sides}`
      for (const { nodes, paint } of rings) {
        const count = nodes.length / 3
        vertices += sides === 0 ? stripVertices(count) : count * sides
        indices += sides === 0 ? stripIndices(count) : count * sides * 6
        wanted += ` ${count} ${paint.join()}`
      }
      grow(vertices, indices)
      if (wanted !== layout) {
        drawn = lay(rings, sides)
        layout = wanted
      }
      let vertex = 0
      for (const { nodes, coreRadius } of rings) {
        const radius = Math.max(coreRadius, least)
        vertex =
          sides === 0
            ? writeStrip(positions, normals, vertex, nodes, radius, toward)
            : writeTube(positions, normals, vertex, nodes, radius, sides)
      }
      for (const name of ['position', 'normal']) {
        const attribute = geometry.getAttribute(name)
        if (!(attribute instanceof BufferAttribute)) continue
        attribute.clearUpdateRanges()
        attribute.addUpdateRange(0, 3 * vertex)
        attribute.needsUpdate = true
      }
      geometry.setDrawRange(0, drawn)
    },
  }
}

/** Node count of the longest curve that scratch arrays were made for. */
let frames = new Float64Array(0)

/**
 * Vertices of a round tube about a closed curve.
 *
 * The section is carried along the curve without turning about it; what is left over after one round is spread over the round.
 *
 * @param first number of the first vertex written
 * @returns number of the next free vertex
 */
export function writeTube(
  positions: Float32Array,
  normals: Float32Array,
  first: number,
  nodes: Float64Array,
  radius: number,
  sides: number,
): number {
  const count = nodes.length / 3
  if (frames.length < 6 * (count + 1)) frames = new Float64Array(6 * (count + 1))
  const twist = carryFrame(nodes, count)
  let to = 3 * first
  for (let i = 0; i < count; i += 1) {
    const [px, py, pz] = [nodes[3 * i] ?? 0, nodes[3 * i + 1] ?? 0, nodes[3 * i + 2] ?? 0]
    const f = 6 * i
    const nx = frames[f] ?? 0
    const ny = frames[f + 1] ?? 0
    const nz = frames[f + 2] ?? 0
    const tx = frames[f + 3] ?? 0
    const ty = frames[f + 4] ?? 0
    const tz = frames[f + 5] ?? 0
    const bx = ty * nz - tz * ny
    const by = tz * nx - tx * nz
    const bz = tx * ny - ty * nx
    // One rotation a side, from the angle that takes up the twist.
    const start = (-twist * i) / count
    let c = Math.cos(start)
    let s = Math.sin(start)
    const turnC = Math.cos((2 * Math.PI) / sides)
    const turnS = Math.sin((2 * Math.PI) / sides)
    for (let j = 0; j < sides; j += 1) {
      const ux = c * nx + s * bx
      const uy = c * ny + s * by
      const uz = c * nz + s * bz
      normals[to] = ux
      positions[to] = px + radius * ux
      normals[to + 1] = uy
      positions[to + 1] = py + radius * uy
      normals[to + 2] = uz
      positions[to + 2] = pz + radius * uz
      to += 3
      const next = c * turnC - s * turnS
      s = s * turnC + c * turnS
      c = next
    }
  }
  return to / 3
}

/** Normal and tangent of every node into `frames`, and the angle by which the normal has turned after one round. */
function carryFrame(nodes: Float64Array, count: number): number {
  const read = (i: number): number => nodes[i] ?? 0
  // First normal: away from the far side of the ring.
  const far = 3 * (count >> 1)
  let nx = read(0) - read(far)
  let ny = read(1) - read(far + 1)
  let nz = read(2) - read(far + 2)
  for (let i = 0; i <= count; i += 1) {
    const ahead = 3 * ((i + 1) % count)
    const behind = 3 * ((i + count - 1) % count)
    let tx = read(ahead) - read(behind)
    let ty = read(ahead + 1) - read(behind + 1)
    let tz = read(ahead + 2) - read(behind + 2)
    const length = Math.hypot(tx, ty, tz) || 1
    tx /= length
    ty /= length
    tz /= length
    const along = nx * tx + ny * ty + nz * tz
    nx -= along * tx
    ny -= along * ty
    nz -= along * tz
    const size = Math.hypot(nx, ny, nz) || 1
    nx /= size
    ny /= size
    nz /= size
    const f = 6 * i
    frames[f] = nx
    frames[f + 1] = ny
    frames[f + 2] = nz
    frames[f + 3] = tx
    frames[f + 4] = ty
    frames[f + 5] = tz
  }
  const of = (k: number): number => frames[k] ?? 0
  // Angle from the first normal to the one that came round, about the tangent.
  const [ax, ay, az, tx, ty, tz] = [of(0), of(1), of(2), of(3), of(4), of(5)]
  const sine = nx * (ty * az - tz * ay) + ny * (tz * ax - tx * az) + nz * (tx * ay - ty * ax)
  return Math.atan2(sine, nx * ax + ny * ay + nz * az)
}

/** Triangles of a round tube, facing outward. @returns the next free place */
export function writeTubeIndex(
  index: Uint32Array | Uint16Array,
  first: number,
  vertex: number,
  count: number,
  sides: number,
): number {
  let to = first
  for (let i = 0; i < count; i += 1) {
    const here = vertex + i * sides
    const next = vertex + ((i + 1) % count) * sides
    for (let j = 0; j < sides; j += 1) {
      const k = (j + 1) % sides
      index[to] = here + j
      index[to + 1] = here + k
      index[to + 2] = next + j
      index[to + 3] = next + j
      index[to + 4] = here + k
      index[to + 5] = next + k
      to += 6
    }
  }
  return to
}
