/**
 * Lines that move with the rings: their speed as an arrow, the sense in which their fluid turns, the way they came, the one picked.
 */
import { at } from '../../../core/base'
import type { RingShape } from '../../../core/filament'
import type { WakeSceneModel } from '../../../core/report'
import { stroke } from '../strokes'
import { add, cross, dot, unit, type Vector } from '../vectors'
import type { Basis } from '../view'
import type { WakeStroke } from './surroundingStrokes'
import { senseColour } from './wakeColours'

export const TRAIL_DASH = [5, 4]
/** Arc of the fluid's turn about the core, from the outside of the ring upstream and downstream of it [rad]. */
const ARC_FROM = -0.62 * Math.PI
const ARC_TO = 0.2 * Math.PI
const ARC_PARTS = 14
/** Gap between core and arc, and the arc's least radius, in pixels. */
const ARC_GAP = 5
const ARC_LEAST = 9
/** A ring seen smaller than this radius in pixels wears no arcs. */
const SMALL = 13
/** Least share of the core's direction toward the eye for its turn to be drawn. */
const SECTION = 0.3
/** Points of a trail, at most: a long run has more output times than a picture has places. */
const TRAIL_POINTS = 600
/** An arrow shorter than this many pixels says nothing. */
const SHORT_ARROW = 5

/** The way of one ring, thinned, with the output time of each place. */
export interface Trail {
  readonly points: readonly Vector[]
  readonly times: readonly number[]
  readonly sense: 1 | -1
}

export function trailsOf(model: WakeSceneModel): readonly Trail[] {
  return model.wake.trajectories.map((path, ring) => {
    const count = path.time.length
    const step = Math.max(1, Math.ceil(count / TRAIL_POINTS))
    const kept = Array.from({ length: count }, (_, k) => k).filter((k) => k % step === 0 || k === count - 1)
    return {
      points: kept.map((k): Vector => [at(path.x, k), at(path.y, k), at(path.z, k)]),
      times: kept.map((k) => at(path.time, k)),
      sense: model.rings[ring]?.sense ?? 1,
    }
  })
}

/** Ways behind the rings up to a time; where a ring is between two kept places, up to where it is. */
export function trailStrokes(
  trails: readonly Trail[],
  shapes: readonly RingShape[],
  time: number,
): readonly WakeStroke[] {
  return trails.flatMap(({ points, times, sense }, ring) => {
    const end = times.findLastIndex((value) => value <= time)
    if (end < 0) return []
    const now = shapes.find(({ number }) => number === ring + 1)
    const way = points.slice(0, end + 1)
    if (now !== undefined) way.push(now.centre)
    return way.length < 2 ? [] : [stroke(way, senseColour(sense), 1.6, { dash: TRAIL_DASH })]
  })
}

/** Arrows, arcs and the mark of the picked ring. @param perPixel length of a pixel [m] */
export function ringStrokes(
  model: WakeSceneModel,
  shapes: readonly RingShape[],
  selected: number | null,
  basis: Basis,
  perPixel: number,
): readonly WakeStroke[] {
  return shapes.flatMap((shape) => {
    const colour = senseColour(model.rings[shape.number - 1]?.sense ?? 1)
    const strokes: WakeStroke[] = []
    const tip = add(shape.centre, shape.direction, shape.speed * model.arrowTime)
    const length = seen(add(tip, shape.centre, -1), basis) / perPixel
    if (length > SHORT_ARROW)
      strokes.push(stroke([shape.centre, tip], colour, 1.8, { head: Math.min(14, length * 0.7) }))
    if (shape.radius / perPixel > SMALL) strokes.push(...arcs(shape, basis, perPixel))
    if (shape.number === selected) strokes.push(...mark(shape))
    return strokes
  })
}

function seen(step: Vector, basis: Basis): number {
  return Math.hypot(dot(step, basis.right), dot(step, basis.up))
}

function node({ nodes }: RingShape, index: number): Vector {
  return [at(nodes, 3 * index), at(nodes, 3 * index + 1), at(nodes, 3 * index + 2)]
}

/** Two arcs with heads, where the core is seen most nearly in section. */
function arcs(shape: RingShape, basis: Basis, perPixel: number): WakeStroke[] {
  const count = shape.nodes.length / 3
  const tangent = (i: number): Vector =>
    unit(add(node(shape, (i + 1) % count), node(shape, (i + count - 1) % count), -1))
  let [near, far] = [0, 0]
  let [most, least] = [-Infinity, Infinity]
  for (let i = 0; i < count; i += 1) {
    const facing = dot(tangent(i), basis.toward)
    if (facing > most) {
      most = facing
      near = i
    }
    if (facing < least) {
      least = facing
      far = i
    }
  }
  // Seen along its axis a ring shows no section, and an arc about it would be a line across the tube.
  if (most - least < 2 * SECTION) return []
  const radius = Math.max(Math.min(shape.coreRadius, shape.radius) + ARC_GAP * perPixel, ARC_LEAST * perPixel)
  const sense = Math.sign(shape.circulation)
  return [near, far].map((i) => {
    const t = tangent(i)
    const place = node(shape, i)
    const apart = add(place, shape.centre, -1)
    const outward = unit(add(apart, t, -dot(apart, t)))
    // Fluid turns about the curve by the right hand where the circulation is positive.
    const round = cross(t, outward)
    const points = Array.from({ length: ARC_PARTS + 1 }, (_, part) => {
      const angle = sense * (ARC_FROM + ((ARC_TO - ARC_FROM) * part) / ARC_PARTS)
      return add(add(place, outward, radius * Math.cos(angle)), round, radius * Math.sin(angle))
    })
    return stroke(points, 'ink', 1.5, { head: 8 })
  })
}

/** The middle of the picked ring's core, gone over in ink. */
function mark(shape: RingShape): WakeStroke[] {
  const count = shape.nodes.length / 3
  const line = Array.from({ length: count + 1 }, (_, i) => node(shape, i % count))
  return [stroke(line, 'ground', 4, { over: true }), stroke(line, 'ink', 2, { over: true })]
}
