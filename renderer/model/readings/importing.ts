/** The head of a file as it is looked at before anything is taken: raw cells, and what the reader finds in it. */
import {
  choicesOfColumns,
  eachFieldFrame,
  READINGS_KINDS,
  READINGS_ROLES,
  readReadings,
  sourceLike,
  type FieldFrameChoices,
  type Plan,
  type ReadingsChoices,
  type ReadingsRole,
} from '../../../core/plan'
import type { ReadingsColumn, ReadingsKind } from '../../../core/tank'

/** Characters of a file that are looked at at once; the whole is read by the worker. */
const HEAD = 200_000
/** Lines shown. */
export const LINES_SHOWN = 7

export const KIND_WORDS: Readonly<Record<ReadingsKind, string>> = {
  rows: 'tracks',
  force: 'force log',
  piston: 'piston log',
  fields: 'velocity fields',
}

export const DELIMITERS: Readonly<Record<string, string>> = {
  ',': 'comma',
  ';': 'semicolon',
  '\t': 'tab',
  ' ': 'space',
  '|': 'bar',
}

export interface Preview {
  readonly kind: ReadingsKind
  readonly delimiter: string
  readonly decimalComma: boolean
  /** As they were read; of a table that cannot be read yet, its headings without roles. */
  readonly columns: readonly ReadingsColumn[]
  /** Raw cells of the first lines, the heading left out where there is one. */
  readonly cells: readonly (readonly string[])[]
  /** Whether frames tell their own time. */
  readonly timed: boolean
  /** Frames of the head of a velocity field. */
  readonly frames: number
  /** Why it cannot be read so, in a sentence; null where it can. */
  readonly problem: string | null
}

/** The first lines, cut at the end of a line. */
export function headOf(text: string): string {
  if (text.length <= HEAD) return text
  const end = text.lastIndexOf('\n', HEAD)
  return text.slice(0, end > 0 ? end : HEAD)
}

/** Look at the head of a file. */
export function previewOf(text: string, choices: ReadingsChoices): Preview {
  const head = headOf(text)
  const table = choices.kind === 'fields' ? null : readReadings(head, choices)
  if (table?.ok === true) {
    const { kind, delimiter, decimalComma, columns } = table
    return { ...plain(head, delimiter, columns), kind, decimalComma, problem: null }
  }
  const fields =
    choices.kind === undefined || choices.kind === 'fields'
      ? eachFieldFrame(
          head,
          () => 0,
          withoutKind(choices),
          () => undefined,
        )
      : null
  if (fields?.ok === true) {
    const { delimiter, decimalComma, columns, frames } = fields
    return { ...plain(head, delimiter, columns), kind: 'fields', decimalComma, frames, problem: null }
  }
  const delimiter = choices.delimiter ?? likelyDelimiter(head)
  const lines = linesOf(head, delimiter)
  const kind = choices.kind ?? 'rows'
  const guesses = choices.roles ?? guessedRoles(lines[0] ?? [], kind)
  const columns = (lines[0] ?? []).map((heading, index) => ({
    heading,
    role: guesses[index] ?? null,
    unit: choices.units?.[index] ?? '',
  }))
  const told = choices.kind === 'fields' ? fields : table
  return {
    ...plain(head, delimiter, columns),
    kind,
    decimalComma: choices.decimalComma ?? (delimiter !== ',' && lines.flat().some((cell) => /^-?\d+,\d+$/u.test(cell))),
    problem: told?.ok === false ? told.message : '',
  }
}

/** What is read of a field, which has one kind. */
export function withoutKind({ delimiter, decimalComma, roles, units }: ReadingsChoices): FieldFrameChoices {
  return {
    ...(delimiter === undefined ? {} : { delimiter }),
    ...(decimalComma === undefined ? {} : { decimalComma }),
    ...(roles === undefined ? {} : { roles }),
    ...(units === undefined ? {} : { units }),
  }
}

function plain(
  head: string,
  delimiter: string,
  columns: readonly ReadingsColumn[],
): Pick<Preview, 'delimiter' | 'columns' | 'cells' | 'timed' | 'frames'> {
  const lines = linesOf(head, delimiter)
  const headed = columns.some(({ heading }, index) => heading !== '' && lines[0]?.[index] === heading)
  return {
    delimiter,
    columns,
    cells: headed ? lines.slice(1) : lines.slice(0, LINES_SHOWN),
    timed: columns.some(({ role }) => role === 'time'),
    frames: 0,
  }
}

/** What can be told of a heading that is not whole, so that only what is missing has to be said. */
function guessedRoles(headings: readonly string[], kind: ReadingsKind): readonly (ReadingsRole | null)[] {
  const taken = new Set<ReadingsRole>()
  return headings.map((heading) => {
    const word = heading
      .replace(/[([].*$/u, '')
      .replace(/[^\p{L}\d]/gu, '')
      .toLowerCase()
    const role = READINGS_KINDS[kind].roles.find((one) => !taken.has(one) && READINGS_ROLES[one].words.includes(word))
    if (role !== undefined) taken.add(role)
    return role ?? null
  })
}

/** Cells of the first lines as they stand, quotation marks taken off. */
function linesOf(head: string, delimiter: string): readonly (readonly string[])[] {
  const lines: string[][] = []
  for (const line of head.replace(/^\uFEFF/u, '').split(/\r\n|\n|\r/u)) {
    if (line.trim() === '' || line.startsWith('#')) continue
    const cells = delimiter === ' ' ? line.trim().split(/\s+/u) : line.split(delimiter)
    lines.push(cells.map((cell) => cell.trim().replace(/^"(.*)"$/u, '$1')))
    if (lines.length > LINES_SHOWN) break
  }
  return lines
}

function likelyDelimiter(head: string): string {
  const first = head.split(/\r\n|\n|\r/u, 1)[0] ?? ''
  return ['\t', ';', ','].find((mark) => first.includes(mark)) ?? ' '
}

/** What the plan remembers of a table with these headings, in place of what would be found; nothing where it has none. */
export function rememberedChoices(plan: Plan, text: string): ReadingsChoices {
  const { columns } = previewOf(text, {})
  const like = sourceLike(
    plan,
    columns.map(({ heading }) => heading),
  )
  return like === null ? {} : { kind: like.kind, ...choicesOfColumns(like.columns) }
}
