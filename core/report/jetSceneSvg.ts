/**
 * The starting jet as a flat section in SVG at one time: for exports and reports, and for windows that cannot draw in three dimensions.
 */
import { at } from '../base'
import { formatQuantity, fromBase, toBase } from '../quantity'
import type { Pixel } from './boxes'
import { drawingColours, type DrawingColours } from './colours'
import { describeJet } from './jetScene'
import type { JetSceneModel } from './jetSceneTypes'
import { AGE_STEPS, ageColour, emptyLine, layLine, oldestAge, sheetRuns } from './jetSheet'
import type { DrawingSize } from './plotSvg'
import type { ScenePoint } from './sceneTypes'
import { coordinate, escapeXml, FONT_FAMILY, pathThrough, svgText } from './svgText'
import { niceTicks, tickLabel, tickStep } from './ticks'

const ROOM = { x: 26, top: 48, bottom: 54 }
const FONT = 12
const KEY = { width: 140, height: 9 }
/** Width of the sheet's line. */
const SHEET_WIDTH = 1.8
/** Distance between drawn points of the sheet, in pixels. */
const FINEST = 2.5

interface Drawing {
  readonly map: (point: ScenePoint) => Pixel
  readonly scale: number
  readonly width: number
  readonly height: number
  readonly dark: boolean
  readonly colours: DrawingColours
}

/** The section at shape number `index`: x to the right, both halves. */
export function jetSceneToSvg(model: JetSceneModel, index: number, size: DrawingSize): string {
  const width = Math.max(240, size.width)
  const height = Math.max(180, size.height)
  const { xMin, xMax, rMax } = model.extent
  const scale = Math.min((width - 2 * ROOM.x) / (xMax - xMin), (height - ROOM.top - ROOM.bottom) / (2 * rMax))
  const left = (width - scale * (xMax - xMin)) / 2
  const middle = ROOM.top + (height - ROOM.top - ROOM.bottom) / 2
  const drawing: Drawing = {
    map: ({ x, r }) => ({ x: left + (x - xMin) * scale, y: middle - r * scale }),
    scale,
    width,
    height,
    dark: size.theme === 'dark',
    colours: drawingColours(size.theme),
  }
  const { colours } = drawing
  const held = Math.min(model.shapes.length - 1, Math.max(0, index))
  const id = 'jet-drawing'
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${coordinate(width)}" height="${coordinate(height)}" `,
    `viewBox="0 0 ${coordinate(width)} ${coordinate(height)}" role="img" aria-labelledby="${id}-title ${id}-desc" font-family="${escapeXml(FONT_FAMILY)}">`,
    `<title id="${id}-title">Starting jet in section, to scale</title>`,
    `<desc id="${id}-desc">${escapeXml([describeJet(model, held), ...model.conventions].join(' '))}</desc>`,
    `<rect width="${coordinate(width)}" height="${coordinate(height)}" fill="${colours.ground}"/>`,
    ...ringRegion(model, held, drawing),
    ...axisLine(model, drawing),
    ...wall(model, drawing),
    ...sheet(model, held, drawing),
    ...ringMarks(model, held, drawing),
    ...lengthAxis(model, drawing),
    ...ageKey(model, held, drawing),
    ...stamp(model, held, drawing),
    '</svg>\n',
  ].join('')
}

function line(points: readonly Pixel[], colour: string, width: number, dash = ''): string {
  const dashes = dash === '' ? '' : ` stroke-dasharray="${dash}"`
  return `<path d="${pathThrough(points)}" stroke="${colour}" stroke-width="${width}" stroke-linecap="round" stroke-linejoin="round"${dashes} fill="none"/>`
}

/** What lies beyond the cut, shaded, with its edge and its name. */
function ringRegion(model: JetSceneModel, index: number, { map, colours }: Drawing): string[] {
  const cutX = model.shapes[index]?.cutX ?? null
  if (cutX === null) return []
  const { xMax, rMax } = model.extent
  const [a, b] = [map({ x: cutX, r: rMax }), map({ x: xMax, r: -rMax })]
  return [
    `<rect x="${coordinate(a.x)}" y="${coordinate(a.y)}" width="${coordinate(b.x - a.x)}" height="${coordinate(b.y - a.y)}" fill="${colours.accent}" fill-opacity="0.08"/>`,
    line([a, { x: a.x, y: b.y }], colours.accent, 1.2, '5 4'),
    svgText('ring, beyond the cut', a.x + 6, a.y - 6, { size: FONT, colour: colours.ink }),
  ]
}

function axisLine({ extent }: JetSceneModel, { map, colours }: Drawing): string[] {
  return [line([map({ x: extent.xMin, r: 0 }), map({ x: extent.xMax, r: 0 })], colours.muted, 0.8, '14 4 2 4')]
}

