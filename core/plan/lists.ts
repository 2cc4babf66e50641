/**
 * Parts lists as pure functions: parts taken from a plan and copied into one, lists changed, joined and written.
 */
import { isObject } from './decodeFields'
import { decodePart, LONGEST_PART_NAME } from './decodeLists'
import { present } from './editPath'
import { examplePlan } from './examples'
import {
  LIST_KINDS,
  LISTS_FORMAT,
  LISTS_VERSION,
  NO_PARTS,
  type ListEntry,
  type ListKind,
  type PartsLists,
} from './listTypes'
import type { Plan } from './types'
import { planDocument } from './writePlan'

export const ALL_LIST_KINDS: readonly ListKind[] = ['nozzles', 'actuators', 'vehicles', 'tanks', 'cameras']

/** The text of a lists file, with its trailing newline. */
export function writeLists(lists: PartsLists): string {
  const kinds = ALL_LIST_KINDS.map((kind) => [kind, lists[kind]] as const)
  const document = { format: LISTS_FORMAT, version: LISTS_VERSION, ...Object.fromEntries(kinds) }
  return `${JSON.stringify(document, null, 2)}\n`
}

/** The part of a plan under a name; null where the plan has none, or the name is empty. */
export function takeFromPlan(plan: Plan, kind: ListKind, name: string): ListEntry | null {
  const [section = '', key] = LIST_KINDS[kind].path.split('.')
  if (section === 'nozzle' && plan.absent.includes('nozzle')) return null
  const written = planDocument(plan)[section]
  const part = key === undefined ? written : isObject(written) ? written[key] : undefined
  const plain = nameOf(name)
  return isObject(part) && plain !== '' ? { name: plain, values: part } : null
}

/**
 * A plan with a part copied into it.
 *
 * @returns null where the plan has no place for it: an actuator and a vehicle need thrusters, a tank and a camera a tank run; or where the
 *   part is refused
 */
export function putIntoPlan(plan: Plan, kind: ListKind, entry: ListEntry): Plan | null {
  const part = decodePart(kind, entry.values)
  if (!part.ok) return null
  const { nozzle, thruster, tankRun } = part.plan
  switch (kind) {
    case 'nozzles':
      return { ...present(plan, 'nozzle'), nozzle }
    case 'actuators':
      return withThruster(plan, thruster === null ? {} : { actuator: thruster.actuator })
    case 'vehicles':
      return withThruster(plan, thruster === null ? {} : { vehicle: thruster.vehicle })
    case 'tanks':
      return withTankRun(plan, tankRun === null ? {} : { tank: tankRun.tank })
    case 'cameras':
      return withTankRun(plan, tankRun === null ? {} : { camera: tankRun.camera })
  }
}

function withThruster(plan: Plan, change: Partial<NonNullable<Plan['thruster']>>): Plan | null {
  return plan.thruster === null ? null : { ...plan, thruster: { ...plan.thruster, ...change } }
}

function withTankRun(plan: Plan, change: Partial<NonNullable<Plan['tankRun']>>): Plan | null {
  return plan.tankRun === null ? null : { ...plan, tankRun: { ...plan.tankRun, ...change } }
}

/** Lists with a part at the end of its kind; a name that is taken gets a number. */
export function withPart(lists: PartsLists, kind: ListKind, entry: ListEntry): PartsLists {
  return { ...lists, [kind]: [...lists[kind], { ...entry, name: freeName(lists[kind], entry.name) }] }
}

export function withoutPart(lists: PartsLists, kind: ListKind, name: string): PartsLists {
  return { ...lists, [kind]: lists[kind].filter((entry) => entry.name !== name) }
}

/** A part under another name; an empty name changes nothing, one that is taken gets a number. */
export function withPartNamed(lists: PartsLists, kind: ListKind, name: string, next: string): PartsLists {
  const plain = nameOf(next)
  if (plain === '' || plain === name) return lists
  const others = lists[kind].filter((entry) => entry.name !== name)
  const free = freeName(others, plain)
  return { ...lists, [kind]: lists[kind].map((entry) => (entry.name === name ? { ...entry, name: free } : entry)) }
}

export interface MergedLists {
  readonly lists: PartsLists
  /** Parts that were new, and of them those whose name was taken by another part. */
  readonly added: number
  readonly renamed: number
}

/** Two lists as one: what both have stands once, a name that stands for two parts gets a number. */
export function mergeLists(own: PartsLists, other: PartsLists): MergedLists {
  let lists = own
  let added = 0
  let renamed = 0
  for (const kind of ALL_LIST_KINDS)
    for (const entry of other[kind]) {
      const named = lists[kind].filter(({ name }) => sameStem(name, entry.name))
      if (named.some(({ values }) => JSON.stringify(values) === JSON.stringify(entry.values))) continue
      if (lists[kind].some(({ name }) => name === entry.name)) renamed += 1
      lists = withPart(lists, kind, entry)
      added += 1
    }
  return { lists, added, renamed }
}

/** Whether a name is another, or that with a number of ours. */
function sameStem(name: string, stem: string): boolean {
  return name === stem || (name.startsWith(`${stem} (`) && /^\(\d+\)$/u.test(name.slice(stem.length + 1)))
}

function freeName(entries: readonly ListEntry[], wanted: string): string {
  const taken = new Set(entries.map(({ name }) => name))
  let name = wanted
  for (let number = 2; taken.has(name); number++) name = `${wanted.slice(0, LONGEST_PART_NAME - 8)} (${number})`
  return name
}

function nameOf(text: string): string {
  return text.trim().slice(0, LONGEST_PART_NAME)
}

/** Parts of the invented examples, to begin with. */
export function sampleLists(): PartsLists {
  const samples: readonly (readonly [kind: ListKind, example: string, name: string])[] = [
    ['nozzles', 'bench-generator', 'Tube, 25 mm'],
    ['nozzles', 'survey-vehicle', 'Tube, 50 mm, with inlet loss'],
    ['nozzles', 'sharp-orifice', 'Plate with a 20 mm hole'],
    ['actuators', 'survey-vehicle', 'Plunger drive, 150 N'],
    ['actuators', 'bench-thruster', 'Bench drive, 40 N'],
    ['vehicles', 'survey-vehicle', 'Survey hull, 1.6 m'],
    ['tanks', 'tank-day', 'Glass tank, 1.2 m'],
    ['cameras', 'tank-day', 'Thirteen megapixels, 100 frames a second'],
  ]
  return samples.reduce((lists, [kind, example, name]) => {
    const entry = takeFromPlan(examplePlan(example), kind, name)
    return entry === null ? lists : withPart(lists, kind, entry)
  }, NO_PARTS)
}
