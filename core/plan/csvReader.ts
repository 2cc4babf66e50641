/**
 * A speed programme from CSV or pasted text: time with speed or position, any usual delimiter, decimal comma, units in the
 * header. The adapter of the CSV library.
 */
import Papa from 'papaparse'
import { at } from '../base'
import { parseQuantity, type Dimension } from '../quantity'
import type { ProgrammeRow } from '../pulse'

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

type Sniffed = { readonly delimiter: string; readonly decimalComma: boolean }

/** Largest table read [characters]. */
const LARGEST_TABLE = 50 * 1024 * 1024

const DELIMITER_NAMES: Readonly<Record<string, string>> = {
  ',': 'comma',
  ';': 'semicolon',
  '\t': 'tab',
  ' ': 'space',
  '|': 'bar',
}

/**
 * Rows of a programme from text.
 *
 * @param source header line `time (s),speed (m/s)` or `time (ms);position (mm)`, or two bare columns read as time and speed in
 *   SI. Lines that are empty or start with # are left out.
 * @returns the rows in SI, or a sentence that names the line that could not be read. Whether the rows make a programme
 *   (rising time, no negative speed) is judged by the plan's decoder.
 */
export function readProgrammeCsv(source: string): ProgrammeReading {
  const text = source.replace(/^\uFEFF/, '')
  if (text.length > LARGEST_TABLE) return { ok: false, message: 'A table must be at most 50 MB.' }
  if (text.includes('\u0000')) return { ok: false, message: 'A table must be plain text (UTF-8); this file is not.' }
  const sniffed = sniff(text)
  const parsed = Papa.parse<string[]>(text, {
    delimiter: sniffed.delimiter,
    comments: '#',
    skipEmptyLines: false,
  })
  const lines = parsed.data
    .map((cells, index) => ({ line: index + 1, cells: cells.map((cell) => cell.trim()) }))
    .filter(({ cells }) => cells.some((cell) => cell !== ''))
  const first = lines[0]
  if (first === undefined)
    return { ok: false, message: 'The table is empty: it needs a column of time and one of speed or position.' }
  const header = first.cells.some((cell) => readNumber(cell, sniffed) === null) ? first.cells : null
  const columns = chooseColumns(header, first.cells.length)
  if (!columns.ok) return columns
  const rows: ProgrammeRow[] = []
  for (const { line, cells } of header === null ? lines : lines.slice(1)) {
    const time = convert(cells[columns.time.index], columns.time, 'time', sniffed)
    const value = convert(
      cells[columns.value.index],
      columns.value,
      columns.kind === 'speed' ? 'speed' : 'length',
      sniffed,
    )
    if (time === null || value === null) {
      const cell = time === null ? cells[columns.time.index] : cells[columns.value.index]
      const what = time === null ? 'time' : columns.kind
      return { ok: false, message: `Line ${line}: ${what} must be a number, got "${cell ?? ''}".` }
    }
    rows.push(columns.kind === 'speed' ? { time, speed: value } : { time, position: value })
  }
  const notes = [
    `Delimiter ${DELIMITER_NAMES[sniffed.delimiter] ?? sniffed.delimiter}, decimal ${sniffed.decimalComma ? 'comma' : 'point'}.`,
    `Column ${columns.time.index + 1} read as time in ${columns.time.unit}, column ${columns.value.index + 1} as ${columns.kind} in ${columns.value.unit}.`,
  ]
  return { ok: true, rows, notes }
}

/** Delimiter and decimal mark from the first lines that hold digits. */
function sniff(text: string): Sniffed {
  const sample = text
    .split(/\r\n|\n|\r/)
    .filter((line) => /\d/.test(line) && !line.startsWith('#'))
    .slice(0, 20)
  const everyHas = (mark: string): boolean => sample.length > 0 && sample.every((line) => line.trim().includes(mark))
  for (const delimiter of ['\t', ';', '|']) {
    if (everyHas(delimiter)) return { delimiter, decimalComma: sample.some((line) => /\d,\d/.test(line)) }
  }
  if (everyHas(',')) return { delimiter: ',', decimalComma: false }
  return { delimiter: ' ', decimalComma: sample.some((line) => /\d,\d/.test(line)) }
}

function readNumber(cell: string, { decimalComma }: Sniffed): number | null {
  const plain = (decimalComma ? cell.replace(',', '.') : cell).replace('\u2212', '-')
  if (!/^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/.test(plain)) return null
  const value = Number(plain)
  return Number.isFinite(value) ? value : null
}

function convert(cell: string | undefined, column: Column, dimension: Dimension, sniffed: Sniffed): number | null {
  const value = readNumber(cell ?? '', sniffed)
  if (value === null) return null
  const parsed = parseQuantity(`${value} ${column.unit}`, dimension)
  return parsed.ok ? parsed.value : null
}

type Columns =
  | { readonly ok: true; readonly time: Column; readonly value: Column; readonly kind: 'speed' | 'position' }
  | { readonly ok: false; readonly message: string }

/** Which column is which, from the header's words; two bare columns are time and speed in SI. */
function chooseColumns(header: readonly string[] | null, count: number): Columns {
  if (count < 2)
    return { ok: false, message: 'The table needs two columns, time and speed or time and position; this one has one.' }
  if (header === null)
    return { ok: true, time: { index: 0, unit: 's' }, value: { index: 1, unit: 'm/s' }, kind: 'speed' }
  const find = (pattern: RegExp): number => header.findIndex((name) => pattern.test(name))
  const timeIndex = find(/^\s*(time|t)\b/i)
  const speedIndex = find(/^\s*(exit speed|speed|velocity|u|v)\b/i)
  const positionIndex = find(/^\s*(position|displacement|x|s)\b/i)
  const kind = speedIndex >= 0 ? 'speed' : 'position'
  const valueIndex = speedIndex >= 0 ? speedIndex : positionIndex
  if (timeIndex < 0 || valueIndex < 0)
    return {
      ok: false,
      message: `The header must name a column of time and one of speed or position, got "${header.join(', ')}".`,
    }
  const time = columnUnit(header, timeIndex, 'time', 's')
  const value = columnUnit(header, valueIndex, kind === 'speed' ? 'speed' : 'length', kind === 'speed' ? 'm/s' : 'm')
  if (typeof time === 'string') return { ok: false, message: time }
  if (typeof value === 'string') return { ok: false, message: value }
  return { ok: true, time, value, kind }
}

/** Unit in the header's brackets, SI where there is none; a sentence where it does not fit. */
function columnUnit(header: readonly string[], index: number, dimension: Dimension, fallback: string): Column | string {
  const name = at(header, index)
  const unit = /[([]([^)\]]*)[)\]]/.exec(name)?.[1]?.trim() ?? fallback
  const parsed = parseQuantity(`1 ${unit}`, dimension, undefined, { name: `Column "${name}"` })
  return parsed.ok ? { index, unit } : parsed.message
}
