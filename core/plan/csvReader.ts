/**
 * Tables from CSV or pasted text: any usual delimiter, decimal comma, units in the header. The adapter of the CSV library;
 * what the columns mean is decided by its callers.
 */
import Papa from 'papaparse'
import { parseQuantity, type Dimension } from '../quantity'

export interface Sniffed {
  readonly delimiter: string
  readonly decimalComma: boolean
}

/** One line that is not empty; `line` counts from 1 in the text, empty lines and comments included. */
export interface TextLine {
  readonly line: number
  readonly cells: readonly string[]
}

export type TextTable =
  | {
      readonly ok: true
      readonly lines: readonly TextLine[]
      readonly sniffed: Sniffed
      /** What was found, to be shown: delimiter and decimal mark. */
      readonly note: string
    }
  | { readonly ok: false; readonly message: string }

/** Largest table read [characters]. */
const LARGEST_TABLE = 50 * 1024 * 1024

const DELIMITER_NAMES: Readonly<Record<string, string>> = {
  ',': 'comma',
  ';': 'semicolon',
  '\t': 'tab',
  ' ': 'space',
  '|': 'bar',
}

/** Lines of cells from text; lines that are empty or start with # are left out. */
export function readTextTable(source: string): TextTable {
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
    .map((cells, index) => ({ line: index + 1, cells: cells.map((cell) => disarmed(cell.trim())) }))
    .filter(({ cells }) => cells.some((cell) => cell !== ''))
  const note = `Delimiter ${DELIMITER_NAMES[sniffed.delimiter] ?? sniffed.delimiter}, decimal ${sniffed.decimalComma ? 'comma' : 'point'}.`
  return { ok: true, lines, sniffed, note }
}

/** Takes off the apostrophe that the writer puts before a text a spreadsheet would run. */
function disarmed(cell: string): string {
  return cell.replace(/^'(?=[=+\-@])/, '')
}

/** Delimiter and decimal mark from the first lines that hold digits, or from a heading alone. */
function sniff(text: string): Sniffed {
  const lines = text.split(/\r\n|\n|\r/).filter((line) => line.trim() !== '' && !line.startsWith('#'))
  const digits = lines.filter((line) => /\d/.test(line))
  const sample = (digits.length > 0 ? digits : lines).slice(0, 20)
  const everyHas = (mark: string): boolean => sample.length > 0 && sample.every((line) => line.trim().includes(mark))
  for (const delimiter of ['\t', ';', '|']) {
    if (everyHas(delimiter)) return { delimiter, decimalComma: sample.some((line) => /\d,\d/.test(line)) }
  }
  if (everyHas(',')) return { delimiter: ',', decimalComma: false }
  return { delimiter: ' ', decimalComma: sample.some((line) => /\d,\d/.test(line)) }
}

/** A cell that is nothing but a number, with a decimal point; null for anything else. */
function plainNumber(cell: string, decimalComma: boolean): string | null {
  const plain = (decimalComma ? cell.replace(',', '.') : cell).replace('\u2212', '-')
  return /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/.test(plain) && Number.isFinite(Number(plain)) ? plain : null
}

/** The number a cell holds and nothing else; null for anything else. */
export function readNumber(cell: string, { decimalComma }: Pick<Sniffed, 'decimalComma'>): number | null {
  const plain = plainNumber(cell, decimalComma)
  return plain === null ? null : Number(plain)
}

/** Unit in the brackets of a column's heading, `fallback` where there is none; a sentence where it does not fit. */
export function headingUnit(
  heading: string,
  dimension: Dimension,
  fallback: string,
): { readonly ok: true; readonly unit: string } | { readonly ok: false; readonly message: string } {
  const unit = /[([]([^)\]]*)[)\]]/.exec(heading)?.[1]?.trim() ?? fallback
  const parsed = parseQuantity(`1 ${unit}`, dimension, undefined, { name: `Column "${heading}"` })
  return parsed.ok ? { ok: true, unit } : { ok: false, message: parsed.message }
}

/** A bare number in a column's unit, in the base unit; null where it is none. */
export function readBare(cell: string, unit: string, dimension: Dimension, sniffed: Sniffed): number | null {
  const plain = plainNumber(cell, sniffed.decimalComma)
  if (plain === null) return null
  // As it was written, so that every digit counts.
  const parsed = parseQuantity(`${plain} ${unit}`, dimension)
  return parsed.ok ? parsed.value : null
}
