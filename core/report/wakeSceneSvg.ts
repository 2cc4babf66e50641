/**
 * Rings in motion as a flat side view in SVG at one output time: for exports and reports, and for windows that cannot draw in three
 * dimensions.
 */
import { at } from '../base'
import { wakeFrame, type RingShape, type Vector } from '../filament'
import { formatQuantity, fromBase, toBase } from '../quantity'
import { placeLabels, pointsAlong, type Box, type Pixel, type Place } from './boxes'
import { drawingColours, type DrawingColours } from './colours'
import { counterColour } from './fieldColours'
import type { DrawingSize } from './plotSvg'
import { plus } from './spaceVectors'
import { coordinate, escapeXml, FONT_FAMILY, pathThrough, svgText } from './svgText'
import { textWidth } from './textWidth'
import { tickStep } from './ticks'
import type { WakeSceneModel, WakeSceneNozzle, WakeSceneWall } from './wakeSceneTypes'

export interface WakeSvgChoice {
  /** Number of the ring to mark, or null. */
  readonly selected: number | null
  readonly trails: boolean
  readonly stations: boolean
}

const ROOM = { x: 48, top: 34, bottom: 68 }
const FONT = 12
const LINE = 16
/** Thinnest core drawn, as a diameter in pixels. */
const THINNEST = 2.4
const HEAD = 9

type Map = (place: Vector) => Pixel

/** The drawing at output time number `index`, seen from the side: x to the right, y up. */
export function wakeSceneToSvg(model: WakeSceneModel, index: number, size: DrawingSize, choice: WakeSvgChoice): string {
  const width = Math.max(200, size.width)
  const height = Math.max(140, size.height)
  const colours = { ...drawingColours(size.theme), counter: counterColour(size.theme === 'dark') }
  const last = model.wake.outputTimes.length - 1
  const shapes = last < 0 ? [] : wakeFrame(model.wake, Math.min(last, Math.max(0, index)))
  const time = last < 0 ? 0 : at(model.wake.outputTimes, Math.min(last, Math.max(0, index)))
  const { map, scale } = mapping(model, width, height)
  const colourOf = (ring: number): string =>
    (model.rings[ring - 1]?.sense ?? 1) > 0 ? colours.accent : colours.counter
  const id = 'wake-drawing'
  const parts = [
    ...model.axes.map(({ from, to }) => line([map(from), map(to)], colours.muted, 0.8, '14 4 2 4')),
    ...datumLines(model, map, colours),
    ...model.nozzles.map((nozzle) => nozzleShape(nozzle, map, colours)),
    ...(model.wall === null ? [] : wallShapes(model.wall, map, colours)),
    ...(model.tube === null
      ? []
      : [1, -1].map((side) => {
          const radius = (model.tube?.radius ?? 0) * side
          const ends = [model.tube?.from, model.tube?.to].flatMap((end) => (end === undefined ? [] : [end]))
          return line(
            ends.map((end) => map(plus(end, [0, 1, 0], radius))),
            colours.edge,
            1,
          )
        })),
    ...(choice.stations
      ? model.stations.map(({ centre, radius }) =>
          line([map(plus(centre, [0, 1, 0], radius)), map(plus(centre, [0, 1, 0], -radius))], colours.edge, 1, '7 4'),
        )
      : []),
    ...(choice.trails ? trails(model, time, map, colourOf) : []),
    ...farthestFirst(shapes).flatMap((shape) => [
      ringShape(shape, map, scale, colourOf(shape.number), shape.number === choice.selected ? colours.ink : null),
      arrow(
        map(shape.centre),
        map(plus(shape.centre, shape.direction, shape.speed * model.arrowTime)),
        colourOf(shape.number),
      ),
    ]),
    ...scaleBar(model, height, scale, colours),
    ...words(model, shapes, choice, { width, height, map, scale, colours, time }),
  ]
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${coordinate(width)}" height="${coordinate(height)}" `,
    `viewBox="0 0 ${coordinate(width)} ${coordinate(height)}" role="img" aria-labelledby="${id}-title ${id}-desc" font-family="${escapeXml(FONT_FAMILY)}">`,
    `<title id="${id}-title">Rings to scale at ${escapeXml(formatQuantity(time, 's'))}</title>`,
    `<desc id="${id}-desc">${escapeXml([model.description, ...model.conventions].join(' '))}</desc>`,
    `<rect width="${coordinate(width)}" height="${coordinate(height)}" fill="${colours.ground}"/>`,
    ...parts,
    '</svg>\n',
  ].join('')
}

