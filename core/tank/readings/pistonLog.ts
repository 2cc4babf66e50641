/**
 * What the piston really did, as a programme at the exit: the prediction is then recomputed for it.
 */
import { at } from '../../base'
import {
  compileProgramme,
  exitPerPiston,
  programmeRowProblems,
  type NozzleInput,
  type ProgrammeInput,
  type ProgrammeRow,
} from '../../pulse'

/** Steps back, over the whole travel, up to which a log is noise and not a stroke back. */
const LARGEST_STEP_BACK = 0.01
/** Rows of the programme: a longer log is thinned to means over equal times. */
const MOST_ROWS = 2000

export type AsRunProgramme =
  | { readonly ok: true; readonly programme: ProgrammeInput; readonly notes: readonly string[] }
  | { readonly ok: false; readonly message: string }

/**
 * The programme at the exit of an as-run log.
 *
 * @param rows of the piston, all with a position or all with a speed, at rising times
 * @param leak share of the piston's displacement that leaks past it, 0 to below 1: the exit moves that much less
 * @param lag time of the log before the piston's start [s], taken off
 */
export function programmeOfLog(
  rows: readonly ProgrammeRow[],
  nozzle: NozzleInput,
  { leak = 0, timeOffset = 0 }: { readonly leak?: number; readonly timeOffset?: number } = {},
): AsRunProgramme {
  if (rows.length < 3) return { ok: false, message: `A piston log needs at least 3 rows, got ${rows.length}.` }
  const factor = exitPerPiston(nozzle) * (1 - leak)
  const notes: string[] = []
  const thinned = thin(rows)
  if (thinned.length < rows.length) notes.push(`The log's ${rows.length} rows are thinned to ${thinned.length} means.`)
  const forward = withoutNoise(thinned)
  if (forward === null)
    return {
      ok: false,
      message:
        'The piston goes back by more than 1 % of its travel in this log: take the rows of one stroke, from its start to its end.',
    }
  if (forward.changed > 0)
    notes.push(`${forward.changed} small steps back, of noise, were held: fluid drawn back in is no part of a stroke.`)
  const exit = forward.rows.map((row): ProgrammeRow =>
    'position' in row
      ? { time: row.time + timeOffset, position: row.position * factor }
      : { time: row.time + timeOffset, speed: row.speed * factor },
  )
  const [problem] = programmeRowProblems(exit)
  if (problem !== undefined) return { ok: false, message: problem.message }
  const table: ProgrammeInput = { shape: 'table', stroke: 0, peakSpeed: 0, riseTime: 0, fallTime: 0, rows: exit }
  const { stroke, peakSpeed } = compileProgramme(table)
  notes.push(
    `Exit over piston by area: ${Number(factor.toPrecision(4))}${leak > 0 ? `, the leak of ${100 * leak} % taken off` : ''}.`,
  )
  return {
    ok: true,
    programme: { ...table, stroke, peakSpeed },
    notes,
  }
}

function thin(rows: readonly ProgrammeRow[]): readonly ProgrammeRow[] {
  if (rows.length <= MOST_ROWS) return rows
  const group = Math.ceil(rows.length / MOST_ROWS)
  const means: ProgrammeRow[] = []
  for (let start = 0; start < rows.length; start += group) {
    const part = rows.slice(start, start + group)
    const of = (value: (row: ProgrammeRow) => number): number =>
      part.reduce((sum, row) => sum + value(row), 0) / part.length
    const time = of((row) => row.time)
    means.push(
      'position' in at(part, 0)
        ? { time, position: of((row) => ('position' in row ? row.position : Number.NaN)) }
        : { time, speed: of((row) => ('speed' in row ? row.speed : Number.NaN)) },
    )
  }
  return means
}

/** Positions that never fall and speeds that are never negative; null where that would change more than noise does. */
function withoutNoise(
  rows: readonly ProgrammeRow[],
): { readonly rows: readonly ProgrammeRow[]; readonly changed: number } | null {
  let highest = Number.NEGATIVE_INFINITY
  let changed = 0
  let back = 0
  let travel = 0
  const held = rows.map((row, index): ProgrammeRow => {
    if ('position' in row) {
      if (row.position < highest) changed++
      back = Math.max(back, highest - row.position)
      highest = Math.max(highest, row.position)
      return { time: row.time, position: highest }
    }
    const step = index === 0 ? 0 : row.time - at(rows, index - 1).time
    if (row.speed < 0) {
      changed++
      back += -row.speed * step
    } else travel += row.speed * step
    return { time: row.time, speed: Math.max(0, row.speed) }
  })
  const first = at(held, 0)
  const whole = 'position' in first ? highest - first.position : travel
  return back > LARGEST_STEP_BACK * whole ? null : { rows: held, changed }
}
