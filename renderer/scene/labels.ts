/**
 * Words on the drawing: each is tied to a point in space and takes a free place beside it.
 */
import {
  placeLabels,
  pointsAlong,
  type Box,
  type Pixel,
  type PulseSceneModel,
  type SceneBar,
  type SceneCallout,
  type ScenePoint,
} from '../../core/report'
import { leaderOf, placesAround, type Side, type Spots } from './labelPlaces'
import { scaleBarEnds, sceneStrokes, seenAlongAxis, shownCallouts } from './strokes'
import { add, type Vector } from './vectors'
import { basisOf, inSpace, project, type Basis, type Size, type View } from './view'

export interface SceneLabel {
  readonly id: string
  readonly text: string
  /** Plan path behind an editable dimension, null for plain words. */
  readonly path: SceneCallout['path'] | null
  readonly quiet: boolean
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
  /** A thin line from the word to what it names, where they stand apart. */
  readonly leader: readonly [Pixel, Pixel] | null
}

interface Wanted extends Spots {
  readonly id: string
  readonly text: string
  readonly path: SceneCallout['path'] | null
  readonly quiet: boolean
  /** May be left out where there is no free place. */
  readonly spare: boolean
}

const NOZZLE_SLICES = 6
/** Points along lines that words keep off, in pixels apart: half the height of a word. */
const LINE_GAP = 8
/** Below this size only dimensions, speed and scale are named. */
const SMALL = { width: 460, height: 260 }

/**
 * Labels for a view.
 *
 * @param measure width of a text in pixels.
 * @param bounds part of the picture labels may use.
 */
export function sceneLabels(
  model: PulseSceneModel,
  view: View,
  size: Size,
  measure: (text: string) => number,
  bounds: Box,
): readonly SceneLabel[] {
  const basis = basisOf(view)
  const small = size.width < SMALL.width || size.height < SMALL.height
  const wanted = [...dimensionLabels(model, basis, view, size), ...bodyLabels(model, basis, view, size)].filter(
    (label) => !(small && label.spare),
  )
  const points = sceneStrokes(model, basis, 1 / view.scale).flatMap((stroke) =>
    pointsAlong(
      stroke.points.map((point) => project(point, basis, view, size)),
      LINE_GAP,
    ),
  )
  const requests = wanted.map((label) => ({
    id: label.id,
    places: placesAround(label, measure(label.text), label.path !== null),
  }))
  return placeLabels(requests, { bounds, boxes: bodies(model, basis, view, size), points }).flatMap(
    ({ id, place, overlap }) => {
      const label = wanted.find((candidate) => candidate.id === id)
      if (label === undefined || (label.spare && overlap > 40)) return []
      const { text, path, quiet } = label
      return [
        {
          id,
          text,
          path,
          quiet,
          left: place.left,
          top: place.top,
          width: place.width,
          height: place.height,
          leader: leaderOf(label, place),
        },
      ]
    },
  )
}

function dimensionLabels(model: PulseSceneModel, basis: Basis, view: View, size: Size): Wanted[] {
  const at = (point: ScenePoint): Pixel => project(inSpace(point, basis), basis, view, size)
  const wall = model.nozzle.stations.reduce((most, { outer }) => Math.max(most, outer.r), 0)
  const callouts = shownCallouts(model, basis).map((callout): Wanted => {
    const middle = at(middleOf(callout))
    const [from, to] = [at(callout.from), at(callout.to)]
    const above = at({ x: middleOf(callout).x, r: wall })
    const spots: Readonly<Record<SceneCallout['path'], Wanted['spots']>> = {
      'nozzle.diameter': [
        ['above', from],
        ['below', to],
        ['left', middle],
        ['right', middle],
      ],
      'programme.stroke': [
        ['below', middle],
        ['above', middle],
      ],
      'programme.peakSpeed': [
        ['above', above],
        ['below', middle],
      ],
    }
    const base = { id: callout.path, text: callout.label, path: callout.path, quiet: false, spare: false }
    return { ...base, spots: spots[callout.path], gap: callout.ends === 'ticks' ? 7 : 4, target: middle }
  })
  const [from, to] = scaleBarEnds(model, basis)
  const bar = project(add(add([0, 0, 0], from, 0.5), to, 0.5), basis, view, size)
  const spots: Wanted['spots'] = [
    ['below', bar],
    ['above', bar],
  ]
  const scale = { id: 'scale', text: model.scaleBar.label, path: null, quiet: true, spare: false }
  return [...callouts, { ...scale, spots, gap: 6, target: bar }]
}

