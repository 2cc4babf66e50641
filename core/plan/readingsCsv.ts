/**
 * Readings from CSV or pasted text: trajectories of rings, force logs, piston logs.
 *
 * Delimiter, decimal mark, units and columns are found, shown and can be set; a row that cannot be read is named by its line, never dropped in
 * silence.
 */
import { at } from '../base'
import type { ProgrammeRow } from '../pulse'
import { parseQuantity } from '../quantity'
import { forceLog, type ForceLog, type ReadingRow, type ReadingsColumn, type ReadingsKind } from '../tank'
import { bareReader, walkTextTable, type Sniffed, type WalkedLine } from './csvReader'
import { LARGEST_FORCE_LOG } from './decodeForceLog'
import { LARGEST_PISTON_ROWS, LARGEST_READING_ROWS } from './decodeReadings'
import {
  isHeading,
  readColumns,
  READINGS_ROLES,
  type ReadColumns,
  type ReadingsChoices,
  type ReadingsRole,
} from './readingsColumns'
import type { SkippedRow } from './ringCsv'

/** Skipped rows that are named one by one; all are counted. */
export const MOST_NAMED = 10_000

export interface ReadingsTable {
  readonly ok: true
  readonly kind: ReadingsKind
  /** What was found in the file, or set: every column, to be shown and kept. */
  readonly columns: readonly ReadingsColumn[]
  readonly delimiter: string
  readonly decimalComma: boolean
  /** Filled by its kind; the others are empty. */
  readonly rows: readonly ReadingRow[]
  readonly force: ForceLog
  readonly piston: readonly ProgrammeRow[]
  readonly skipped: readonly SkippedRow[]
  /** All rows that were skipped, those beyond the named ones included. */
  readonly skippedCount: number
  readonly notes: readonly string[]
}

export type ReadingsReading = ReadingsTable | { readonly ok: false; readonly message: string }

/** Values of a line by role in SI; null where the cell is empty. */
export type LineValues = ReadonlyMap<ReadingsRole, number | null>

/**
 * Read a table of readings.
 *
 * @param choices what the user set; the rest is found
 * @returns the readings and each row that could not be read with why, or a sentence where no table could be read at all. Velocity fields are
 *   read by `readFieldFrame`.
 */
export function readReadings(source: string, choices: ReadingsChoices = {}): ReadingsReading {
  const rows: ReadingRow[] = []
  const piston: ProgrammeRow[] = []
  const [times, forces]: [number[], number[]] = [[], []]
  const runs = new Set<string>()
  let lastTime = Number.NEGATIVE_INFINITY
  const take: TakeLine = (values, { run, kind }) => {
    const value = (role: ReadingsRole): number | null => values.get(role) ?? null
    const time = value('time')
    if (time === null) return 'time must be given.'
    if (kind === 'rows') {
      const row = rowOf(run, time, value)
      if (typeof row === 'string') return row
      if (rows.length >= LARGEST_READING_ROWS) return `a trajectory has at most ${LARGEST_READING_ROWS} rows.`
      runs.add(run)
      rows.push(row)
      return null
    }
    if (!(time > lastTime)) return `its time ${time} s does not come after ${lastTime} s, the row before it.`
    if (kind === 'force') {
      const force = value('force')
      if (force === null) return 'force must be given.'
      if (times.length >= LARGEST_FORCE_LOG) return `a force log has at most ${LARGEST_FORCE_LOG} rows.`
      times.push(time)
      forces.push(force)
    } else {
      const [position, speed] = [value('position'), value('speed')]
      if (piston.length >= LARGEST_PISTON_ROWS) return `a piston log has at most ${LARGEST_PISTON_ROWS} rows.`
      if (position !== null) piston.push({ time, position })
      else if (speed !== null) piston.push({ time, speed })
      else return 'the position or the speed of the piston must be given.'
    }
    lastTime = time
    return null
  }
  const walked = walkReadings(source, choices, take)
  if (!walked.ok) return walked
  if (walked.kind === 'fields')
    return { ok: false, message: 'This is a velocity field: columns x, r (or y), u and v. Read it as one.' }
  const mixed = piston.length > 0 && piston.some((row) => 'position' in row !== 'position' in at(piston, 0))
  if (mixed)
    return { ok: false, message: 'A piston log must give the position in every row, or the speed in every row.' }
  const count = rows.length + times.length + piston.length
  if (count === 0) return { ok: false, message: walked.skipped[0]?.message ?? 'The table has a heading and no rows.' }
  const notes =
    runs.size > 1 ? [`${runs.size} runs: ${[...runs].slice(0, 8).join(', ')}${runs.size > 8 ? '\u2026' : ''}.`] : []
  return { ...walked, rows, force: forceLog(times, forces), piston, notes: [...walked.notes, ...notes] }
}

/** Take in one line; a sentence where it is refused. */
export type TakeLine = (
  values: LineValues,
  about: { readonly run: string; readonly kind: ReadingsKind; readonly line: number; readonly newRun: boolean },
) => string | null

type Walked =
  | (Omit<ReadingsTable, 'rows' | 'force' | 'piston'> & { readonly read: number })
  | { readonly ok: false; readonly message: string }

