/**
 * Where the two views of the tank stand on a drawing, and where its words stand: no two on one another.
 */
import { at } from '../base'
import { placeLabels, pointsAlong, type Box, type Pixel, type Place } from './boxes'
import type { ScenePoint } from './sceneTypes'
import type { TankDimension, TankExtentName, TankSceneModel, TankView } from './tankSceneTypes'
import { textWidth } from './textWidth'

export const TANK_FONT = 12
const LINE = TANK_FONT * 1.35
const MARGIN = { left: 30, right: 16, top: 10, bottom: 14 }
/** Room for a dimension line with its words. */
const DIMENSION = 30
const CAMERA_ROW = 24
/** Station labels above one another, at most. */
const MOST_LEVELS = 6
const GAPS = [6, 16, 28, 42, 60]
/** Room kept on both sides of words. */
const PAD = 4

export interface TankLayout {
  readonly width: number
  readonly height: number
  /** Pixels a metre. */
  readonly scale: number
  /** A point of each view, from above first. */
  readonly maps: readonly [(point: ScenePoint) => Pixel, (point: ScenePoint) => Pixel]
  /** Frames of the views. */
  readonly frames: readonly [Box, Box]
  readonly stations: readonly StationLabel[]
}

/** A station's words over the view from the side; its leader runs down from them. */
export interface StationLabel {
  readonly x: number
  readonly text: string
  readonly place: Place
}

export interface TankWord {
  readonly text: string
  readonly tone: 'ink' | 'muted' | 'limit'
  readonly place: Place
}

export function tankLayout(model: TankSceneModel, part: TankExtentName, width: number, height: number): TankLayout {
  const { xMin, xMax, across } = model.extents[part]
  const [planSpan, sideSpan] = [across[0][1] - across[0][0], across[1][1] - across[1][0]]
  const right = MARGIN.right + (part === 'whole' && model.views.some(({ size }) => size !== null) ? DIMENSION : 0)
  const sides = MARGIN.left + right
  const ends = MARGIN.top + MARGIN.bottom + DIMENSION
  const camera = model.views[0].camera === null ? 8 : CAMERA_ROW
  let levels = 1
  let made: TankLayout | null = null
  // The words over the stations take height, which takes scale, which brings the stations together.
  for (let tries = 0; tries < MOST_LEVELS; tries += 1) {
    const words = levels * LINE + 15
    const long = xMax - xMin
    const stacked = Math.min((width - sides) / long, (height - ends - camera - words) / (planSpan + sideSpan))
    // Side by side their axes are level; the words stand over the view from the side, the camera under that from above.
    const above = (scale: number): number => Math.max(across[0][1] * scale, across[1][1] * scale + words)
    const below = (scale: number): number =>
      Math.max(-across[0][0] * scale + camera, -across[1][0] * scale + MARGIN.bottom + DIMENSION)
    const most =
      (height - MARGIN.top - words - MARGIN.bottom - DIMENSION) /
      (Math.max(across[0][1], across[1][1]) - Math.min(across[0][0], across[1][0]))
    const level = Math.min((width - 2 * sides) / (2 * long), most)
    const beside = level > stacked
    const scale = Math.max(1e-6, beside ? level : stacked)
    const used = scale * long
    const frames = beside ? besideFrames() : stackedFrames()

    function stackedFrames(): readonly [Box, Box] {
      const left = MARGIN.left + (width - sides - used) / 2
      const spare = height - ends - camera - words - scale * (planSpan + sideSpan)
      const top = MARGIN.top + Math.max(0, spare) / 2
      const upper = { left, top, width: used, height: scale * planSpan }
      return [upper, { ...upper, top: top + upper.height + camera + words, height: scale * sideSpan }]
    }
    function besideFrames(): readonly [Box, Box] {
      const spare = Math.max(0, width - 2 * sides - 2 * used) / 4
      const left = MARGIN.left + spare
      const axis = MARGIN.top + above(scale) + Math.max(0, height - MARGIN.top - above(scale) - below(scale)) / 2
      const frame = (index: 0 | 1, x: number): Box => ({
        left: x,
        top: axis - across[index][1] * scale,
        width: used,
        height: scale * (index === 0 ? planSpan : sideSpan),
      })
      return [frame(0, left), frame(1, left + used + sides + 2 * spare)]
    }

    const map =
      (index: 0 | 1) =>
      ({ x, r }: ScenePoint): Pixel => ({
        x: frames[index].left + (x - xMin) * scale,
        y: frames[index].top + (across[index][1] - r) * scale,
      })
    const maps = [map(0), map(1)] as const
    const stations = stationLabels(model, maps[1], frames[1].top, width)
    const needed = Math.max(0, ...stations.map((station) => station.level)) + 1
    made = { width, height, scale, maps, frames, stations }
    if (needed <= levels) break
    levels = needed
  }
  if (made === null) throw new RangeError('the drawing has no room')
  return made
}

