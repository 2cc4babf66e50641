/**
 * Lines of what stands still around the rings: axes with their numbers' ticks, nozzle edges, wall, tube, stations.
 */
import type {
  DrawingColours,
  WakeSceneModel,
  WakeSceneNozzle,
  WakeSceneTube,
  WakeSceneWall,
} from '../../../core/report'
import { seenAlongAxis, stroke, type Stroke } from '../strokes'
import { add, cross, dot, unit, type Vector } from '../vectors'
import type { Basis } from '../view'

export type WakeStroke = Stroke<keyof DrawingColours | 'counter'>

const AXIS_DASH = [14, 4, 2, 4]
const STATION_DASH = [7, 4]
const PARTS = 72
/** Hatch of a wall, in pixels: from one stroke to the next, and their length. */
const HATCH_GAP = 8
const HATCH_LENGTH = 8
const MOST_HATCHES = 220
const TICK = 5
const TUBE_CIRCLES = 5

/** @param perPixel length of a pixel [m] */
export function surroundingStrokes(
  model: WakeSceneModel,
  stations: boolean,
  basis: Basis,
  perPixel: number,
): readonly WakeStroke[] {
  return [
    ...model.axes.map(({ from, to }) => stroke([from, to], 'muted', 1, { dash: AXIS_DASH })),
    ...datumStrokes(model, basis, perPixel),
    ...model.nozzles.flatMap(nozzleEdges),
    ...(model.wall === null ? [] : wallStrokes(model.wall, perPixel)),
    ...(model.tube === null ? [] : tubeStrokes(model.tube, basis)),
    ...(stations
      ? model.stations.map(({ centre, radius }) =>
          stroke(circle(centre, [0, 1, 0], [0, 0, 1], radius, radius), 'edge', 1.1, { dash: STATION_DASH }),
        )
      : []),
  ]
}

function circle(centre: Vector, first: Vector, second: Vector, a: number, b: number): Vector[] {
  return Array.from({ length: PARTS + 1 }, (_, part) => {
    const angle = (2 * Math.PI * part) / PARTS
    return add(add(centre, first, a * Math.cos(angle)), second, b * Math.sin(angle))
  })
}

function datumStrokes({ datum }: WakeSceneModel, basis: Basis, perPixel: number): WakeStroke[] {
  if (seenAlongAxis(basis)) return []
  // Ticks hang square to the axis as it is seen, downward.
  const aside = unit(cross(basis.toward, [1, 0, 0]))
  const down = dot(aside, basis.up) > 0 ? -1 : 1
  return [
    stroke([datum.from, datum.to], 'ink', 1),
    ...datum.ticks.map(({ place }) => stroke([place, add(place, aside, down * TICK * perPixel)], 'ink', 1)),
  ]
}

function nozzleEdges({ position, axes, stretch, outline }: WakeSceneNozzle): WakeStroke[] {
  const lip = outline.stations.at(-1)
  if (lip === undefined) return []
  const [forward, first, second] = axes
  return [lip.inner, lip.outer].map(({ x, r }) =>
    stroke(circle(add(position, forward, x), first, second, r * stretch[0], r * stretch[1]), 'ink', 1),
  )
}

/** The frame of the drawn part, hatched on the side of the solid. */
function wallStrokes({ corners, behind }: WakeSceneWall, perPixel: number): WakeStroke[] {
  const middle = add([0, 0, 0], add(corners[0], corners[2]), 0.5)
  const edges = corners.map((corner, index) => [corner, corners[(index + 1) % 4] ?? corner] as const)
  const whole = edges.reduce((sum, [a, b]) => sum + Math.hypot(...add(b, a, -1)), 0)
  const gap = Math.max(HATCH_GAP * perPixel, whole / MOST_HATCHES)
  const length = HATCH_LENGTH * perPixel
  const hatches = edges.flatMap(([a, b]) => {
    const span = Math.hypot(...add(b, a, -1))
    const along = unit(add(b, a, -1))
    const halfway = add(add([0, 0, 0], a, 0.5), b, 0.5)
    const outward = unit(add(halfway, middle, -1))
    // Slanting behind the wall and out of its plane, so that it shows from the front and from the edge.
    const slant = add(add(add([0, 0, 0], along, 0.6 * length), behind, 0.8 * length), outward, 0.5 * length)
    return Array.from({ length: Math.max(1, Math.floor(span / gap)) }, (_, part) => {
      const start = add(a, along, (part + 0.5) * gap)
      return stroke([start, add(start, slant)], 'edge', 1)
    })
  })
  return [stroke([...corners, corners[0]], 'edge', 1.3), ...hatches]
}

/** Circles along the tube and the two lines in which it is seen from the side. */
function tubeStrokes({ from, to, radius }: WakeSceneTube, basis: Basis): WakeStroke[] {
  const axis = unit(add(to, from, -1))
  const seen = cross(basis.toward, axis)
  const aside: Vector = Math.hypot(...seen) > 0.05 ? unit(seen) : basis.up
  const other = cross(axis, aside)
  const rings = Array.from({ length: TUBE_CIRCLES }, (_, part) => {
    const centre = add(from, add(to, from, -1), part / (TUBE_CIRCLES - 1))
    return stroke(circle(centre, aside, other, radius, radius), 'edge', 1)
  })
  return [
    ...rings,
    ...[1, -1].map((side) => stroke([add(from, aside, side * radius), add(to, aside, side * radius)], 'edge', 1)),
  ]
}
