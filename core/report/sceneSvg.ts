/**
 * The drawing of one pulse as a flat side view in SVG: for exports and reports, and for windows that cannot draw in three dimensions.
 */
import type { Pixel } from './boxes'
import { drawingColours, type DrawingColours } from './colours'
import type { DrawingSize } from './plotSvg'
import { both, flatLabels, mirrored, type Map } from './sceneSvgLabels'
import type { PulseSceneModel, SceneBar, ScenePoint, SceneRing } from './sceneTypes'
import { swirlArc } from './swirlArc'
import { coordinate, escapeXml, FONT_FAMILY, pathThrough } from './svgText'

/** Room around the drawing for labels, in pixels. */
const MARGIN = { x: 34, y: 30 }

/** Write the drawing as one SVG document, seen from the side with the near half of the nozzle cut away. */
export function sceneToSvg(model: PulseSceneModel, size: DrawingSize): string {
  const width = Math.max(200, size.width)
  const height = Math.max(140, size.height)
  const colours = drawingColours(size.theme)
  const map = mapping(model, width, height)
  const shapes = [
    ...nozzleShapes(model, map, colours),
    ...slugShapes(model, map, colours),
    ...jetShapes(model, map, colours),
    ...(model.ring === null ? [] : ringShapes(model.ring, map, colours)),
    ...(model.ghost === null
      ? []
      : outlineShapes(model.ghost.core, map, `stroke="${colours.muted}" stroke-width="1" stroke-dasharray="1.5 2.5"`)),
    axisLine(model, map, colours),
    ...arrowShapes(model, map, colours),
    ...[model.scaleBar, ...model.callouts.filter(({ ends }) => ends === 'ticks')].map((bar) =>
      dimensionLine(bar, map, colours),
    ),
    ...model.callouts
      .filter(({ ends }) => ends === 'arrow')
      .map((bar) => arrow(straight(bar.from, bar.to, map), colours.ink)),
  ]
  const id = 'pulse-drawing'
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${coordinate(width)}" height="${coordinate(height)}" `,
    `viewBox="0 0 ${coordinate(width)} ${coordinate(height)}" role="img" aria-labelledby="${id}-title ${id}-desc" font-family="${escapeXml(FONT_FAMILY)}">`,
    `<title id="${id}-title">Nozzle, slug and ring to scale</title>`,
    `<desc id="${id}-desc">${escapeXml([model.description, ...model.conventions].join(' '))}</desc>`,
    `<rect width="${coordinate(width)}" height="${coordinate(height)}" fill="${colours.ground}"/>`,
    ...shapes,
    ...flatLabels(model, map, { width, height }, colours),
    '</svg>\n',
  ].join('')
}

function mapping(model: PulseSceneModel, width: number, height: number): Map {
  const { xMin, xMax, rMax } = model.extent
  const scale = Math.min((width - 2 * MARGIN.x) / (xMax - xMin), (height - 2 * MARGIN.y) / (2 * rMax))
  const left = (width - scale * (xMax - xMin)) / 2
  return ({ x, r }) => ({ x: left + (x - xMin) * scale, y: height / 2 - r * scale })
}

function nozzleShapes(model: PulseSceneModel, map: Map, colours: DrawingColours): string[] {
  const inner = model.nozzle.stations.map((station) => station.inner)
  const outer = model.nozzle.stations.map((station) => station.outer)
  const bore = [...inner, ...mirrored(inner).reverse()]
  const fill = `<path d="${pathThrough(bore.map(map))}Z" fill="${colours.nozzle}" fill-opacity="0.35"/>`
  const walls = both([...inner, ...[...outer].reverse()]).map(
    (wall) =>
      `<path d="${pathThrough(wall.map(map))}Z" fill="${colours.nozzle}" stroke="${colours.ink}" stroke-width="1" stroke-linejoin="round"/>`,
  )
  return [fill, ...walls]
}

function slugShapes(model: PulseSceneModel, map: Map, colours: DrawingColours): string[] {
  const { outline } = model.slug
  const closed = [...outline, ...mirrored(outline).reverse()]
  return [
    `<path d="${pathThrough(closed.map(map))}Z" fill="${colours.accent}" fill-opacity="0.16" stroke="${colours.accent}" stroke-width="1" stroke-opacity="0.7"/>`,
  ]
}

function jetShapes(model: PulseSceneModel, map: Map, colours: DrawingColours): string[] {
  const jet = model.trailingJet
  if (jet === null) return []
  const r = jet.diameter / 2
  const corners = [
    { x: 0, r },
    { x: jet.length, r },
    { x: jet.length, r: -r },
    { x: 0, r: -r },
  ]
  return [
    `<path d="${pathThrough(corners.map(map))}Z" fill="${colours.accent}" fill-opacity="0.12" stroke="${colours.accent}" stroke-width="1" stroke-dasharray="3 3"/>`,
  ]
}

