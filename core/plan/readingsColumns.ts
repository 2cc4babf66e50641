/**
 * What the columns of a table of readings mean: guessed from the words of its heading, or as the user mapped them.
 */
import type { Dimension } from '../quantity'
import type { ReadingsColumn, ReadingsKind } from '../tank'
import { headingUnit, readNumber, type Sniffed, type WalkedLine } from './csvReader'

export type ReadingsRole =
  | 'run'
  | 'time'
  | 'x'
  | 'radius'
  | 'circulation'
  | 'sigmaX'
  | 'sigmaRadius'
  | 'sigmaCirculation'
  | 'force'
  | 'position'
  | 'speed'
  | 'r'
  | 'u'
  | 'v'

interface RoleDefinition {
  readonly label: string
  readonly dimension: Dimension
  /** Unit of a column that names none. */
  readonly unit: string
  /** Words of a heading, in small letters and without blanks or marks. */
  readonly words: readonly string[]
}

const uncertain = (...names: readonly string[]): string[] =>
  names.flatMap((name) => [
    ...['sigma', 's', 'u', 'd', 'err', 'error', 'uncertainty', 'uncertaintyof', 'sd', 'std', 'delta'].map(
      (word) => `${word}${name}`,
    ),
    ...['sigma', 'err', 'error', 'uncertainty', 'sd', 'std'].map((word) => `${name}${word}`),
  ])

const X = ['x', 'position', 'place', 'axialposition', 'xcore', 'corex', 'axial', 'distance']
const RADIUS = ['radius', 'r', 'ringradius', 'rcore', 'corer', 'radialposition']
const CIRCULATION = ['circulation', 'gamma', '\u03b3', 'ringcirculation']
const TIME = ['time', 't', 'seconds', 'elapsed', 'elapsedtime', 'timestamp']

export const READINGS_ROLES: Readonly<Record<ReadingsRole, RoleDefinition>> = {
  run: {
    label: 'run',
    dimension: 'number',
    unit: '',
    words: ['run', 'runno', 'runnumber', 'repeat', 'trial', 'shot', 'experiment', 'test', 'series', 'frame', 'frameno'],
  },
  time: { label: 'time', dimension: 'time', unit: 's', words: TIME },
  x: { label: 'place', dimension: 'length', unit: 'm', words: X },
  radius: { label: 'radius', dimension: 'length', unit: 'm', words: RADIUS },
  circulation: { label: 'circulation', dimension: 'circulation', unit: 'm2/s', words: CIRCULATION },
  sigmaX: { label: 'uncertainty of the place', dimension: 'length', unit: 'm', words: uncertain(...X) },
  sigmaRadius: { label: 'uncertainty of the radius', dimension: 'length', unit: 'm', words: uncertain(...RADIUS) },
  sigmaCirculation: {
    label: 'uncertainty of the circulation',
    dimension: 'circulation',
    unit: 'm2/s',
    words: uncertain(...CIRCULATION),
  },
  force: {
    label: 'force',
    dimension: 'force',
    unit: 'N',
    words: ['force', 'f', 'thrust', 'load', 'fx', 'loadcell', 'axialforce'],
  },
  position: {
    label: 'piston position',
    dimension: 'length',
    unit: 'm',
    words: [
      'position',
      'pistonposition',
      'displacement',
      'pistondisplacement',
      'travel',
      'pistontravel',
      'x',
      's',
      'stroke',
    ],
  },
  speed: {
    label: 'piston speed',
    dimension: 'speed',
    unit: 'm/s',
    words: ['speed', 'pistonspeed', 'velocity', 'pistonvelocity', 'u', 'v'],
  },
  r: { label: 'place across', dimension: 'length', unit: 'm', words: ['r', 'y', 'radius', 'radialposition'] },
  u: {
    label: 'axial velocity',
    dimension: 'speed',
    unit: 'm/s',
    words: ['u', 'vx', 'ux', 'velx', 'velocityx', 'xvelocity', 'axialvelocity', 'uaxial', 'velocityu'],
  },
  v: {
    label: 'velocity across',
    dimension: 'speed',
    unit: 'm/s',
    words: [
      'v',
      'vr',
      'ur',
      'vy',
      'uy',
      'vely',
      'velr',
      'velocityy',
      'velocityr',
      'yvelocity',
      'radialvelocity',
      'velocityv',
    ],
  },
}

/** Roles a kind of table may have, those of a bare table in their order; the needed ones first in `needed`. */
export const READINGS_KINDS: Readonly<
  Record<
    ReadingsKind,
    {
      readonly roles: readonly ReadingsRole[]
      readonly bare: readonly ReadingsRole[]
      readonly needed: readonly ReadingsRole[]
    }
  >
> = {
  rows: {
    roles: ['run', 'time', 'sigmaX', 'sigmaRadius', 'sigmaCirculation', 'x', 'radius', 'circulation'],
    bare: ['time', 'x', 'radius', 'circulation'],
    needed: ['time'],
  },
  force: { roles: ['time', 'force'], bare: ['time', 'force'], needed: ['time', 'force'] },
  piston: { roles: ['time', 'speed', 'position'], bare: ['time', 'position'], needed: ['time'] },
  fields: { roles: ['run', 'time', 'x', 'r', 'u', 'v'], bare: ['x', 'r', 'u', 'v'], needed: ['x', 'r', 'u', 'v'] },
}

