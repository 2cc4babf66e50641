/**
 * Words on the drawing of rings: numbers of the rings, the axis' numbers, and names of what stands around, off one another.
 */
import { at } from '../../../core/base'
import type { RingShape } from '../../../core/filament'
import { placeLabels, pointsAlong, type Box, type Pixel, type Place, type WakeSceneModel } from '../../../core/report'
import { leaderOf, placesAround, type Side, type Spots } from '../labelPlaces'
import type { FrameWord } from '../frameWord'
import { seenAlongAxis } from '../strokes'
import { add, cross, dot, unit, type Vector } from '../vectors'
import { basisOf, project, type Size, type View } from '../view'

interface Wanted extends Spots {
  readonly id: string
  readonly text: string
  readonly ring: number | null
  readonly quiet: boolean
  /** Left out where there is no free place. */
  readonly spare: boolean
  /** Only beside it, never moved away with a leader. */
  readonly fixed: boolean
}

export interface LabelContext {
  readonly view: View
  readonly size: Size
  /** Width of a text in pixels. */
  readonly measure: (text: string) => number
  /** Part of the picture labels may use. */
  readonly bounds: Box
  /** Kept free of labels: scale bar and keys. */
  readonly taken: readonly Box[]
}

/** Numbers of the x axis stand at least so far apart, in pixels. */
const TICK_ROOM = 44
/** Share of a direction toward the eye beyond which lengths along it shrink to nothing. */
const ALONG = 0.9
/** Points of a ring that labels keep off. */
const RING_POINTS = 28
/** Below this size only rings are named. */
const SMALL = { width: 420, height: 240 }
/** Square pixels of a ring's number that may be covered. */
const MOST_COVERED = 60
/** A word this near to the edge of its object needs no line, in pixels. */
const NEAR = 26
/** A ring's number stands no further away than this many pixels. */
const RING_AWAY = 34

export function wakeLabels(
  model: WakeSceneModel,
  shapes: readonly RingShape[],
  selected: number | null,
  stations: boolean,
  { view, size, measure, bounds, taken }: LabelContext,
): readonly FrameWord[] {
  const small = size.width < SMALL.width || size.height < SMALL.height
  const outlines = shapes.map((shape) => ({ shape, outline: outlineOf(shape, view, size) }))
  const wanted = [
    ...datumWords(model, view, size),
    // The picked ring's word takes its place first.
    ...[true, false].flatMap((first) =>
      outlines.flatMap(({ shape, outline }) =>
        (shape.number === selected) === first ? [ringWord(shape, outline, first, view)] : [],
      ),
    ),
    ...(small ? [] : surroundingWords(model, stations, view, size)),
  ]
  const requests = wanted.map((label) => ({ id: label.id, places: placesOf(label, measure(label.text)) }))
  const obstacles = {
    bounds,
    boxes: [...taken, ...nozzleBoxes(model, view, size)],
    points: outlines.flatMap(({ outline }) => outline),
  }
  return placeLabels(requests, obstacles).flatMap(({ id, place, overlap }) => {
    const label = wanted.find((candidate) => candidate.id === id)
    if (label === undefined || (label.spare && overlap > 8)) return []
    // Numbers on one another cannot be read: where many rings share a place, keys pick among them.
    if (label.ring !== null && label.ring !== selected && overlap > MOST_COVERED) return []
    // The number of a ring that has left the picture leaves with it.
    if (label.ring !== null && outside(label.target, size)) return []
    return [{ ...wordOf(label, place, selected), edged: obstacles.points.some((point) => inside(point, place)) }]
  })
}

function wordOf(label: Wanted, place: Place, selected: number | null): FrameWord {
  const { id, text, quiet, ring } = label
  const { left, top, width, height } = place
  const act = ring === null ? null : `Ring ${ring}`
  const base = {
    id,
    text,
    quiet,
    left,
    top,
    width,
    height,
    act,
    leader: label.fixed ? null : leaderOf({ ...label, target: nearestSpot(label, place) }, place, label.gap + NEAR),
  }
  return ring === null ? base : { ...base, chosen: ring === selected }
}

