/**
 * A speed programme given row by row: what its rows must hold, and the exact pieces between them.
 *
 * Speeds are joined by straight lines; positions by a monotone cubic, whose slope is the speed. Time zero is the first
 * piston motion, so rest before and after the motion is cut off.
 */
import { at, last, monotoneCubic, type Problem } from '../base'
import { straightPieces, type SpeedPiece } from './speedPieces'
import type { ProgrammeRow } from './types'

/** Fewer rows have no shape to speak of. */
const FEWEST_ROWS = 3
/** After this many problems the rest is more of the same. */
const MOST_PROBLEMS = 20

/**
 * What is wrong with the rows of a programme, in row order; empty where nothing is.
 *
 * Rows must be at least three, all with a speed or all with a position, finite, at strictly rising times, with no
 * negative speed, no falling position and a positive stroke.
 *
 * @returns sentences that name the row, counted from 1; `field` is the plan path `programme.rows.<index from 0>.<key>`.
 */
export function programmeRowProblems(rows: readonly ProgrammeRow[]): Problem[] {
  const first = rows[0]
  if (first === undefined || rows.length < FEWEST_ROWS) {
    return [
      problem(
        'programme.rows',
        `${rows.length} rows`,
        'at least 3 rows',
        `A programme table needs at least 3 rows, got ${rows.length}.`,
      ),
    ]
  }
  const quantity = quantityOf(first)
  const problems: Problem[] = []
  for (let i = 0; i < rows.length && problems.length < MOST_PROBLEMS; i++) {
    const found = rowProblem(at(rows, i), i, i === 0 ? null : at(rows, i - 1), quantity)
    if (found !== null) problems.push(found)
  }
  if (problems.length === 0 && !(strokeOfRows(rows) > 0)) {
    const stroke = strokeOfRows(rows)
    const text = `The rows of the programme must add up to a stroke above 0 m, got ${stroke} m: the piston never moves.`
    problems.push(problem('programme.rows', `${stroke} m`, 'a stroke above 0 m', text))
  }
  return problems
}

/** Slug length of valid rows [m]: the sum under the speeds, or last less first position. */
export function strokeOfRows(rows: readonly ProgrammeRow[]): number {
  const first = rows[0]
  if (first === undefined) return 0
  if ('position' in first) {
    const end = last(rows)
    return 'position' in end ? end.position - first.position : 0
  }
  let sum = 0
  for (let i = 0; i + 1 < rows.length; i++) {
    const a = at(rows, i)
    const b = at(rows, i + 1)
    sum += ((b.time - a.time) * (valueOf(a) + valueOf(b))) / 2
  }
  return sum
}

/** Rows in a time stretched by a factor: speeds are kept, so positions stretch with it. */
export function stretchRows(rows: readonly ProgrammeRow[], factor: number): ProgrammeRow[] {
  return rows.map((row) =>
    'speed' in row
      ? { time: row.time * factor, speed: row.speed }
      : { time: row.time * factor, position: row.position * factor },
  )
}

/** Pieces of valid rows from the first motion (time 0) to the last, and what was cut off. */
export function piecesOfRows(rows: readonly ProgrammeRow[]): {
  readonly pieces: readonly SpeedPiece[]
  readonly notes: readonly string[]
} {
  const times = rows.map((row) => row.time)
  const values = rows.map(valueOf)
  const all = quantityOf(at(rows, 0)) === 'speed' ? straightPieces(times, values) : cubicPieces(times, values)
  let from = 0
  let to = all.length
  while (from < to - 1 && isRest(at(all, from))) from++
  while (to - 1 > from && isRest(at(all, to - 1))) to--
  const origin = at(all, from).start
  const pieces = all.slice(from, to).map((piece) => ({ ...piece, start: piece.start - origin }))
  const notes: string[] = []
  if (origin !== 0)
    notes.push(`Time is counted from the first piston motion: ${origin} s has been taken off every time of the table.`)
  if (to < all.length)
    notes.push(`The stroke ends where the motion does: the rest after ${at(all, to).start} s of the table is left out.`)
  return { pieces, notes }
}

/** The slope of the monotone cubic through positions, piece by piece. */
function cubicPieces(times: readonly number[], positions: readonly number[]): SpeedPiece[] {
  const curve = monotoneCubic(times, positions)
  return Array.from({ length: times.length - 1 }, (_, i) => {
    const start = at(times, i)
    const length = at(times, i + 1) - start
    const mean = (at(positions, i + 1) - at(positions, i)) / length
    const m0 = at(curve.slope, i)
    const m1 = at(curve.slope, i + 1)
    return {
      start,
      length,
      c0: m0,
      c1: (6 * mean - 4 * m0 - 2 * m1) / length,
      c2: (3 * (m0 + m1 - 2 * mean)) / (length * length),
    }
  })
}

function isRest(piece: SpeedPiece): boolean {
  return piece.c0 === 0 && piece.c1 === 0 && piece.c2 === 0
}

function quantityOf(row: ProgrammeRow): 'speed' | 'position' {
  return 'speed' in row ? 'speed' : 'position'
}

function valueOf(row: ProgrammeRow): number {
  return 'speed' in row ? row.speed : row.position
}

/** The first thing wrong with a row, or null. */
function rowProblem(
  row: ProgrammeRow,
  index: number,
  before: ProgrammeRow | null,
  quantity: 'speed' | 'position',
): Problem | null {
  const name = `Row ${index + 1} of the programme`
  const field = `programme.rows.${index}`
  const own = quantityOf(row)
  const value = valueOf(row)
  if (own !== quantity) {
    const text = `${name} has a ${own}, row 1 has a ${quantity}: all rows must give the same one.`
    return problem(`${field}.${own}`, `a ${own}`, `a ${quantity} in every row`, text)
  }
  if (!Number.isFinite(row.time)) {
    return problem(`${field}.time`, `${row.time}`, 'a finite time', `${name} must have a finite time, got ${row.time}.`)
  }
  if (!Number.isFinite(value)) {
    const text = `${name} must have a finite ${own}, got ${value}.`
    return problem(`${field}.${own}`, `${value}`, `a finite ${own}`, text)
  }
  if (own === 'speed' && value < 0) {
    const text = `${name} must have a speed of at least 0 m/s, got ${value} m/s: fluid drawn back in is not part of a stroke.`
    return problem(`${field}.speed`, `${value} m/s`, 'at least 0 m/s', text)
  }
  if (before === null) return null
  if (!(row.time > before.time)) {
    const text = `${name} must be later than row ${index} at ${before.time} s, got ${row.time} s.`
    return problem(`${field}.time`, `${row.time} s`, `after ${before.time} s`, text)
  }
  if (own === 'position' && value < valueOf(before)) {
    const text = `${name} must not lie behind row ${index} at ${valueOf(before)} m, got ${value} m.`
    return problem(`${field}.position`, `${value} m`, `at least ${valueOf(before)} m`, text)
  }
  return null
}

function problem(field: string, value: string, limit: string, message: string): Problem {
  return { field, value, limit, message }
}