/** What the user set in place of what is found; everything may be left out. */
export interface ReadingsChoices {
  readonly kind?: ReadingsKind
  readonly delimiter?: string
  readonly decimalComma?: boolean
  /** Role of each column in its order; null: not used. */
  readonly roles?: readonly (ReadingsRole | null)[]
  /** Unit of each column in its order; null: as its heading says. */
  readonly units?: readonly (string | null)[]
}

export interface ReadColumn {
  readonly role: ReadingsRole
  readonly index: number
  readonly unit: string
}

export type ReadColumns =
  | {
      readonly ok: true
      readonly kind: ReadingsKind
      readonly headed: boolean
      readonly used: readonly ReadColumn[]
      /** Every column, to be shown and kept. */
      readonly columns: readonly ReadingsColumn[]
      /** True where a length is in pixels. */
      readonly pixels: boolean
    }
  | { readonly ok: false; readonly message: string }

/** The words of a heading without its unit, in small letters and without blanks and marks; signs that stand for a word are spelt. */
export function headingWord(heading: string): string {
  return heading
    .replace(/[([].*$/u, '')
    .replace(/[\u03c3\u03c2]/gu, 'sigma')
    .replace(/[\u0394\u03b4]/gu, 'delta')
    .replace(/\u0393/gu, 'gamma')
    .replace(/[^\p{L}\d]/gu, '')
    .toLowerCase()
}

/** Roles and units from the first line of a table. */
export function readColumns(first: WalkedLine, choices: ReadingsChoices, sniffed: Sniffed): ReadColumns {
  const headed = isHeading(first, sniffed)
  const kind = choices.kind ?? (headed ? kindOf(first.cells.map(headingWord)) : 'rows')
  const roles = choices.roles ?? (headed ? rolesOf(first.cells, kind) : bareRoles(kind, first.cells.length))
  const { needed } = READINGS_KINDS[kind]
  const missing = needed.filter((role) => !roles.includes(role))
  if (missing.length > 0)
    return {
      ok: false,
      message: `The table needs a column of ${missing.map((role) => READINGS_ROLES[role].label).join(' and one of ')}; its columns are "${first.cells.join('", "')}". Say which column is which.`,
    }
  const measured: readonly ReadingsRole[] =
    kind === 'rows' ? ['x', 'radius', 'circulation'] : kind === 'piston' ? ['position', 'speed'] : needed
  if (!measured.some((role) => roles.includes(role)))
    return {
      ok: false,
      message: `The table needs a column of ${measured.map((role) => READINGS_ROLES[role].label).join(' or ')}; its columns are "${first.cells.join('", "')}". Say which column is which.`,
    }
  const used: ReadColumn[] = []
  const columns: ReadingsColumn[] = []
  let pixels = false
  for (const [index, cell] of first.cells.entries()) {
    const heading = headed ? cell : `column ${index + 1}`
    const role = roles[index] ?? null
    if (role === null || used.some((one) => one.role === role)) {
      columns.push({ heading, role: null, unit: '' })
      continue
    }
    const { dimension, unit: usual } = READINGS_ROLES[role]
    const chosen = choices.units?.[index] ?? null
    const inPixels =
      dimension === 'length' && /[([]\s*(?:px|pixels?)\s*[)\]]/iu.test(chosen === null ? heading : `(${chosen})`)
    const named = chosen === null ? heading : `${heading.replace(/[([].*$/u, '')} (${chosen})`
    const found = role === 'run' || inPixels ? { ok: true as const, unit: usual } : headingUnit(named, dimension, usual)
    if (!found.ok) return found
    pixels ||= inPixels
    used.push({ role, index, unit: found.unit })
    columns.push({ heading, role, unit: inPixels ? 'px' : found.unit })
  }
  return { ok: true, kind, headed, used, columns, pixels }
}

/** A line of words in every cell: no number, and at least one letter. */
export function isHeading({ cells }: WalkedLine, sniffed: Sniffed): boolean {
  return (
    cells.some((cell) => /\p{L}/u.test(cell)) &&
    cells.every((cell) => cell === '' || (readNumber(cell, sniffed) === null && !/^[+-]?[\d.,]/u.test(cell)))
  )
}

function kindOf(words: readonly string[]): ReadingsKind {
  const has = (role: ReadingsRole): boolean => words.some((word) => READINGS_ROLES[role].words.includes(word))
  if (has('force')) return 'force'
  if (has('u') && has('v') && has('r')) return 'fields'
  if (words.some((word) => word.startsWith('piston'))) return 'piston'
  if (!has('radius') && !has('circulation') && !words.includes('x') && has('speed')) return 'piston'
  return 'rows'
}

/** Each column the first role of the kind whose words it has, each role once. */
function rolesOf(headings: readonly string[], kind: ReadingsKind): readonly (ReadingsRole | null)[] {
  const taken = new Set<ReadingsRole>()
  return headings.map((heading) => {
    const word = headingWord(heading)
    const role = READINGS_KINDS[kind].roles.find((one) => !taken.has(one) && READINGS_ROLES[one].words.includes(word))
    if (role === undefined) return null
    taken.add(role)
    return role
  })
}

function bareRoles(kind: ReadingsKind, count: number): readonly (ReadingsRole | null)[] {
  const { bare } = READINGS_KINDS[kind]
  return Array.from({ length: count }, (_, index) => bare[index] ?? null)
}
