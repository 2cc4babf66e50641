/**
 * Words on the flat drawing: beside what they name, off the lines.
 */
import { placeLabels, pointsAlong, type Box, type Pixel, type Place } from './boxes'
import type { DrawingColours } from './colours'
import type { PulseSceneModel, SceneBar, SceneCallout, ScenePoint } from './sceneTypes'
import { svgText } from './svgText'
import { textWidth } from './textWidth'

const FONT = 12
const LINE = FONT * 1.3
/** Distances tried from the object, in pixels. */
const GAPS = [7, 20, 36, 56]
const ALONG = [0, -26, 26, -52, 52]

export type Map = (point: ScenePoint) => Pixel

/** The mirror image of a meridian below the axis. */
export function mirrored(points: readonly ScenePoint[]): ScenePoint[] {
  return points.map(({ x, r }) => ({ x, r: -r }))
}

/** A meridian and its mirror image. */
export function both(points: readonly ScenePoint[]): readonly (readonly ScenePoint[])[] {
  return [points, mirrored(points)]
}

type Spot = readonly ['above' | 'below', Pixel]

interface Wanted {
  readonly text: string
  readonly colour: string
  readonly spots: readonly Spot[]
}

/** Text elements of the drawing. */
export function flatLabels(
  model: PulseSceneModel,
  map: Map,
  size: { readonly width: number; readonly height: number },
  colours: DrawingColours,
): string[] {
  const wanted = [...dimensionWords(model, map, colours), ...bodyWords(model, map, colours)]
  const bounds: Box = { left: 4, top: 4, width: size.width - 8, height: size.height - 8 }
  const requests = wanted.map((label, index) => ({ id: String(index), places: placesOf(label) }))
  return placeLabels(requests, { bounds, boxes: [], points: lines(model, map) }).flatMap(({ id, place }) => {
    const label = wanted[Number(id)]
    if (label === undefined) return []
    const style = { size: FONT, colour: label.colour, halo: colours.ground }
    return [svgText(label.text, place.left, place.top + place.height * 0.78, style)]
  })
}

function placesOf(label: Wanted): Place[] {
  const width = textWidth(label.text, FONT)
  return GAPS.flatMap((gap) =>
    ALONG.flatMap((along) =>
      label.spots.map(([side, at]): Place => {
        const top = side === 'above' ? at.y - gap - LINE : at.y + gap
        return { left: at.x - width / 2 + along, top, width, height: LINE, vertical: false }
      }),
    ),
  )
}

/** Outer radius of the wall where it is nearest to the diameter's dimension line. */
function nozzleTop(model: PulseSceneModel): number {
  const stations = model.nozzle.stations
  const end = model.nozzle.shape === 'tube' ? stations[0] : stations.at(-1)
  return end?.outer.r ?? 0
}

function middle(bar: SceneBar): ScenePoint {
  return { x: (bar.from.x + bar.to.x) / 2, r: (bar.from.r + bar.to.r) / 2 }
}

function dimensionWords(model: PulseSceneModel, map: Map, colours: DrawingColours): Wanted[] {
  const wall = model.nozzle.stations.reduce((most, { outer }) => Math.max(most, outer.r), 0)
  const callouts = model.callouts.map((callout): Wanted => {
    const centre = map(middle(callout))
    const spots: Readonly<Record<SceneCallout['path'], readonly Spot[]>> = {
      'nozzle.diameter': [
        ['above', map({ x: callout.from.x, r: Math.max(callout.from.r, nozzleTop(model)) })],
        ['below', map(callout.to)],
      ],
      'programme.stroke': [
        ['below', centre],
        ['above', centre],
      ],
      'programme.peakSpeed': [
        ['above', map({ x: middle(callout).x, r: wall })],
        ['below', centre],
      ],
    }
    return { text: callout.label, colour: colours.ink, spots: spots[callout.path] }
  })
  const spots: readonly Spot[] = [
    ['below', map(middle(model.scaleBar))],
    ['above', map(middle(model.scaleBar))],
  ]
  return [...callouts, { text: model.scaleBar.label, colour: colours.muted, spots }]
}

function bodyWords(model: PulseSceneModel, map: Map, colours: DrawingColours): Wanted[] {
  const { speed, ring, trailingJet } = model
  const words: Wanted[] = []
  if (speed !== null) {
    const at = map({ x: (speed.from + speed.to) / 2, r: 0 })
    words.push({
      text: speed.label,
      colour: colours.ink,
      spots: [
        ['above', at],
        ['below', at],
      ],
    })
  }
  if (ring !== null) {
    const top = [...ring.core, ...ring.carried].reduce((most, { r }) => Math.max(most, r), 0)
    if (ring.carried.length > 0)
      words.push({ text: model.labels.carried, colour: colours.muted, spots: [['above', map({ x: ring.x, r: top })]] })
    words.push({ text: model.labels.core, colour: colours.muted, spots: [['below', map({ x: ring.x, r: -top })]] })
  }
  if (trailingJet !== null) {
    const r = trailingJet.diameter / 2
    const x = trailingJet.length / 2
    words.push({
      text: trailingJet.label,
      colour: colours.muted,
      spots: [
        ['above', map({ x, r })],
        ['below', map({ x, r: -r })],
      ],
    })
  }
  return words
}

function lines(model: PulseSceneModel, map: Map): Pixel[] {
  const { ring, nozzle } = model
  const bars = [...model.callouts, model.scaleBar].map((bar) => [bar.from, bar.to])
  const walls = [nozzle.stations.map(({ inner }) => inner), nozzle.stations.map(({ outer }) => outer)].flatMap(both)
  const rings = ring === null ? [] : [...both(ring.core), ...both(ring.carried)]
  return [...bars, ...walls, ...rings].flatMap((line) => pointsAlong(line.map(map), 5))
}
