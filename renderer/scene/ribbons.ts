/**
 * Lines as thin strips of triangles that face the eye: a width in pixels, dashes, filled heads, and no line primitives, which have
 * no width and alias on software renderers.
 */
import { BufferAttribute, BufferGeometry, DynamicDrawUsage } from 'three'
import type { DrawingColours } from '../../core/report'
import { colourParts } from '../plots/themeColours'
import type { Stroke } from './strokes'
import { add, cross, dot, unit, type Vector } from './vectors'
import type { Basis } from './view'

/** Lines stand this far before the surfaces they lie on, in pixels. */
const BEFORE_SURFACE = 1.5

export interface Ribbons {
  readonly geometry: BufferGeometry
  draw(strokes: readonly Stroke[], basis: Basis, perPixel: number, colours: DrawingColours): void
}

/** Strips in one growing buffer that is refilled in place. */
export function createRibbons(): Ribbons {
  const geometry = new BufferGeometry()
  let capacity = 0
  let position = new BufferAttribute(new Float32Array(0), 3)
  let colour = new BufferAttribute(new Float32Array(0), 3)
  return {
    geometry,
    draw(strokes, basis, perPixel, colours) {
      const points: number[] = []
      const paints: number[] = []
      for (const stroke of strokes) {
        const before = points.length
        traceStroke(points, stroke, basis, perPixel)
        const [red, green, blue] = linear(colours[stroke.colour])
        for (let index = before; index < points.length; index += 3) paints.push(red, green, blue)
      }
      if (points.length > capacity) {
        capacity = Math.ceil(points.length / 2) * 3
        geometry.dispose()
        position = new BufferAttribute(new Float32Array(capacity), 3).setUsage(DynamicDrawUsage)
        colour = new BufferAttribute(new Float32Array(capacity), 3).setUsage(DynamicDrawUsage)
        geometry.setAttribute('position', position)
        geometry.setAttribute('color', colour)
      }
      position.array.set(points)
      colour.array.set(paints)
      position.needsUpdate = true
      colour.needsUpdate = true
      geometry.setDrawRange(0, points.length / 3)
    },
  }
}

/** Colours of vertices are linear. */
function linear(colour: string): readonly [number, number, number] {
  const [red, green, blue] = colourParts(colour)
  const one = (part: number): number => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4)
  return [one(red), one(green), one(blue)]
}

function traceStroke(out: number[], stroke: Stroke, basis: Basis, perPixel: number): void {
  const raised = stroke.points.map((point) => add(point, basis.toward, BEFORE_SURFACE * perPixel))
  const half = (stroke.width / 2) * perPixel
  const end = raised.at(-1)
  if (stroke.head > 0 && end !== undefined) {
    const length = stroke.head * perPixel
    const { line, direction } = shortened(raised, length, basis)
    dashed(out, line, stroke.dash, half, basis, perPixel)
    const neck = line.at(-1) ?? end
    const side = unit(cross(basis.toward, direction))
    const tip = add(neck, direction, Math.hypot(...add(end, neck, -1)))
    triangle(out, tip, add(neck, side, length * 0.32), add(neck, side, -length * 0.32))
  } else dashed(out, raised, stroke.dash, half, basis, perPixel)
}

/** The line without its last `length`, as seen on the screen, and the direction in which it ends. */
function shortened(
  line: readonly Vector[],
  length: number,
  basis: Basis,
): { readonly line: Vector[]; readonly direction: Vector } {
  const kept = [...line]
  let left = length
  let tip = kept.at(-1) ?? [0, 0, 0]
  const end = tip
  while (kept.length > 1) {
    const before = kept.at(-2)
    if (before === undefined) break
    const span = seenLength(tip, before, basis)
    if (span > left) {
      const share = span === 0 ? 0 : left / span
      tip = add(tip, add(before, tip, -1), share)
      kept[kept.length - 1] = tip
      break
    }
    left -= span
    kept.pop()
    tip = before
  }
  const flat = add(end, tip, -1)
  return { line: kept, direction: unit(add(flat, basis.toward, -dot(flat, basis.toward))) }
}

function seenLength(a: Vector, b: Vector, basis: Basis): number {
  const step = add(b, a, -1)
  return Math.hypot(dot(step, basis.right), dot(step, basis.up))
}

function dashed(
  out: number[],
  line: readonly Vector[],
  dash: readonly number[],
  half: number,
  basis: Basis,
  perPixel: number,
): void {
  let slot = 0
  let left = dash.length > 0 ? (dash[0] ?? 0) * perPixel : Infinity
  for (let index = 1; index < line.length; index += 1) {
    const [start, end] = [line[index - 1], line[index]]
    if (start === undefined || end === undefined) continue
    const span = seenLength(start, end, basis)
    if (span === 0) continue
    const step = add(end, start, -1)
    const side = unit(cross(basis.toward, step))
    let done = 0
    while (done < span - 1e-12) {
      const next = Math.min(span, done + left)
      if (slot % 2 === 0) quad(out, add(start, step, done / span), add(start, step, next / span), side, half)
      left -= next - done
      done = next
      if (left > 1e-12) continue
      slot = (slot + 1) % dash.length
      left = (dash[slot] ?? 1) * perPixel
    }
  }
}

function quad(out: number[], a: Vector, b: Vector, side: Vector, half: number): void {
  const [p, q, r, s] = [add(a, side, half), add(b, side, half), add(b, side, -half), add(a, side, -half)]
  triangle(out, p, q, r)
  triangle(out, p, r, s)
}

function triangle(out: number[], a: Vector, b: Vector, c: Vector): void {
  out.push(...a, ...b, ...c)
}