function mapping(model: WakeSceneModel, width: number, height: number): { readonly map: Map; readonly scale: number } {
  const { reach } = model
  const low = [Infinity, Infinity]
  const high = [-Infinity, -Infinity]
  for (let i = 0; i < reach.length; i += 3)
    for (const axis of [0, 1]) {
      low[axis] = Math.min(at(low, axis), at(reach, i + axis))
      high[axis] = Math.max(at(high, axis), at(reach, i + axis))
    }
  const span = (axis: number): number => Math.max(at(high, axis) - at(low, axis), 1e-12)
  const scale = Math.min((width - 2 * ROOM.x) / span(0), (height - ROOM.top - ROOM.bottom) / span(1))
  const left = (width - scale * span(0)) / 2
  const top = ROOM.top + (height - ROOM.top - ROOM.bottom - scale * span(1)) / 2
  return {
    scale,
    map: ([x, y]) => ({ x: left + (x - at(low, 0)) * scale, y: top + (at(high, 1) - y) * scale }),
  }
}

function line(points: readonly Pixel[], colour: string, width: number, dash = ''): string {
  const dashes = dash === '' ? '' : ` stroke-dasharray="${dash}"`
  return `<path d="${pathThrough(points)}" stroke="${colour}" stroke-width="${width}"${dashes} fill="none"/>`
}

function datumLines({ datum }: WakeSceneModel, map: Map, colours: DrawingColours): string[] {
  const ticks = datum.ticks.map(({ place }) => {
    const { x, y } = map(place)
    return line(
      [
        { x, y },
        { x, y: y + 5 },
      ],
      colours.ink,
      1,
    )
  })
  return [line([map(datum.from), map(datum.to)], colours.ink, 1), ...ticks]
}

/** The walls of a nozzle in its section with the drawing's plane, as far as it lies in it. */
function nozzleShape({ position, axes, stretch, outline }: WakeSceneNozzle, map: Map, colours: DrawingColours): string {
  const [forward, first] = axes
  const place = (x: number, r: number): Pixel => map(plus(plus(position, forward, x), first, r * stretch[0]))
  const wall = (side: 1 | -1): string => {
    const inside = outline.stations.map(({ inner }) => place(inner.x, side * inner.r))
    const outside = outline.stations.map(({ outer }) => place(outer.x, side * outer.r)).reverse()
    return `<path d="${pathThrough([...inside, ...outside])}Z" fill="${colours.nozzle}" stroke="${colours.ink}" stroke-width="1" stroke-linejoin="round"/>`
  }
  return wall(1) + wall(-1)
}

function wallShapes({ corners, behind }: WakeSceneWall, map: Map, colours: DrawingColours): string[] {
  const pixels = corners.map(map)
  const outline = `<path d="${pathThrough(pixels)}Z" fill="${colours.edge}" fill-opacity="0.16" stroke="${colours.edge}" stroke-width="1.3"/>`
  const spans = pixels.map((a, index) => {
    const b = at(pixels, (index + 1) % 4)
    return Math.hypot(b.x - a.x, b.y - a.y)
  })
  // Seen from its edge the wall is one line, hatched once.
  const edgeOn = Math.min(...spans) < 4
  const longest = spans.indexOf(Math.max(...spans))
  const hatches = corners.flatMap((corner, index) => {
    if (edgeOn && index !== longest) return []
    const next = corners[(index + 1) % 4] ?? corner
    const [a, b] = [map(corner), map(next)]
    const span = Math.hypot(b.x - a.x, b.y - a.y)
    if (span < 1 || Math.hypot(behind[0], behind[1]) < 0.2) return []
    const along = { x: (b.x - a.x) / span, y: (b.y - a.y) / span }
    return Array.from({ length: Math.min(120, Math.floor(span / 8)) }, (_, part) => {
      const start = { x: a.x + along.x * (part + 0.5) * 8, y: a.y + along.y * (part + 0.5) * 8 }
      const end = { x: start.x + behind[0] * 7 + along.x * 5, y: start.y - behind[1] * 7 + along.y * 5 }
      return line([start, end], colours.edge, 1)
    })
  })
  return [outline, ...hatches]
}

