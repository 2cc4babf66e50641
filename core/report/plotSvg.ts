/**
 * A plot written as SVG: the same picture for exports, reports and the runner. Pure text, no outside font, no script.
 */
import { formatNumber } from '../quantity'
import type { Box } from './boxes'
import { drawingColours, type DrawingColours, type DrawingTheme } from './colours'
import { lineEnds, plotLabels, type PlotLabel } from './plotLabels'
import { markedPoints, markerPath } from './plotMarkers'
import { plotDomain, plotScale, seriesParts, type PlotScale } from './plotScale'
import { coordinate, escapeXml, FONT_FAMILY, pathThrough, svgText } from './svgText'
import { textWidth } from './textWidth'
import { niceTicks, tickLabel, tickStep } from './ticks'
import type { PlotAxis, PlotMarker, PlotModel, PlotSeries } from './types'

export interface DrawingSize {
  /** Pixels, at least 160. */
  readonly width: number
  /** Pixels, at least 120. */
  readonly height: number
  readonly theme: DrawingTheme
}

/** Dash patterns by line style, in pixels. */
export const DASHES: Readonly<Record<PlotSeries['line'], readonly number[]>> = {
  solid: [],
  dashed: [5, 4],
  dotted: [1.5, 3],
}
const LIMIT_DASH = [6, 3, 1.5, 3]

/** `Speed (m/s)`, or the bare title of a pure number. */
export function axisText(axis: PlotAxis): string {
  return axis.unit === '' ? axis.title : `${axis.title} (${axis.unit})`
}

/** What a plot shows, in words, for people who do not see it. */
export function describePlot(model: PlotModel): string {
  const parts = model.series.map((series) => {
    const values = series.y.filter((y) => y !== null).filter(Number.isFinite)
    if (values.length === 0) return `${series.name}: no values`
    const unit = model.y.unit === '' ? '' : ` ${model.y.unit}`
    const low = values.reduce((a, b) => Math.min(a, b))
    const high = values.reduce((a, b) => Math.max(a, b))
    return `${series.name}: ${formatNumber(low, 3)} to ${formatNumber(high, 3)}${unit}`
  })
  const lines = model.lines.map((line) => line.label)
  const bands = model.bands.map(
    (band) => `${band.label} from ${formatNumber(band.from, 3)} to ${formatNumber(band.to, 3)}`,
  )
  const axes = `${axisText(model.y)} against ${axisText(model.x)}`
  return `${[axes, ...parts, ...lines, ...bands].join('. ')}.`
}

/**
 * Write a plot as one SVG document.
 *
 * Labels are placed with estimated text widths, so they keep clear of one another in any system font.
 */
export function plotToSvg(model: PlotModel, size: DrawingSize): string {
  const width = Math.max(160, size.width)
  const height = Math.max(120, size.height)
  const colours = drawingColours(size.theme)
  const font = height < 220 ? 11 : 12
  const domain = plotDomain(model)
  const headerHeight = font * 2.6
  const frameHeight = height - headerHeight - font * 3.4
  const yCount = Math.max(2, Math.min(6, Math.floor(frameHeight / 45)))
  const yTicks = axisTicks(domain.yMin, domain.yMax, yCount)
  const widest = Math.max(...yTicks.map(({ label }) => textWidth(label, font)), font)
  const left = widest + 14
  const frame: Box = { left, top: headerHeight, width: width - left - 14, height: frameHeight }
  const scale = plotScale(domain, frame)
  const xTicks = axisTicks(domain.xMin, domain.xMax, Math.max(2, Math.min(10, Math.floor(frame.width / 60))))
  const id = model.id.replace(/[^A-Za-z0-9_-]/g, '-')
  const body = [
    `<rect width="${coordinate(width)}" height="${coordinate(height)}" fill="${colours.ground}"/>`,
    svgText(model.title, 10, font * 1.6, { size: font + 1, colour: colours.ink, weight: 600 }),
    unitText(model, width, font, colours),
    ...bands(model, scale, colours),
    ...yTicks.flatMap(({ value, label }) => gridLine(scale, value, label, font, colours)),
    ...xTicks.flatMap(({ value, label }) => xTick(scale, value, label, font, colours)),
    `<path d="M${coordinate(frame.left)} ${coordinate(frame.top + frame.height)}h${coordinate(frame.width)}" stroke="${colours.edge}" fill="none"/>`,
    ...model.lines.map((line) => {
      const stroke = line.kind === 'limit' ? colours.limit : colours.ink
      const dash = line.kind === 'limit' ? LIMIT_DASH : [2, 3]
      return `<path d="${pathThrough(lineEnds(line, scale))}" stroke="${stroke}" stroke-width="1.2" stroke-dasharray="${dash.join(' ')}" fill="none"/>`
    }),
    ...model.series.flatMap((series) => areaBetween(series, model, scale, colours)),
    ...model.series.flatMap((series) => seriesMarks(series, scale, colours)),
    ...plotLabels(model, scale, (text) => textWidth(text, font), font * 1.25).map((label) =>
      labelText(label, font, colours),
    ),
    svgText(axisText(model.x), frame.left + frame.width / 2, height - font * 0.6, {
      size: font,
      colour: colours.muted,
      anchor: 'middle',
    }),
  ]
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${coordinate(width)}" height="${coordinate(height)}" `,
    `viewBox="0 0 ${coordinate(width)} ${coordinate(height)}" role="img" aria-labelledby="${id}-title ${id}-desc" `,
    `font-family="${escapeXml(FONT_FAMILY)}" style="font-variant-numeric:tabular-nums">`,
    `<title id="${id}-title">${escapeXml(model.title)}</title><desc id="${id}-desc">${escapeXml(describePlot(model))}</desc>`,
    ...body,
    '</svg>\n',
  ].join('')
}

