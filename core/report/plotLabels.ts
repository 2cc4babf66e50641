/**
 * Direct labels of a plot: names at the ends of lines, limits on their lines, bands in or beside them; none clipped, none colliding.
 */
import { placeLabels, pointsAlong, type LabelRequest, type Pixel, type Place } from './boxes'
import { MARKER_RADIUS, markedPoints } from './plotMarkers'
import { seriesParts, type PlotScale } from './plotScale'
import type { PlotBand, PlotLine, PlotMarker, PlotModel, SeriesRole } from './types'

export interface PlotLabel {
  readonly text: string
  readonly place: Place
  /** What it names, which decides its colour. */
  readonly wears: SeriesRole | 'limit' | 'mark'
  /** Mark drawn before it: a line of the legend of measured points. */
  readonly marker?: { readonly marker: PlotMarker; readonly x: number; readonly y: number }
}

type Measure = (text: string) => number

/**
 * @param measure width of a text in pixels at the size used.
 * @param lineHeight height of one line of text in pixels.
 */
export function plotLabels(
  model: PlotModel,
  scale: PlotScale,
  measure: Measure,
  lineHeight: number,
): readonly PlotLabel[] {
  const wanted: { request: LabelRequest; text: string; wears: PlotLabel['wears'] }[] = []
  const points: Pixel[] = []
  model.series.forEach((series, index) => {
    const marks = series.marker === undefined ? null : markedPoints(series, scale)
    const parts = marks === null ? seriesParts(series, scale) : [marks.toSorted((a, b) => a.x - b.x)]
    for (const part of parts) points.push(...(marks === null ? pointsAlong(part, 4) : part.flatMap(aroundMark)))
    const longest = parts.at(-1)
    // A lone series is named by the title of its plot.
    if (model.series.length < 2 || longest === undefined || series.unnamed === true || marks !== null) return
    const places = placesAtEnd(longest, measure(series.name), lineHeight)
    wanted.push({ request: { id: `series-${index}`, places }, text: series.name, wears: series.role })
  })
  for (const line of model.lines) points.push(...pointsAlong(lineEnds(line, scale), 4))
  model.lines.forEach((line, index) => {
    const places = placesOnLine(line, scale, measure(line.label), lineHeight)
    wanted.push({ request: { id: `line-${index}`, places }, text: line.label, wears: line.kind })
  })
  model.bands.forEach((band, index) => {
    const places = placesOnBand(band, scale, measure(band.label), lineHeight)
    wanted.push({ request: { id: `band-${index}`, places }, text: band.label, wears: 'limit' })
  })
  const legend = legendOf(model, scale, measure, lineHeight)
  if (legend !== null) wanted.unshift({ request: { id: 'legend', places: legend.places }, text: '', wears: 'mark' })
  const placed = placeLabels(
    wanted.map(({ request }) => request),
    { bounds: scale.frame, boxes: [], points },
  )
  return placed.flatMap(({ id, place }) => {
    const label = wanted.find(({ request }) => request.id === id)
    if (id === 'legend' && legend !== null) return legend.labels(place)
    return label === undefined ? [] : [{ text: label.text, place, wears: label.wears }]
  })
}

/** What a name must keep clear of: the mark and a little around it. */
function aroundMark({ x, y }: Pixel): readonly Pixel[] {
  return [
    { x: x - MARKER_RADIUS, y: y - MARKER_RADIUS },
    { x: x + MARKER_RADIUS, y: y + MARKER_RADIUS },
    { x, y },
  ]
}

/** Room of the mark before its name [px]. */
const MARK_ROOM = 14

interface Legend {
  readonly places: readonly Place[]
  labels(place: Place): readonly PlotLabel[]
}

