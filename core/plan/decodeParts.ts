/** Objects and lists inside a section: what is missing is empty, what is something else is refused. */
import { decodeValue, isObject, refuse, type Problems } from './decodeFields'
import type { FieldDefinition } from './fieldTypes'
import type { Json, JsonObject } from './json'
import { quantityDefinition } from './planPaths'

/** The object at the last key of a path; null where there is none, or what stands there is refused. */
export function partOf(parent: JsonObject, path: string, problems: Problems): JsonObject | null {
  const raw = parent[path.slice(path.lastIndexOf('.') + 1)]
  if (raw === undefined || raw === null) return null
  if (isObject(raw)) return raw
  refuse(problems, path, raw, 'an object of values')
  return null
}

/** A list with each item decoded; items that are refused are left out, and null or nothing is an empty list. */
export function listOf<T>(
  raw: Json | undefined,
  field: string,
  problems: Problems,
  decode: (item: Json, field: string, problems: Problems) => T | null,
): T[] {
  if (raw === undefined || raw === null) return []
  if (!Array.isArray(raw)) {
    refuse(problems, field, raw, 'a list')
    return []
  }
  return raw.flatMap((item: Json, index) => {
    const decoded = decode(item, `${field}.${index}`, problems)
    return decoded === null ? [] : [decoded]
  })
}

/** A list of numbers kept to one definition. */
export function numbersOf(
  raw: Json | undefined,
  field: string,
  definition: FieldDefinition,
  problems: Problems,
): number[] {
  return listOf(raw, field, problems, (item, at) => decodeValue(item, definition, at, problems))
}

/** A list of numbers at a path whose items the table of the plan's quantities knows. */
export function numbersAt(raw: Json | undefined, path: string, problems: Problems): number[] {
  const definition = quantityDefinition(`${path}.0`)
  if (definition === null) throw new RangeError(`no quantity is known at ${path}`)
  return numbersOf(raw, path, definition, problems)
}
