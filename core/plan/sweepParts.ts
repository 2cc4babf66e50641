/**
 * Parts of a sweep that several machines share: which rows are whose, what a killed part had finished, and the parts as one table.
 *
 * Row r (from 1) belongs to part (r - 1) mod n + 1 of n, so that slow and fast corners of a sweep spread over all parts.
 */
import { at, DomainError } from '../base'
import { csvLine } from './csvWriter'

export const SWEEP_PART_FORMAT = 'ringwright-sweep-part'
export const SWEEP_PART_VERSION = 1

/** Part `index` (from 1) of `of` parts. */
export interface SweepPart {
  readonly index: number
  readonly of: number
}

export const WHOLE_SWEEP: SweepPart = { index: 1, of: 1 }

/** What lies beside the rows of a part, as JSON: a table of numbers cannot say what it was computed from. */
export interface SweepPartNote {
  readonly program: { readonly name: string; readonly version: string }
  readonly inputHash: string
  readonly part: SweepPart
  /** Rows of the whole sweep. */
  readonly total: number
  readonly columns: readonly string[]
}

/** Names of the files of a part. */
export function sweepFileNames(part: SweepPart | null): {
  readonly table: string
  readonly note: string
  readonly unfinished: string
} {
  const base = part === null ? 'sweep' : `sweep.${part.index}-of-${part.of}`
  return { table: `${base}.csv`, note: `${base}.json`, unfinished: `${base}.csv.partial` }
}

/** Numbers of the rows of a part, rising. */
export function rowsOfPart({ index, of }: SweepPart, total: number): readonly number[] {
  const count = Math.max(0, Math.ceil((total - index + 1) / of))
  return Array.from({ length: count }, (_, k) => index + k * of)
}

export function partNoteText(note: SweepPartNote): string {
  const { program, inputHash, part, total, columns } = note
  const document = {
    format: SWEEP_PART_FORMAT,
    version: SWEEP_PART_VERSION,
    program,
    inputHash,
    part: part.index,
    of: part.of,
    rows: total,
    columns,
  }
  return `${JSON.stringify(document, null, 2)}\n`
}

/** The finished rows of a part whose writing was cut off: header and whole lines in their order, as far as they are sound. */
export interface KeptRows {
  /** What may stay of the file. */
  readonly text: string
  readonly rows: number
}

/** @returns nothing kept where even the header is not that of the part */
export function keptRows(text: string, { part, total, columns }: SweepPartNote): KeptRows {
  const header = csvLine(columns)
  if (!text.startsWith(header)) return { text: '', rows: 0 }
  const numbers = rowsOfPart(part, total)
  let end = header.length
  let rows = 0
  while (rows < numbers.length) {
    const next = text.indexOf(LINE_END, end)
    if (next < 0 || !isRow(text.slice(end, next), at(numbers, rows), columns.length)) break
    end = next + LINE_END.length
    rows++
  }
  return { text: text.slice(0, end), rows }
}

const LINE_END = '\r\n'

function isRow(line: string, row: number, cells: number): boolean {
  return line.startsWith(`${row},`) && cellCount(line) === cells
}

/** Cells of a line; commas inside quotes do not count. */
function cellCount(line: string): number {
  let count = 1
  let quoted = false
  for (const character of line) {
    if (character === '"') quoted = !quoted
    else if (character === ',' && !quoted) count++
  }
  return quoted ? 0 : count
}

/** A part as it was found. */
export interface FoundPart {
  /** The file, as the user knows it, for sentences. */
  readonly name: string
  readonly note: SweepPartNote
  /** Its table; null where it is not finished. */
  readonly text: string | null
}

/**
 * Parts as the one table that the sweep gives when it is not split, to the byte and in whatever order they come.
 *
 * @param inputHash of the plan they must have been computed from
 * @throws {DomainError} where parts are missing, unfinished, there twice, damaged, or not of this plan and of one another
 */
export function mergeSweepParts(parts: readonly FoundPart[], inputHash: string): string {
  const [first] = parts
  if (first === undefined) refuse('No part of a sweep was found in the folders after --merge.')
  for (const { name, note } of parts) {
    if (note.inputHash !== inputHash) refuse(`${name} was computed from another plan than the one given.`)
    requireLike(first, name, note)
  }
  const { of } = first.note.part
  const byIndex = new Map<number, FoundPart>()
  for (const part of parts) {
    const { index } = part.note.part
    const other = byIndex.get(index)
    if (other !== undefined) refuse(`Part ${index} of ${of} is there twice: ${other.name} and ${part.name}.`)
    byIndex.set(index, part)
  }
  const missing = Array.from({ length: of }, (_, k) => k + 1).filter((index) => !byIndex.has(index))
  if (missing.length > 0)
    refuse(
      `${missing.length === 1 ? 'Part' : 'Parts'} ${listed(missing)} of ${of} ${missing.length === 1 ? 'is' : 'are'} missing.`,
    )
  const lines: string[] = []
  for (const part of byIndex.values()) takeRows(part, lines)
  return csvLine(first.note.columns) + lines.join('')
}

/** Many numbers are not all listed. */
function listed(numbers: readonly number[]): string {
  const shown = numbers.slice(0, 10).join(', ')
  return numbers.length > 10 ? `${shown} and ${numbers.length - 10} more` : shown
}

function requireLike(first: FoundPart, name: string, { part, total, columns, program }: SweepPartNote): void {
  const { note } = first
  if (part.of !== note.part.of)
    refuse(`${name} is one of ${part.of} parts, ${first.name} one of ${note.part.of}: all must be of one split.`)
  if (program.version !== note.program.version)
    refuse(
      `${name} was computed by version ${program.version}, ${first.name} by ${note.program.version}: all must be of one version.`,
    )
  if (total !== note.total || csvLine(columns) !== csvLine(note.columns))
    refuse(`${name} and ${first.name} tell of different tables.`)
}

/** Put the rows of a part into their places. */
function takeRows({ name, note, text }: FoundPart, lines: string[]): void {
  if (text === null)
    refuse(
      `${name} is not finished: run part ${note.part.index} of ${note.part.of} again, it goes on where it stopped.`,
    )
  const numbers = rowsOfPart(note.part, note.total)
  const kept = keptRows(text, note)
  if (kept.rows !== numbers.length || kept.text.length !== text.length)
    refuse(
      `${name} is damaged: it must hold the ${numbers.length} rows of part ${note.part.index} of ${note.part.of} and nothing else, and ${kept.rows} of them are sound.`,
    )
  const header = csvLine(note.columns)
  const rows = kept.text.slice(header.length).split(LINE_END)
  numbers.forEach((row, k) => {
    lines[row - 1] = `${at(rows, k)}${LINE_END}`
  })
}

function refuse(message: string): never {
  throw new DomainError('merge', message)
}
