/**
 * What Chart.js does not draw: bands behind the lines, limits across them, names at their ends, and the data cursor.
 */
import type { ChartArea, Plugin } from 'chart.js'
import {
  lineEnds,
  markedPoints,
  markerPath,
  plotDomain,
  plotLabels,
  plotScale,
  seriesColour,
  type DrawingColours,
  type PlotModel,
  type PlotScale,
} from '../../core/report'
import { withOpacity } from './themeColours'

export interface PlotState {
  readonly model: PlotModel
  readonly colours: DrawingColours
  /** Abscissa the cursor stands on; null when it is away. */
  readonly cursor: number | null
}

/** The plugin reads the state anew at each drawing. */
export function marksPlugin(
  state: { readonly current: PlotState },
  look: { readonly fontFamily: string; readonly fontSize: number },
): Plugin<'line'> {
  return {
    id: 'marks',
    beforeDatasetsDraw(chart) {
      drawBands(chart.ctx, state.current, scaleOf(state.current.model, chart.chartArea))
    },
    afterDatasetsDraw(chart) {
      const scale = scaleOf(state.current.model, chart.chartArea)
      chart.ctx.save()
      drawFoot(chart.ctx, state.current, scale)
      drawLines(chart.ctx, state.current, scale)
      drawMeasured(chart.ctx, state.current, scale)
      drawLabels(chart.ctx, state.current, scale, look)
      drawCursor(chart.ctx, state.current, scale)
      chart.ctx.restore()
    },
  }
}

function scaleOf(model: PlotModel, area: ChartArea): PlotScale {
  return plotScale(plotDomain(model), { left: area.left, top: area.top, width: area.width, height: area.height })
}

function drawBands(context: CanvasRenderingContext2D, { model, colours }: PlotState, scale: PlotScale): void {
  const { left, top, width, height } = scale.frame
  context.save()
  context.beginPath()
  context.rect(left, top, width, height)
  context.clip()
  for (const band of model.bands) {
    const [a, b] =
      band.axis === 'x' ? [scale.toX(band.from), scale.toX(band.to)] : [scale.toY(band.to), scale.toY(band.from)]
    context.fillStyle = withOpacity(colours.limit, 0.12)
    if (band.axis === 'x') context.fillRect(a, top, b - a, height)
    else context.fillRect(left, a, width, b - a)
    context.strokeStyle = withOpacity(colours.limit, 0.4)
    context.lineWidth = 1
    context.setLineDash([2, 3])
    context.beginPath()
    for (const edge of [a, b]) {
      context.moveTo(band.axis === 'x' ? edge : left, band.axis === 'x' ? top : edge)
      context.lineTo(band.axis === 'x' ? edge : left + width, band.axis === 'x' ? top + height : edge)
    }
    context.stroke()
  }
  context.restore()
}

function drawFoot(context: CanvasRenderingContext2D, { colours }: PlotState, { frame }: PlotScale): void {
  context.strokeStyle = colours.edge
  context.lineWidth = 1
  context.beginPath()
  context.moveTo(frame.left, frame.top + frame.height)
  context.lineTo(frame.left + frame.width, frame.top + frame.height)
  context.stroke()
}

function drawLines(context: CanvasRenderingContext2D, { model, colours }: PlotState, scale: PlotScale): void {
  for (const line of model.lines) {
    const [from, to] = lineEnds(line, scale)
    context.strokeStyle = line.kind === 'limit' ? colours.limit : colours.ink
    context.lineWidth = 1.2
    context.setLineDash(line.kind === 'limit' ? [6, 3, 1.5, 3] : [2, 3])
    context.beginPath()
    context.moveTo(from.x, from.y)
    context.lineTo(to.x, to.y)
    context.stroke()
  }
  context.setLineDash([])
}

