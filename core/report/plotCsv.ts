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
  const rows = new Map<string, (number | null)[]>()
  const shared = model.series.every((series) => sameValues(series.x, model.series[0]?.x ?? []))
  const columns = model.series.flatMap((series) => {
    const name = model.series.length === 1 ? model.title : `${model.title}, ${series.name}`
    const values = { name, x: series.x, y: series.y }
    return series.error === undefined
      ? [values]
      : [values, { name: `${name}, uncertainty`, x: series.x, y: series.error }]
  })
  columns.forEach(({ name, x: abscissae, y }, column) => {
    headings.push(heading(name, model.y.unit))
    const seen = new Map<number, number>()
    abscissae.forEach((x, index) => {
      // Where all series share their abscissae a row is an index: a vertical step keeps both of its rows, as repeats keep theirs.
      const again = seen.get(x) ?? 0
      seen.set(x, again + 1)
      const key = shared ? String(index) : `${x} ${again}`
      let row = rows.get(key)
      if (row === undefined) {
        row = [finiteOrNull(x), ...columns.map(() => null)]
        rows.set(key, row)
      }
      row[column + 1] = finiteOrNull(y[index])
    })
  })
  const list = [...rows.values()]
  if (!shared) list.sort((a, b) => (a[0] ?? 0) - (b[0] ?? 0))
  return { headings, rows: list }
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
