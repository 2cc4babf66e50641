/**
 * From values to pixels: the ends of both axes and the straight map between.
 */
import type { Box, Pixel } from './boxes'
import type { PlotModel, PlotSeries } from './types'

export interface PlotDomain {
  readonly xMin: number
  readonly xMax: number
  readonly yMin: number
  readonly yMax: number
}

export interface PlotScale {
  readonly domain: PlotDomain
  readonly frame: Box
  toX(value: number): number
  toY(value: number): number
}

/**
 * Ends of the axes: where the model gives them, else from its data, lines and bands with a little room at the top; an axis whose
 * values are all of one sign starts at zero, so that areas and slopes are honest.
 */
export function plotDomain(model: PlotModel): PlotDomain {
  const x = finite(model.series.flatMap((series) => series.x))
  const y = finite(model.series.flatMap((series) => [...series.y, ...errorEnds(series)]))
  for (const line of model.lines) (line.axis === 'x' ? x : y).push(...finite([line.value]))
  for (const band of model.bands) (band.axis === 'x' ? x : y).push(...finite([band.from, band.to]))
  const [xMin, xMax] = ends(x, model.x.min, model.x.max, 0)
  const [yMin, yMax] = ends(y, model.y.min, model.y.max, 0.08)
  return { xMin, xMax, yMin, yMax }
}

/** Ends of the error bars of a series. */
function errorEnds({ y, error = [] }: PlotSeries): number[] {
  return error.flatMap((half, index) => {
    const value = y[index] ?? null
    return half === null || value === null ? [] : [value - half, value + half]
  })
}

function finite(values: readonly (number | null)[]): number[] {
  return values.filter((value) => value !== null && Number.isFinite(value)).map(Number)
}

function ends(
  values: readonly number[],
  min: number | undefined,
  max: number | undefined,
  room: number,
): [number, number] {
  let low = Infinity
  let high = -Infinity
  for (const value of values) {
    if (value < low) low = value
    if (value > high) high = value
  }
  if (low > high) [low, high] = [0, 1]
  if (low > 0) low = 0
  if (high < 0) high = 0
  const span = high - low
  const from = min ?? (low < 0 ? low - span * room : low)
  const to = max ?? (high > 0 ? high + span * room : high)
  return to > from ? [from, to] : [from, from + 1]
}

export function plotScale(domain: PlotDomain, frame: Box): PlotScale {
  const perX = frame.width / (domain.xMax - domain.xMin)
  const perY = frame.height / (domain.yMax - domain.yMin)
  return {
    domain,
    frame,
    toX: (value) => frame.left + (value - domain.xMin) * perX,
    toY: (value) => frame.top + frame.height - (value - domain.yMin) * perY,
  }
}

/** The unbroken parts of a series in pixels, cut where they leave the frame; a part has at least one point. */
export function seriesParts(series: PlotSeries, scale: PlotScale): readonly (readonly Pixel[])[] {
  const parts: Pixel[][] = []
  let part: Pixel[] = []
  let before: Pixel | null = null
  const { xMin, xMax, yMin, yMax } = scale.domain
  const close = (): void => {
    if (part.length > 0) parts.push(part)
    part = []
  }
  series.x.forEach((x, index) => {
    const y = series.y[index]
    if (y === null || y === undefined || !Number.isFinite(y) || !Number.isFinite(x)) {
      close()
      before = null
      return
    }
    const point = { x, y }
    if (before === null) {
      if (inside(point)) part.push(pixel(point))
    } else {
      const cut = clipSegment(before, point, scale.domain)
      if (cut === null) close()
      else {
        if (part.length === 0) part.push(pixel(cut[0]))
        part.push(pixel(cut[1]))
        if (!inside(point)) close()
      }
    }
    before = point
  })
  close()
  return parts

  function inside(point: Pixel): boolean {
    return point.x >= xMin && point.x <= xMax && point.y >= yMin && point.y <= yMax
  }
  function pixel(point: Pixel): Pixel {
    return { x: scale.toX(point.x), y: scale.toY(point.y) }
  }
}

/** Part of a segment inside the domain (Liang-Barsky), null when it misses. */
function clipSegment(a: Pixel, b: Pixel, domain: PlotDomain): readonly [Pixel, Pixel] | null {
  const dx = b.x - a.x
  const dy = b.y - a.y
  let from = 0
  let to = 1
  const edges: readonly (readonly [number, number])[] = [
    [-dx, a.x - domain.xMin],
    [dx, domain.xMax - a.x],
    [-dy, a.y - domain.yMin],
    [dy, domain.yMax - a.y],
  ]
  for (const [toward, room] of edges) {
    if (toward === 0) {
      if (room < 0) return null
      continue
    }
    const share = room / toward
    if (toward < 0) from = Math.max(from, share)
    else to = Math.min(to, share)
  }
  if (from > to) return null
  return [
    { x: a.x + dx * from, y: a.y + dy * from },
    { x: a.x + dx * to, y: a.y + dy * to },
  ]
}
