/**
 * Lines as thin strips of triangles that face the eye: a width in pixels, dashes, filled heads, and no line primitives, which have
 * no width and alias on software renderers.
 */
import { BufferAttribute, BufferGeometry, DynamicDrawUsage } from 'three'
import { colourParts } from '../plots/themeColours'
import type { Stroke } from './strokes'
import type { Vector } from './vectors'
import type { Basis } from './view'

/** Lines stand this far before the surfaces they lie on, in pixels. */
const BEFORE_SURFACE = 1.5

export interface Ribbons {
  readonly geometry: BufferGeometry
  draw<Name extends string>(
    strokes: readonly Stroke<Name>[],
    basis: Basis,
    perPixel: number,
    colours: Readonly<Record<Name, string>>,
  ): void
}

/** Strips in one growing buffer that is refilled in place. */
export function createRibbons(): Ribbons {
  const geometry = new BufferGeometry()
  const tracer = new Tracer()
  let capacity = -1
  return {
    geometry,
    draw(strokes, basis, perPixel, colours) {
      tracer.begin(basis, perPixel)
      for (const stroke of strokes) {
        tracer.setColour(colours[stroke.colour])
        tracer.trace(stroke)
      }
      if (tracer.capacity !== capacity) {
        capacity = tracer.capacity
        geometry.dispose()
        geometry.setAttribute('position', new BufferAttribute(tracer.points, 3).setUsage(DynamicDrawUsage))
        geometry.setAttribute('color', new BufferAttribute(tracer.paints, 3).setUsage(DynamicDrawUsage))
      }
      for (const name of ['position', 'color']) {
        const attribute = geometry.getAttribute(name)
        if (!(attribute instanceof BufferAttribute)) continue
        attribute.clearUpdateRanges()
        attribute.addUpdateRange(0, tracer.count)
        attribute.needsUpdate = true
      }
      geometry.setDrawRange(0, tracer.count / 3)
    },
  }
}

/** Colours of vertices are linear. */
export function linearParts(colour: string): readonly [number, number, number] {
  const [red, green, blue] = colourParts(colour)
  const one = (part: number): number => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4)
  return [one(red), one(green), one(blue)]
}

/** Writes triangles number by number: strips are traced anew in every frame that moves, and leave nothing to collect. */
class Tracer {
  points = new Float32Array(0)
  paints = new Float32Array(0)
  count = 0
  private basis: Basis = { right: [1, 0, 0], up: [0, 1, 0], toward: [0, 0, 1], radial: [0, 1, 0] }
  private perPixel = 1
  private paint: readonly [number, number, number] = [0, 0, 0]
  /** Every corner is raised so far toward the eye. */
  private lift: Vector = [0, 0, 0]

  get capacity(): number {
    return this.points.length
  }

  begin(basis: Basis, perPixel: number): void {
    this.count = 0
    this.basis = basis
    this.perPixel = perPixel
    const raise = BEFORE_SURFACE * perPixel
    this.lift = [basis.toward[0] * raise, basis.toward[1] * raise, basis.toward[2] * raise]
  }

  setColour(colour: string): void {
    this.paint = linearParts(colour)
  }

  trace({ points, dash, width, head }: Stroke<string>): void {
    const half = (width / 2) * this.perPixel
    let end = points.length - 1
    /** How far along its last piece the line goes. */
    let share = 1
    if (head > 0 && end > 0) {
      let left = head * this.perPixel
      for (; end > 0; end -= 1) {
        const span = this.seen(points[end - 1], points[end])
        if (span > left) {
          share = 1 - left / span
          break
        }
        left -= span
      }
      this.head(points, end, share, head * this.perPixel)
    }
    this.line(points, end, share, dash, half)
  }

  /** Length on the screen. */
  private seen(a: Vector | undefined, b: Vector | undefined): number {
    if (a === undefined || b === undefined) return 0
    const { right, up } = this.basis
    const x = b[0] - a[0]
    const y = b[1] - a[1]
    const z = b[2] - a[2]
    return Math.hypot(x * right[0] + y * right[1] + z * right[2], x * up[0] + y * up[1] + z * up[2])
  }

