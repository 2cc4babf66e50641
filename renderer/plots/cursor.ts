/**
 * The data cursor: which point it stands on and what it reads there.
 */
import { formatNumber } from '../../core/quantity'
import { plotDomain, type PlotModel, type PlotSeries } from '../../core/report'
import { valueNear } from './marks'

export interface ReadoutEntry {
  readonly name: string
  readonly value: string
}

/** Index of the value nearest to x in a list that does not fall; null for an empty list. */
export function nearestIndex(values: readonly number[], x: number): number | null {
  let best: number | null = null
  let bestDistance = Infinity
  values.forEach((value, index) => {
    const distance = Math.abs(value - x)
    if (distance < bestDistance) {
      best = index
      bestDistance = distance
    }
  })
  return best
}

/** Abscissa first, then each series that has a value there, with units. */
export function cursorReadout(model: PlotModel, x: number): readonly ReadoutEntry[] {
  const entries: ReadoutEntry[] = [{ name: model.x.title.toLowerCase(), value: withUnit(x, model.x.unit) }]
  const { xMin, xMax } = plotDomain(model)
  for (const series of model.series) {
    const value =
      series.marker === undefined ? valueNear(series.x, series.y, x) : measuredNear(series, x, NEAR * (xMax - xMin))
    if (value !== null) entries.push({ name: series.name, value: withUnit(value, model.y.unit) })
  }
  return entries
}

/** Share of the axis within which a measured point is read at the cursor. */
const NEAR = 0.012

/** Value of the measured point nearest to an abscissa, at most `reach` away. */
function measuredNear({ x, y }: PlotSeries, abscissa: number, reach: number): number | null {
  const index = nearestIndex(x, abscissa)
  return index === null || Math.abs((x[index] ?? Infinity) - abscissa) > reach ? null : (y[index] ?? null)
}

function withUnit(value: number, unit: string): string {
  return unit === '' ? formatNumber(value) : `${formatNumber(value)}\u00a0${unit}`
}