interface Tick {
  readonly value: number
  readonly label: string
}

/** Ticks of one axis with their text. */
export function axisTicks(min: number, max: number, count: number): readonly Tick[] {
  // One number alone gives no scale: steps get finer until two stand on the axis.
  let parts = count
  while (max > min && niceTicks(min, max, parts).length < 2 && parts < 4 * count) parts += 1
  const step = tickStep(max - min, parts)
  return niceTicks(min, max, parts).map((value) => ({ value, label: tickLabel(value, step) }))
}

function unitText(model: PlotModel, width: number, font: number, colours: DrawingColours): string {
  const text = model.title === model.y.title ? model.y.unit : axisText(model.y)
  return text === '' ? '' : svgText(text, width - 14, font * 1.6, { size: font, colour: colours.muted, anchor: 'end' })
}

function gridLine(scale: PlotScale, value: number, label: string, font: number, colours: DrawingColours): string[] {
  const { left, width } = scale.frame
  const y = scale.toY(value)
  return [
    `<path d="M${coordinate(left)} ${coordinate(y)}h${coordinate(width)}" stroke="${colours.rule}" fill="none"/>`,
    svgText(label, left - 6, y + font * 0.35, { size: font, colour: colours.muted, anchor: 'end' }),
  ]
}

function xTick(scale: PlotScale, value: number, label: string, font: number, colours: DrawingColours): string[] {
  const bottom = scale.frame.top + scale.frame.height
  const x = scale.toX(value)
  return [
    `<path d="M${coordinate(x)} ${coordinate(bottom)}v4" stroke="${colours.edge}" fill="none"/>`,
    svgText(label, x, bottom + font * 1.5, { size: font, colour: colours.muted, anchor: 'middle' }),
  ]
}

/** Bands keep a thin edge on both sides: in grey the shade alone is too faint. */
function bands(model: PlotModel, scale: PlotScale, colours: DrawingColours): string[] {
  return model.bands.flatMap((band) => {
    const { left, top, width, height } = scale.frame
    const held = (value: number, from: number, length: number): number => Math.min(from + length, Math.max(from, value))
    const [a, b] =
      band.axis === 'x'
        ? [held(scale.toX(band.from), left, width), held(scale.toX(band.to), left, width)]
        : [held(scale.toY(band.to), top, height), held(scale.toY(band.from), top, height)]
    if (b - a <= 0) return []
    const box: Box = band.axis === 'x' ? { left: a, top, width: b - a, height } : { left, top: a, width, height: b - a }
    const place = `x="${coordinate(box.left)}" y="${coordinate(box.top)}" width="${coordinate(box.width)}" height="${coordinate(box.height)}"`
    const edges =
      band.axis === 'x'
        ? `M${coordinate(a)} ${coordinate(top)}v${coordinate(height)}M${coordinate(b)} ${coordinate(top)}v${coordinate(height)}`
        : `M${coordinate(left)} ${coordinate(a)}h${coordinate(width)}M${coordinate(left)} ${coordinate(b)}h${coordinate(width)}`
    return [
      `<rect ${place} fill="${colours.limit}" fill-opacity="0.12"/>`,
      `<path d="${edges}" stroke="${colours.limit}" stroke-opacity="0.45" stroke-width="0.75" stroke-dasharray="2 3" fill="none"/>`,
    ]
  })
}

