/**
 * The lines of the drawing: axis, outlines, arrows and dimensions, drawn anew for each view so that they always face the eye.
 */
import {
  offAxisRuns,
  swirlArc,
  type DrawingColours,
  type PulseSceneModel,
  type SceneCallout,
  type ScenePoint,
  type SceneRing,
} from '../../core/report'
import { add, cross, unit, type Vector } from './vectors'
import { inSpace, type Basis } from './view'

export interface Stroke<Name extends string = keyof DrawingColours> {
  readonly points: readonly Vector[]
  readonly colour: Name
  /** Pixels. */
  readonly width: number
  /** Pixels on, off, on ...; empty for a full line. */
  readonly dash: readonly number[]
  /** Drawn over bodies instead of behind what is nearer. */
  readonly over: boolean
  /** Length of a filled head at the last point, in pixels; 0 for none. */
  readonly head: number
}

const AXIS_DASH = [14, 5]
const CARRIED_DASH = [6, 4]
const GHOST_DASH = [2, 3]
const CIRCLE_PARTS = 72
/** Beyond this share of the view along the axis, lengths along it can no longer be read. */
const ALONG_AXIS = 0.9
/** Gap between the core and the arrow that shows how it turns, in pixels. */
const SWIRL_GAP = 6
/** Least radius of that arrow, in pixels. */
const SWIRL_LEAST = 13
/** A core thinner than this radius is gone over with a line, in pixels. */
const THIN_CORE = 1.2

/** A stroke with what is usual for the rest. */
export function stroke<Name extends string = keyof DrawingColours>(
  points: readonly Vector[],
  colour: Name,
  width: number,
  more: Partial<Stroke<Name>> = {},
): Stroke<Name> {
  return { points, colour, width, dash: [], over: false, head: 0, ...more }
}

/** Whether the view is so near to the axis that outlines and lengths along it shrink to nothing. */
export function seenAlongAxis(basis: Basis): boolean {
  return Math.abs(basis.toward[0]) > ALONG_AXIS
}

/** All lines of the drawing for a view; `perPixel` is the length of a pixel in metres. */
export function sceneStrokes(model: PulseSceneModel, basis: Basis, perPixel: number): readonly Stroke[] {
  return [
    ...edges(model),
    ...axis(model),
    ...(model.ring === null ? [] : ringStrokes(model.ring, model.ghost, basis, perPixel)),
    ...jetEdges(model),
    ...(seenAlongAxis(basis) ? [] : speedArrow(model)),
    ...dimensions(model, basis, perPixel),
  ]
}

function circle(x: number, r: number): Vector[] {
  return Array.from({ length: CIRCLE_PARTS + 1 }, (_, part) => {
    const angle = (2 * Math.PI * part) / CIRCLE_PARTS
    return [x, r * Math.cos(angle), r * Math.sin(angle)]
  })
}

/** The lip and the ends of the slug, as a draughtsman would go over them. */
function edges(model: PulseSceneModel): Stroke[] {
  const lip = model.nozzle.stations.at(-1)
  const rear = model.slug.outline[0]
  const front = model.slug.outline.at(-1)
  return [
    ...(lip === undefined
      ? []
      : [stroke(circle(lip.inner.x, lip.inner.r), 'ink', 1), stroke(circle(lip.outer.x, lip.outer.r), 'ink', 1)]),
    ...(rear === undefined || front === undefined ? [] : [stroke(circle(rear.x, rear.r * 0.985), 'accent', 1)]),
  ]
}

function axis(model: PulseSceneModel): Stroke[] {
  const { xMin, xMax } = model.extent
  return [
    stroke(
      [
        [xMin, 0, 0],
        [xMax + 0.02 * (xMax - xMin), 0, 0],
      ],
      'muted',
      1,
      { dash: AXIS_DASH },
    ),
  ]
}

