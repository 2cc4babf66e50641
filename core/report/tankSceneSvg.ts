/**
 * The drawing of a tank run as SVG: one writer for the page, the export and the run sheet.
 */
import type { Box, Pixel } from './boxes'
import type { DrawingColours } from './colours'
import type { ScenePoint } from './sceneTypes'
import { coordinate, escapeXml, FONT_FAMILY, pathThrough, svgText } from './svgText'
import { TANK_FONT, tankLayout, tankWords, titlePlace, type TankLayout } from './tankSceneLayout'
import { textWidth } from './textWidth'
import type { TankDimension, TankExtentName, TankSceneModel, TankView } from './tankSceneTypes'

export interface TankDrawingOptions {
  /** Pixels. */
  readonly width: number
  readonly height: number
  readonly colours: DrawingColours
  /** The whole tank, or only where the ring runs. */
  readonly part: TankExtentName
  /** Start of the identifiers, one for each drawing on a page. */
  readonly id: string
}

type Map = (point: ScenePoint) => Pixel

/** Smallest core drawn [pixels]. */
const LEAST_CORE = 1.6

export function tankSceneToSvg(model: TankSceneModel, options: TankDrawingOptions): string {
  const { colours, part, id } = options
  const width = Math.max(240, options.width)
  const height = Math.max(180, options.height)
  const layout = tankLayout(model, part, width, height)
  const tones = { ink: colours.ink, muted: colours.muted, limit: colours.limit }
  const words = tankWords(model, part, layout).map(({ text, tone, place }) =>
    svgText(text, place.left, place.top + place.height * 0.76, {
      size: TANK_FONT,
      colour: tones[tone],
      halo: colours.ground,
    }),
  )
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${coordinate(width)}" height="${coordinate(height)}" `,
    `viewBox="0 0 ${coordinate(width)} ${coordinate(height)}" role="img" aria-labelledby="${id}-title ${id}-desc" font-family="${escapeXml(FONT_FAMILY)}">`,
    `<title id="${id}-title">Tank, ring and camera to scale</title>`,
    `<desc id="${id}-desc">${escapeXml([model.description, ...model.conventions].join(' '))}</desc>`,
    `<rect width="${coordinate(width)}" height="${coordinate(height)}" fill="${colours.ground}"/>`,
    ...model.views.flatMap((view, index) => viewShapes(model, view, index === 0 ? 0 : 1, part, layout, colours)),
    ...stationMarks(layout, colours),
    ...foot(model, part, layout, colours),
    ...words,
    '</svg>\n',
  ].join('')
}

function viewShapes(
  model: TankSceneModel,
  view: TankView,
  index: 0 | 1,
  part: TankExtentName,
  layout: TankLayout,
  colours: DrawingColours,
): string[] {
  const map = layout.maps[index]
  const frame = layout.frames[index]
  const title = titlePlace(view.title, frame)
  return [
    rectangle(frame, `fill="${colours.accent}" fill-opacity="0.06"`),
    ...wallShapes(model, view, frame, map, colours),
    ...fieldShapes(view, frame, map, layout.scale, colours),
    ...pathShapes(model, map, colours),
    line([map({ x: model.extents[part].xMin, r: 0 }), map({ x: model.extents[part].xMax, r: 0 })], colours.muted, {
      dash: '10 3 2 3',
      width: 0.8,
    }),
    ...ringShapes(model, map, layout.scale, colours),
    ...nozzleShapes(model, frame, map, colours),
    ...(part === 'whole' ? view.clearances.map((bar) => dimensionLine(bar, map, colours)) : []),
    ...(part === 'whole' ? sizeMarks(view.size, frame, map, colours) : []),
    svgText(view.title, frame.left - 12, title.top + title.height, {
      size: TANK_FONT,
      colour: colours.muted,
      vertical: true,
    }),
  ]
}

/** Half the length of words that run upward. */
function turnedHalf(text: string): number {
  return textWidth(text, TANK_FONT) / 2
}

function wallShapes(
  model: TankSceneModel,
  { walls }: TankView,
  frame: Box,
  map: Map,
  colours: DrawingColours,
): string[] {
  const right = frame.left + frame.width
  const bottom = frame.top + frame.height
  const inside = (y: number): boolean => y > frame.top - 1 && y < bottom + 1
  const shapes = walls.flatMap(({ kind, r }) => {
    const { y } = map({ x: 0, r })
    if (!inside(y)) return []
    const across = [
      { x: frame.left, y },
      { x: right, y },
    ]
    return kind === 'wall' ? [line(across, colours.ink, { width: 2.4 })] : surface(across, colours)
  })
  const end = model.end === null ? null : map({ x: model.end, r: 0 }).x
  const closed = end !== null && end <= right + 1
  if (closed)
    shapes.push(
      line(
        [
          { x: end, y: frame.top - 1 },
          { x: end, y: bottom + 1 },
        ],
        colours.ink,
        { width: 2.4 },
      ),
    )
  else shapes.push(breakLine(right, frame, colours))
  shapes.push(breakLine(frame.left, frame, colours))
  return shapes
}

