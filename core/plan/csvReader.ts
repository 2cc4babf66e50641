/**
 * Tables from CSV or pasted text: any usual delimiter, decimal comma, units in the header. The adapter of the CSV library;
 * what the columns mean is decided by its callers.
 */
import Papa from 'papaparse'
import { DomainError } from '../base'
import { parseQuantity, unitOf, type Dimension } from '../quantity'
import { sniffTable, type TableMarks } from './sniffTable'

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
  // Comments become empty lines instead of being left to the library, which would not count them.
  const parsed = Papa.parse<string[]>(text.replace(/^#.*$/gmu, ''), {
    delimiter: sniffed.delimiter,
    skipEmptyLines: false,
  })
  const lines = parsed.data
    .map((cells, index) => ({ line: index + 1, cells: cells.map((cell) => disarmed(cell.trim())) }))
    .filter(({ cells }) => cells.some((cell) => cell !== ''))
  return { ok: true, lines, sniffed, note: noteOf(sniffed) }
}

export interface WalkedLine extends TextLine {
  /** An empty line stands before it. */
  readonly afterGap: boolean
  /** Why the line cannot be read as it stands; null where nothing is wrong with it. */
  readonly problem: string | null
}

export type TableWalk =
  | { readonly ok: true; readonly sniffed: Sniffed; readonly note: string }
  | { readonly ok: false; readonly message: string }

/** More than this share of zero characters: text of two bytes a character. */
const TWO_BYTES_SHARE = 0.1

/**
 * A table line by line, for tables too long to be held twice. Lines that are empty or start with # are left out; a line that is spoilt (a stray or
 * unclosed quotation mark, a zero character, a cell over several lines) is handed over with its problem, never dropped.
 *
 * @param chosen delimiter and decimal mark where the user set them; sniffed where absent
 */
export function walkTextTable(
  source: string,
  chosen: Partial<TableMarks>,
  visit: (line: WalkedLine, sniffed: Sniffed) => void,
): TableWalk {
  if (source.length > LARGEST_TABLE) return { ok: false, message: 'A table must be at most 50 MB.' }
  const zeros = source.includes('\u0000') ? source.split('\u0000').length - 1 : 0
  if (zeros > TWO_BYTES_SHARE * source.length)
    return {
      ok: false,
      message:
        'A table must be UTF-8 text; this one has two bytes a character (UTF-16) and no byte-order mark: save it as UTF-8.',
    }
  const text = source.replace(/^\uFEFF/, '').replace(/\r\n?/g, '\n')
  const sniffed: Sniffed = { ...sniffTable(text), ...chosen }
  walkLines(text, sniffed.delimiter, (line) => visit(line, sniffed))
  return { ok: true, sniffed, note: noteOf(sniffed) }
}

function walkLines(text: string, delimiter: string, visit: (line: WalkedLine) => void): void {
  let cursor = 0
  let line = 1
  let gap = false
  let resume: number | null = null
  Papa.parse<string[]>(text, {
    delimiter,
    newline: '\n',
    comments: '#',
    skipEmptyLines: false,
    step: ({ data, errors, meta }, parser) => {
      const [from, fromLine] = [cursor, line]
      const end = Math.max(meta.cursor, cursor)
      const passed = newlines(text, cursor, end)
      const inside = data.reduce((sum, cell) => sum + newlines(cell, 0, cell.length), 0)
      const closed = text[end - 1] === '\n'
      const first = line + Math.max(0, passed - inside - (closed ? 1 : 0))
      if (errors.some(({ code }) => code === 'MissingQuotes')) {
        resume = line
        parser.abort()
        return
      }
      cursor = end
      line += passed
      if (data.every((cell) => cell.trim() === '')) {
        gap = true
        return
      }
      if (inside > 0) {
        // Cells of readings do not run over lines: every line is judged by itself, so that a stray mark takes none with it.
        walkPlain(text.slice(from, closed ? end - 1 : end).split('\n'), delimiter, fromLine, visit)
      } else visit({ line: first, cells: data.map(tidied), afterGap: gap, problem: problemOf(data, errors.length > 0) })
      gap = false
    },
  })
  if (resume !== null) walkPlain(text.slice(cursor).split('\n'), delimiter, resume, visit)
}

/** Lines each by itself, quotation marks round a cell taken off, where they do not pair up over the table. */
function walkPlain(
  lines: readonly string[],
  delimiter: string,
  first: number,
  visit: (line: WalkedLine) => void,
): void {
  let gap = false
  lines.forEach((whole, index) => {
    if (whole.startsWith('#')) return
    const cells = whole.split(delimiter).map((cell) => cell.trim().replace(/^"(.*)"$/, '$1'))
    if (cells.every((cell) => cell === '')) {
      gap = true
      return
    }
    const stray = cells.some((cell) => cell.includes('"'))
    visit({
      line: first + index,
      cells: cells.map(tidied),
      afterGap: gap,
      problem: stray ? 'a quotation mark is not closed on its line.' : problemOf(cells, false),
    })
    gap = false
  })
}

function problemOf(cells: readonly string[], quotes: boolean): string | null {
  if (quotes) return 'it has a stray quotation mark.'
  return cells.some((cell) => cell.includes('\u0000')) ? 'it holds a character that is no text (zero).' : null
}

function newlines(text: string, from: number, to: number): number {
  let count = 0
  for (let at = text.indexOf('\n', from); at >= 0 && at < to; at = text.indexOf('\n', at + 1)) count++
  return count
}

function tidied(cell: string): string {
  return disarmed(cell.trim())
}

function noteOf(sniffed: Sniffed): string {
  return `Delimiter ${DELIMITER_NAMES[sniffed.delimiter] ?? sniffed.delimiter}, decimal ${sniffed.decimalComma ? 'comma' : 'point'}.`
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

/**
 * As readBare, for many cells of one column: where the unit is a power of ten of the base unit the point is moved in the text, which gives the
 * same nearest number without exact fractions.
 */
export function bareReader(unit: string, dimension: Dimension, sniffed: Sniffed): (cell: string) => number | null {
  const power = powerOfTen(unit, dimension)
  if (power === null) return (cell) => readBare(cell, unit, dimension, sniffed)
  return (cell) => {
    const plain = plainNumber(cell, sniffed.decimalComma)
    if (plain === null) return null
    if (power === 0) return Number(plain)
    const mark = plain.search(/[eE]/)
    const value =
      mark < 0
        ? Number(`${plain}e${power}`)
        : Number(`${plain.slice(0, mark)}e${Number(plain.slice(mark + 1)) + power}`)
    return Number.isFinite(value) ? value : null
  }
}

/** Exponent of a unit that is a power of ten of its base unit; null for any other. */
function powerOfTen(unit: string, dimension: Dimension): number | null {
  if (unit === '') return dimension === 'number' ? 0 : null
  try {
    const { numerator, denominator, offset, dimension: own } = unitOf(unit)
    const power = Math.round(Math.log10(numerator) - Math.log10(denominator))
    const exact = power >= 0 ? numerator === denominator * 10 ** power : denominator === numerator * 10 ** -power
    // Both are areas in a time and share their units.
    const fits = own === dimension || (own === 'kinematicViscosity' && dimension === 'circulation')
    return fits && exact && offset === undefined ? power : null
  } catch (error) {
    if (error instanceof DomainError) return null
    throw error
  }
}
