/**
 * CSV as other programs read it: RFC 4180, comma, CRLF, header line, shortest round-trip digits, empty cell for missing.
 */

export type Cell = number | string | boolean | null

/** Starts that a spreadsheet would run as a formula. */
const FORMULA_START = /^[=+\-@\t\r]/

function cell(value: Cell): string {
  if (value === null) return ''
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : ''
  if (typeof value === 'boolean') return value ? 'true' : 'false'
  const safe = FORMULA_START.test(value) ? `'${value}` : value
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}

/**
 * A table as CSV text.
 *
 * @param header column names, `name (unit)`
 * @param rows cells in the order of the header; a number that is not finite becomes an empty cell
 */
export function writeCsv(header: readonly string[], rows: Iterable<readonly Cell[]>): string {
  const lines = [csvLine(header)]
  for (const row of rows) lines.push(csvLine(row))
  return lines.join('')
}

/** One row as its line with the end of line, for tables that are written row by row. */
export function csvLine(row: readonly Cell[]): string {
  return `${row.map(cell).join(',')}\r\n`
}