/** The water's surface with the mark of a level. */
function surface(across: readonly Pixel[], colours: DrawingColours): string[] {
  const [a, b] = [across[0], across.at(-1)]
  if (a === undefined || b === undefined) return []
  const x = a.x + 14
  const mark = [
    { x: x - 5, y: a.y - 8 },
    { x: x + 5, y: a.y - 8 },
    { x, y: a.y - 1 },
  ]
  const under = [3, 6].map((down, i) =>
    line(
      [
        { x: x - 5 + 2 * i, y: a.y + down },
        { x: x + 5 - 2 * i, y: a.y + down },
      ],
      colours.accent,
      { width: 1 },
    ),
  )
  return [
    line(across, colours.accent, { width: 1.4 }),
    `<path d="${pathThrough(mark)}Z" fill="none" stroke="${colours.accent}" stroke-width="1"/>`,
    ...under,
  ]
}

/** The tank goes on beyond this edge. */
function breakLine(x: number, { top, height }: Box, colours: DrawingColours): string {
  const middle = top + height / 2
  const points = [
    { x, y: top - 3 },
    { x, y: middle - 8 },
    { x: x - 4, y: middle - 3 },
    { x: x + 4, y: middle + 3 },
    { x, y: middle + 8 },
    { x, y: top + height + 3 },
  ]
  return line(points, colours.edge, { width: 0.8 })
}

function fieldShapes(
  { field, camera }: TankView,
  frame: Box,
  map: Map,
  scale: number,
  colours: DrawingColours,
): string[] {
  if (field === null) return []
  const seen = `fill="${colours.accent}" fill-opacity="0.1" stroke="${colours.accent}" stroke-width="1.2" stroke-dasharray="7 3"`
  const [a, b] = [map({ x: field.xMin, r: field.half }), map({ x: field.xMax, r: -field.half })]
  const top = Math.max(frame.top, a.y)
  const low = Math.min(frame.top + frame.height, b.y)
  if (field.half > 0) return [rectangle({ left: a.x, top, width: b.x - a.x, height: low - top }, seen)]
  const thick = Math.max(3, (field.thickness ?? 0) * scale)
  const sheet = rectangle(
    { left: a.x, top: a.y - thick / 2, width: b.x - a.x, height: thick },
    `fill="${colours.accent}" fill-opacity="0.45"`,
  )
  if (camera === null) return [sheet]
  const lens = map(camera.at)
  const foot = Math.min(lens.y, frame.top + frame.height + 6)
  const share = (foot - a.y) / Math.max(1e-9, lens.y - a.y)
  const rays = camera.sees.map((x) => {
    const from = map({ x, r: 0 })
    return line([from, { x: from.x + (lens.x - from.x) * share, y: foot }], colours.muted, { width: 1, dash: '3 3' })
  })
  const body = { left: lens.x - 7, top: foot + 5, width: 14, height: 9 }
  const hood = [
    { x: lens.x - 4, y: foot },
    { x: lens.x + 4, y: foot },
    { x: lens.x + 2, y: foot + 5 },
    { x: lens.x - 2, y: foot + 5 },
  ]
  return [
    ...rays,
    sheet,
    rectangle(body, `fill="${colours.ground}" stroke="${colours.ink}" stroke-width="1.2"`),
    `<path d="${pathThrough(hood)}Z" fill="${colours.ink}"/>`,
  ]
}

/** The way of the core above and below the axis: from the adopted ring's radius out to the widest of the range. */
function pathShapes({ path }: TankSceneModel, map: Map, colours: DrawingColours): string[] {
  if (path === null || path.x.length < 2) return []
  return [1, -1].flatMap((sign) => {
    const edge = (radius: readonly number[]): Pixel[] => path.x.map((x, i) => map({ x, r: sign * (radius[i] ?? 0) }))
    const inner = edge(path.radius)
    return [
      `<path d="${pathThrough([...inner, ...edge(path.radiusHigh).reverse()])}Z" fill="${colours.accent}" fill-opacity="0.3"/>`,
      line(inner, colours.accent, { width: 1.1 }),
    ]
  })
}

function ringShapes({ stations }: TankSceneModel, map: Map, scale: number, colours: DrawingColours): string[] {
  return stations.flatMap(({ x, ring, spread }, i) => {
    const foot = map({ x, r: 0 })
    const tick = line(
      [
        { x: foot.x, y: foot.y - 4 },
        { x: foot.x, y: foot.y + 4 },
      ],
      colours.ink,
      { width: 1 },
    )
    if (ring === null) return [tick]
    const size = coordinate(Math.max(LEAST_CORE, ring.coreRadius * scale))
    const [top, bottom] = [map({ x, r: ring.radius }), map({ x, r: -ring.radius })]
    const cores = [top, bottom].map(
      (at) =>
        `<circle cx="${coordinate(at.x)}" cy="${coordinate(at.y)}" r="${size}" fill="${colours.accent}" stroke="${colours.ink}" stroke-width="0.8"/>`,
    )
    return [line([top, bottom], colours.accent, { width: 1.4 }), tick, ...spreadMark(spread, i, map, colours), ...cores]
  })
}

