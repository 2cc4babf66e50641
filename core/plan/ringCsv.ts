/**
 * Lists of rings read from CSV or pasted cells.
 */
import type { WakeRing } from '../filament'
import { formatQuantity, parseQuantity } from '../quantity'
import type { CoreModel } from '../ring'
import { headingUnit, readBare, readNumber, readTextTable, type Sniffed, type TextLine } from './csvReader'
import { RING_TABLE_KEYS, SI_RING_UNITS, type RingTableKey, type RingTableUnits } from './ringTable'
import { CORE_WORDS, RING_COLUMNS, type RingColumnKey } from './wakeFields'

export interface SkippedRow {
  readonly line: number
  /** Why, in a sentence that names the line. */
  readonly message: string
}

export type RingReading =
  | {
      readonly ok: true
      readonly rings: readonly WakeRing[]
      readonly skipped: readonly SkippedRow[]
      /** What was found and assumed: delimiter, decimal mark, columns and units. */
      readonly notes: readonly string[]
    }
  | { readonly ok: false; readonly message: string }

interface Column {
  readonly key: RingTableKey
  readonly index: number
  readonly unit: string
}

const NEEDED: readonly RingColumnKey[] = ['circulation', 'radius', 'coreRadius']

/** Words a heading may use beside the column's own label and key, as `bareWord` leaves them. */
const OTHER_WORDS: Readonly<Record<string, RingTableKey>> = {
  gamma: 'circulation',
  starttime: 'startTime',
  coremodel: 'core',
  dx: 'directionX',
  dy: 'directionY',
  dz: 'directionZ',
}

/** Largest core radius over ring radius that is read; the march may ask for less. */
const THICKEST_CORE = 1.5

/** Value of a column that is absent or empty. */
const USUAL: Partial<Readonly<Record<RingColumnKey, number>>> = {
  x: 0,
  y: 0,
  z: 0,
  directionX: 1,
  directionY: 0,
  directionZ: 0,
  axisRatio: 1,
  startTime: 0,
}

/**
 * Rings from CSV, TSV or pasted cells.
 *
 * @param source with a heading line of the columns' labels or keys, units in brackets; or bare columns in the order of
 *   RING_TABLE_KEYS, or of its quantities where there is no column of words. A cell may carry its own unit.
 * @param units unit of a column whose heading names none, and of bare columns; SI where absent
 * @returns the rings in SI and each row that could not be read with why, or a sentence where no row could be read at all.
 *   Whether the rings make a wake (apart from one another, clear of walls) is judged when they are marched.
 */
export function readRingTable(source: string, units: RingTableUnits = SI_RING_UNITS): RingReading {
  const table = readTextTable(source)
  if (!table.ok) return table
  const { lines, sniffed } = table
  const first = lines[0]
  if (first === undefined)
    return refused('The table is empty: it needs circulation, radius and core radius of each ring.')
  const columns = columnsOf(first, lines[1] ?? first, units, sniffed)
  if (!columns.ok) return columns
  const rings: WakeRing[] = []
  const skipped: SkippedRow[] = []
  for (const line of columns.headed ? lines.slice(1) : lines) {
    const ring = ringOf(line, columns.list, sniffed)
    if (typeof ring === 'string') skipped.push({ line: line.line, message: `Line ${line.line}: ${ring}` })
    else rings.push(ring)
  }
  if (rings.length === 0)
    return refused(skipped[0]?.message ?? 'The table has a heading and no rows: each ring is one row below it.')
  return { ok: true, rings, skipped, notes: [table.note, ...columns.notes] }
}

function refused(message: string): { readonly ok: false; readonly message: string } {
  return { ok: false, message }
}