/** Of the pixels a word may stand beside, the one it stands by. */
function nearestSpot({ spots, target }: Spots, place: Place): Pixel {
  const away = ({ x, y }: Pixel): number =>
    Math.hypot(place.left + place.width / 2 - x, place.top + place.height / 2 - y)
  return spots.reduce((best, [, pixel]) => (away(pixel) < away(best) ? pixel : best), target)
}

function inside({ x, y }: Pixel, { left, top, width, height }: Box): boolean {
  return x > left && x < left + width && y > top && y < top + height
}

function outside({ x, y }: Pixel, size: Size): boolean {
  return x < -20 || y < -20 || x > size.width + 20 || y > size.height + 20
}

function placesOf(label: Wanted, width: number): Place[] {
  const all = placesAround(label, width, label.ring !== null)
  if (label.fixed) return all.slice(0, label.spots.length)
  if (label.ring === null) return all
  // Near the ring or nowhere: a number that wanders would be read as another ring's.
  return all.filter(({ left, top, width: w, height: h }) =>
    label.spots.some(([, pixel]) => Math.hypot(left + w / 2 - pixel.x, top + h / 2 - pixel.y) < label.gap + RING_AWAY),
  )
}

/** A ring's line on the screen, thinned. */
function outlineOf({ nodes }: RingShape, view: View, size: Size): Pixel[] {
  const basis = basisOf(view)
  const count = nodes.length / 3
  const step = Math.max(1, Math.floor(count / RING_POINTS))
  return Array.from({ length: Math.ceil(count / step) }, (_, i) => {
    const k = 3 * i * step
    return project([at(nodes, k), at(nodes, k + 1), at(nodes, k + 2)], basis, view, size)
  })
}

function ringWord(
  { number, coreRadius, centre }: RingShape,
  outline: readonly Pixel[],
  chosen: boolean,
  view: View,
): Wanted {
  const extreme = (better: (a: Pixel, b: Pixel) => boolean): Pixel =>
    outline.reduce((best, pixel) => (better(pixel, best) ? pixel : best), outline[0] ?? { x: 0, y: 0 })
  const spots: readonly (readonly [Side, Pixel])[] = [
    ['above', extreme((a, b) => a.y < b.y)],
    ['below', extreme((a, b) => a.y > b.y)],
    ['right', extreme((a, b) => a.x > b.x)],
    ['left', extreme((a, b) => a.x < b.x)],
  ]
  return {
    id: `ring ${number}`,
    text: chosen ? `ring ${number}` : String(number),
    ring: number,
    quiet: false,
    spare: false,
    fixed: false,
    spots,
    // Clear of the tube and of the arc about it.
    gap: Math.max(coreRadius * view.scale + 7, 11),
    target: spots[0]?.[1] ?? { x: centre[0], y: centre[1] },
  }
}

function datumWords({ datum }: WakeSceneModel, view: View, size: Size): Wanted[] {
  const basis = basisOf(view)
  if (seenAlongAxis(basis) || datum.ticks.length < 2) return []
  const place = (point: Vector): Pixel => project(point, basis, view, size)
  const [a, b] = [place(at(datum.ticks, 0).place), place(at(datum.ticks, 1).place)]
  const every = [1, 2, 5, 10, 20].find((count) => Math.hypot(b.x - a.x, b.y - a.y) * count >= TICK_ROOM) ?? 50
  const zero = Math.max(
    0,
    datum.ticks.findIndex(({ label }) => label === '0'),
  )
  const end = place(datum.to)
  const word = (id: string, text: string, spot: readonly [Side, Pixel]): Wanted => ({
    id,
    text,
    ring: null,
    quiet: true,
    spare: true,
    fixed: true,
    spots: [spot],
    gap: 6,
    target: spot[1],
  })
  return [
    ...datum.ticks.flatMap(({ place: point, label }, index) =>
      (index - zero) % every === 0 ? [word(`tick ${index}`, label, ['below', place(point)])] : [],
    ),
    word('datum', datum.title, ['right', { x: end.x + 2, y: end.y - 7 }]),
  ]
}