/** Measured points lie among one another, so that their names stand together in the corner that is freest. */
function legendOf(model: PlotModel, scale: PlotScale, measure: Measure, lineHeight: number): Legend | null {
  const entries = model.series.flatMap(({ name, marker, role, unnamed }) =>
    marker === undefined || unnamed === true ? [] : [{ name, marker, role }],
  )
  if (entries.length === 0 || model.series.length < 2) return null
  const line = lineHeight * 1.15
  const width = MARK_ROOM + entries.reduce((most, { name }) => Math.max(most, measure(name)), 0)
  const height = line * entries.length
  const { left, top, width: across, height: down } = scale.frame
  const [right, bottom] = [left + across - width - 6, top + down - height - 6]
  const corners = [
    [left + 8, top + 4],
    [right, bottom],
    [right, top + 4],
    [left + 8, bottom],
    [left + (across - width) / 2, top + 4],
    [left + (across - width) / 2, bottom],
  ] as const
  return {
    places: corners.map(([x, y]) => ({ left: x, top: y, width, height, vertical: false })),
    labels: (place) =>
      entries.map(({ name, marker, role }, index) => {
        const y = place.top + index * line
        return {
          text: name,
          place: { left: place.left + MARK_ROOM, top: y, width: width - MARK_ROOM, height: line, vertical: false },
          wears: role,
          marker: { marker, x: place.left + 4, y: y + line / 2 },
        }
      }),
  }
}

/** End points in pixels of a line across the plot. */
export function lineEnds(line: PlotLine, scale: PlotScale): readonly [Pixel, Pixel] {
  const { left, top, width, height } = scale.frame
  if (line.axis === 'y') {
    const y = scale.toY(line.value)
    return [
      { x: left, y },
      { x: left + width, y },
    ]
  }
  const x = scale.toX(line.value)
  return [
    { x, y: top },
    { x, y: top + height },
  ]
}

function across(left: number, top: number, width: number, height: number): Place {
  return { left, top, width, height, vertical: false }
}

function upward(left: number, top: number, width: number, height: number): Place {
  return { left, top, width: height, height: width, vertical: true }
}

function placesAtEnd(part: readonly Pixel[], width: number, height: number): Place[] {
  const end = part.at(-1)
  if (end === undefined) return []
  const right = end.x + 5
  const places = [0, -0.55, 0.55, -1.1, 1.1].map((lines) =>
    across(right, end.y - height / 2 + lines * height, width, height),
  )
  for (const share of [1, 0.8, 0.6, 0.4]) {
    const point = part[Math.max(0, Math.round((part.length - 1) * share))]
    if (point === undefined) continue
    places.push(across(point.x - width - 3, point.y - height - 3, width, height))
    places.push(across(point.x + 6, point.y + 2, width, height))
    places.push(across(point.x - width - 3, point.y + 3, width, height))
  }
  return places
}

function placesOnLine(line: PlotLine, scale: PlotScale, width: number, height: number): Place[] {
  const { left, top } = scale.frame
  const [from, to] = lineEnds(line, scale)
  if (line.axis === 'y') {
    const shares = [0.4, 0.25, 0.1, 0.6, 0.75, 1, 0]
    const lefts = shares.map((share) => left + 2 + (scale.frame.width - width - 4) * share)
    return [
      ...lefts.map((x) => across(x, from.y + 3, width, height)),
      ...lefts.map((x) => across(x, from.y - height - 3, width, height)),
    ]
  }
  const bottom = to.y - height - 2
  return [
    across(from.x + 4, top + 1, width, height),
    across(from.x - width - 4, top + 1, width, height),
    across(from.x + 4, bottom, width, height),
    across(from.x - width - 4, bottom, width, height),
    upward(from.x + 3, top + 2, width, height),
    upward(from.x - height - 3, top + 2, width, height),
  ]
}

function placesOnBand(band: PlotBand, scale: PlotScale, width: number, height: number): Place[] {
  const { left, top } = scale.frame
  if (band.axis === 'y') {
    const y = (scale.toY(band.from) + scale.toY(band.to) - height) / 2
    const right = left + scale.frame.width - width - 4
    return [
      across(right, y, width, height),
      across(left + 4, y, width, height),
      across(right, scale.toY(band.to) - height - 2, width, height),
    ]
  }
  const a = Math.max(left, scale.toX(band.from))
  const b = Math.min(left + scale.frame.width, scale.toX(band.to))
  const middle = (a + b) / 2
  const inside = b - a >= width + 4 ? [across(middle - width / 2, top + 2, width, height)] : []
  const turned = b - a >= height + 2 ? [upward(middle - height / 2, top + 4, width, height)] : []
  return [
    ...inside,
    ...turned,
    across(a - width - 4, top + 1, width, height),
    across(b + 4, top + 1, width, height),
    across(a - width - 4, top + 1 + height, width, height),
    upward(a - height - 2, top + 4, width, height),
  ]
}
