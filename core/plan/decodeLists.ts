/**
 * A file of parts lists read: every part is decoded by the plan's own decoder, so that a list holds nothing a plan would refuse.
 */
import type { Problem } from '../base'
import { describeValue, isObject, refuse, type Problems } from './decodeFields'
import { decodePlan } from './decodePlan'
import { LIST_KINDS, LISTS_FORMAT, LISTS_VERSION, type ListEntry, type ListKind, type ListsReading } from './listTypes'
import type { Json, JsonObject } from './json'
import { PLAN_FORMAT, PLAN_VERSION, type Plan } from './types'
import { planDocument } from './writePlan'

/** Most parts of one kind, longest name [characters], and largest file [characters]. */
export const MOST_PARTS = 1000
export const LONGEST_PART_NAME = 120
export const LARGEST_LISTS = 5 * 1024 * 1024

/** Read parts lists from their text. Never throws for any text. */
export function readLists(text: string): ListsReading {
  if (text.length > LARGEST_LISTS)
    return refused('', 'a larger file', 'at most 5 MB', 'Parts lists must be at most 5 MB.')
  let document: unknown
  try {
    document = JSON.parse(text.replace(/^\uFEFF/, ''))
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error)
    return refused('', 'text that is not JSON', 'a JSON document', `These are no parts lists: not valid JSON (${why}).`)
  }
  return decodeLists(document)
}

/** As readLists, from parsed JSON. */
export function decodeLists(document: unknown): ListsReading {
  const given = isObject(document) ? document['format'] : document
  if (!isObject(document) || given !== LISTS_FORMAT) {
    const what = describeValue(given)
    const limit = `"${LISTS_FORMAT}"`
    return refused('format', what, limit, `These are no parts lists: format must be ${limit}, got ${what}.`)
  }
  const version = document['version']
  if (typeof version !== 'number' || !Number.isInteger(version) || version < 1) {
    const what = describeValue(version)
    return refused('version', what, 'a whole number from 1', `version must be a whole number from 1, got ${what}.`)
  }
  if (version > LISTS_VERSION)
    return refused(
      'version',
      String(version),
      `at most ${LISTS_VERSION}`,
      `These parts lists were made by a newer version (${version}); this program reads up to ${LISTS_VERSION}.`,
    )
  const problems: Problems = []
  const read = (kind: ListKind): ListEntry[] => entriesOf(document[kind], kind, problems)
  const lists = {
    nozzles: read('nozzles'),
    actuators: read('actuators'),
    vehicles: read('vehicles'),
    tanks: read('tanks'),
    cameras: read('cameras'),
  }
  return problems.length > 0 ? { ok: false, problems } : { ok: true, lists }
}

function refused(field: string, value: string, limit: string, message: string): ListsReading {
  return { ok: false, problems: [{ field, value, limit, message }] }
}

function entriesOf(raw: Json | undefined, kind: ListKind, problems: Problems): ListEntry[] {
  if (raw === undefined || raw === null) return []
  if (!Array.isArray(raw) || raw.length > MOST_PARTS) {
    refuse(problems, kind, Array.isArray(raw) ? `${raw.length} parts` : raw, `a list of at most ${MOST_PARTS} parts`)
    return []
  }
  const names = new Set<string>()
  return raw.flatMap((item: Json, index) => {
    const field = `${kind}.${index}`
    const name = isObject(item) && typeof item['name'] === 'string' ? item['name'].trim() : ''
    if (!isObject(item) || name === '' || name.length > LONGEST_PART_NAME) {
      refuse(
        problems,
        `${field}.name`,
        isObject(item) ? item['name'] : item,
        `a text of 1 to ${LONGEST_PART_NAME} characters`,
      )
      return []
    }
    if (names.has(name)) {
      refuse(
        problems,
        `${field}.name`,
        name,
        'a name of its own',
        `${field}.name must be a name of its own, "${name}" stands twice.`,
      )
      return []
    }
    names.add(name)
    const part = decodePart(kind, item['values'])
    if (part.ok) return [{ name, values: part.values }]
    problems.push(...part.problems.map((problem) => within(problem, kind, `${field}.values`)))
    return []
  })
}

/** A refusal of the plan's decoder under its place in the lists. */
function within(problem: Problem, kind: ListKind, place: string): Problem {
  const { path } = LIST_KINDS[kind]
  const moved = (text: string): string => text.replaceAll(path, place)
  return { ...problem, field: moved(problem.field), message: moved(problem.message) }
}

export type PartReading =
  | { readonly ok: true; readonly values: JsonObject; readonly plan: Plan }
  | { readonly ok: false; readonly problems: readonly Problem[] }

/** The smallest plan that can carry a part. */
const CARRIER = {
  format: PLAN_FORMAT,
  version: PLAN_VERSION,
  water: { kind: 'fresh' },
  nozzle: { diameter: 0.03 },
  programme: { shape: 'rectangular', stroke: 0.06, peakSpeed: 0.1 },
} as const satisfies JsonObject

/** Values of one part through the decoder of the plan: `plan` carries it where the plan has it. */
export function decodePart(kind: ListKind, values: Json | undefined): PartReading {
  const { path } = LIST_KINDS[kind]
  if (!isObject(values)) {
    const problems: Problems = []
    refuse(problems, path, values, 'an object of values')
    return { ok: false, problems }
  }
  const [section = '', key] = path.split('.')
  const reading = decodePlan({ ...CARRIER, [section]: key === undefined ? values : { [key]: values } })
  if (!reading.ok) return reading
  const written = planDocument(reading.plan)[section]
  const part = key === undefined ? written : isObject(written) ? written[key] : undefined
  return { ok: true, values: isObject(part) ? part : values, plan: reading.plan }
}