/** Measured points with their error bars. */
function drawMeasured(context: CanvasRenderingContext2D, { model, colours }: PlotState, scale: PlotScale): void {
  for (const series of model.series) {
    const { marker } = series
    if (marker === undefined) continue
    const points = markedPoints(series, scale)
    context.strokeStyle = seriesColour(series, colours)
    context.lineWidth = 1
    context.stroke(new Path2D(points.map(({ bar }) => bar).join('')))
    const shapes = new Path2D(points.map(({ x, y }) => markerPath(marker, x, y)).join(''))
    context.fillStyle = colours.ground
    context.fill(shapes)
    context.lineWidth = 1.3
    context.stroke(shapes)
  }
}

function drawLabels(
  context: CanvasRenderingContext2D,
  { model, colours }: PlotState,
  scale: PlotScale,
  look: { readonly fontFamily: string; readonly fontSize: number },
): void {
  context.font = `${look.fontSize}px ${look.fontFamily}`
  context.textAlign = 'left'
  context.textBaseline = 'middle'
  const height = look.fontSize * 1.25
  const worn = {
    primary: colours.ink,
    secondary: colours.muted,
    reference: colours.ink,
    limit: colours.limit,
    mark: colours.ink,
  }
  // A halo of the ground keeps a word readable where a small plot leaves no free place.
  context.strokeStyle = colours.ground
  context.lineWidth = 3
  context.lineJoin = 'round'
  const write = (text: string, x: number, y: number): void => {
    context.strokeText(text, x, y)
    context.fillText(text, x, y)
  }
  for (const label of plotLabels(model, scale, (text) => context.measureText(text).width, height)) {
    const { place } = label
    context.fillStyle = worn[label.wears]
    if (label.marker !== undefined) {
      const shape = new Path2D(markerPath(label.marker.marker, label.marker.x, label.marker.y))
      const ink = context.fillStyle
      context.save()
      context.fillStyle = colours.ground
      context.fill(shape)
      context.strokeStyle = ink
      context.lineWidth = 1.3
      context.stroke(shape)
      context.restore()
    }
    if (!place.vertical) {
      write(label.text, place.left, place.top + place.height / 2)
      continue
    }
    context.save()
    context.translate(place.left + place.width / 2, place.top + place.height)
    context.rotate(-Math.PI / 2)
    write(label.text, 0, 0)
    context.restore()
  }
}

/** A thin line at the abscissa and an open mark on each series. */
function drawCursor(context: CanvasRenderingContext2D, { model, colours, cursor }: PlotState, scale: PlotScale): void {
  if (cursor === null) return
  const x = scale.toX(cursor)
  context.strokeStyle = colours.edge
  context.lineWidth = 1
  context.beginPath()
  context.moveTo(x, scale.frame.top)
  context.lineTo(x, scale.frame.top + scale.frame.height)
  context.stroke()
  for (const series of model.series) {
    const value = series.marker === undefined ? valueNear(series.x, series.y, cursor) : null
    if (value === null) continue
    const y = scale.toY(value)
    if (y < scale.frame.top - 1 || y > scale.frame.top + scale.frame.height + 1) continue
    context.beginPath()
    context.arc(x, y, 3.5, 0, 2 * Math.PI)
    context.fillStyle = colours.ground
    context.fill()
    context.strokeStyle = seriesColour(series, colours)
    context.lineWidth = 1.8
    context.stroke()
  }
}

/** Value of a series at an abscissa, straight between its points; null outside them and in gaps. Abscissae must not fall. */
export function valueNear(x: readonly number[], y: readonly (number | null)[], at: number): number | null {
  for (let index = 0; index < x.length; index += 1) {
    const [x1, y1] = [x[index], y[index]]
    if (x1 === undefined || x1 < at) continue
    if (x1 === at) return finite(y1)
    const [x0, y0] = [x[index - 1], finite(y[index - 1])]
    const end = finite(y1)
    if (x0 === undefined || y0 === null || end === null) return null
    return y0 + ((end - y0) * (at - x0)) / (x1 - x0)
  }
  return null
}

function finite(value: number | null | undefined): number | null {
  return value === null || value === undefined || !Number.isFinite(value) ? null : value
}
