/**
 * The map laid out in pixels: areas of colour, lines, hatched edges and labels that keep off one another. Window and SVG draw the same.
 */
import { at } from '../base'
import { placeLabels, pointsAlong, type Box, type LabelRequest, type Pixel, type Place } from './boxes'
import { fieldColour, type Paint } from './fieldColours'
import { axisTicks } from './plotSvg'
import { coordinate, pathThrough } from './svgText'
import { MARK_RADIUS, placedMarks, type PlacedMark } from './thrustMapMarks'
import { colourShare, valueAtShare, type ThrustMapModel } from './thrustMap'
import { regionAbove, type ContourLine } from './contours'

export interface MapText {
  readonly id: string
  readonly text: string
  /** Left end, middle or right end of the words, on their base line. */
  readonly x: number
  readonly y: number
  readonly anchor: 'start' | 'middle' | 'end'
  /** On what the words stand, which decides their colour. */
  readonly wears: 'muted' | 'limit' | 'plate'
  /** A plate under the words, in the colour of the field there or in the ground's. */
  readonly plate: (Box & { readonly paint: Paint | null }) | null
  readonly vertical: boolean
}

export interface MapDrawing {
  readonly frame: Box
  /** Areas of colour from the lowest up, each over the one before. */
  readonly bands: readonly { readonly d: string; readonly paint: Paint }[]
  /** What breaks a limit. */
  readonly veil: string
  /** What cannot give the thrust, under a second veil. */
  readonly weak: string
  readonly contours: readonly { readonly d: string; readonly paint: Paint }[]
  readonly edges: readonly { readonly name: string; readonly d: string; readonly hatch: string }[]
  /** Dashed ends of the published band and its strip along the axis. */
  readonly strips: readonly { readonly d: string; readonly box: Box }[]
  /** Ticks of both axes. */
  readonly ticks: string
  /** Designs, each beside its place where another stands there already. */
  readonly marks: readonly PlacedMark[]
  /** Steps of the colour scale, from the lowest up, and the ticks on it. */
  readonly scale: {
    readonly box: Box
    readonly steps: readonly (Box & { readonly paint: Paint })[]
    readonly ticks: string
  }
  readonly texts: readonly MapText[]
  toX(value: number): number
  toY(value: number): number
  /** Place in the units of the axes under a pixel. */
  toPlace(pixel: Pixel): Pixel
}

export interface MapSize {
  readonly width: number
  readonly height: number
  /** Pixels. */
  readonly font: number
  /** Width of a text in pixels. */
  readonly measure: (text: string) => number
}

/** Areas of colour over the whole scale. */
const BANDS = 24
const SCALE_WIDTH = 14
const HATCH_EVERY = 9
const HATCH_LENGTH = 7
const STRIP = 5