/**
 * Levels from the bottom up so that no leader crosses another station's words; where too many would stand above one another the words
 * become shorter, and at last are left out: the tables hold them all.
 */
function stationLabels(
  { stations }: TankSceneModel,
  map: (point: ScenePoint) => Pixel,
  top: number,
  width: number,
): readonly (StationLabel & { readonly level: number })[] {
  const most = Math.max(0, ...stations.map(({ labels }) => labels.length))
  let best: readonly (StationLabel & { readonly level: number })[] = []
  for (let short = 0; short < most; short += 1) {
    const labels = stations.map((one) => ({ x: one.x, text: one.labels[Math.min(short, one.labels.length - 1)] ?? '' }))
    for (const side of ['right', 'left'] as const) {
      const placed = levelled(labels, side, map, top, width)
      if (placed.length === stations.length) return placed
      if (placed.length > best.length) best = placed
    }
  }
  return best
}

/** Words to one side of their leaders, the station farthest to that side at the bottom. */
function levelled(
  labels: readonly { readonly x: number; readonly text: string }[],
  side: 'left' | 'right',
  map: (point: ScenePoint) => Pixel,
  top: number,
  width: number,
): readonly (StationLabel & { readonly level: number })[] {
  const placed: (StationLabel & { readonly level: number; readonly foot: number })[] = []
  for (const { x, text } of labels.toSorted((a, b) => (side === 'right' ? b.x - a.x : a.x - b.x))) {
    const foot = map({ x, r: 0 }).x
    const wide = textWidth(text, TANK_FONT)
    const left = Math.max(4, Math.min(side === 'right' ? foot - 3 : foot + 3 - wide, width - wide - 4))
    const free = (level: number): boolean =>
      placed.every((other) => {
        const apart = left + wide + 6 < other.place.left || other.place.left + other.place.width + 6 < left
        const over = other.foot > left - 3 && other.foot < left + wide + 3
        const under = foot > other.place.left - 3 && foot < other.place.left + other.place.width + 3
        return (apart || level !== other.level) && !(over && other.level >= level) && !(under && other.level <= level)
      })
    const level = Array.from({ length: MOST_LEVELS }, (_, i) => i).find(free)
    if (level === undefined) continue
    const place = { left, top: top - 12 - (level + 1) * LINE, width: wide, height: LINE, vertical: false }
    placed.push({ x, text, level, foot, place })
  }
  return placed
}

/** A view's title runs upward beside it, at the middle of its height where that keeps it on the drawing. */
export function titlePlace(title: string, { left, top, height }: Box): Box {
  const long = textWidth(title, TANK_FONT)
  return { left: left - 26, top: Math.max(4, top + (height - long) / 2), width: 24, height: long }
}

type Spot = 'above' | 'below' | 'left' | 'right'

interface Wanted {
  readonly text: string
  readonly tone: TankWord['tone']
  readonly spots: readonly (readonly [Spot, Pixel])[]
}