function ringShapes(ring: SceneRing, map: Map, colours: DrawingColours): string[] {
  const solid = `fill="${colours.accent}" stroke="${colours.ink}" stroke-width="1"`
  const dashed = `stroke="${colours.muted}" stroke-width="1" stroke-dasharray="5 4"`
  const body = [...both(ring.core)].map((core) => `<path d="${pathThrough(core.map(map))}Z" ${solid}/>`)
  return [...outlineShapes(ring.carried, map, dashed), ...body]
}

function outlineShapes(points: readonly ScenePoint[], map: Map, style: string): string[] {
  return offAxisRuns(points).flatMap((run) =>
    both(run).map((part) => `<path d="${pathThrough(part.map(map))}" ${style} fill="none"/>`),
  )
}

/** A closed outline without the part that lies on the axis, which is no edge of the body. */
export function offAxisRuns(points: readonly ScenePoint[]): readonly (readonly ScenePoint[])[] {
  const first = points[0]
  if (first === undefined) return []
  const size = points.reduce((most, { r }) => Math.max(most, r), 0)
  const onAxis = (point: ScenePoint): boolean => point.r < size * 1e-6
  if (!points.some(onAxis)) return [[...points, first]]
  const start = points.findIndex(
    (point, index) => onAxis(point) && !onAxis(points[(index + 1) % points.length] ?? point),
  )
  if (start < 0) return []
  const turned = [...points.slice(start), ...points.slice(0, start + 1)]
  const runs: ScenePoint[][] = []
  let run: ScenePoint[] = []
  turned.forEach((point, index) => {
    const before = turned[index - 1]
    if (before !== undefined && onAxis(before) && onAxis(point)) {
      if (run.length > 1) runs.push(run)
      run = []
    }
    run.push(point)
  })
  if (run.length > 1) runs.push(run)
  return runs
}

function axisLine(model: PulseSceneModel, map: Map, colours: DrawingColours): string {
  const ends = [model.extent.xMin, model.extent.xMax].map((x) => map({ x, r: 0 }))
  return `<path d="${pathThrough(ends)}" stroke="${colours.ink}" stroke-width="0.8" stroke-dasharray="14 4 2 4" fill="none"/>`
}

function arrowShapes(model: PulseSceneModel, map: Map, colours: DrawingColours): string[] {
  const swirl = model.ring === null ? [] : swirlArrows(model.ring, map, colours)
  if (model.speed === null) return swirl
  return [...swirl, arrow(straight({ x: model.speed.from, r: 0 }, { x: model.speed.to, r: 0 }, map), colours.accent)]
}

const HEAD = 11

/** A level line that leaves room for its head. */
function straight(from: ScenePoint, to: ScenePoint, map: Map): Pixel[] {
  const [a, b] = [map(from), map(to)]
  return [a, { x: Math.max(a.x + 1, b.x - HEAD), y: b.y }]
}

/** A line with a filled head beyond its end. */
function arrow(line: readonly Pixel[], colour: string): string {
  const [tip, before] = [line.at(-1), line.at(-2)]
  if (tip === undefined || before === undefined) return ''
  const length = Math.max(1e-9, Math.hypot(tip.x - before.x, tip.y - before.y))
  const along = { x: (tip.x - before.x) / length, y: (tip.y - before.y) / length }
  const end = { x: tip.x + along.x * HEAD, y: tip.y + along.y * HEAD }
  const side = { x: -along.y * HEAD * 0.32, y: along.x * HEAD * 0.32 }
  const corners = [end, { x: tip.x + side.x, y: tip.y + side.y }, { x: tip.x - side.x, y: tip.y - side.y }]
  return (
    `<path d="${pathThrough(line)}" stroke="${colour}" stroke-width="1.4" fill="none"/>` +
    `<path d="${pathThrough(corners)}Z" fill="${colour}"/>`
  )
}

function swirlArrows(ring: SceneRing, map: Map, colours: DrawingColours): string[] {
  const pixel = 1 / Math.abs(map({ x: 1, r: 0 }).x - map({ x: 0, r: 0 }).x)
  return both(swirlArc(ring, Math.max(6 * pixel, 13 * pixel - ring.meanCoreRadius))).map((arc) =>
    arrow(arc.map(map), colours.ink),
  )
}

function dimensionLine(bar: SceneBar, map: Map, colours: DrawingColours): string {
  const [a, b] = [map(bar.from), map(bar.to)]
  const length = Math.max(1e-9, Math.hypot(b.x - a.x, b.y - a.y))
  const across = { x: (-(b.y - a.y) / length) * 4, y: ((b.x - a.x) / length) * 4 }
  const tick = (p: Pixel): string =>
    pathThrough([
      { x: p.x - across.x, y: p.y - across.y },
      { x: p.x + across.x, y: p.y + across.y },
    ])
  return `<path d="${pathThrough([a, b])}${tick(a)}${tick(b)}" stroke="${colours.ink}" stroke-width="1" fill="none"/>`
}
