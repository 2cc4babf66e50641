/**
 * A speed programme from CSV or pasted text: time with speed or position.
 */
import { at } from '../base'
import type { ProgrammeRow } from '../pulse'
import { headingUnit, readBare, readNumber, readTextTable } from './csvReader'

export type ProgrammeReading =
  | {
      readonly ok: true
      readonly rows: readonly ProgrammeRow[]
      /** What was found and assumed, to be shown: delimiter, decimal mark, columns and units. */
      readonly notes: readonly string[]
    }
  | { readonly ok: false; readonly message: string }

interface Column {
  readonly index: number
  readonly unit: string
}

/**
 * Rows of a programme from text.
 *
 * @param source header line `time (s),speed (m/s)` or `time (ms);position (mm)`, or two bare columns read as time and speed in
 *   SI. A column headed `piston position` or `piston speed` is the piston's own and is carried to the exit; others are at the
 *   exit. Lines that are empty or start with # are left out.
 * @param exitPerPiston piston area over exit area: what the slug moves while the piston moves one
 * @returns the rows in SI, or a sentence that names the line that could not be read. Whether the rows make a programme
 *   (rising time, no negative speed) is judged by the plan's decoder.
 */
export function readProgrammeCsv(source: string, exitPerPiston = 1): ProgrammeReading {
  const table = readTextTable(source)
  if (!table.ok) return table
  const { lines, sniffed } = table
  const first = lines[0]
  if (first === undefined)
    return { ok: false, message: 'The table is empty: it needs a column of time and one of speed or position.' }
  const header = first.cells.some((cell) => readNumber(cell, sniffed) === null) ? first.cells : null
  const columns = chooseColumns(header, first.cells.length)
  if (!columns.ok) return columns
  const rows: ProgrammeRow[] = []
  for (const { line, cells } of header === null ? lines : lines.slice(1)) {
    const cellOf = ({ index }: Column): string => cells[index] ?? ''
    const time = readBare(cellOf(columns.time), columns.time.unit, 'time', sniffed)
    const value = readBare(
      cellOf(columns.value),
      columns.value.unit,
      columns.kind === 'speed' ? 'speed' : 'length',
      sniffed,
    )
    if (time === null || value === null) {
      const cell = cellOf(time === null ? columns.time : columns.value)
      const what = time === null ? 'time' : columns.kind
      return { ok: false, message: `Line ${line}: ${what} must be a number, got "${cell}".` }
    }
    const exit = columns.piston ? value * exitPerPiston : value
    rows.push(columns.kind === 'speed' ? { time, speed: exit } : { time, position: exit })
  }
  const notes = [
    table.note,
    `Column ${columns.time.index + 1} read as time in ${columns.time.unit}, column ${columns.value.index + 1} as ${columns.kind} ${columns.piston ? `of the piston in ${columns.value.unit}, times ${Number(exitPerPiston.toPrecision(4))} for the exit` : `at the exit in ${columns.value.unit}`}.`,
  ]
  return { ok: true, rows, notes }
}

type Columns =
  | {
      readonly ok: true
      readonly time: Column
      readonly value: Column
      readonly kind: 'speed' | 'position'
      readonly piston: boolean
    }
  | { readonly ok: false; readonly message: string }

/** Which column is which, from the header's words; two bare columns are time and speed in SI. */
function chooseColumns(header: readonly string[] | null, count: number): Columns {
  if (count < 2)
    return { ok: false, message: 'The table needs two columns, time and speed or time and position; this one has one.' }
  if (header === null)
    return { ok: true, time: { index: 0, unit: 's' }, value: { index: 1, unit: 'm/s' }, kind: 'speed', piston: false }
  const find = (pattern: RegExp): number => header.findIndex((name) => pattern.test(name))
  const timeIndex = find(/^\s*(time|t)\b/i)
  const speedIndex = find(/^\s*((exit|piston) )?(speed|velocity|u|v)\b/i)
  const positionIndex = find(/^\s*((exit|piston) )?(position|displacement|travel|x|s)\b/i)
  const kind = speedIndex >= 0 ? 'speed' : 'position'
  const valueIndex = speedIndex >= 0 ? speedIndex : positionIndex
  if (timeIndex < 0 || valueIndex < 0)
    return {
      ok: false,
      message: `The header must name a column of time and one of speed or position, got "${header.join(', ')}".`,
    }
  const time = headingUnit(at(header, timeIndex), 'time', 's')
  const value =
    kind === 'speed'
      ? headingUnit(at(header, valueIndex), 'speed', 'm/s')
      : headingUnit(at(header, valueIndex), 'length', 'm')
  if (!time.ok) return time
  if (!value.ok) return value
  return {
    ok: true,
    time: { index: timeIndex, unit: time.unit },
    value: { index: valueIndex, unit: value.unit },
    kind,
    piston: /^\s*piston\b/i.test(at(header, valueIndex)),
  }
}
