/**
 * Which ring is under a pixel.
 */
import { at } from '../../../core/base'
import type { RingShape } from '../../../core/filament'
import type { Pixel } from '../../../core/report'
import { dot, type Vector } from '../vectors'
import { basisOf, project, type Size, type View } from '../view'

/** So near to a tube is on it, in pixels. */
const NEAR = 7

/** Number of the ring whose tube is at a pixel, the nearest to the eye among several; null for none. */
export function ringAt(shapes: readonly RingShape[], pixel: Pixel, view: View, size: Size): number | null {
  const basis = basisOf(view)
  let found: number | null = null
  let best = Infinity
  for (const { nodes, number, coreRadius } of shapes) {
    const count = nodes.length / 3
    const reach = Math.max(coreRadius * view.scale, NEAR)
    for (let i = 0; i < count; i += 1) {
      const place: Vector = [at(nodes, 3 * i), at(nodes, 3 * i + 1), at(nodes, 3 * i + 2)]
      const next = 3 * ((i + 1) % count)
      const a = project(place, basis, view, size)
      const b = project([at(nodes, next), at(nodes, next + 1), at(nodes, next + 2)], basis, view, size)
      if (fromLine(pixel, a, b) > reach) continue
      const depth = -dot(place, basis.toward)
      if (depth >= best) continue
      best = depth
      found = number
    }
  }
  return found
}

function fromLine(p: Pixel, a: Pixel, b: Pixel): number {
  const [dx, dy] = [b.x - a.x, b.y - a.y]
  const square = dx * dx + dy * dy
  const share = square === 0 ? 0 : Math.min(1, Math.max(0, ((p.x - a.x) * dx + (p.y - a.y) * dy) / square))
  return Math.hypot(p.x - a.x - share * dx, p.y - a.y - share * dy)
}

/** The ring before or after one in the order of numbers, round and round; from none, the first or the last. */
export function nextRing(shapes: readonly RingShape[], from: number | null, step: 1 | -1): number | null {
  const numbers = shapes.map(({ number }) => number)
  if (numbers.length === 0) return null
  const held = from === null ? -1 : numbers.indexOf(from)
  if (held < 0) return at(numbers, step > 0 ? 0 : numbers.length - 1)
  return at(numbers, (held + step + numbers.length) % numbers.length)
}