  /** A filled head from the end of a shortened line to where it would have ended. */
  private head(points: readonly Vector[], end: number, share: number, length: number): void {
    const [before, after, tip] = [points[Math.max(0, end - 1)], points[end], points[points.length - 1]]
    if (before === undefined || after === undefined || tip === undefined) return
    const nx = before[0] + (after[0] - before[0]) * share
    const ny = before[1] + (after[1] - before[1]) * share
    const nz = before[2] + (after[2] - before[2]) * share
    const { right, up } = this.basis
    const [x, y, z] = [tip[0] - nx, tip[1] - ny, tip[2] - nz]
    const across = x * right[0] + y * right[1] + z * right[2]
    const upward = x * up[0] + y * up[1] + z * up[2]
    const reach = Math.hypot(across, upward)
    if (reach === 0) return
    // Along the screen, so that a head seen at a slant keeps its shape.
    const [ca, cu] = [across / reach, upward / reach]
    const side = length * 0.32
    const forward = (axis: 0 | 1 | 2): number => right[axis] * ca + up[axis] * cu
    const aside = (axis: 0 | 1 | 2): number => up[axis] * ca - right[axis] * cu
    const [fx, fy, fz] = [forward(0), forward(1), forward(2)]
    const [sx, sy, sz] = [aside(0) * side, aside(1) * side, aside(2) * side]
    this.room(9)
    this.corner(nx + fx * reach, ny + fy * reach, nz + fz * reach)
    this.corner(nx + sx, ny + sy, nz + sz)
    this.corner(nx - sx, ny - sy, nz - sz)
  }

  private line(points: readonly Vector[], end: number, share: number, dash: readonly number[], half: number): void {
    const { toward } = this.basis
    let slot = 0
    let left = dash.length > 0 ? (dash[0] ?? 0) * this.perPixel : Infinity
    for (let index = 1; index <= end; index += 1) {
      const a = points[index - 1]
      const b = points[index]
      if (a === undefined || b === undefined) continue
      const whole = this.seen(a, b)
      const span = index === end ? whole * share : whole
      if (!(span > 0)) continue
      const x = b[0] - a[0]
      const y = b[1] - a[1]
      const z = b[2] - a[2]
      const acrossX = toward[1] * z - toward[2] * y
      const acrossY = toward[2] * x - toward[0] * z
      const acrossZ = toward[0] * y - toward[1] * x
      const factor = half / Math.hypot(acrossX, acrossY, acrossZ)
      const sx = acrossX * factor
      const sy = acrossY * factor
      const sz = acrossZ * factor
      let done = 0
      while (done < span - 1e-12) {
        const next = Math.min(span, done + left)
        if (slot % 2 === 0) {
          const p = done / whole
          const q = next / whole
          this.quad(a[0] + x * p, a[1] + y * p, a[2] + z * p, a[0] + x * q, a[1] + y * q, a[2] + z * q, sx, sy, sz)
        }
        left -= next - done
        done = next
        if (left > 1e-12) continue
        slot = (slot + 1) % dash.length
        left = (dash[slot] ?? 1) * this.perPixel
      }
    }
  }

  private quad(
    ax: number,
    ay: number,
    az: number,
    bx: number,
    by: number,
    bz: number,
    sx: number,
    sy: number,
    sz: number,
  ): void {
    this.room(18)
    this.corner(ax + sx, ay + sy, az + sz)
    this.corner(bx + sx, by + sy, bz + sz)
    this.corner(bx - sx, by - sy, bz - sz)
    this.corner(ax + sx, ay + sy, az + sz)
    this.corner(bx - sx, by - sy, bz - sz)
    this.corner(ax - sx, ay - sy, az - sz)
  }

  private corner(x: number, y: number, z: number): void {
    const { points, paints, lift, paint, count } = this
    points[count] = x + lift[0]
    points[count + 1] = y + lift[1]
    points[count + 2] = z + lift[2]
    paints[count] = paint[0]
    paints[count + 1] = paint[1]
    paints[count + 2] = paint[2]
    this.count = count + 3
  }

  private room(more: number): void {
    if (this.count + more <= this.points.length) return
    // A multiple of a corner, half as much again.
    const size = Math.ceil(Math.max(2304, (this.count + more) * 1.5) / 9) * 9
    const [points, paints] = [new Float32Array(size), new Float32Array(size)]
    points.set(this.points.subarray(0, this.count))
    paints.set(this.paints.subarray(0, this.count))
    this.points = points
    this.paints = paints
  }
}
