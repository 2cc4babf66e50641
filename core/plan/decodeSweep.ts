/** The sections `sweep`, `spread` and `held` of a plan, and lists of fields with their levels. */
import { equallySpaced } from '../base'
import { parseQuantity, siUnit, toBase } from '../quantity'
import { checkAgainst, decodeNumber, decodeValue, describeValue, isObject, refuse, type Problems } from './decodeFields'
import { listOf, numbersOf, partOf } from './decodeParts'
import type { Json, JsonObject } from './json'
import { variedDefinition } from './planPaths'
import type { FieldDefinition } from './fieldTypes'
import type { HeldDesign, SpreadSection, SweepField, SweepSection } from './sectionTypes'

/** Most rows of a sweep. */
export const LARGEST_ROWS = 100000

export const SWEEP_DEFAULTS: SweepSection = { fields: [], results: [] }

export const SPREAD_DEFAULTS: SpreadSection = { relative: {}, absolute: {}, samples: 500, seed: 1 }

export function decodeSweep(raw: JsonObject, problems: Problems): SweepSection {
  const before = problems.length
  const fields = decodeLevels(raw['fields'], 'sweep.fields', problems)
  const rows = fields.reduce((product, { values }) => product * values.length, 1)
  if (problems.length === before && rows > LARGEST_ROWS)
    refuse(
      problems,
      'sweep.fields',
      rows,
      `at most ${LARGEST_ROWS} rows`,
      `sweep.fields must make at most ${LARGEST_ROWS} rows together, got ${rows}.`,
    )
  const results = listOf(raw['results'], 'sweep.results', problems, (item, at) => {
    if (typeof item === 'string' && item !== '') return item
    refuse(problems, at, item, 'a dotted path of the summary, such as "pulse.ring.speed"')
    return null
  })
  return { fields, results }
}

/** Fields each with its levels: `{ path, values }` or `{ path, from, to, count }`; each path once. */
export function decodeLevels(raw: Json | undefined, field: string, problems: Problems): SweepField[] {
  const seen = new Set<string>()
  return listOf(raw, field, problems, (item, at) => {
    if (!isObject(item)) {
      refuse(problems, at, item, 'a field { path, values } or { path, from, to, count }')
      return null
    }
    const path = decodePath(item['path'], `${at}.path`, problems)
    if (path === null) return null
    if (seen.has(path.name)) {
      refuse(problems, `${at}.path`, path.name, 'a path that no field before it has')
      return null
    }
    seen.add(path.name)
    const ends = ['from', 'to', 'count'].filter((key) => isGiven(item[key]))
    if (!isGiven(item['values'])) return decodeSteps(item, path, at, problems)
    if (ends.length > 0)
      refuse(
        problems,
        at,
        item,
        'values, or from, to and count',
        `${at} must give values or from, to and count, not both; it gives values and ${ends.join(', ')}.`,
      )
    const values = numbersOf(item['values'], `${at}.values`, path.definition, problems)
    if (Array.isArray(item['values']) && item['values'].length === 0)
      refuse(problems, `${at}.values`, item['values'], 'a list of at least one value')
    return { path: path.name, values, given: null }
  })
}

interface KnownPath {
  readonly name: string
  readonly definition: FieldDefinition
}

function decodePath(raw: Json | undefined, field: string, problems: Problems): KnownPath | null {
  const definition = typeof raw === 'string' ? variedDefinition(raw) : null
  if (typeof raw === 'string' && definition !== null) return { name: raw, definition }
  refuse(problems, field, raw, 'the dotted path of a number of the plan, such as "nozzle.diameter"')
  return null
}

function isGiven(raw: Json | undefined): boolean {
  return raw !== undefined && raw !== null
}

const COUNT: FieldDefinition = {
  label: 'Count',
  dimension: 'number',
  min: 1,
  max: LARGEST_ROWS,
  whole: true,
  help: 'How many values there are, both ends included.',
}

function decodeSteps(
  item: JsonObject,
  { name, definition }: KnownPath,
  field: string,
  problems: Problems,
): SweepField | null {
  const read = (key: string, of: FieldDefinition): number | null => {
    if (isGiven(item[key])) return decodeValue(item[key], of, `${field}.${key}`, problems)
    refuse(
      problems,
      `${field}.${key}`,
      item[key],
      'given',
      `${field} must give values, or from, to and count; it has no ${key}.`,
    )
    return null
  }
  const from = read('from', definition)
  const to = read('to', definition)
  const count = read('count', COUNT)
  if (from === null || to === null || count === null || checkAgainst(COUNT, 'count', count) !== null) return null
  const values = stepsBetween(from, to, count)
  const broken = definition.whole === true ? values.find((value) => !Number.isInteger(value)) : undefined
  if (broken !== undefined && Number.isInteger(from) && Number.isInteger(to))
    refuse(
      problems,
      `${field}.count`,
      count,
      'a count whose steps are whole',
      `${field} must make whole numbers of ${name}; ${count} values from ${from} to ${to} give ${broken}.`,
    )
  return { path: name, values, given: { from, to, count } }
}

