/** Reading a plan by the dotted paths of its numbers. */
import type { Problem } from '../base'
import { checkAgainst } from './decodeFields'
import { quantityDefinition } from './planPaths'
import type { Plan } from './types'

/** The value at a path of a nest of objects and lists; undefined where there is none. */
function valueAt(node: unknown, path: string): unknown {
  return path
    .split('.')
    .reduce<unknown>((held, key) => (isRecord(held) && Object.hasOwn(held, key) ? held[key] : undefined), node)
}

/** Whether a value is an object or a list. */
export function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null
}

/**
 * The number at a path of the plan [SI], items of lists included (`wake.stations.0`).
 *
 * @returns null where it is not given, or the plan holds no such number
 */
export function numberAt(plan: Plan, path: string): number | null {
  if (quantityDefinition(path) === null) return null
  const value = valueAt(plan, path) ?? aliased(plan, path)
  return typeof value === 'number' ? value : null
}

/** Targets stand in a file under the name of what is wanted; in the plan they are told apart by their kind. */
function aliased({ tankRun, thruster }: Plan, path: string): number | undefined {
  const wanted = tankRun?.target ?? null
  if (wanted !== null && path === `tankRun.target.${wanted.kind}`) return wanted.value
  const first = thruster?.target[0]
  if (first === undefined) return undefined
  if (path === 'thruster.target.speed' && 'speed' in first) return first.speed
  if (path === 'thruster.target.thrust' && 'thrust' in first) return first.thrust
  return undefined
}

/** As checkField, for any number of the plan by its dotted path; null where nothing is wrong or the plan knows no such number. */
export function checkNumber(path: string, value: number): Problem | null {
  const definition = quantityDefinition(path)
  return definition === null ? null : checkAgainst(definition, path, value)
}