/** Colour of a series by its role; the limit colour is not among them. */
export function seriesColour(series: PlotSeries, colours: Pick<DrawingColours, 'accent' | 'muted' | 'ink'>): string {
  return series.role === 'primary' ? colours.accent : series.role === 'secondary' ? colours.muted : colours.ink
}

/** The shade between a series and the one it is filled to. */
function areaBetween(series: PlotSeries, model: PlotModel, scale: PlotScale, colours: DrawingColours): string[] {
  const other = model.series.find(({ id }) => id === series.fillTo)
  const [upper = [], lower = []] =
    other === undefined ? [] : [seriesParts(series, scale)[0], seriesParts(other, scale)[0]]
  if (upper.length === 0 || lower.length === 0) return []
  const colour = seriesColour(series, colours)
  return [`<path d="${pathThrough([...upper, ...lower.toReversed()])}Z" fill="${colour}" fill-opacity="0.15"/>`]
}

function seriesMarks(series: PlotSeries, scale: PlotScale, colours: DrawingColours): readonly string[] {
  const colour = seriesColour(series, colours)
  if (series.marker !== undefined) return measuredMarks(series, series.marker, scale, colours)
  const zero = coordinate(Math.min(scale.frame.top + scale.frame.height, Math.max(scale.frame.top, scale.toY(0))))
  const dash = DASHES[series.line].length > 0 ? ` stroke-dasharray="${DASHES[series.line].join(' ')}"` : ''
  const lineWidth = series.role === 'primary' ? 1.8 : 1.4
  return seriesParts(series, scale).flatMap((part) => {
    const [first, final] = [part[0], part.at(-1)]
    if (first === undefined || final === undefined) return []
    const line = `<path d="${pathThrough(part)}" stroke="${colour}" stroke-width="${lineWidth}" stroke-linejoin="round"${dash} fill="none"/>`
    if (!series.filled) return [line]
    const area = `${pathThrough(part)}L${coordinate(final.x)} ${zero}L${coordinate(first.x)} ${zero}Z`
    return [`<path d="${area}" fill="${colour}" fill-opacity="0.15"/>`, line]
  })
}

/** All error bars in one path, all marks in another. */
function measuredMarks(
  series: PlotSeries,
  marker: PlotMarker,
  scale: PlotScale,
  colours: DrawingColours,
): readonly string[] {
  const points = markedPoints(series, scale)
  if (points.length === 0) return []
  const colour = seriesColour(series, colours)
  const bars = points.map(({ bar }) => bar).join('')
  return [
    ...(bars === '' ? [] : [`<path d="${bars}" stroke="${colour}" stroke-width="1" fill="none"/>`]),
    `<path d="${points.map(({ x, y }) => markerPath(marker, x, y)).join('')}" stroke="${colour}" stroke-width="1.3" fill="${colours.ground}"/>`,
  ]
}

function labelText(label: PlotLabel, font: number, colours: DrawingColours): string {
  const { place } = label
  const worn = {
    primary: colours.ink,
    secondary: colours.muted,
    reference: colours.ink,
    limit: colours.limit,
    mark: colours.ink,
  }
  const colour = worn[label.wears]
  const mark =
    label.marker === undefined
      ? ''
      : `<path d="${markerPath(label.marker.marker, label.marker.x, label.marker.y)}" stroke="${colour}" stroke-width="1.3" fill="${colours.ground}"/>`
  if (place.vertical) {
    return svgText(label.text, place.left + place.width * 0.78, place.top + place.height, {
      size: font,
      colour,
      vertical: true,
    })
  }
  return (
    mark +
    svgText(label.text, place.left, place.top + place.height * 0.78, { size: font, colour, halo: colours.ground })
  )
}