function ringStrokes(ring: SceneRing, ghost: SceneRing | null, basis: Basis, perPixel: number): Stroke[] {
  const outline = (
    points: readonly ScenePoint[],
    colour: keyof DrawingColours,
    width: number,
    dash: readonly number[],
    over: boolean,
  ): Stroke[] =>
    offAxisRuns(points).flatMap((run) =>
      [1, -1].map((side) =>
        stroke(
          run.map(({ x, r }) => inSpace({ x, r: side * r }, basis)),
          colour,
          width,
          { dash, over },
        ),
      ),
    )
  const widest = ring.carried.reduce((most, point) => (point.r > most.r ? point : most), { x: ring.x, r: 0 })
  const thin =
    ring.meanCoreRadius < THIN_CORE * perPixel ? [stroke(circle(ring.x, ring.radius), 'accent', 2 * THIN_CORE)] : []
  // Seen along the axis the outlines shrink to a line: a circle of the largest radius takes over.
  if (seenAlongAxis(basis)) return [...thin, stroke(circle(widest.x, widest.r), 'muted', 1.1, { dash: CARRIED_DASH })]
  return [
    ...outline(ring.carried, 'muted', 1.1, CARRIED_DASH, false),
    ...thin,
    ...(ghost === null ? [] : outline(ghost.core, 'ink', 1, GHOST_DASH, true)),
    ...swirl(ring, basis, perPixel),
  ]
}

/** Around each core section: forward next to the axis, back on the outside. */
function swirl(ring: SceneRing, basis: Basis, perPixel: number): Stroke[] {
  // Around a core of a few pixels the arc keeps a size that can be seen.
  const gap = Math.max(SWIRL_GAP * perPixel, SWIRL_LEAST * perPixel - ring.meanCoreRadius)
  const arc = swirlArc(ring, gap)
  return [1, -1].map((side) => {
    const points = arc.map(({ x, r }) => inSpace({ x, r: side * r }, basis))
    return stroke(points, 'ink', 1.8, { head: 11 })
  })
}

function jetEdges(model: PulseSceneModel): Stroke[] {
  const jet = model.trailingJet
  if (jet === null) return []
  return [stroke(circle(jet.length, jet.diameter / 2), 'accent', 1, { dash: [3, 3] })]
}

function speedArrow(model: PulseSceneModel): Stroke[] {
  if (model.speed === null) return []
  return [
    stroke(
      [
        [model.speed.from, 0, 0],
        [model.speed.to, 0, 0],
      ],
      'accent',
      1.6,
      { head: 18 },
    ),
  ]
}

function dimensions(model: PulseSceneModel, basis: Basis, perPixel: number): Stroke[] {
  const along = seenAlongAxis(basis)
  const shown = shownCallouts(model, basis)
  const [from, to] = scaleBarEnds(model, basis)
  return [
    ...ticked(from, to, basis, perPixel, false),
    ...shown
      .filter(({ ends }) => ends === 'ticks')
      .flatMap((bar) => ticked(inSpace(bar.from, basis), inSpace(bar.to, basis), basis, perPixel, along)),
    ...shown
      .filter(({ ends }) => ends === 'arrow')
      .map((bar) => stroke([inSpace(bar.from, basis), inSpace(bar.to, basis)], 'ink', 1.4, { head: 11, over: true })),
  ]
}

/** Dimensions that can be read in a view: along the axis only those across it. */
export function shownCallouts(model: PulseSceneModel, basis: Basis): readonly SceneCallout[] {
  return seenAlongAxis(basis) ? model.callouts.filter(({ from, to }) => from.x === to.x) : model.callouts
}

/** The bar lies along the axis; seen along that, it turns across the picture, where the scale is the same. */
export function scaleBarEnds(model: PulseSceneModel, basis: Basis): readonly [Vector, Vector] {
  const { from, to } = model.scaleBar
  if (!seenAlongAxis(basis)) return [inSpace(from, basis), inSpace(to, basis)]
  const middle = inSpace({ x: 0, r: from.r }, basis)
  const half = (to.x - from.x) / 2
  return [add(middle, basis.right, -half), add(middle, basis.right, half)]
}

/** A line with a tick at each end, as dimensions have. */
function ticked(from: Vector, to: Vector, basis: Basis, perPixel: number, over: boolean): Stroke[] {
  const across = unit(cross(basis.toward, unit(add(to, from, -1))))
  const tick = (end: Vector): Stroke =>
    stroke([add(end, across, -5 * perPixel), add(end, across, 5 * perPixel)], 'ink', 1.1, { over })
  return [stroke([from, to], 'ink', 1.1, { over }), tick(from), tick(to)]
}