/** Equal steps, both ends exact; between them 15 digits, so that a third value of 0.1 to 0.2 reads 0.15. */
function stepsBetween(from: number, to: number, count: number): number[] {
  if (count === 1) return [from]
  return equallySpaced(from, to, count).map((value, index) =>
    index === 0 || index === count - 1 ? value : Number(value.toPrecision(15)),
  )
}

export function decodeSpread(raw: JsonObject, problems: Problems): SpreadSection {
  const relative = decodeDeviations(raw, 'spread.relative', problems, (item, definition, at) => {
    // Degrees Celsius have no natural zero that a share could be taken of.
    if (definition.dimension !== 'temperature') return decodeValue(item, SHARE, at, problems)
    refuse(problems, at, item, 'given under spread.absolute', `${at} must be given in spread.absolute, in kelvin.`)
    return null
  })
  const absolute = decodeDeviations(raw, 'spread.absolute', problems, (item, definition, at) =>
    decodeDeviation(item, definition, at, problems),
  )
  for (const path of Object.keys(absolute).filter((name) => Object.hasOwn(relative, name)))
    refuse(
      problems,
      `spread.absolute.${path}`,
      absolute[path],
      'given once',
      `${path} must stand in spread.relative or in spread.absolute, not in both.`,
    )
  return {
    relative,
    absolute,
    samples: decodeNumber(raw, 'spread.samples', SPREAD_DEFAULTS.samples, problems),
    seed: decodeNumber(raw, 'spread.seed', SPREAD_DEFAULTS.seed, problems),
  }
}

const SHARE: FieldDefinition = {
  label: 'Relative deviation',
  dimension: 'number',
  min: 0,
  max: 1,
  help: 'Standard deviation over the value.',
}

function decodeDeviations(
  raw: JsonObject,
  field: string,
  problems: Problems,
  decode: (item: Json, definition: FieldDefinition, field: string) => number | null,
): Record<string, number> {
  const part = partOf(raw, field, problems) ?? {}
  const entries = Object.entries(part).flatMap(([path, item]): [string, number][] => {
    const definition = variedDefinition(path)
    const at = `${field}.${path}`
    if (definition === null) {
      refuse(
        problems,
        at,
        path,
        'the dotted path of a number of the plan',
        `${field} must name numbers of the plan by dotted paths such as "nozzle.diameter", got ${describeValue(path)}.`,
      )
      return []
    }
    if (definition.whole === true) {
      refuse(problems, at, path, 'a number that varies', `${at} must name a number that can scatter; ${path} is whole.`)
      return []
    }
    const value = decode(item, definition, at)
    return value === null ? [] : [[path, value]]
  })
  return Object.fromEntries(entries)
}

/** A standard deviation in the dimension of its field: 0 or more; of a temperature it is a difference, in kelvin. */
function decodeDeviation(raw: Json, definition: FieldDefinition, field: string, problems: Problems): number | null {
  const { label, help, dimension } = definition
  const limits: FieldDefinition = {
    label,
    help,
    dimension,
    min: 0,
    ...(definition.minutes === true ? { minutes: true } : {}),
  }
  if (dimension !== 'temperature' || typeof raw !== 'string') return decodeValue(raw, limits, field, problems)
  const parsed = parseQuantity(raw, dimension, siUnit(dimension), { name: label })
  if (!parsed.ok || parsed.unit === null) return decodeValue(raw, limits, field, problems)
  return decodeValue(parsed.value - toBase(0, parsed.unit), limits, field, problems)
}

/** Designs held against one another: a name, and the sections that make each. */
export function decodeHeld(raw: Json | undefined, problems: Problems): HeldDesign[] {
  return listOf(raw, 'held', problems, (item, at) => {
    if (isObject(item) && isObject(item['plan']) && typeof (item['name'] ?? '') === 'string') {
      const name = item['name']
      return { name: typeof name === 'string' ? name : '', plan: item['plan'] }
    }
    refuse(problems, at, item, 'a held design { name, plan }')
    return null
  })
}