/** Lay a map out. */
export function thrustMapDrawing(model: ThrustMapModel, size: MapSize): MapDrawing {
  const { font, measure } = size
  const { x, y, result, grid } = model
  const yTicks = axisTicks(y.min, y.max, Math.max(2, Math.min(8, Math.floor(size.height / 60))))
  const levels = result.levels.map((level) => ({ level, label: levelLabel(model, level) }))
  const scaleRoom = Math.max(0, ...levels.map(({ label }) => measure(label))) + SCALE_WIDTH + 26
  const left = Math.max(...yTicks.map(({ label }) => measure(label)), font) + 14
  const frame: Box = {
    left,
    top: font * 1.9,
    width: Math.max(60, size.width - left - scaleRoom - 8),
    height: Math.max(60, size.height - font * 5.2),
  }
  const toX = (value: number): number => frame.left + ((value - x.min) / (x.max - x.min)) * frame.width
  const toY = (value: number): number => frame.top + frame.height - ((value - y.min) / (y.max - y.min)) * frame.height
  const path = (lines: readonly ContourLine[], closed = false): string =>
    lines
      .map((line) => pathThrough(line.map((place) => ({ x: toX(place.x), y: toY(place.y) }))) + (closed ? 'Z' : ''))
      .join('')
  const paintOf = (share: number): Paint => fieldColour('amount', share)
  const bands = [
    {
      d: `M${coordinate(frame.left)} ${coordinate(frame.top)}h${coordinate(frame.width)}v${coordinate(frame.height)}h${coordinate(-frame.width)}Z`,
      paint: paintOf(0.5 / BANDS),
    },
    ...Array.from({ length: BANDS - 1 }, (_, i) => i + 1).flatMap((step) => {
      const d = result.high > result.low ? path(regionAbove(grid, valueAtShare(result, step / BANDS)), true) : ''
      return d === '' ? [] : [{ d, paint: paintOf((step + 0.5) / BANDS) }]
    }),
  ]
  const xTicks = axisTicks(x.min, x.max, Math.max(2, Math.min(10, Math.floor(frame.width / 70))))
  const bottom = frame.top + frame.height
  const marks = placedMarks(model, toX, toY, frame)
  const scaleBox: Box = {
    left: frame.left + frame.width + 18,
    top: frame.top,
    width: SCALE_WIDTH,
    height: frame.height,
  }
  const scaleY = (level: number): number => bottom - colourShare(result, level) * frame.height
  const edges = model.edges.map(({ name, lines }) => {
    const drawn = lines.map((line) => line.map((place) => ({ x: toX(place.x), y: toY(place.y) })))
    return { name, drawn, d: drawn.map(pathThrough).join(''), hatch: drawn.map(hatchOf).join('') }
  })
  const strips = model.strips.map(({ axis, from, to, label }) =>
    stripOf(axis, axis === 'x' ? [toX(from), toX(to)] : [toY(to), toY(from)], frame, label),
  )
  const obstacles = {
    bounds: { left: frame.left + 1, top: frame.top + 1, width: frame.width - 2, height: frame.height - 2 },
    boxes: [
      ...marks.map((mark) => ({
        left: mark.x - MARK_RADIUS - 2,
        top: mark.y - MARK_RADIUS - 2,
        width: 2 * MARK_RADIUS + 4,
        height: 2 * MARK_RADIUS + 4,
      })),
      ...strips.map(({ box }) => box),
    ],
    points: edges.flatMap(({ drawn }) => drawn.flatMap((line) => pointsAlong(line, 5))),
  }
  const height = font * 1.3
  const wanted: {
    readonly request: LabelRequest
    readonly text: string
    readonly paint: Paint | null
    readonly must: boolean
    readonly wears: MapText['wears']
  }[] = [
    ...edges.map(({ name, drawn }) => ({
      request: { id: `edge ${name}`, places: besideLine(drawn, measure(name) + 8, height) },
      text: name,
      paint: null,
      must: true,
      wears: 'limit' as const,
    })),
    ...strips.map(({ label, places }, i) => ({
      request: { id: `strip ${i}`, places: places(measure(label) + 8, height) },
      text: label,
      paint: null,
      must: true,
      wears: 'muted' as const,
    })),
    ...model.contours.flatMap(({ level, label, lines }) => {
      const places = onLine(lines, toX, toY, measure(label) + 6, height)
      return places.length === 0
        ? []
        : [
            {
              request: { id: `level ${level}`, places },
              text: label,
              paint: paintOf(colourShare(result, level)),
              must: false,
              wears: 'plate' as const,
            },
          ]
    }),
  ]
  const placed = placeLabels(
    wanted.filter(({ request }) => request.places.length > 0).map(({ request }) => request),
    obstacles,
  )
  const labels = placed.flatMap(({ id, place, overlap }): MapText[] => {
    const label = wanted.find(({ request }) => request.id === id)
    // A number that finds no free place is left out: it stands on the scale. So does a name: the limits are listed beside the map.
    if (label === undefined || overlap > (label.must ? 0.3 * place.width * place.height : 0)) return []
    return [
      {
        id,
        text: label.text,
        x: place.left + place.width / 2,
        y: place.top + height * 0.76,
        anchor: 'middle',
        wears: label.wears,
        plate: { ...place, paint: label.paint },
        vertical: false,
      },
    ]
  })
  const plain = (id: string, text: string, px: number, py: number, anchor: MapText['anchor']): MapText => ({
    id,
    text,
    x: px,
    y: py,
    anchor,
    wears: 'muted',
    plate: null,
    vertical: false,
  })
  const axisName = (title: string, unit: string): string => (unit === '' ? title : `${title} (${unit})`)
  return {
    frame,
    bands,
    veil: path(model.broken, true),
    weak: path(model.weak, true),
    contours: model.contours.map(({ level, lines }) => ({
      d: path(lines),
      paint: paintOf(colourShare(result, level)),
    })),
    edges: edges.map(({ name, d, hatch }) => ({ name, d, hatch })),
    strips: strips.map(({ d, box }) => ({ d, box })),
    ticks: [
      ...xTicks.map(({ value }) => `M${coordinate(toX(value))} ${coordinate(bottom)}v4`),
      ...yTicks.map(({ value }) => `M${coordinate(frame.left)} ${coordinate(toY(value))}h-4`),
    ].join(''),
    marks,
    scale: {
      box: scaleBox,
      steps: Array.from({ length: BANDS }, (_, i) => ({
        left: scaleBox.left,
        top: bottom - ((i + 1) / BANDS) * frame.height,
        width: SCALE_WIDTH,
        height: frame.height / BANDS + 0.5,
        paint: paintOf((i + 0.5) / BANDS),
      })),
      ticks: levels
        .map(({ level }) => `M${coordinate(scaleBox.left + SCALE_WIDTH)} ${coordinate(scaleY(level))}h4`)
        .join(''),
    },
    texts: [
      ...labels,
      ...xTicks.map(({ value, label }) => plain(`x ${label}`, label, toX(value), bottom + font * 1.5, 'middle')),
      ...yTicks.map(({ value, label }) => plain(`y ${label}`, label, frame.left - 7, toY(value) + font * 0.35, 'end')),
      ...levels.map(({ level, label }) =>
        plain(`scale ${label}`, label, scaleBox.left + SCALE_WIDTH + 7, scaleY(level) + font * 0.35, 'start'),
      ),
      plain('x', axisName(x.title, x.unit), frame.left + frame.width / 2, bottom + font * 2.8, 'middle'),
      plain('y', axisName(y.title, y.unit), 4, font, 'start'),
      plain('result', axisName(result.title, result.unit), size.width - 4, font, 'end'),
    ],
    toX,
    toY,
    toPlace: (pixel) => ({
      x: x.min + ((pixel.x - frame.left) / frame.width) * (x.max - x.min),
      y: y.min + ((bottom - pixel.y) / frame.height) * (y.max - y.min),
    }),
  }
}

