/**
 * The map of a thruster as SVG: for exports and reports, with its colours, hatches and marks readable in grey.
 */
import { drawingColours, type DrawingColours } from './colours'
import type { Paint } from './fieldColours'
import type { DrawingSize } from './plotSvg'
import { coordinate, escapeXml, FONT_FAMILY, svgText } from './svgText'
import { textWidth } from './textWidth'
import { describeThrustMap, type ThrustMapModel } from './thrustMap'
import { thrustMapDrawing, type MapDrawing, type MapText } from './thrustMapDrawing'
import { MARK_RADIUS } from './thrustMapMarks'

/** Black or white, whichever is read better on a paint. */
export function inkOn(paint: Paint): string {
  const [red, green, blue] = paint.map((part) =>
    part / 255 <= 0.03928 ? part / 255 / 12.92 : ((part / 255 + 0.055) / 1.055) ** 2.4,
  )
  // Where contrast against white and against black are equal.
  return 0.2126 * (red ?? 0) + 0.7152 * (green ?? 0) + 0.0722 * (blue ?? 0) > 0.179 ? '#000000' : '#FFFFFF'
}

export function paintText(paint: Paint): string {
  return `rgb(${paint.join(',')})`
}

const HEADING = 26

/** Write the map as one SVG document. */
export function thrustMapToSvg(model: ThrustMapModel, size: DrawingSize): string {
  const width = Math.max(240, size.width)
  const height = Math.max(200, size.height)
  const font = 12
  const colours = drawingColours(size.theme)
  const drawing = thrustMapDrawing(model, {
    width,
    height: height - HEADING,
    font,
    measure: (text) => textWidth(text, font),
  })
  const heading = `${model.title}, ${model.scope}`
  const title = escapeXml(heading)
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${coordinate(width)}" height="${coordinate(height)}" `,
    `viewBox="0 0 ${coordinate(width)} ${coordinate(height)}" role="img" aria-labelledby="thrust-map-title thrust-map-desc" `,
    `font-family="${escapeXml(FONT_FAMILY)}" style="font-variant-numeric:tabular-nums">`,
    `<title id="thrust-map-title">${title}</title><desc id="thrust-map-desc">${escapeXml(describeThrustMap(model))}</desc>`,
    `<rect width="${coordinate(width)}" height="${coordinate(height)}" fill="${colours.ground}"/>`,
    svgText(heading, 10, 18, { size: font + 1, colour: colours.ink, weight: 600 }),
    `<g transform="translate(0 ${HEADING})">`,
    ...field(drawing, colours),
    ...drawing.texts.map((text) => label(text, font, colours)),
    ...drawing.marks.map((mark) => tieOf(mark, colours)),
    ...drawing.marks.map((mark) => markOf(mark, font, colours)),
    '</g></svg>\n',
  ].join('')
}

function field(
  { frame, bands, veil, weak, contours, edges, strips, ticks, scale }: MapDrawing,
  colours: DrawingColours,
): string[] {
  const box = `x="${coordinate(frame.left)}" y="${coordinate(frame.top)}" width="${coordinate(frame.width)}" height="${coordinate(frame.height)}"`
  return [
    `<clipPath id="thrust-map-frame"><rect ${box}/></clipPath><g clip-path="url(#thrust-map-frame)">`,
    ...bands.map(({ d, paint }) => `<path d="${d}" fill="${paintText(paint)}" fill-rule="evenodd"/>`),
    veil === '' ? '' : `<path d="${veil}" fill="${colours.ground}" fill-opacity="0.62" fill-rule="evenodd"/>`,
    weak === '' ? '' : `<path d="${weak}" fill="${colours.ground}" fill-opacity="0.62" fill-rule="evenodd"/>`,
    ...contours.map(
      ({ d, paint }) => `<path d="${d}" fill="none" stroke="${inkOn(paint)}" stroke-opacity="0.7" stroke-width="0.9"/>`,
    ),
    ...strips.map(
      ({ d, box: strip }) =>
        `<path d="${d}" fill="none" stroke="${colours.ink}" stroke-width="1" stroke-dasharray="2 4"/><rect x="${coordinate(strip.left)}" y="${coordinate(strip.top)}" width="${coordinate(strip.width)}" height="${coordinate(strip.height)}" fill="${colours.limit}"/>`,
    ),
    ...edges.map(
      ({ d, hatch }) =>
        `<path d="${d}" fill="none" stroke="${colours.ground}" stroke-width="4"/><path d="${d}${hatch}" fill="none" stroke="${colours.limit}" stroke-width="1.6" stroke-linejoin="round"/>`,
    ),
    '</g>',
    `<rect ${box} fill="none" stroke="${colours.edge}"/>`,
    ...scale.steps.map(
      (step) =>
        `<rect x="${coordinate(step.left)}" y="${coordinate(step.top)}" width="${coordinate(step.width)}" height="${coordinate(step.height)}" fill="${paintText(step.paint)}"/>`,
    ),
    `<path d="${ticks}${scale.ticks}" stroke="${colours.edge}" fill="none"/>`,
  ]
}

function label({ text, x, y, anchor, wears, plate }: MapText, font: number, colours: DrawingColours): string {
  const colour =
    wears === 'limit'
      ? colours.limit
      : wears === 'plate' && plate !== null && plate.paint !== null
        ? inkOn(plate.paint)
        : colours.muted
  const under =
    plate === null
      ? ''
      : `<rect x="${coordinate(plate.left)}" y="${coordinate(plate.top)}" width="${coordinate(plate.width)}" height="${coordinate(plate.height)}" fill="${plate.paint === null ? colours.ground : paintText(plate.paint)}"/>`
  return under + svgText(text, x, y, { size: font, colour, anchor })
}

function tieOf({ tie }: MapDrawing['marks'][number], colours: DrawingColours): string {
  return tie === ''
    ? ''
    : `<path d="${tie}" fill="none" stroke="${colours.ground}" stroke-width="3.5"/><path d="${tie}" fill="none" stroke="${colours.ink}"/>`
}

function markOf(
  { x, y, kind, label: text, onMap }: MapDrawing['marks'][number],
  font: number,
  colours: DrawingColours,
): string {
  const [px, py] = [coordinate(x), coordinate(y)]
  if (kind === 'present')
    return `<path d="M${px} ${coordinate(y - 13)}v26M${coordinate(x - 13)} ${py}h26" stroke="${colours.ground}" stroke-width="4"/><path d="M${px} ${coordinate(y - 13)}v26M${coordinate(x - 13)} ${py}h26" stroke="${colours.accent}" stroke-width="2"/><rect x="${coordinate(x - 6)}" y="${coordinate(y - 6)}" width="12" height="12" fill="${colours.ground}" stroke="${colours.accent}" stroke-width="2"/>`
  return `<circle cx="${px}" cy="${py}" r="${MARK_RADIUS}" fill="${colours.ground}" stroke="${colours.ink}"${onMap ? '' : ' stroke-dasharray="3 2"'}/>${svgText(text, x, y + font * 0.35, { size: font, colour: colours.ink, anchor: 'middle', weight: 600 })}`
}
