/**
 * The numbers behind a plot, as a table and as CSV (RFC 4180: comma, CRLF, shortest digits that read back the same).
 */
import { writeCsv } from '../plan'
import type { PlotModel } from './types'

export interface PlotTable {
  readonly headings: readonly string[]
  readonly rows: readonly (readonly (number | null)[])[]
}

/** One row an abscissa, series side by side; a series without a value there leaves the cell empty. */
export function plotTable(model: PlotModel): PlotTable {
  const headings = [heading(model.x.title, model.x.unit)]
  const rows = new Map<number, (number | null)[]>()
  const order: number[] = []
  const shared = model.series.every((series) => sameValues(series.x, model.series[0]?.x ?? []))
  model.series.forEach((series, column) => {
    headings.push(heading(model.series.length === 1 ? model.title : `${model.title}, ${series.name}`, model.y.unit))
    series.x.forEach((x, index) => {
      // Where all series share their abscissae a row is an index: a vertical step keeps both of its rows.
      const key = shared ? index : x
      let row = rows.get(key)
      if (row === undefined) {
        row = [finiteOrNull(x), ...model.series.map(() => null)]
        rows.set(key, row)
        order.push(key)
      }
      row[column + 1] = finiteOrNull(series.y[index])
    })
  })
  if (!shared) order.sort((a, b) => a - b)
  return { headings, rows: order.map((key) => rows.get(key) ?? []) }
}

/** The plot's table as CSV text in the shown units, named in the header. */
export function plotToCsv(model: PlotModel): string {
  const { headings, rows } = plotTable(model)
  return writeCsv(headings, rows)
}

function sameValues(a: readonly number[], b: readonly number[]): boolean {
  return a === b || (a.length === b.length && a.every((value, index) => value === b[index]))
}

function heading(title: string, unit: string): string {
  return unit === '' ? title : `${title} (${unit})`
}

function finiteOrNull(value: number | null | undefined): number | null {
  return value === null || value === undefined || !Number.isFinite(value) ? null : value
}