/** The ends of the colours hold all beyond them, which the outermost numbers then say. */
function levelLabel({ result, contours }: ThrustMapModel, level: number): string {
  const label = contours.find((contour) => contour.level === level)?.label ?? ''
  return label
    .replace(/^/u, result.beyondLow && level === result.low ? '≤ ' : '')
    .replace(/^/u, result.beyondHigh && level === result.high ? '≥ ' : '')
}

/** Short strokes from a line into what breaks the limit: on its right where y runs upward, so on its left here. */
function hatchOf(line: readonly Pixel[]): string {
  let toNext = HATCH_EVERY / 2
  let strokes = ''
  line.forEach((point, index) => {
    const before = line[index - 1]
    if (before === undefined) return
    const [dx, dy] = [point.x - before.x, point.y - before.y]
    const length = Math.hypot(dx, dy)
    if (length === 0) return
    let gone = toNext
    for (; gone <= length; gone += HATCH_EVERY) {
      const [px, py] = [before.x + (dx * gone) / length, before.y + (dy * gone) / length]
      // Square to the line and leaning along it.
      const [nx, ny] = [-dy / length + (0.6 * dx) / length, dx / length + (0.6 * dy) / length]
      strokes += `M${coordinate(px)} ${coordinate(py)}l${coordinate(nx * HATCH_LENGTH)} ${coordinate(ny * HATCH_LENGTH)}`
    }
    toNext = gone - length
  })
  return strokes
}

