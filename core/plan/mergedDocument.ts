/** Known values of a part of the document, with what the part held beyond them in the file it was read from. */
import type { Json, JsonObject } from './json'

/** Values of a part by key; a key with undefined is known and not written. */
export type Part = Readonly<Record<string, Json | undefined>>

/** Known values first in their order, then what the part held beyond them. */
export function merged(source: Json | undefined, values: Part): JsonObject {
  const beyond = Object.entries(objectOf(source)).filter(([key]) => !(key in values))
  const known = Object.entries(values).flatMap(([key, value]) => pair(key, value))
  return Object.fromEntries([...known, ...beyond])
}

/** The object a document holds; empty where it holds something else. */
export function objectOf(source: Json | undefined): JsonObject {
  return isJsonObject(source) ? source : {}
}

/** Objects of a list, each with what it held beyond; a list of another length has changed, and keeps nothing. */
export function mergedList(source: Json | undefined, items: readonly Part[]): JsonObject[] {
  const old = isJsonList(source) && source.length === items.length ? source : []
  return items.map((item, index) => merged(old[index], item))
}

/** A pair for Object.fromEntries; none where there is no value. */
export function pair(key: string, value: Json | undefined): [string, Json][] {
  return value === undefined ? [] : [[key, value]]
}

function isJsonList(source: Json | undefined): source is readonly Json[] {
  return Array.isArray(source)
}

function isJsonObject(source: Json | undefined): source is JsonObject {
  return typeof source === 'object' && source !== null && !isJsonList(source)
}
