/**
 * Older plans are brought up one version at a time by numbered pure steps; newer ones are refused.
 */
import type { JsonObject } from './json'
import { PLAN_VERSION } from './types'

/** One step: takes a document of version `from` and returns one of version `from + 1`. */
export interface Migration {
  readonly from: number
  readonly up: (document: JsonObject) => JsonObject
}

/** Steps in order, one for every version before PLAN_VERSION. Version 1 is the first, so there are none yet. */
export const MIGRATIONS: readonly Migration[] = []

/**
 * Bring a document to the target version.
 *
 * @param version the document's own version, 1 <= version <= target
 * @returns the document with `version` set, unchanged when it is current
 * @throws {RangeError} if a step is missing: an internal mistake, tested against
 */
export function migrate(
  document: JsonObject,
  version: number,
  migrations: readonly Migration[] = MIGRATIONS,
  target: number = PLAN_VERSION,
): JsonObject {
  let current = document
  for (let from = version; from < target; from++) {
    const step = migrations.find((migration) => migration.from === from)
    if (step === undefined) throw new RangeError(`no migration from plan version ${from}`)
    current = { ...step.up(current), version: from + 1 }
  }
  return current
}
