/**
 * Keys of a plan that this version does not know. They are kept and written back, but a misspelt field would be among them, so
 * whoever reads a plan tells them.
 */
import type { Json, JsonObject } from './json'
import { planDocument } from './writePlan'
import { isObject } from './decodeFields'
import { COMPUTED_SECTIONS } from './sectionOrder'
import type { Plan } from './types'

/** Sections whose every key this version knows; others belong to later capabilities and are not looked into. */
const KNOWN_SECTIONS = [...COMPUTED_SECTIONS, 'view'] as const

/** Sections the contract names, whether or not this version reads them. */
const LATER_SECTIONS = ['held'] as const

/** Dotted paths of the keys this version does not know, in their order; empty for a plan it knows whole. */
export function unknownKeys(plan: Plan): readonly string[] {
  const known = planDocument({ ...plan, source: {} })
  const later: readonly string[] = LATER_SECTIONS
  const top = Object.keys(plan.source).filter((key) => !(key in OPTIONAL) && !(key in known) && !later.includes(key))
  const inside = KNOWN_SECTIONS.flatMap((section) => {
    const given = plan.source[section]
    const taken = known[section]
    if (!isObject(given) || !isObject(taken)) return []
    return Object.keys(given)
      .filter((key) => !(key in taken) && !isOptional(section, key))
      .map((key) => `${section}.${key}`)
  })
  const deeper = NESTED_SECTIONS.flatMap((section) => unknownBelow(plan.source[section], known[section], section))
  return [...top, ...inside, ...deeper]
}

/** Sections whose parts keep what is unknown in them too. */
const NESTED_SECTIONS = ['thruster', 'tankRun', 'readings', 'sweep', 'spread'] as const

/** Steps of a matrix are saved as the values they make; what a row of readings does not hold is not saved. */
const READ_INTO_VALUES =
  /^(?:tankRun\.matrix\.fields\.\d+\.(?:from|to|count)|readings\.rows\.\d+\.(?:x|radius|circulation|sigmaX|sigmaRadius|sigmaCirculation))$/u

/** Unknown keys of the objects and the lists of objects inside one. */
function unknownBelow(given: Json | undefined, taken: Json | undefined, path: string): readonly string[] {
  // A log in another form, or a list of plain numbers, holds no keys of its own.
  if (path === 'readings.force') return []
  if (Array.isArray(given) && Array.isArray(taken) && given.length === taken.length)
    return given.flatMap((item: Json, index) => unknownOf(item, taken[index], `${path}.${index}`))
  if (!isObject(given) || !isObject(taken)) return []
  return Object.keys(given).flatMap((key) => unknownOf(given[key], taken[key], `${path}.${key}`))
}

function unknownOf(given: Json | undefined, taken: Json | undefined, path: string): readonly string[] {
  const own =
    isObject(given) && isObject(taken)
      ? Object.keys(given)
          .filter((key) => !(key in taken))
          .map((key) => `${path}.${key}`)
          .filter((name) => !READ_INTO_VALUES.test(name))
      : []
  return [...own, ...unknownBelow(given, taken, path)]
}

/** Known keys that a saved plan may leave out. */
const OPTIONAL: JsonObject = { notes: '', title: '', revision: '' }
function isOptional(section: string, key: string): boolean {
  return (
    (section === 'water' && ['density', 'kinematicViscosity', 'vapourPressure'].includes(key)) ||
    (section === 'programme' && key === 'rows') ||
    (section === 'readings' && ['piston', 'calibration', 'sources', 'fields', 'standResonance'].includes(key))
  )
}

/** The keys in a sentence; null where there are none. */
export function unknownKeysInWords(plan: Plan): string | null {
  const keys = unknownKeys(plan)
  if (keys.length === 0) return null
  const list = keys.slice(0, 6).join(', ') + (keys.length > 6 ? ` and ${keys.length - 6} more` : '')
  return `Not known to this version, kept and not read: ${list}.`
}