function stripOf(axis: 'x' | 'y', [from, to]: readonly [number, number], frame: Box, label: string) {
  const [a, b] = axis === 'x' ? [frame.left, frame.left + frame.width] : [frame.top, frame.top + frame.height]
  const [low, high] = [Math.min(b, Math.max(a, from)), Math.min(b, Math.max(a, to))]
  const ends = [from, to].filter((end) => end > a && end < b)
  const d = ends
    .map((end) =>
      axis === 'x'
        ? `M${coordinate(end)} ${coordinate(frame.top)}v${coordinate(frame.height)}`
        : `M${coordinate(frame.left)} ${coordinate(end)}h${coordinate(frame.width)}`,
    )
    .join('')
  const box: Box =
    axis === 'x'
      ? { left: low, top: frame.top + frame.height - STRIP, width: high - low, height: STRIP }
      : { left: frame.left, top: low, width: STRIP, height: high - low }
  const places = (width: number, height: number): Place[] => {
    if (high <= low) return []
    const middle = (low + high) / 2
    const shares = [0, 1, 0.5, 0.25, 0.75]
    return shares.map((share) =>
      axis === 'x'
        ? {
            left: middle - width / 2,
            top: frame.top + 3 + share * (frame.height - height - 12),
            width,
            height,
            vertical: false,
          }
        : {
            left: frame.left + 9 + share * (frame.width - width - 14),
            top: middle - height / 2,
            width,
            height,
            vertical: false,
          },
    )
  }
  return { d, box, label, places }
}

/** Places beside the longest of some lines, first on the side that breaks the limit. */
function besideLine(lines: readonly (readonly Pixel[])[], width: number, height: number): Place[] {
  const long = [...lines].sort((a, b) => b.length - a.length).slice(0, 2)
  return long.flatMap((line) =>
    [0.5, 0.3, 0.7, 0.15, 0.85].flatMap((share) => {
      const index = Math.min(line.length - 2, Math.max(0, Math.round((line.length - 1) * share)))
      const [point, next] = [line[index], line[index + 1]]
      if (point === undefined || next === undefined) return []
      const length = Math.hypot(next.x - point.x, next.y - point.y) || 1
      const [nx, ny] = [-(next.y - point.y) / length, (next.x - point.x) / length]
      return [HATCH_LENGTH + 5, HATCH_LENGTH + 22, -6].map((away) => {
        const reach = Math.sign(away) * ((Math.abs(nx) * width + Math.abs(ny) * height) / 2) + away
        return {
          left: point.x + nx * reach - width / 2,
          top: point.y + ny * reach - height / 2,
          width,
          height,
          vertical: false,
        }
      })
    }),
  )
}

/** Places on the longest line of a level. */
function onLine(
  lines: readonly ContourLine[],
  toX: (value: number) => number,
  toY: (value: number) => number,
  width: number,
  height: number,
): Place[] {
  const longest = [...lines].sort((a, b) => b.length - a.length)[0]
  if (longest === undefined || longest.length < 4) return []
  return [0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8, 0.1, 0.9].map((share) => {
    const place = at(longest, Math.round((longest.length - 1) * share))
    return { left: toX(place.x) - width / 2, top: toY(place.y) - height / 2, width, height, vertical: false }
  })
}