/** The words of a heading without its unit, in small letters and without blanks. */
function bareWord(heading: string): string {
  return heading
    .replace(/[([].*$/u, '')
    .replace(/[^\p{L}\d]/gu, '')
    .toLowerCase()
}

function keyOf(heading: string): RingTableKey | null {
  const word = bareWord(heading)
  const named = RING_TABLE_KEYS.find(
    (key) => key.toLowerCase() === word || (key !== 'core' && bareWord(RING_COLUMNS[key].label) === word),
  )
  return named ?? OTHER_WORDS[word] ?? null
}

type Columns =
  | { readonly ok: true; readonly headed: boolean; readonly list: readonly Column[]; readonly notes: readonly string[] }
  | { readonly ok: false; readonly message: string }

function columnsOf(first: TextLine, second: TextLine, units: RingTableUnits, sniffed: Sniffed): Columns {
  const headed =
    first.cells.every((cell) => readNumber(cell, sniffed) === null) && first.cells.some((cell) => keyOf(cell))
  return headed ? namedColumns(first.cells, units) : bareColumns(first, second, units, sniffed)
}

function namedColumns(headings: readonly string[], units: RingTableUnits): Columns {
  const list: Column[] = []
  const ignored: string[] = []
  for (const [index, heading] of headings.entries()) {
    const key = keyOf(heading)
    if (key === null || list.some((column) => column.key === key)) {
      if (heading !== '') ignored.push(`“${heading}”`)
    } else if (key === 'core') list.push({ key, index, unit: '' })
    else {
      const found = headingUnit(heading, RING_COLUMNS[key].dimension, units[key])
      if (!found.ok) return found
      list.push({ key, index, unit: found.unit })
    }
  }
  const missing = NEEDED.filter((key) => !list.some((column) => column.key === key))
  if (missing.length > 0)
    return refused(
      `The heading must name ${missing.map((key) => RING_COLUMNS[key].label.toLowerCase()).join(', ')}, got "${headings.join(', ')}".`,
    )
  const notes = ignored.length === 0 ? [] : [`Columns not used: ${ignored.join(', ')}.`]
  return { ok: true, headed: true, list, notes }
}

function bareColumns(first: TextLine, second: TextLine, units: RingTableUnits, sniffed: Sniffed): Columns {
  const count = Math.max(first.cells.length, second.cells.length)
  if (count < NEEDED.length)
    return refused(
      `Each ring needs circulation, radius and core radius, in this order or under a heading; this table has ${count} column${count === 1 ? '' : 's'}.`,
    )
  // The fourth column is the core's model where it holds words, else the first of the places.
  const fourth = [first, second].map(({ cells }) => cells[3] ?? '').find((cell) => cell !== '') ?? ''
  const worded = fourth === '' || readCore(fourth) !== null || readNumber(fourth, sniffed) === null
  const keys = worded ? RING_TABLE_KEYS : RING_TABLE_KEYS.filter((key) => key !== 'core')
  const list = keys.slice(0, count).map((key, index) => ({ key, index, unit: key === 'core' ? '' : units[key] }))
  const words = list.map(({ key, unit }) =>
    key === 'core' ? 'core' : `${RING_COLUMNS[key].label.toLowerCase()}${unit === '' ? '' : ` in ${unit}`}`,
  )
  return { ok: true, headed: false, list, notes: [`No heading: columns read as ${words.join(', ')}.`] }
}

/** A ring of a line, or why it is none. */
function ringOf({ cells }: TextLine, columns: readonly Column[], sniffed: Sniffed): WakeRing | string {
  const values = new Map<RingColumnKey, number>()
  let core: CoreModel = 'uniform'
  for (const { key, index, unit } of columns) {
    const cell = cells[index] ?? ''
    if (key === 'core') {
      const read = cell === '' ? 'uniform' : readCore(cell)
      if (read === null) return `core must be one of ${Object.values(CORE_WORDS).join(', ')}, got "${cell}".`
      core = read
    } else if (cell !== '') {
      const value = readCell(cell, key, unit, sniffed)
      if (typeof value === 'string') return value
      values.set(key, value)
    }
  }
  const missing = NEEDED.find((key) => !values.has(key))
  if (missing !== undefined) return `${RING_COLUMNS[missing].label.toLowerCase()} must be given.`
  const value = (key: RingColumnKey): number => values.get(key) ?? USUAL[key] ?? 0
  const ring: WakeRing = {
    circulation: value('circulation'),
    radius: value('radius'),
    coreRadius: value('coreRadius'),
    core,
    centre: [value('x'), value('y'), value('z')],
    direction: [value('directionX'), value('directionY'), value('directionZ')],
    axisRatio: value('axisRatio'),
    startTime: value('startTime'),
  }
  const unitOf = (key: RingColumnKey): string =>
    columns.find((column) => column.key === key)?.unit ?? SI_RING_UNITS[key]
  return whatIsWrong(ring, unitOf) ?? ring
}

function readCore(cell: string): CoreModel | null {
  const word = cell.toLowerCase()
  if (word === 'uniform' || word === 'hollow' || word === 'gaussian') return word
  return null
}

/** A number in the column's unit, or a quantity with its own. */
function readCell(cell: string, key: RingColumnKey, unit: string, sniffed: Sniffed): number | string {
  const { label, dimension } = RING_COLUMNS[key]
  const bare = readBare(cell, unit, dimension, sniffed)
  if (bare !== null) return bare
  const text = sniffed.decimalComma ? cell.replace(',', '.') : cell
  const parsed = parseQuantity(text, dimension, unit, { name: label })
  return parsed.ok ? parsed.value : parsed.message
}

/** What a ring by itself breaks, in a sentence in the units of its columns; null for nothing. */
function whatIsWrong(ring: WakeRing, unitOf: (key: RingColumnKey) => string): string | null {
  const got = (key: RingColumnKey, limit: string, bound: number, value: number): string => {
    const shown = (base: number): string => formatQuantity(base, unitOf(key), 6)
    return `${RING_COLUMNS[key].label.toLowerCase()} must be ${limit} ${shown(bound)}, got ${shown(value)}.`
  }
  const { circulation, radius, coreRadius, axisRatio = 1, startTime = 0 } = ring
  if (circulation === 0) return 'circulation must not be 0: a ring without it is no ring.'
  if (!(radius > 0)) return got('radius', 'above', 0, radius)
  if (!(coreRadius > 0)) return got('coreRadius', 'above', 0, coreRadius)
  if (coreRadius > THICKEST_CORE * radius) return got('coreRadius', 'at most', THICKEST_CORE * radius, coreRadius)
  if (!(axisRatio > 0)) return got('axisRatio', 'above', 0, axisRatio)
  if (startTime < 0) return got('startTime', 'at least', 0, startTime)
  if (ring.direction.every((value) => value === 0)) return 'the direction must point somewhere, got 0, 0, 0.'
  return null
}