function surroundingWords(model: WakeSceneModel, stations: boolean, view: View, size: Size): Wanted[] {
  const basis = basisOf(view)
  const place = (point: Vector): Pixel => project(point, basis, view, size)
  const words = (id: string, text: string, anchors: readonly (readonly [Side, Pixel])[]): Wanted => ({
    id,
    text,
    ring: null,
    quiet: true,
    spare: true,
    fixed: false,
    spots: anchors,
    gap: 5,
    target: anchors[0]?.[1] ?? { x: 0, y: 0 },
  })
  const wanted: Wanted[] = []
  model.nozzles.forEach(({ position, axes, outline, label }, index) => {
    // Seen from the front it has no side to stand beside.
    if (Math.abs(dot(axes[0], basis.toward)) > ALONG) return
    const middle = place(add(position, axes[0], -outline.length / 2))
    const reach = outline.stations.reduce((most, { outer }) => Math.max(most, outer.r), 0) * view.scale
    wanted.push(
      words(`nozzle ${index}`, label, [
        ['above', { x: middle.x, y: middle.y - reach }],
        ['below', { x: middle.x, y: middle.y + reach }],
      ]),
    )
  })
  if (stations)
    model.stations.forEach(({ centre, radius, label }, index) => {
      // Highest and lowest point of the circle as seen.
      const upward = unit(add(basis.up, [1, 0, 0], -basis.up[0]))
      const end = add([0, 0, 0], Math.hypot(...upward) > 0 ? upward : [0, 1, 0], radius)
      wanted.push(
        words(`station ${index}`, label, [
          ['above', place(add(centre, end))],
          ['below', place(add(centre, end, -1))],
        ]),
      )
    })
  if (model.wall !== null) {
    const corners = model.wall.corners.map(place)
    const top = corners.reduce((best, pixel) => (pixel.y < best.y ? pixel : best))
    const bottom = corners.reduce((best, pixel) => (pixel.y > best.y ? pixel : best))
    wanted.push(
      words('wall', model.wall.label, [
        ['above', top],
        ['right', top],
        ['left', top],
        ['below', bottom],
      ]),
    )
  }
  if (model.tube !== null) {
    const { from, to, radius, label } = model.tube
    const middle = add(add([0, 0, 0], from, 0.5), to, 0.5)
    const axis = unit(add(to, from, -1))
    const seen = cross(basis.toward, axis)
    const aside = Math.hypot(...seen) > 0.05 ? unit(seen) : basis.up
    const upward = dot(aside, basis.up) >= 0 ? aside : unit(add([0, 0, 0], aside, -1))
    wanted.push(
      words('tube', label, [
        ['above', place(add(middle, upward, radius))],
        ['below', place(add(middle, upward, -radius))],
      ]),
    )
  }
  return wanted
}

/** Where nozzles are seen, in slices along them. */
function nozzleBoxes(model: WakeSceneModel, view: View, size: Size): Box[] {
  const basis = basisOf(view)
  return model.nozzles.flatMap(({ position, axes, outline }) => {
    const half = outline.stations.reduce((most, { outer }) => Math.max(most, outer.r), 0) * view.scale * 0.9
    const line = [
      project(position, basis, view, size),
      project(add(position, axes[0], -outline.length), basis, view, size),
    ]
    return pointsAlong(line, Math.max(6, half)).map(({ x, y }) => ({
      left: x - half / 2,
      top: y - half,
      width: half,
      height: 2 * half,
    }))
  })
}