function middleOf(bar: SceneBar): ScenePoint {
  return { x: (bar.from.x + bar.to.x) / 2, r: (bar.from.r + bar.to.r) / 2 }
}

function bodyLabels(model: PulseSceneModel, basis: Basis, view: View, size: Size): Wanted[] {
  const at = (point: ScenePoint): Pixel => project(inSpace(point, basis), basis, view, size)
  const words = (id: string, text: string, anchor: Pixel, sides: readonly Side[], spare: boolean): Wanted => {
    const spots = sides.map((side) => [side, anchor] as const)
    return { id, text, path: null, quiet: spare, spare, spots, gap: 8, target: anchor }
  }
  const wanted: Wanted[] = []
  const { speed, ring, trailingJet } = model
  if (speed !== null && !seenAlongAxis(basis)) {
    const middle = at({ x: (speed.from + speed.to) / 2, r: 0 })
    wanted.push(words('speed', speed.label, middle, ['above', 'below', 'right'], false))
  }
  if (ring !== null) {
    const top = ring.carried.reduce((most, { r }) => Math.max(most, r), 0)
    const core = ring.core.reduce((most, { r }) => Math.max(most, r), 0)
    if (ring.carried.length > 0)
      wanted.push(words('carried', model.labels.carried, at({ x: ring.x, r: top }), ['above', 'right', 'left'], true))
    if (!seenAlongAxis(basis))
      wanted.push(words('core', model.labels.core, at({ x: ring.x, r: -core }), ['below', 'right', 'left'], true))
  }
  if (trailingJet !== null && !seenAlongAxis(basis)) {
    const anchor = at({ x: trailingJet.length / 2, r: trailingJet.diameter / 2 })
    wanted.push(words('jet', trailingJet.label, anchor, ['above', 'below'], true))
  }
  return wanted
}

/** Where bodies are seen, as boxes, so that words stand beside and not on them. */
function bodies(model: PulseSceneModel, basis: Basis, view: View, size: Size): Box[] {
  const boxes: Box[] = []
  const cover = (points: readonly Vector[]): void => {
    const pixels = points.map((point) => project(point, basis, view, size))
    const [xs, ys] = [pixels.map(({ x }) => x), pixels.map(({ y }) => y)]
    const [left, top] = [Math.min(...xs), Math.min(...ys)]
    boxes.push({ left, top, width: Math.max(...xs) - left, height: Math.max(...ys) - top })
  }
  const round = (x: number, r: number): Vector[] =>
    Array.from({ length: 12 }, (_, part) => [x, r * Math.cos((part * Math.PI) / 6), r * Math.sin((part * Math.PI) / 6)])
  const stations = model.nozzle.stations
  const [rear, lip] = [stations[0], stations.at(-1)]
  if (rear !== undefined && lip !== undefined) {
    // In slices: one box around a slanting tube would claim the empty corners as well.
    const widest = stations.reduce((most, { outer }) => Math.max(most, outer.r), 0)
    for (let slice = 0; slice < NOZZLE_SLICES; slice += 1) {
      const at = (part: number): number => rear.outer.x + ((lip.outer.x - rear.outer.x) * part) / NOZZLE_SLICES
      cover([...round(at(slice), widest), ...round(at(slice + 1), widest)])
    }
  }
  if (model.ring !== null) {
    const { core } = model.ring
    const [from, to] = [Math.min(...core.map(({ x }) => x)), Math.max(...core.map(({ x }) => x))]
    const widest = Math.max(...core.map(({ r }) => r))
    cover([...round(from, widest * 0.8), ...round(model.ring.x, widest), ...round(to, widest * 0.8)])
  }
  return boxes
}