function trails(model: WakeSceneModel, time: number, map: Map, colourOf: (ring: number) => string): string[] {
  return model.wake.trajectories.flatMap((path, ring) => {
    const end = path.time.findLastIndex((value) => value <= time)
    if (end < 1) return []
    const step = Math.max(1, Math.floor(end / 300))
    const kept = Array.from({ length: end + 1 }, (_, k) => k).filter((k) => k % step === 0 || k === end)
    const points = kept.map((k) => map([at(path.x, k), at(path.y, k), at(path.z, k)]))
    return [line(points, colourOf(ring + 1), 1.2, '3 4')]
  })
}

function farthestFirst(shapes: readonly RingShape[]): RingShape[] {
  return [...shapes].sort((a, b) => a.centre[2] - b.centre[2])
}

/** The ring's line as wide as its core: what a tube looks like in parallel projection. */
function ringShape(
  { nodes, coreRadius }: RingShape,
  map: Map,
  scale: number,
  colour: string,
  mark: string | null,
): string {
  const points = Array.from({ length: nodes.length / 3 }, (_, i) =>
    map([at(nodes, 3 * i), at(nodes, 3 * i + 1), at(nodes, 3 * i + 2)]),
  )
  const path = `${pathThrough(points)}Z`
  const width = Math.max(2 * coreRadius * scale, THINNEST)
  const tube = `<path d="${path}" stroke="${colour}" stroke-width="${coordinate(width)}" stroke-linejoin="round" fill="none"/>`
  return mark === null ? tube : `${tube}<path d="${path}" stroke="${mark}" stroke-width="1.6" fill="none"/>`
}

function arrow(from: Pixel, to: Pixel, colour: string): string {
  const length = Math.hypot(to.x - from.x, to.y - from.y)
  if (length < 5) return ''
  const head = Math.min(HEAD, length * 0.7)
  const along = { x: (to.x - from.x) / length, y: (to.y - from.y) / length }
  const neck = { x: to.x - along.x * head, y: to.y - along.y * head }
  const side = { x: -along.y * head * 0.34, y: along.x * head * 0.34 }
  const corners = [to, { x: neck.x + side.x, y: neck.y + side.y }, { x: neck.x - side.x, y: neck.y - side.y }]
  return `${line([from, neck], colour, 1.5)}<path d="${pathThrough(corners)}Z" fill="${colour}"/>`
}

function scaleBar({ units }: WakeSceneModel, height: number, scale: number, colours: DrawingColours): string[] {
  const unit = units.length
  const length = toBase(tickStep(fromBase(60 / scale, unit), 1), unit)
  const [left, y] = [16, height - 34]
  const right = left + length * scale
  const tick = (x: number): string =>
    line(
      [
        { x, y: y - 4 },
        { x, y: y + 4 },
      ],
      colours.ink,
      1,
    )
  const text = formatQuantity(length, unit, 3)
  return [
    line(
      [
        { x: left, y },
        { x: right, y },
      ],
      colours.ink,
      1,
    ),
    tick(left),
    tick(right),
    svgText(text, right + 8, y + 4, { size: FONT, colour: colours.ink }),
  ]
}

interface WordContext {
  readonly width: number
  readonly height: number
  readonly map: Map
  readonly scale: number
  readonly colours: DrawingColours
  readonly time: number
}

