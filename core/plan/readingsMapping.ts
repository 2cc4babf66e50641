/** What was mapped once is mapped again: how a file's columns were read, kept in the plan, as choices for the next file of its kind. */
import { forceLog, type ReadingRow, type ReadingsColumn, type ReadingsKind, type ReadingsSource } from '../tank'
import { READINGS_DEFAULTS } from './decodeReadings'
import { setReadings } from './edit'
import { READINGS_ROLES, type ReadingsChoices, type ReadingsRole } from './readingsColumns'
import type { ReadingsTable } from './readingsCsv'
import type { Plan } from './types'

function isRole(text: string): text is ReadingsRole {
  return text in READINGS_ROLES
}

/** Roles and units of columns as they were read. */
export function choicesOfColumns(
  columns: readonly ReadingsColumn[],
): Required<Pick<ReadingsChoices, 'roles' | 'units'>> {
  return {
    roles: columns.map(({ role }) => (role !== null && isRole(role) ? role : null)),
    units: columns.map(({ role, unit }) => (role === null || unit === '' ? null : unit)),
  }
}

/** The source of the plan whose columns have these headings; the last one where there are several. */
export function sourceLike(plan: Plan, headings: readonly string[]): ReadingsSource | null {
  const like = ({ columns }: ReadingsSource): boolean =>
    columns.length === headings.length && columns.every(({ heading }, index) => heading === headings[index])
  return plan.readings?.sources.findLast(like) ?? null
}

/**
 * The plan with what a file holds: tracks in place of those there or after them, a log in place of the one there. A run that is added under
 * a name there already is told apart by its file.
 */
export function withReadings(
  plan: Plan,
  table: ReadingsTable,
  file: { readonly name: string; readonly hash: string },
  how: 'replace' | 'add',
): Plan {
  const held = plan.readings ?? READINGS_DEFAULTS
  const source: ReadingsSource = { ...file, kind: table.kind, columns: table.columns }
  const others = held.sources.filter(
    ({ kind, name }) => kind !== table.kind || (how === 'add' && table.kind === 'rows' && name !== file.name),
  )
  const sources = [...others, source]
  if (table.kind === 'force') return setReadings(plan, { force: table.force, sources })
  if (table.kind === 'piston') return setReadings(plan, { piston: table.piston, sources })
  const rows = how === 'replace' ? table.rows : [...held.rows, ...apart(held.rows, table.rows, file.name)]
  return setReadings(plan, { rows, sources })
}

/** Rows whose runs have no name of those there. */
function apart(there: readonly ReadingRow[], added: readonly ReadingRow[], file: string): readonly ReadingRow[] {
  const taken = new Set(there.map(({ run }) => run))
  if (!added.some(({ run }) => taken.has(run))) return added
  const stem = file.replace(/\.[^.]*$/u, '')
  const names = new Map<string, string>()
  for (const { run } of added) {
    if (names.has(run)) continue
    const wanted = new Set(added.map((row) => row.run)).size === 1 ? stem : `${stem} ${run}`
    let name = taken.has(run) ? wanted : run
    for (let k = 2; taken.has(name); k++) name = `${wanted} (${k})`
    taken.add(name)
    names.set(run, name)
  }
  return added.map((row) => ({ ...row, run: names.get(row.run) ?? row.run }))
}

/** Readings of one kind taken out, with the files they came from. */
export function withoutReadings(plan: Plan, kind: ReadingsKind): Plan {
  const emptied = {
    rows: { rows: [] },
    force: { force: forceLog([], []) },
    piston: { piston: [] },
    fields: { fields: null },
  }[kind]
  const sources = plan.readings?.sources.filter((source) => source.kind !== kind) ?? []
  return setReadings(plan, { ...emptied, sources })
}