/** The words in and about the views. */
export function tankWords(model: TankSceneModel, part: TankExtentName, layout: TankLayout): readonly TankWord[] {
  const wanted: Wanted[] = []
  const points: Pixel[] = []
  const boxes: Box[] = layout.stations.map(({ place }) => place)
  model.views.forEach((view, index) => {
    const map = layout.maps[index === 0 ? 0 : 1]
    const frame = layout.frames[index === 0 ? 0 : 1]
    wanted.push(...fieldWords(view, map, frame))
    // After what has fewer places to go.
    if (part === 'whole') wanted.push(...view.clearances.map((line) => along(line, map)))
    const foot = frame.top + frame.height
    points.push(...linesOf(model, view, part, map).filter(({ y }) => y < foot + 3))
    for (const x of [frame.left, frame.left + frame.width])
      points.push(
        ...pointsAlong(
          [
            { x, y: frame.top },
            { x, y: foot },
          ],
          4,
        ),
      )
    boxes.push(...ringBoxes(model, map, layout.scale), nozzleBox(model, map))
    if (view.camera !== null)
      boxes.push({ left: map(view.camera.at).x - 9, top: foot + 2, width: 18, height: CAMERA_ROW - 4 })
    if (part === 'whole' && view.size !== null)
      boxes.push({ left: frame.left + frame.width + 6, top: frame.top, width: DIMENSION, height: frame.height })
    // The view's title upright beside it, and the mark of the water's surface.
    boxes.push(titlePlace(view.title, frame))
    if (index === 1) {
      boxes.push({ left: frame.left + 6, top: frame.top - 10, width: 18, height: 18 })
      boxes.push({ left: frame.left, top: foot + 4, width: frame.width, height: DIMENSION })
    }
  })
  for (const { x, place } of layout.stations) {
    const foot = layout.maps[1]({ x, r: 0 })
    points.push(...pointsAlong([{ x: foot.x, y: place.top + place.height }, foot], 5))
  }
  const requests = wanted.map((word, index) => ({ id: String(index), places: placesOf(word) }))
  const bounds: Box = { left: 22, top: 2, width: layout.width - 24, height: layout.height - 4 }
  return placeLabels(requests, { bounds, boxes, points }).flatMap(({ id, place, overlap }) => {
    const word = wanted[Number(id)]
    // What finds no free place is left out: sizes stand in the tables as well.
    return word === undefined || overlap > 0
      ? []
      : [{ ...word, place: { ...place, left: place.left + PAD, width: place.width - 2 * PAD } }]
  })
}

function along({ from, to, label, warn }: TankDimension, map: (point: ScenePoint) => Pixel): Wanted {
  const level = from.r === to.r
  const share = (part: number): Pixel => map({ x: from.x + (to.x - from.x) * part, r: from.r + (to.r - from.r) * part })
  const shares = level ? [0.5, 0.35, 0.65, 0.8, 0.2] : [0.6, 0.75, 0.45, 0.88, 0.3]
  const sides: readonly Spot[] = level ? ['above', 'below'] : ['right', 'left']
  return {
    text: label,
    tone: warn ? 'limit' : 'ink',
    spots: sides.flatMap((side) => shares.map((part) => [side, share(part)] as const)),
  }
}

function fieldWords({ field, camera }: TankView, map: (point: ScenePoint) => Pixel, frame: Box): Wanted[] {
  const words: Wanted[] = []
  if (field !== null) {
    const corner = (x: number, r: number): Pixel => map({ x, r })
    const middle = (field.xMin + field.xMax) / 2
    const seen = field.half > 0
    const top = Math.max(corner(0, field.half).y, frame.top)
    const foot = Math.min(corner(0, -field.half).y, frame.top + frame.height)
    const xs = [0, 0.25, -0.25, 0.6, 1.1].map((part) => middle + part * (field.xMax - field.xMin))
    words.push({
      text: seen ? field.label : field.sheetLabel,
      tone: 'muted',
      spots: [
        ...xs.map((x) => ['below', { x: corner(x, 0).x, y: foot }] as const),
        ...xs.map((x) => ['above', { x: corner(x, 0).x, y: top }] as const),
        ...xs.map((x) => ['above', { x: corner(x, 0).x, y: foot - 2 }] as const),
        ['right', corner(field.xMax, 0)],
      ],
    })
  }
  if (camera !== null) {
    const place = { x: map(camera.at).x, y: frame.top + frame.height + CAMERA_ROW / 2 }
    words.push({
      text: camera.label,
      tone: 'muted',
      spots: [
        ['right', { x: place.x + 10, y: place.y }],
        ['left', { x: place.x - 10, y: place.y }],
      ],
    })
  }
  return words
}

