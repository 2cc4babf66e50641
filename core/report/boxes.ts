/**
 * Placing labels on a drawing: each label offers places in order of liking, and takes the first that costs least.
 *
 * Pixels, y downward. The same rule serves the window's plots, the SVG writer and the drawing of the ring.
 */

export interface Box {
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
}

export interface Pixel {
  readonly x: number
  readonly y: number
}

export interface Place extends Box {
  /** Text runs upward instead of across. */
  readonly vertical: boolean
}

export interface LabelRequest {
  readonly id: string
  /** Best first; at least one. */
  readonly places: readonly Place[]
}

export interface PlacedLabel {
  readonly id: string
  readonly place: Place
  /** Square pixels lost to other labels and obstacles, and twenty times those beyond the bounds; 0 when it stands free. */
  readonly overlap: number
}

export interface Obstacles {
  /** Where labels may stand. */
  readonly bounds: Box
  /** Shapes to keep off. */
  readonly boxes: readonly Box[]
  /** Points along lines to keep off. */
  readonly points: readonly Pixel[]
}

/** A clipped word is worse than one that stands on something. */
const OUTSIDE_WEIGHT = 20

/** Square pixels that two boxes share. */
export function sharedArea(a: Box, b: Box): number {
  const width = Math.min(a.left + a.width, b.left + b.width) - Math.max(a.left, b.left)
  const height = Math.min(a.top + a.height, b.top + b.height) - Math.max(a.top, b.top)
  return width > 0 && height > 0 ? width * height : 0
}

/**
 * Place labels in the order given; an earlier label is never moved for a later one.
 *
 * Leaving the bounds and covering another label weigh most, crossing a line less; among equals the earlier place wins.
 */
export function placeLabels(requests: readonly LabelRequest[], obstacles: Obstacles): readonly PlacedLabel[] {
  const placed: PlacedLabel[] = []
  for (const request of requests) {
    let best: PlacedLabel | null = null
    let bestCost = Infinity
    request.places.forEach((place, order) => {
      const overlap = lostArea(
        place,
        obstacles,
        placed.map((label) => label.place),
      )
      const cost = overlap * 10 + crossings(place, obstacles.points) * 6 + order * 0.5
      if (cost >= bestCost) return
      bestCost = cost
      best = { id: request.id, place, overlap }
    })
    if (best !== null) placed.push(best)
  }
  return placed
}

function lostArea(place: Box, obstacles: Obstacles, taken: readonly Box[]): number {
  const outside = place.width * place.height - sharedArea(place, obstacles.bounds)
  const covered = [...obstacles.boxes, ...taken].reduce((sum, box) => sum + sharedArea(place, box), 0)
  return (outside > 1e-6 ? outside * OUTSIDE_WEIGHT : 0) + covered
}

function crossings(place: Box, points: readonly Pixel[]): number {
  const right = place.left + place.width
  const bottom = place.top + place.height
  let count = 0
  for (const { x, y } of points) if (x > place.left && x < right && y > place.top && y < bottom) count += 1
  return count
}

/** Points along a polyline no further apart than `gap`, so that a label across a long straight part is noticed. */
export function pointsAlong(line: readonly Pixel[], gap: number): Pixel[] {
  const points: Pixel[] = []
  line.forEach((point, index) => {
    const before = line[index - 1]
    if (before !== undefined) {
      const parts = Math.min(400, Math.ceil(Math.hypot(point.x - before.x, point.y - before.y) / gap))
      for (let part = 1; part < parts; part += 1) {
        const share = part / parts
        points.push({ x: before.x + (point.x - before.x) * share, y: before.y + (point.y - before.y) * share })
      }
    }
    points.push(point)
  })
  return points
}
