/** Reading the summary by the dotted paths of its values, items of lists included (`tankRun.arrivals.0.time`). */
import type { Cell } from './csvWriter'
import { isRecord } from './planNumbers'

/** What stands at a path. */
export type SummaryValue =
  /** null: the summary has such a value, and here it is missing. */
  | { readonly known: true; readonly value: Cell }
  /** No such value, or a part of the summary that holds several. */
  | { readonly known: false }

const UNKNOWN: SummaryValue = { known: false }
const MISSING: SummaryValue = { known: true, value: null }

/** @param document as `summaryDocument` makes it */
export function summaryValue(document: Readonly<Record<string, unknown>>, path: string): SummaryValue {
  let node: unknown = document
  for (const key of path.split('.')) {
    // Below a part that is missing here nothing can be told: a ring that is not made has no speed.
    if (node === null || node === undefined) return MISSING
    if (Array.isArray(node)) {
      if (!/^(?:0|[1-9]\d*)$/.test(key)) return UNKNOWN
      node = node[Number(key)]
    } else if (isRecord(node) && Object.hasOwn(node, key)) node = node[key]
    else return UNKNOWN
  }
  if (node === null || node === undefined) return MISSING
  return typeof node === 'number' || typeof node === 'string' || typeof node === 'boolean'
    ? { known: true, value: node }
    : UNKNOWN
}

/** The number at a path; null where there is none, or one that is not finite. */
export function summaryNumber(document: Readonly<Record<string, unknown>>, path: string): number | null {
  const found = summaryValue(document, path)
  return found.known && typeof found.value === 'number' && Number.isFinite(found.value) ? found.value : null
}