function wall(model: JetSceneModel, { map, colours }: Drawing): string[] {
  const { nozzle } = model
  const inner = nozzle.stations.map((station) => station.inner)
  const outer = nozzle.stations.map((station) => station.outer).reverse()
  const halves = [1, -1].map((side) => {
    const points = [...inner, ...outer].map(({ x, r }) => map({ x, r: side * r }))
    return `<path d="${pathThrough(points)}Z" fill="${colours.nozzle}" stroke="${colours.ink}" stroke-width="1" stroke-linejoin="round"/>`
  })
  const name = map({ x: -nozzle.length, r: nozzle.diameter / 2 + nozzle.wall })
  return [...halves, svgText(`tube, ${model.diameterText}`, name.x, name.y - 6, { size: FONT, colour: colours.muted })]
}

function sheet(model: JetSceneModel, index: number, { map, scale, dark, colours }: Drawing): string[] {
  const shape = model.shapes[index]
  if (shape === undefined) return []
  const sheetLine = emptyLine()
  layLine(sheetLine, shape, FINEST / scale)
  const parts: string[] = []
  for (const side of [1, -1]) {
    for (let i = 0; i < shape.looseCount; i += 1) {
      const { x, y } = map({ x: at(shape.x, i), r: side * at(shape.r, i) })
      parts.push(`<circle cx="${coordinate(x)}" cy="${coordinate(y)}" r="1.1" fill="${colours.muted}"/>`)
    }
    for (const { first, last, step, counter } of sheetRuns(sheetLine)) {
      const points = Array.from({ length: last - first + 1 }, (_, k) =>
        map({ x: at(sheetLine.x, first + k), r: side * at(sheetLine.r, first + k) }),
      )
      parts.push(line(points, ageColour(step, dark), SHEET_WIDTH, counter ? '1 3' : ''))
    }
  }
  return parts
}

/** Crosses where the ring's circulation is. */
function ringMarks(model: JetSceneModel, index: number, { map, colours }: Drawing): string[] {
  const ring = model.rings[index] ?? null
  if (ring === null) return []
  return [1, -1].map((side) => {
    const { x, y } = map({ x: ring.x, r: side * ring.radius })
    return `<path d="M${coordinate(x - 5)} ${coordinate(y)}h10M${coordinate(x)} ${coordinate(y - 5)}v10" stroke="${colours.ink}" stroke-width="1.4" fill="none"/>`
  })
}

/** x in the chosen unit along the foot of the drawing. */
function lengthAxis({ extent, units }: JetSceneModel, { map, scale, height, colours }: Drawing): string[] {
  const unit = units.length
  const y = Math.min(height - 32, map({ x: 0, r: -extent.rMax }).y + 12)
  const [from, to] = [fromBase(extent.xMin, unit), fromBase(extent.xMax, unit)]
  const count = Math.max(2, Math.floor(((extent.xMax - extent.xMin) * scale) / 70))
  const step = tickStep(to - from, count)
  const place = (value: number): number => map({ x: toBase(value, unit), r: 0 }).x
  const ticks = niceTicks(from, to, count).flatMap((value) => [
    line(
      [
        { x: place(value), y },
        { x: place(value), y: y + 4 },
      ],
      colours.ink,
      1,
    ),
    svgText(tickLabel(value, step), place(value), y + 17, { size: FONT, colour: colours.muted, anchor: 'middle' }),
  ])
  const [a, b] = [map({ x: extent.xMin, r: 0 }).x, map({ x: extent.xMax, r: 0 }).x]
  const title = svgText(`x (${unit})`, b, y + 30, { size: FONT, colour: colours.muted, anchor: 'end' })
  return [
    line(
      [
        { x: a, y },
        { x: b, y },
      ],
      colours.ink,
      1,
    ),
    ...ticks,
    title,
  ]
}

function ageKey(model: JetSceneModel, index: number, { dark, colours }: Drawing): string[] {
  const shape = model.shapes[index]
  if (shape === undefined) return []
  const [left, top, step] = [14, 12, KEY.width / AGE_STEPS]
  const patches = Array.from(
    { length: AGE_STEPS },
    (_, k) =>
      `<rect x="${coordinate(left + 64 + k * step)}" y="${top}" width="${coordinate(step + 0.3)}" height="${KEY.height}" fill="${ageColour(k, dark)}"/>`,
  )
  const words = { size: FONT, colour: colours.muted }
  return [
    svgText('just shed', left, top + KEY.height, words),
    ...patches,
    svgText(
      `${formatQuantity(oldestAge(shape), model.units.time, 3)} old`,
      left + 64 + KEY.width + 8,
      top + KEY.height,
      words,
    ),
  ]
}

function stamp(model: JetSceneModel, index: number, { width, colours }: Drawing): string[] {
  const shape = model.shapes[index]
  if (shape === undefined) return []
  const text = `t = ${formatQuantity(shape.time, model.units.time)}, formation time ${shape.formationTime.toFixed(2)}`
  return [svgText(text, width - 14, 21, { size: FONT, colour: colours.ink, anchor: 'end' })]
}
