/** Marks of measured points: shapes that differ without colour, as path data for SVG and canvas alike. */
import { coordinate } from './svgText'
import type { PlotScale } from './plotScale'
import type { PlotMarker, PlotSeries } from './types'

/** Half the size of a mark [px]. */
export const MARKER_RADIUS = 3.4
const CAP = 2.5

/** Marks in the order in which runs take them. */
export const MARKERS: readonly PlotMarker[] = ['circle', 'square', 'diamond', 'triangle', 'cross']

/** Path data of a mark about a point in pixels. */
export function markerPath(marker: PlotMarker, x: number, y: number, radius = MARKER_RADIUS): string {
  const r = coordinate(radius)
  switch (marker) {
    case 'circle':
      return `M${coordinate(x - radius)} ${coordinate(y)}a${r} ${r} 0 1 0 ${coordinate(2 * radius)} 0a${r} ${r} 0 1 0 ${coordinate(-2 * radius)} 0Z`
    case 'square':
      return `M${coordinate(x - 0.9 * radius)} ${coordinate(y - 0.9 * radius)}h${coordinate(1.8 * radius)}v${coordinate(1.8 * radius)}h${coordinate(-1.8 * radius)}Z`
    case 'diamond':
      return `M${coordinate(x)} ${coordinate(y - 1.25 * radius)}l${coordinate(1.25 * radius)} ${coordinate(1.25 * radius)}l${coordinate(-1.25 * radius)} ${coordinate(1.25 * radius)}l${coordinate(-1.25 * radius)} ${coordinate(-1.25 * radius)}Z`
    case 'triangle':
      return `M${coordinate(x)} ${coordinate(y - 1.2 * radius)}l${coordinate(1.15 * radius)} ${coordinate(2.1 * radius)}h${coordinate(-2.3 * radius)}Z`
    case 'cross':
      return `M${coordinate(x - radius)} ${coordinate(y - radius)}l${coordinate(2 * radius)} ${coordinate(2 * radius)}M${coordinate(x - radius)} ${coordinate(y + radius)}l${coordinate(2 * radius)} ${coordinate(-2 * radius)}`
  }
}

export interface MarkedPoint {
  readonly x: number
  readonly y: number
  /** Path data of the error bar; '' for none. */
  readonly bar: string
}

/** Points of a series of marks inside the frame, in pixels, with their error bars held to it. */
export function markedPoints(series: PlotSeries, scale: PlotScale): readonly MarkedPoint[] {
  const { frame } = scale
  const [top, bottom] = [frame.top, frame.top + frame.height]
  return series.x.flatMap((abscissa, index): MarkedPoint[] => {
    const value = series.y[index]
    if (value === null || value === undefined || !Number.isFinite(value)) return []
    const [x, y] = [scale.toX(abscissa), scale.toY(value)]
    if (x < frame.left - 1 || x > frame.left + frame.width + 1 || y < top - 1 || y > bottom + 1) return []
    const error = series.error?.[index] ?? null
    if (error === null || !(error > 0)) return [{ x, y, bar: '' }]
    const [high, low] = [Math.max(top, scale.toY(value + error)), Math.min(bottom, scale.toY(value - error))]
    // A bar shorter than its mark only thickens it.
    if (low - high < 2 * MARKER_RADIUS) return [{ x, y, bar: '' }]
    const cap = (at: number): string => `M${coordinate(x - CAP)} ${coordinate(at)}h${coordinate(2 * CAP)}`
    return [{ x, y, bar: `M${coordinate(x)} ${coordinate(high)}V${coordinate(low)}${cap(high)}${cap(low)}` }]
  })
}
