/** Designs on the map: each at its place, or beside it with a line to it where another stands there. */
import type { Box, Pixel } from './boxes'
import { coordinate } from './svgText'
import type { ThrustMapModel } from './thrustMap'

/** Of the sign of a candidate [pixels]. */
export const MARK_RADIUS = 9

/** A design on the drawing: where its sign stands, and a line to the place it stands for where that is another. */
export interface PlacedMark extends Pixel {
  readonly id: string
  readonly kind: 'present' | 'candidate'
  readonly label: string
  readonly onMap: boolean
  readonly tie: string
}

/** The plan stands where it is; candidates give way to it and to those before them. */
export function placedMarks(
  { marks }: ThrustMapModel,
  toX: (value: number) => number,
  toY: (value: number) => number,
  frame: Box,
): readonly PlacedMark[] {
  const placed: PlacedMark[] = []
  const order = [...marks].sort((a, b) => Number(b.kind === 'present') - Number(a.kind === 'present'))
  for (const { id, kind, label, onMap, ...place } of order) {
    const there = { x: toX(place.x), y: toY(place.y) }
    if (!inside(there, frame)) continue
    const free = kind === 'present' ? there : freePlace(there, placed, frame)
    const moved = free.x !== there.x || free.y !== there.y
    const tie = moved
      ? `M${coordinate(free.x)} ${coordinate(free.y)}L${coordinate(there.x)} ${coordinate(there.y)}m-2 0a2 2 0 1 0 4 0a2 2 0 1 0-4 0`
      : ''
    placed.push({ id, kind, label, onMap, tie, ...free })
  }
  return placed
}

/** The nearest of some places around one that is inside the frame and clear of the marks there. */
function freePlace(there: Pixel, taken: readonly Pixel[], frame: Box): Pixel {
  const apart = 2 * MARK_RADIUS + 3
  for (const reach of [0, 1, 1.6, 2.4, 3.2])
    for (const turn of reach === 0 ? [0] : [0, 1, 7, 2, 6, 3, 5, 4]) {
      const angle = (turn * Math.PI) / 4
      const place = { x: there.x + reach * apart * Math.cos(angle), y: there.y + reach * apart * Math.sin(angle) }
      const clear = taken.every(({ x, y }) => Math.hypot(x - place.x, y - place.y) >= apart - 0.5)
      if (clear && inside(place, frame)) return place
    }
  return there
}

function inside({ x, y }: Pixel, frame: Box): boolean {
  return (
    x >= frame.left - 1 && x <= frame.left + frame.width + 1 && y >= frame.top - 1 && y <= frame.top + frame.height + 1
  )
}