/** Every line of a table as values in SI. Runs are told by their column, or by empty lines between them. */
export function walkReadings(source: string, choices: ReadingsChoices, take: TakeLine): Walked {
  const skipped: SkippedRow[] = []
  let skippedCount = 0
  let read = 0
  let again = 0
  let columns: ReadColumns | null = null
  let line: ((walked: WalkedLine) => ReadLine) | null = null
  let block = 1
  let fresh = false
  let sniffed: Sniffed | null = null
  const marks = {
    ...(choices.delimiter === undefined ? {} : { delimiter: choices.delimiter }),
    ...(choices.decimalComma === undefined ? {} : { decimalComma: choices.decimalComma }),
  }
  const skip = (at: number, why: string): void => {
    skippedCount++
    if (skipped.length < MOST_NAMED) skipped.push({ line: at, message: `Line ${at}: ${why}` })
  }
  const walk = walkTextTable(source, marks, (walked, found) => {
    if (walked.problem !== null) {
      skip(walked.line, walked.problem)
      return
    }
    if (columns === null) {
      sniffed = found
      columns = readColumns(walked, choices, found)
      if (columns.ok) line = lineReader(columns, found)
      if (!columns.ok || columns.headed) return
    }
    if (!columns.ok || line === null) return
    if (walked.afterGap && read > 0) {
      block++
      fresh = true
    }
    if (columns.headed && walked.afterGap && isHeading(walked, found)) {
      again++
      return
    }
    const { values, run, problem } = line(walked)
    const why =
      problem ?? take(values, { run: run ?? String(block), kind: columns.kind, line: walked.line, newRun: fresh })
    fresh = false
    if (why === null) read++
    else skip(walked.line, why)
  })
  if (!walk.ok) return walk
  const made: ReadColumns | null = columns
  if (made === null || sniffed === null)
    return { ok: false, message: skipped[0]?.message ?? 'The table is empty: it needs a heading and rows below it.' }
  return finished(made, walk, { skipped, skippedCount, read, again })
}

function finished(
  columns: ReadColumns,
  walk: { readonly sniffed: Sniffed; readonly note: string },
  of: {
    readonly skipped: readonly SkippedRow[]
    readonly skippedCount: number
    readonly read: number
    readonly again: number
  },
): Walked {
  if (!columns.ok) return columns
  const words = columns.columns.map(({ heading, role, unit }) =>
    role === null ? `"${heading}" not used` : `"${heading}" as ${labelOf(role)}${unit === '' ? '' : ` in ${unit}`}`,
  )
  const notes = [walk.note, `Columns: ${words.join('; ')}.`]
  if (columns.pixels) notes.push('Lengths are in pixels: set the length scale to the size of a pixel.')
  if (of.again > 0) notes.push(`The heading stands again ${of.again} ${of.again === 1 ? 'time' : 'times'}.`)
  if (of.skippedCount > 0)
    notes.push(
      `${of.skippedCount} of ${of.skippedCount + of.read} rows were skipped${of.skippedCount > of.skipped.length ? `, the first ${of.skipped.length} of them named` : ''}.`,
    )
  return {
    ok: true,
    kind: columns.kind,
    columns: columns.columns,
    delimiter: walk.sniffed.delimiter,
    decimalComma: walk.sniffed.decimalComma,
    skipped: of.skipped,
    skippedCount: of.skippedCount,
    read: of.read,
    notes,
  }
}

function labelOf(role: string): string {
  return Object.entries(READINGS_ROLES).find(([key]) => key === role)?.[1].label ?? role
}

interface ReadLine {
  readonly values: LineValues
  readonly run: string | null
  readonly problem: string | null
}

/** No vector, as programs write it. */
const NOTHING = /^(?:nan|n\/?a|null|none|-+)$/iu

function lineReader(
  { used, columns }: Extract<ReadColumns, { ok: true }>,
  sniffed: Sniffed,
): (line: WalkedLine) => ReadLine {
  const readers = used
    .filter(({ role }) => role !== 'run')
    .map((column) => ({
      ...column,
      ...READINGS_ROLES[column.role],
      role: column.role,
      unit: column.unit,
      read: bareReader(column.unit, READINGS_ROLES[column.role].dimension, sniffed),
    }))
  const runColumn = used.find(({ role }) => role === 'run')
  return ({ cells }) => {
    const values = new Map<ReadingsRole, number | null>()
    const beyond = cells.slice(columns.length).filter((cell) => cell !== '').length
    if (beyond > 0)
      return {
        values,
        run: null,
        problem: `it has ${cells.length} cells where the table has ${columns.length} columns.`,
      }
    for (const { role, index, unit, dimension, label, read } of readers) {
      const cell = cells[index] ?? ''
      if (cell === '' || NOTHING.test(cell)) {
        values.set(role, null)
        continue
      }
      const bare = read(cell)
      if (bare !== null) {
        values.set(role, bare)
        continue
      }
      const text = sniffed.decimalComma ? cell.replace(',', '.') : cell
      const parsed = parseQuantity(text, dimension, unit, { name: label })
      if (!parsed.ok) return { values, run: null, problem: parsed.message }
      values.set(role, parsed.value)
    }
    const run = runColumn === undefined ? null : (cells[runColumn.index] ?? '')
    return { values, run: run === '' ? null : run, problem: null }
  }
}

function rowOf(run: string, time: number, value: (role: ReadingsRole) => number | null): ReadingRow | string {
  const row: ReadingRow = {
    run,
    time,
    x: value('x'),
    radius: value('radius'),
    circulation: value('circulation'),
    sigmaX: value('sigmaX'),
    sigmaRadius: value('sigmaRadius'),
    sigmaCirculation: value('sigmaCirculation'),
  }
  if (row.x === null && row.radius === null && row.circulation === null)
    return 'it holds no place, radius or circulation.'
  if (row.radius !== null && !(row.radius > 0)) return `radius must be above 0 m, got ${row.radius} m.`
  for (const [label, sigma] of [
    ['place', row.sigmaX],
    ['radius', row.sigmaRadius],
    ['circulation', row.sigmaCirculation],
  ] as const)
    if (sigma !== null && !(sigma > 0)) return `the uncertainty of the ${label} must be above 0, got ${sigma}.`
  return row
}
