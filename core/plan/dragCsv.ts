/**
 * Drag against speed from CSV or pasted cells.
 */
import { parseQuantity, type Dimension } from '../quantity'
import { headingUnit, readBare, readNumber, readTextTable, type Sniffed, type TextLine } from './csvReader'
import type { SkippedRow } from './ringCsv'

export interface DragRow {
  /** [m/s] */
  readonly speed: number
  /** [N] */
  readonly drag: number
}

export type DragReading =
  | {
      readonly ok: true
      /** By rising speed. */
      readonly rows: readonly DragRow[]
      readonly skipped: readonly SkippedRow[]
      /** What was found and assumed: delimiter, decimal mark, columns and units. */
      readonly notes: readonly string[]
    }
  | { readonly ok: false; readonly message: string }

export interface DragUnits {
  readonly speed: string
  readonly drag: string
}

interface Column {
  readonly name: string
  readonly dimension: Dimension
  readonly index: number
  readonly unit: string
}

const SI: DragUnits = { speed: 'm/s', drag: 'N' }

/**
 * Rows of speed and drag from text.
 *
 * @param source header line `speed (m/s),drag (N)`, in any order and units, or two bare columns of speed and drag; a cell may carry
 *   its own unit
 * @param units unit of a column whose heading names none, and of bare columns; SI where absent
 * @returns the rows in SI by rising speed, and each row that could not be read with its line and why; or a sentence where there are
 *   not two rows to go by
 */
export function readDragTable(source: string, units: DragUnits = SI): DragReading {
  const table = readTextTable(source)
  if (!table.ok) return table
  const { lines, sniffed } = table
  const first = lines[0]
  if (first === undefined)
    return { ok: false, message: 'The table is empty: it needs a column of speed and one of drag.' }
  const headed =
    first.cells.every((cell) => readNumber(cell, sniffed) === null) && first.cells.some((cell) => /[\p{L}]/u.test(cell))
  const columns = chooseColumns(headed ? first.cells : null, first.cells.length, units)
  if (!columns.ok) return columns
  const rows: (DragRow & { readonly line: number })[] = []
  const skipped: SkippedRow[] = []
  for (const line of headed ? lines.slice(1) : lines) {
    const row = rowOf(line, columns.speed, columns.drag, sniffed)
    const twin = typeof row === 'string' ? undefined : rows.find(({ speed }) => speed === row.speed)
    const wrong =
      typeof row === 'string' ? row : twin === undefined ? null : `its speed stands in line ${twin.line} already.`
    if (wrong !== null) skipped.push({ line: line.line, message: `Line ${line.line}: ${wrong}` })
    else if (typeof row !== 'string') rows.push({ ...row, line: line.line })
  }
  if (rows.length < 2)
    return { ok: false, message: skipped[0]?.message ?? 'A table of drag needs at least 2 rows of speed and drag.' }
  const notes = [
    table.note,
    `Column ${columns.speed.index + 1} read as speed in ${columns.speed.unit}, column ${columns.drag.index + 1} as drag in ${columns.drag.unit}.`,
  ]
  return {
    ok: true,
    rows: rows.sort((a, b) => a.speed - b.speed).map(({ speed, drag }) => ({ speed, drag })),
    skipped,
    notes,
  }
}

type Columns =
  | { readonly ok: true; readonly speed: Column; readonly drag: Column }
  | { readonly ok: false; readonly message: string }

function chooseColumns(header: readonly string[] | null, count: number, units: DragUnits): Columns {
  const speed: Column = { name: 'Speed', dimension: 'speed', index: 0, unit: units.speed }
  const drag: Column = { name: 'Drag', dimension: 'force', index: 1, unit: units.drag }
  if (header === null)
    return count < 2
      ? { ok: false, message: 'The table needs two columns, speed and drag; this one has one.' }
      : { ok: true, speed, drag }
  const [speedAt, dragAt] = [/^\s*(vehicle )?(speed|velocity|v|u)\b/iu, /^\s*(drag|resistance|force|d|f)\b/iu].map(
    (words) => header.findIndex((name) => words.test(name)),
  )
  if (speedAt === undefined || dragAt === undefined || speedAt < 0 || dragAt < 0)
    return {
      ok: false,
      message: `The heading must name a column of speed and one of drag, got "${header.join(', ')}".`,
    }
  const speedUnit = headingUnit(header[speedAt] ?? '', 'speed', units.speed)
  const dragUnit = headingUnit(header[dragAt] ?? '', 'force', units.drag)
  if (!speedUnit.ok) return speedUnit
  if (!dragUnit.ok) return dragUnit
  return {
    ok: true,
    speed: { ...speed, index: speedAt, unit: speedUnit.unit },
    drag: { ...drag, index: dragAt, unit: dragUnit.unit },
  }
}

/** A row, or why it is none. */
function rowOf({ cells }: TextLine, speed: Column, drag: Column, sniffed: Sniffed): DragRow | string {
  const [v, d] = [speed, drag].map((column) => readCell(cells[column.index] ?? '', column, sniffed))
  if (typeof v === 'string') return v
  if (typeof d === 'string') return d
  return { speed: v ?? 0, drag: d ?? 0 }
}

/** A number in the column's unit, or a quantity with its own; a sentence for anything else and for what is below 0. */
function readCell(cell: string, { name, dimension, unit }: Column, sniffed: Sniffed): number | string {
  if (cell === '') return `${name.toLowerCase()} must be given.`
  const bare = readBare(cell, unit, dimension, sniffed)
  const parsed =
    bare === null
      ? parseQuantity(sniffed.decimalComma ? cell.replace(',', '.') : cell, dimension, unit, { name })
      : null
  const value = bare ?? (parsed?.ok === true ? parsed.value : null)
  if (value === null)
    return parsed?.ok === false ? parsed.message : `${name.toLowerCase()} must be a number, got "${cell}".`
  return value < 0 ? `${name.toLowerCase()} must be at least 0, got "${cell}".` : value
}