/** Where the ring may be at the adopted time; neighbours stand a little apart. */
function spreadMark(
  spread: readonly [number, number] | null,
  index: number,
  map: Map,
  colours: DrawingColours,
): string[] {
  if (spread === null) return []
  const [a, b] = spread.map((x) => map({ x, r: 0 }))
  if (a === undefined || b === undefined || b.x - a.x < 2) return []
  const y = a.y + (index % 2 === 0 ? 0 : 4)
  const cap = (x: number): Pixel[] => [
    { x, y: y - 4 },
    { x, y: y + 4 },
  ]
  return [
    [
      { x: a.x, y },
      { x: b.x, y },
    ],
    cap(a.x),
    cap(b.x),
  ].map((points) => line(points, colours.accent, { width: 1.8 }))
}

function nozzleShapes({ nozzle }: TankSceneModel, frame: Box, map: Map, colours: DrawingColours): string[] {
  const held = ({ x, y }: Pixel): Pixel => ({ x, y: Math.min(frame.top + frame.height, Math.max(frame.top, y)) })
  const points = (pick: 'inner' | 'outer', sign: 1 | -1): Pixel[] =>
    nozzle.map((part) => held(map({ x: part[pick].x, r: sign * part[pick].r })))
  const bore = [...points('inner', 1), ...points('inner', -1).reverse()]
  return [
    `<path d="${pathThrough(bore)}Z" fill="${colours.nozzle}" fill-opacity="0.4"/>`,
    ...([1, -1] as const).map(
      (sign) =>
        `<path d="${pathThrough([...points('inner', sign), ...points('outer', sign).reverse()])}Z" fill="${colours.nozzle}" stroke="${colours.ink}" stroke-width="1" stroke-linejoin="round"/>`,
    ),
  ]
}

/** Station words with their leaders down to the axis of the view from the side. */
function stationMarks({ stations, maps }: TankLayout, colours: DrawingColours): string[] {
  return stations.flatMap(({ x, text, place }) => {
    const foot = maps[1]({ x, r: 0 })
    return [
      line([{ x: foot.x, y: place.top + place.height - 1 }, foot], colours.muted, { width: 0.8, dash: '2 2' }),
      svgText(text, place.left, place.top + place.height * 0.76, { size: TANK_FONT, colour: colours.ink }),
    ]
  })
}

/** Whole width or depth of a view, right of it. */
function sizeMarks(size: TankDimension | null, frame: Box, map: Map, colours: DrawingColours): string[] {
  if (size === null) return []
  const x = frame.left + frame.width + 14
  const [a, b] = [map(size.from).y, map(size.to).y]
  return [
    bar({ x, y: a }, { x, y: b }, colours.ink),
    svgText(size.label, x + 15, (a + b) / 2 + turnedHalf(size.label), {
      size: TANK_FONT,
      colour: colours.ink,
      vertical: true,
    }),
  ]
}

/** Under the views: the tank's length, or a bar to measure by. */
function foot(model: TankSceneModel, part: TankExtentName, layout: TankLayout, colours: DrawingColours): string[] {
  const frame = layout.frames[1]
  const y = frame.top + frame.height + 24
  const map = layout.maps[1]
  const from = map({ x: 0, r: 0 }).x
  const whole = part === 'whole' && model.length !== null
  const to = whole ? map(model.length.to).x : from + model.scaleBar.length * layout.scale
  const label = whole ? model.length.label : model.scaleBar.label
  return [
    bar({ x: from, y }, { x: to, y }, whole ? colours.ink : colours.muted),
    svgText(label, (from + to) / 2, y - 5, {
      size: TANK_FONT,
      colour: whole ? colours.ink : colours.muted,
      anchor: 'middle',
    }),
  ]
}

function dimensionLine({ from, to, warn }: TankDimension, map: Map, colours: DrawingColours): string {
  return bar(map(from), map(to), warn ? colours.limit : colours.ink)
}

function bar(a: Pixel, b: Pixel, colour: string): string {
  const length = Math.max(1e-9, Math.hypot(b.x - a.x, b.y - a.y))
  const across = { x: (-(b.y - a.y) / length) * 4, y: ((b.x - a.x) / length) * 4 }
  const tick = (p: Pixel): string =>
    pathThrough([
      { x: p.x - across.x, y: p.y - across.y },
      { x: p.x + across.x, y: p.y + across.y },
    ])
  return `<path d="${pathThrough([a, b])}${tick(a)}${tick(b)}" stroke="${colour}" stroke-width="1" fill="none"/>`
}

function line(
  points: readonly Pixel[],
  colour: string,
  style: { readonly width: number; readonly dash?: string },
): string {
  const dash = style.dash === undefined ? '' : ` stroke-dasharray="${style.dash}"`
  return `<path d="${pathThrough(points)}" stroke="${colour}" stroke-width="${style.width}"${dash} fill="none"/>`
}

function rectangle({ left, top, width, height }: Box, style: string): string {
  return `<rect x="${coordinate(left)}" y="${coordinate(top)}" width="${coordinate(Math.max(0, width))}" height="${coordinate(Math.max(0, height))}" ${style}/>`
}