function placesOf({ text, spots }: Wanted): Place[] {
  const width = textWidth(text, TANK_FONT) + 2 * PAD
  return GAPS.flatMap((gap) =>
    spots.map(([spot, { x, y }]): Place => {
      const left = spot === 'right' ? x + gap : spot === 'left' ? x - gap - width : x - width / 2
      const top = spot === 'above' ? y - gap - LINE : spot === 'below' ? y + gap : y - LINE / 2
      return { left, top, width, height: LINE, vertical: false }
    }),
  )
}

function linesOf(
  model: TankSceneModel,
  { clearances, field, camera, walls }: TankView,
  part: TankExtentName,
  map: (point: ScenePoint) => Pixel,
): Pixel[] {
  const { xMin, xMax } = model.extents[part]
  const lines: ScenePoint[][] = [
    [
      { x: xMin, r: 0 },
      { x: xMax, r: 0 },
    ],
    ...walls.map(({ r }) => [
      { x: xMin, r },
      { x: xMax, r },
    ]),
  ]
  if (camera !== null) lines.push(...camera.sees.map((x) => [{ x, r: 0 }, camera.at]))
  if (field !== null) {
    const [a, b, h] = [field.xMin, field.xMax, field.half]
    lines.push([
      { x: a, r: h },
      { x: b, r: h },
      { x: b, r: -h },
      { x: a, r: -h },
      { x: a, r: h },
    ])
  }
  // Words on a dimension line read as its size: points this close outweigh any farther place.
  const dimensions = part === 'whole' ? clearances.flatMap(({ from, to }) => pointsAlong([map(from), map(to)], 1)) : []
  return [...dimensions, ...lines.flatMap((line) => pointsAlong(line.map(map), 5))]
}

/** A strip about the axis as far as the ring's way and its spread reach. */
function ringBoxes({ path, stations }: TankSceneModel, map: (point: ScenePoint) => Pixel, scale: number): Box[] {
  const rings = stations.flatMap(({ x, ring, spread }) => (ring === null ? [] : [{ x, ring, spread }]))
  const widest = path === null ? 0 : path.radiusHigh.reduce((a, b) => Math.max(a, b), 0)
  const way = path === null ? [] : [at(path.x, 0), at(path.x, path.x.length - 1)]
  const boxes = rings.map(({ x, ring, spread }): Box => {
    const [low, high] = spread ?? [x, x]
    const from = map({ x: Math.min(low, x - ring.coreRadius), r: ring.radius + ring.coreRadius })
    const to = map({ x: Math.max(high, x + ring.coreRadius), r: -ring.radius - ring.coreRadius })
    return { left: from.x - 2, top: from.y - 2, width: to.x - from.x + 4, height: to.y - from.y + 4 }
  })
  const [first, final] = way
  if (first === undefined || final === undefined) return boxes
  const from = map({ x: first, r: widest })
  return [...boxes, { left: from.x, top: from.y, width: (final - first) * scale, height: 2 * widest * scale }]
}

function nozzleBox({ nozzle }: TankSceneModel, map: (point: ScenePoint) => Pixel): Box {
  const outer = nozzle.reduce((most, station) => Math.max(most, station.outer.r), 0)
  const [a, b] = [map({ x: nozzle[0]?.outer.x ?? 0, r: outer }), map({ x: 0, r: -outer })]
  return { left: a.x, top: a.y, width: b.x - a.x, height: b.y - a.y }
}