/** Numbers of rings and of the axis, names of what stands around. */
function words(
  model: WakeSceneModel,
  shapes: readonly RingShape[],
  choice: WakeSvgChoice,
  { width, height, map, scale, colours, time }: WordContext,
): string[] {
  interface Word {
    readonly text: string
    readonly colour: string
    readonly weight: number
    readonly places: readonly Place[]
  }
  const beside = (text: string, spots: readonly (readonly [Pixel, -1 | 1])[], gap: number): Place[] => {
    const wide = textWidth(text, FONT)
    return [0, 14, 28].flatMap((away) =>
      [0, -24, 24].flatMap((along) =>
        spots.map(([pixel, side]): Place => {
          const top = side < 0 ? pixel.y - gap - away - LINE : pixel.y + gap + away
          return { left: pixel.x - wide / 2 + along, top, width: wide, height: LINE, vertical: false }
        }),
      ),
    )
  }
  const list: Word[] = []
  const ticks = model.datum.ticks
  const gap = ticks.length > 1 ? Math.abs(map(at(ticks, 1).place).x - map(at(ticks, 0).place).x) : Infinity
  const every = [1, 2, 5, 10, 20, 50].find((count) => gap * count >= 44) ?? 100
  ticks.forEach(({ place, label }, index) => {
    if (index % every === 0)
      list.push({
        text: label,
        colour: colours.muted,
        weight: 400,
        places: beside(label, [[map(place), 1]], 5).slice(0, 1),
      })
  })
  const end = map(model.datum.to)
  const title = model.datum.title
  list.push({
    text: title,
    colour: colours.muted,
    weight: 400,
    places: [
      {
        left: Math.min(end.x + 6, width - 10 - textWidth(title, FONT)),
        top: end.y - LINE - 2,
        width: textWidth(title, FONT),
        height: LINE,
        vertical: false,
      },
    ],
  })
  for (const { number, nodes, coreRadius } of shapes) {
    let [top, bottom] = [
      { x: 0, y: Infinity },
      { x: 0, y: -Infinity },
    ]
    for (let i = 0; i < nodes.length; i += 3) {
      const pixel = map([at(nodes, i), at(nodes, i + 1), at(nodes, i + 2)])
      if (pixel.y < top.y) top = pixel
      if (pixel.y > bottom.y) bottom = pixel
    }
    const chosen = number === choice.selected
    const text = chosen ? `ring ${number}` : String(number)
    const places = beside(
      text,
      [
        [top, -1],
        [bottom, 1],
      ],
      coreRadius * scale + 5,
    )
    list.push({ text, colour: colours.ink, weight: chosen ? 700 : 400, places })
  }
  model.nozzles.forEach(({ position, axes, outline, label }) => {
    const middle = map(plus(position, axes[0], -outline.length / 2))
    const [along, radial] = [
      Math.abs(axes[0][1]) * outline.length,
      outline.stations.reduce((most, { outer }) => Math.max(most, outer.r), 0),
    ]
    const reach = (radial + along / 2) * scale
    const spots = [
      [{ x: middle.x, y: middle.y - reach }, -1],
      [{ x: middle.x, y: middle.y + reach }, 1],
    ] as const
    list.push({ text: label, colour: colours.muted, weight: 400, places: beside(label, spots, 5) })
  })
  if (choice.stations)
    for (const { centre, radius, label } of model.stations)
      list.push({
        text: label,
        colour: colours.muted,
        weight: 400,
        places: beside(label, [[map(plus(centre, [0, 1, 0], radius)), -1]], 4),
      })
  const bounds: Box = { left: 4, top: 4, width: width - 8, height: height - 8 }
  const points = shapes.flatMap(({ nodes }) =>
    pointsAlong(
      Array.from({ length: nodes.length / 3 }, (_, i) =>
        map([at(nodes, 3 * i), at(nodes, 3 * i + 1), at(nodes, 3 * i + 2)]),
      ),
      8,
    ),
  )
  const requests = list.map(({ places }, index) => ({ id: String(index), places }))
  const placed = placeLabels(requests, { bounds, boxes: [], points }).flatMap(({ id, place, overlap }) => {
    const word = list[Number(id)]
    if (word === undefined || (overlap > 8 && word.colour === colours.muted)) return []
    const style = { size: FONT, colour: word.colour, weight: word.weight, halo: colours.ground }
    return [svgText(word.text, place.left, place.top + place.height * 0.78, style)]
  })
  const stamp = `t = ${formatQuantity(time, 's')}`
  return [...placed, svgText(stamp, width - 12, 20, { size: FONT, colour: colours.ink, anchor: 'end' })]
}
