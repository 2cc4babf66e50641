/**
 * Tubes as half shells that face the eye: a third of the triangles of a six-sided tube, and alike in parallel projection.
 */
import type { Vector } from '../vectors'

/** Where a curve runs straight at the eye the shell closes: a round cap there, up to so many a ring. */
const CAPS = 4
const CAP_CORNERS = 8
const CAP_VERTICES = CAP_CORNERS + 1

export function stripVertices(count: number): number {
  return 3 * count + CAPS * CAP_VERTICES
}

export function stripIndices(count: number): number {
  return 12 * count + CAPS * CAP_CORNERS * 3
}

/**
 * Vertices of a shell about a closed curve: left edge, crest, right edge of every node, then the caps.
 *
 * @returns number of the next free vertex
 */
export function writeStrip(
  positions: Float32Array,
  normals: Float32Array,
  first: number,
  nodes: Float64Array,
  radius: number,
  toward: Vector,
): number {
  const count = nodes.length / 3
  const read = (i: number): number => nodes[i] ?? 0
  const [ex, ey, ez] = toward
  let to = 3 * first
  const put = (x: number, y: number, z: number, nx: number, ny: number, nz: number): void => {
    positions[to] = x
    positions[to + 1] = y
    positions[to + 2] = z
    normals[to] = nx
    normals[to + 1] = ny
    normals[to + 2] = nz
    to += 3
  }
  const caps: number[] = []
  let [lx, ly, lz] = [0, 0, 0]
  // The last node goes first, unwritten: the shell may turn over between it and the first one.
  for (let step = -1; step < count; step += 1) {
    const i = (step + count) % count
    const ahead = 3 * ((i + 1) % count)
    const behind = 3 * ((i + count - 1) % count)
    const tx = read(ahead) - read(behind)
    const ty = read(ahead + 1) - read(behind + 1)
    const tz = read(ahead + 2) - read(behind + 2)
    let sx = ey * tz - ez * ty
    let sy = ez * tx - ex * tz
    let sz = ex * ty - ey * tx
    const length = Math.hypot(sx, sy, sz)
    if (length > 0) {
      sx /= length
      sy /= length
      sz /= length
    } else [sx, sy, sz] = [lx, ly, lz]
    if (sx * lx + sy * ly + sz * lz < 0) caps.push(i)
    lx = sx
    ly = sy
    lz = sz
    if (step < 0) continue
    const [px, py, pz] = [read(3 * i), read(3 * i + 1), read(3 * i + 2)]
    put(px + radius * sx, py + radius * sy, pz + radius * sz, sx, sy, sz)
    put(px + radius * ex, py + radius * ey, pz + radius * ez, ex, ey, ez)
    put(px - radius * sx, py - radius * sy, pz - radius * sz, -sx, -sy, -sz)
  }
  // Across and up the screen, whichever way.
  const across: Vector = Math.abs(ey) < 0.9 ? [ez, 0, -ex] : [0, -ez, ey]
  const size = Math.hypot(...across)
  const [ax, ay, az] = [across[0] / size, across[1] / size, across[2] / size]
  const [ux, uy, uz] = [ey * az - ez * ay, ez * ax - ex * az, ex * ay - ey * ax]
  for (let cap = 0; cap < CAPS; cap += 1) {
    const node = caps[cap]
    // A cap that is not needed has no size.
    const reach = node === undefined ? 0 : radius
    const i = 3 * (node ?? 0)
    const [px, py, pz] = [read(i), read(i + 1), read(i + 2)]
    put(px + reach * ex, py + reach * ey, pz + reach * ez, ex, ey, ez)
    for (let corner = 0; corner < CAP_CORNERS; corner += 1) {
      const angle = (2 * Math.PI * corner) / CAP_CORNERS
      const [c, s] = [Math.cos(angle), Math.sin(angle)]
      const [nx, ny, nz] = [c * ax + s * ux, c * ay + s * uy, c * az + s * uz]
      put(px + reach * nx, py + reach * ny, pz + reach * nz, nx, ny, nz)
    }
  }
  return to / 3
}

/** Triangles of a shell, facing the eye. @returns the next free place */
export function writeStripIndex(index: Uint32Array, first: number, vertex: number, count: number): number {
  let to = first
  const put = (a: number, b: number, c: number): void => {
    index[to] = a
    index[to + 1] = b
    index[to + 2] = c
    to += 3
  }
  for (let i = 0; i < count; i += 1) {
    const here = vertex + 3 * i
    const next = vertex + 3 * ((i + 1) % count)
    for (const side of [0, 1]) {
      put(here + side, here + side + 1, next + side)
      put(next + side, here + side + 1, next + side + 1)
    }
  }
  for (let cap = 0; cap < CAPS; cap += 1) {
    const centre = vertex + 3 * count + cap * CAP_VERTICES
    for (let corner = 0; corner < CAP_CORNERS; corner += 1)
      put(centre, centre + 1 + corner, centre + 1 + ((corner + 1) % CAP_CORNERS))
  }
  return to
}
